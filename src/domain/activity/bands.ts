import type { BandId } from '../station/bands';
import type { ModeId } from '../station/modes';

/** A band of an activity, with the frequency and the mode on which its contacts are tried. */
export interface ActivityBand {
  band: BandId;
  frequencyMhz: number;
  mode: ModeId;
}

/** The bands of a station in an activity: those it named, else those on which it has equipment. */
export function bandsInActivity(
  offered: readonly BandId[],
  named: readonly BandId[] | null,
  equipped: readonly BandId[],
): BandId[] {
  const own = new Set(named ?? equipped);
  return offered.filter((band) => own.has(band));
}
