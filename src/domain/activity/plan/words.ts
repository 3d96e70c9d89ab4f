import { formatNumber } from '../../time/format';

/** "1 contact", "12 contacts" */
export function contacts(count: number): string {
  return count === 1 ? '1 contact' : `${formatNumber(count)} contacts`;
}
