import { isUnchanged } from './readFeed';

/** A calendar as an answer over HTTP, or 304 where the asker has it already (RFC 9110, 13.1.2). */
export function calendarResponse(
  request: Request,
  { body, etag, lastModifiedMs }: { body: string; etag: string; lastModifiedMs: number },
  cacheControl: string,
  extra: Record<string, string> = {},
): Response {
  const headers = {
    etag,
    'last-modified': new Date(lastModifiedMs).toUTCString(),
    'cache-control': cacheControl,
    ...extra,
  };
  if (isUnchanged(request.headers.get('if-none-match'), etag)) {
    return new Response(null, { status: 304, headers });
  }
  return new Response(body, {
    headers: { ...headers, 'content-type': 'text/calendar; charset=utf-8' },
  });
}
