import { paths } from '../../paths';

/** Pages whose address is a secret from a mail and lets its holder act. */
const SECRET_PAGES = [
  paths.answer(''),
  paths.noMore(''),
  paths.rosterAnswer(''),
  paths.joinCrew(''),
];

/** What is done on them by the secret alone; every other action goes by who is signed in. */
const BY_SECRET =
  /^(guests\.(accept|decline|dropOut|withdraw|cancel|move|report|say|limits|freshLink|noMore)|activities\.(answerByLink|giveBackByLink|freshLink))$/;

export function isSecretPage(pathname: string): boolean {
  return SECRET_PAGES.some((beginning) => pathname.startsWith(beginning));
}

/** Whether the query of a secret page names no action but one of its own. */
export function isBySecret(search: string): boolean {
  const action = new URLSearchParams(search).get('_action');
  return action === null || BY_SECRET.test(action);
}

/** The address stays with its holder: not kept, not indexed, not told to the next page. */
export const SECRET_PAGE_HEADERS: Record<string, string> = {
  'cache-control': 'no-store',
  'referrer-policy': 'no-referrer',
  'x-robots-tag': 'noindex, nofollow',
};
