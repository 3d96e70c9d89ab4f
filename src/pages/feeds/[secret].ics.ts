import type { APIRoute } from 'astro';
import { openToAll } from '../../server/auth/guards';
import { isUnchanged, readFeed } from '../../server/feeds/readFeed';
import { services } from '../../server/services';

/** A calendar program reads a feed. The address is the secret; no session counts here. */
export const GET: APIRoute = async (context) => {
  openToAll(context);
  const { body, etag, lastModifiedMs } = await readFeed(services(), context.params['secret'] ?? '');
  const headers = {
    etag,
    'last-modified': new Date(lastModifiedMs).toUTCString(),
    'cache-control': 'private, no-cache',
    'referrer-policy': 'no-referrer',
    'x-robots-tag': 'noindex',
  };
  if (isUnchanged(context.request.headers.get('if-none-match'), etag)) {
    return new Response(null, { status: 304, headers });
  }
  return new Response(body, {
    headers: { ...headers, 'content-type': 'text/calendar; charset=utf-8' },
  });
};
