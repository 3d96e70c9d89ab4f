import { Auth, raw, skipCSRFCheck } from '@auth/core';
import type { ResponseInternal } from '@auth/core/types';
import type { APIContext } from 'astro';
import authConfig from '../../../auth.config';
import { config } from '../config';
import { services } from '../services';
import { SignInRefused } from './authorize';
import type { Viewer } from './viewer';
import { viewerOfSession, type SessionClaims } from './viewerOfSession';

type WithCookies = Pick<APIContext, 'cookies' | 'request'>;

/** A cookie younger than this is left alone, so that requests side by side do not overwrite each other. */
const ROLL_AFTER_S = 3_600;

/** Auth.js leaves a cookie with the address to return to; where to go is decided here by the pages. */
const SESSION_COOKIE = /^(__Secure-)?authjs\.session-token/;

/** Asks Auth.js inside this process. Its own token against forged forms is off: the middleware checks the origin. */
async function askAuth(
  { request }: WithCookies,
  path: string,
  form?: Record<string, string>,
): Promise<ResponseInternal> {
  const headers = new Headers({ cookie: request.headers.get('cookie') ?? '' });
  if (form) headers.set('content-type', 'application/x-www-form-urlencoded');
  const asked = new Request(`${config().publicUrl}${authConfig.basePath}${path}`, {
    method: form ? 'POST' : 'GET',
    headers,
    ...(form ? { body: new URLSearchParams(form).toString() } : {}),
  });
  const answer: unknown = await Auth(asked, { ...authConfig, raw, skipCSRFCheck });
  if (answer instanceof Response) throw new Error(`Auth.js is not set up: ${await answer.text()}`);
  return answer as ResponseInternal;
}

function setCookies({ cookies }: WithCookies, answer: ResponseInternal): void {
  for (const { name, value, options } of answer.cookies ?? []) {
    if (SESSION_COOKIE.test(name)) cookies.set(name, value, options);
  }
}

/**
 * Reads the session of a request and prolongs its cookie. Returns null, and takes the cookie away, when
 * the session is over.
 */
export async function readSession(context: WithCookies): Promise<Viewer | null> {
  const given = context.request.headers.get('cookie') ?? '';
  if (!/(^|;\s*)(__Secure-)?authjs\.session-token/.test(given)) return null;
  const answer = await askAuth(context, '/session');
  const claims = (answer.body ?? {}) as SessionClaims & { issuedAtS?: number };
  const viewer = await viewerOfSession(services(), claims);
  if (!viewer) await signOut(context);
  else if (Date.now() / 1000 - (claims.issuedAtS ?? 0) > ROLL_AFTER_S) setCookies(context, answer);
  return viewer;
}

/** Starts a session by address and password. Throws `SignInRefused`. */
export async function signInByPassword(
  context: WithCookies,
  given: { email: string; password: string },
): Promise<void> {
  setCookies(context, await askAuth(context, '/callback/password', given));
}

/** Starts a session by a link from a mail; confirming an address takes the first password too. Throws `SignInRefused`. */
export async function signInByLink(
  context: WithCookies,
  given: { secret: string } & (
    { purpose: 'signIn' } | { purpose: 'confirmMail'; password: string }
  ),
): Promise<void> {
  setCookies(context, await askAuth(context, '/callback/link', given));
}

/** Ends the session of this browser. */
export async function signOut(context: WithCookies): Promise<void> {
  setCookies(context, await askAuth(context, '/signout', {}));
}

export { SignInRefused };
