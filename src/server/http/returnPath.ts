import { paths } from '../../paths';

/**
 * A path on this server to go back to, or undefined: never another host, however it is written
 * ("//host", "/\host", "https:host"), and never back to signing in.
 */
export function safeReturnPath(given: string | null | undefined): string | undefined {
  if (!given || given.length > 2000 || !given.startsWith('/')) return undefined;
  if (/[\\\p{Cc}]/u.test(given)) return undefined;
  const base = 'http://here.invalid';
  let url: URL;
  try {
    url = new URL(given, base);
  } catch {
    return undefined;
  }
  if (url.origin !== base || url.pathname.startsWith('//')) return undefined;
  if (url.pathname === paths.signIn || url.pathname.startsWith(`${paths.signIn}/`))
    return undefined;
  return url.pathname + url.search + url.hash;
}

/** Sign-in page that leads back to `returnPath` where that is safe. */
export function signInPath(returnPath: string | null | undefined): string {
  const next = safeReturnPath(returnPath);
  if (!next || next === paths.home) return paths.signIn;
  return `${paths.signIn}?${new URLSearchParams({ next }).toString()}`;
}
