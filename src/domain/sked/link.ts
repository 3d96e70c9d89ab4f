import { computeLink } from '../link/budget';
import { bandById, type BandId } from '../station/bands';
import type { ModeId } from '../station/modes';
import { MINUTE_MS, type Interval } from '../time/interval';
import { judgeOf, missingWords, type JudgedStation } from '../window/judge';
import { linkSheets, type LinkSheets } from '../window/ledgerSheet';

export interface SkedOnAir extends Interval {
  band: BandId;
  frequencyMhz: number;
  mode: ModeId;
}

/** The whole minute in the middle of a slot. */
export function middleOfSlot({ startMs, endMs }: Interval): number {
  return Math.round((startMs + endMs) / 2 / MINUTE_MS) * MINUTE_MS;
}

/** Both ledgers in the middle of the slot, or the sentence why there are none. */
export function skedLink(
  stations: readonly JudgedStation[],
  sked: SkedOnAir,
): { sheets: LinkSheets } | { why: string } {
  const [first, second] = stations;
  const { missing, basis, sentence } = judgeOf(stations, sked.frequencyMhz, sked.mode);
  if (stations.length !== 2) {
    return { why: 'A link has two ends: with more stations there is no single ledger to show.' };
  }
  if (missing.length > 0) {
    return { why: `There is no margin yet: ${missingWords(missing, sked.frequencyMhz)}.` };
  }
  if (basis !== 'margin' || !first?.setup || !second?.setup) return { why: sentence };
  const timeMs = middleOfSlot(sked);
  const setups = [first.setup, second.setup] as const;
  const result = computeLink({
    stations: [
      { callSign: first.callSign, site: first.site, setup: setups[0] },
      { callSign: second.callSign, site: second.site, setup: setups[1] },
    ],
    frequencyMhz: sked.frequencyMhz,
    mode: sked.mode,
    timeMs,
    chance: { slotMinutes: (sked.endMs - sked.startMs) / MINUTE_MS },
  });
  return { sheets: linkSheets(result, setups, sked.mode, bandById(sked.band).label, timeMs) };
}
