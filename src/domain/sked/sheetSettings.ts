import { DIAL_CONVENTIONS, type DialConvention } from '../link/doppler';
import { isForPairsOnly } from './dial';
import type { SkedState } from './types';

/** What all parties of a sked must see alike. */
export interface SheetSettings {
  eastFirst: boolean;
  convention: DialConvention;
}

/** The conventions from which so many parties can choose. */
export function conventionsFor(parties: number): DialConvention[] {
  return DIAL_CONVENTIONS.filter((convention) => parties === 2 || !isForPairsOnly(convention));
}

/** With whom and whether settings can still be changed: while the sked may still be worked. */
export function settingsOpen(state: SkedState): boolean {
  return state === 'offered' || state === 'agreed';
}
