import { createHmac, timingSafeEqual } from 'node:crypto';
import type { AstroCookies } from 'astro';
import { config } from '../config';
import { authSecret } from './secret';

const COOKIE = 'echotide.known';
const YEAR_S = 31_536_000;

function markFor(email: string): string {
  return createHmac('sha256', authSecret()).update(`known browser\n${email}`).digest('base64url');
}

/**
 * Whether somebody signed in to this account with this browser before. Its attempts are counted apart,
 * so that strangers trying passwords cannot keep the owner out.
 */
export function isKnownBrowser(cookies: AstroCookies, email: string): boolean {
  const given = Buffer.from(cookies.get(COOKIE)?.value ?? '');
  const expected = Buffer.from(markFor(email));
  return given.length === expected.length && timingSafeEqual(given, expected);
}

export function rememberBrowser(cookies: AstroCookies, email: string): void {
  cookies.set(COOKIE, markFor(email), {
    path: '/',
    maxAge: YEAR_S,
    httpOnly: true,
    sameSite: 'lax',
    secure: config().publicUrl.startsWith('https:'),
  });
}
