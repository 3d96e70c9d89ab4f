import type { APIContext, MiddlewareNext } from 'astro';
import { defineMiddleware } from 'astro:middleware';
import { paths } from './paths';
import { readSession } from './server/auth/session';
import { Forbidden, NotFound, SignInNeeded, WrongHost } from './server/errors';
import { failureOf } from './server/http/failure';
import { addSecurityHeaders } from './server/http/headers';
import { forgetKept } from './server/http/keptSheets';
import { isOwnHost, mayChange } from './server/http/origin';
import { errorToJson } from './server/http/respond';
import { signInPath } from './server/http/returnPath';
import { isSecretPage, SECRET_PAGE_HEADERS } from './server/http/secretPages';
import { newId } from './server/ids';
import { log } from './server/log';
import { services } from './server/services';

/** Every request passes here: who asks, may they, and what an error looks like. */
export const onRequest = defineMiddleware(async (context, next) => {
  context.locals.requestId = context.request.headers.get('x-request-id') ?? newId();
  context.locals.viewer = null;
  let response: Response;
  let reached = false;
  try {
    refuseForeign(context);
    context.locals.viewer = await readSession(context);
    reached = true;
    response = await next();
    if (response.status === 404 && isApi(context) && !isJson(response)) {
      throw new NotFound('The API has nothing at this address.');
    }
  } catch (error) {
    response = await answerFailure(context, next, error, reached);
  }
  const { requestId, viewer } = context.locals;
  return withHeaders(response, (headers) => {
    headers.set('x-request-id', requestId);
    addSecurityHeaders(headers, services().config);
    if (isPage(headers)) forgetKept(context.request, headers, viewer);
    if (viewer) headers.set('cache-control', 'no-store');
    else if (isPage(headers)) headers.set('cache-control', 'private, no-cache');
    if (isSecretPage(context.url.pathname)) {
      for (const [name, value] of Object.entries(SECRET_PAGE_HEADERS)) headers.set(name, value);
    }
  });
});

function refuseForeign({ request, url }: APIContext): void {
  const { publicUrl } = services().config;
  if (!isOwnHost(url.host, publicUrl)) {
    throw new WrongHost(`This server answers at ${publicUrl} only.`);
  }
  if (
    !mayChange(
      {
        method: request.method,
        pathname: url.pathname,
        search: url.search,
        headers: request.headers,
      },
      publicUrl,
    )
  ) {
    throw new Forbidden(
      'This change was not asked for by a page of ours. Open the page here and send it again.',
    );
  }
}

async function answerFailure(
  context: APIContext,
  next: MiddlewareNext,
  error: unknown,
  /** Whether the request came through to its page and action. */
  reached: boolean,
): Promise<Response> {
  const { requestId } = context.locals;
  if (isApi(context)) return errorToJson(error, requestId);
  if (error instanceof SignInNeeded) {
    const { pathname, search } = context.url;
    const asked = context.request.method === 'GET' ? pathname + search : pathname;
    return context.redirect(signInPath(asked), 303);
  }
  const failure = failureOf(error, requestId);
  if (failure.status === 500) log.error({ requestId, err: error }, 'request failed');
  // Rendering a page runs the action that the request names, even when the page is that of the refusal.
  const acts = !reached && context.request.method !== 'GET' && context.request.method !== 'HEAD';
  if (error instanceof WrongHost || acts) return plain(failure.sentence, failure.status);
  context.locals.failure = failure;
  try {
    const cookie = context.request.headers.get('cookie') ?? '';
    return await next(new Request(new URL(paths.problem, context.url), { headers: { cookie } }));
  } catch (broken) {
    log.error({ requestId, err: broken }, 'the error page failed');
    return plain(failure.sentence, failure.status);
  }
}

function plain(sentence: string, status: number): Response {
  return new Response(`${sentence}\n`, {
    status,
    headers: { 'content-type': 'text/plain; charset=utf-8' },
  });
}

function isApi({ url }: APIContext): boolean {
  return url.pathname.startsWith('/api/');
}

function isJson({ headers }: Response): boolean {
  return (headers.get('content-type') ?? '').includes('json');
}

function isPage(headers: Headers): boolean {
  return (headers.get('content-type') ?? '').startsWith('text/html');
}

/** Some answers, such as those of `Response.redirect`, do not let their headers be changed. */
function withHeaders(response: Response, change: (headers: Headers) => void): Response {
  const own = new Response(response.body, response);
  change(own.headers);
  return own;
}
