import { DAY_MS, HOUR_MS } from '../../src/domain/time/interval';
import type { WindowStation } from '../../src/domain/window';
import { PairRoom, allPairWindows, type AllPairs } from '../../src/domain/window/allPairs';
import { seenTimes } from '../../src/domain/window/seenTimes';

const room = new PairRoom();

/** Every pair over 72 hours with the ephemeris made anew; another day every run, so that nothing is left to use. */
export function allPairsOnce(stations: readonly WindowStation[], run: number): AllPairs {
  const startMs = Date.UTC(2027, 0, 1) + run * DAY_MS;
  const all = allPairWindows(
    seenTimes({ startMs, endMs: startMs + 72 * HOUR_MS }, stations),
    1,
    room,
  );
  if (all.beginsAfterMs.length < stations.length) throw new Error('Hardly any window was found.');
  return all;
}
