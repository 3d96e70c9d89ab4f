import { paths } from '../../paths';

/** Pages whose address is a secret from a mail and lets its holder act without signing in. */
const SECRET_PAGES = [paths.answer(''), paths.noMore('')];

export function isSecretPage(pathname: string): boolean {
  return SECRET_PAGES.some((beginning) => pathname.startsWith(beginning));
}

/** The address stays with its holder: not kept, not indexed, not told to the next page. */
export const SECRET_PAGE_HEADERS: Record<string, string> = {
  'cache-control': 'no-store',
  'referrer-policy': 'no-referrer',
  'x-robots-tag': 'noindex, nofollow',
};
