import { DAY_MS } from '../../src/domain/time/interval';
import { forEachPair, pairCount } from '../../src/domain/window/allPairs';
import { seenTimes } from '../../src/domain/window/seenTimes';
import { manyStations } from './manyStations';
import { type Bench, type BenchResult } from './results';

const SIZES: readonly (readonly [stations: number, days: number])[] = [
  [250, 30],
  [500, 30],
  [1000, 30],
  [2000, 30],
  [500, 90],
  [500, 365],
  [2000, 365],
];

interface Row {
  stations: number;
  days: number;
  pairs: number;
  windows: number;
  /** All of it. */
  seconds: number;
  /** Of these, for what each station sees by itself. */
  stationSeconds: number;
  keptMb: number;
  residentMb: number;
}

/**
 * Every pair in turn, windows counted and let go of. What each station sees grows with stations × days, the windows
 * with pairs × days; nothing but the former is kept.
 */
function measure(count: number, days: number): Row {
  const stations = manyStations(count);
  const startMs = Date.UTC(2027, 0, 1);
  const begunMs = performance.now();
  const seen = seenTimes({ startMs, endMs: startMs + days * DAY_MS }, stations);
  const stationSeconds = (performance.now() - begunMs) / 1000;
  let windows = 0;
  forEachPair(seen, 1, (_first, _second, { from, to }) => {
    windows += to - from;
  });
  return {
    stations: count,
    days,
    pairs: pairCount(count),
    windows,
    seconds: (performance.now() - begunMs) / 1000,
    stationSeconds,
    keptMb: (seen.beginsMs.byteLength + seen.endsMs.byteLength) / 1e6,
    residentMb: process.memoryUsage.rss() / 1e6,
  };
}

function run(): BenchResult[] {
  for (let call = 0; call < 4; call += 1) measure(300, 30);
  const rows = SIZES.map(([stations, days]) => measure(stations, days));
  console.table(
    rows.map(({ seconds, stationSeconds, keptMb, residentMb, ...row }) => ({
      ...row,
      seconds: Number(seconds.toFixed(3)),
      'µs a station and day': Number(
        ((stationSeconds * 1e6) / row.stations / row.days).toPrecision(3),
      ),
      'kept, MB': Number(keptMb.toFixed(1)),
      'process, MB': Math.round(residentMb),
      'ns a window': Math.round((seconds * 1e9) / row.windows),
    })),
  );
  return rows.flatMap((row) => {
    const { stations, days, pairs, windows, seconds, stationSeconds, keptMb, residentMb } = row;
    return [
      {
        name: `windows.growth.${stations}x${days}.seconds`,
        value: seconds,
        unit: 's',
        note: `${pairs} pairs, ${windows} windows, pair by pair, ephemeris and all sky limits included`,
      },
      {
        name: `windows.growth.${stations}x${days}.stationSeconds`,
        value: stationSeconds,
        unit: 's',
        note: 'of these, for what each station sees by itself: linear in stations × days',
      },
      {
        name: `windows.growth.${stations}x${days}.residentMb`,
        value: residentMb,
        unit: 'MB',
        note: `whole process; ${keptMb.toFixed(1)} MB of it is what is kept of the stations`,
      },
    ];
  });
}

export const growth: Bench = { name: 'windows.growth', run };
