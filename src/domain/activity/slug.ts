/** The title as part of an address: "northern-winter-weekend"; "activity" where no letter is left. */
export function slugOf(title: string): string {
  const plain = title
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 60)
    .replace(/-+$/, '');
  return plain === '' || plain === 'new' ? 'activity' : plain;
}
