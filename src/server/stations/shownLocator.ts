import { cutLocator } from '../../domain/locator/locator';
import type { StationRow } from '../db/tables';

/** All that everybody is shown of a place which somebody else has told. */
const TOLD_BY_OTHERS = 4;

/** The locator as far as the public may know it. */
export function shownLocator({
  locator,
  public_locator_length: length,
  guest,
}: Pick<StationRow, 'locator' | 'public_locator_length' | 'guest'>): string {
  return cutLocator(locator, guest === 1 && length > TOLD_BY_OTHERS ? TOLD_BY_OTHERS : length);
}
