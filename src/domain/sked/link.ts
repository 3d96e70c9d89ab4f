import { computeLink, type LinkResult } from '../link/budget';
import { bandById, type BandId } from '../station/bands';
import type { ModeId } from '../station/modes';
import { MINUTE_MS, type Interval } from '../time/interval';
import {
  judgeOf,
  missingWords,
  MOST_STATIONS_BY_MARGIN,
  type JudgedStation,
} from '../window/judge';
import { linkSheets, type LinkSheets } from '../window/ledgerSheet';
import { linkMatrix, pairsOf, type LinkMatrix } from '../window/linkMatrix';

export interface SkedOnAir extends Interval {
  band: BandId;
  frequencyMhz: number;
  mode: ModeId;
}

/** The whole minute in the middle of a slot. */
export function middleOfSlot({ startMs, endMs }: Interval): number {
  return Math.round((startMs + endMs) / 2 / MINUTE_MS) * MINUTE_MS;
}

export interface SkedLinks {
  /** Both ledgers of one pair. */
  sheets: LinkSheets;
  /** All pairs of a round, and by places in it the one of the ledgers; null between two stations. */
  round: { matrix: LinkMatrix; pair: { first: number; second: number } } | null;
}

/**
 * The links in the middle of the slot, or the sentence why there are none. Of a round the ledgers are those of the
 * two stations named, else of the weakest pair.
 */
export function skedLink(
  stations: readonly JudgedStation[],
  sked: SkedOnAir,
  named: readonly string[] = [],
): SkedLinks | { why: string } {
  const equipped = stations.filter(({ setup }) => setup !== null);
  const { missing, basis, sentence } = judgeOf(
    stations.length > 2 ? equipped : stations,
    sked.frequencyMhz,
    sked.mode,
  );
  if (stations.length > MOST_STATIONS_BY_MARGIN) {
    return { why: `Margins are computed for up to ${MOST_STATIONS_BY_MARGIN} stations.` };
  }
  const lacking = stations.filter(({ setup }) => !setup).map(({ callSign }) => callSign);
  if (missing.length > 0 || equipped.length < 2) {
    return { why: `There is no margin yet: ${missingWords(lacking, sked.frequencyMhz)}.` };
  }
  if (basis !== 'margin') return { why: sentence };
  const timeMs = middleOfSlot(sked);
  const pairs = pairsOf(stations.length).map(({ first, second }) => ({
    first,
    second,
    link: linkOf(stations[first]!, stations[second]!, sked, timeMs),
  }));
  const matrix = linkMatrix(
    stations.map(({ callSign }) => callSign),
    pairs,
    timeMs,
  );
  const known = pairs.filter(({ link }) => link !== null);
  const chosen =
    known.find(({ first, second }) =>
      [first, second].every((at) => named.includes(stations[at]!.callSign)),
    ) ??
    known.find(({ first, second }) => {
      const ends = [matrix.weakest?.from, matrix.weakest?.to];
      return ends.includes(first) && ends.includes(second);
    }) ??
    known[0]!;
  const { first, second } = chosen;
  const setups = [stations[first]!.setup!, stations[second]!.setup!] as const;
  const { label } = bandById(sked.band);
  return {
    sheets: linkSheets(chosen.link!, setups, sked.mode, label, timeMs),
    round: stations.length > 2 ? { matrix, pair: { first, second } } : null,
  };
}

function linkOf(
  first: JudgedStation,
  second: JudgedStation,
  sked: SkedOnAir,
  timeMs: number,
): LinkResult | null {
  if (!first.setup || !second.setup) return null;
  return computeLink({
    stations: [
      { callSign: first.callSign, site: first.site, setup: first.setup },
      { callSign: second.callSign, site: second.site, setup: second.setup },
    ],
    frequencyMhz: sked.frequencyMhz,
    mode: sked.mode,
    timeMs,
    chance: { slotMinutes: (sked.endMs - sked.startMs) / MINUTE_MS },
  });
}
