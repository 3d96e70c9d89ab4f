import { createHash } from 'node:crypto';
import type { APIContext } from 'astro';
import type { Viewer } from '../auth/viewer';

/** Says for whom this browser may have kept sheets. */
const COOKIE = 'sheets_of';
/** Read by public/skeds/keeper.js. */
const HEADER = 'x-sheet-owner';
const YEAR_S = 31_536_000;

function markOf(viewer: Pick<Viewer, 'id'>): string {
  return createHash('sha256').update(`sheets of ${viewer.id}`).digest('hex').slice(0, 24);
}

/** Marks the page as one that the browser may keep for this person. */
export function mayBeKept(
  {
    cookies,
    url,
    response,
  }: Pick<APIContext, 'cookies' | 'url'> & { response: { headers: Headers } },
  viewer: Viewer,
): void {
  response.headers.set(HEADER, markOf(viewer));
  cookies.set(COOKIE, markOf(viewer), {
    path: '/',
    httpOnly: true,
    sameSite: 'lax',
    secure: url.protocol === 'https:',
    maxAge: YEAR_S,
  });
}

/** Makes the browser forget the sheets of whoever is not signed in here any more. */
export function forgetKept(request: Request, headers: Headers, viewer: Viewer | null): void {
  const mark = new RegExp(`(?:^|;\\s*)${COOKIE}=([^;]*)`).exec(
    request.headers.get('cookie') ?? '',
  )?.[1];
  if (mark === undefined || (viewer && mark === markOf(viewer))) return;
  headers.set('clear-site-data', '"storage"');
  headers.append('set-cookie', `${COOKIE}=; Path=/; Max-Age=0; HttpOnly; SameSite=Lax`);
}
