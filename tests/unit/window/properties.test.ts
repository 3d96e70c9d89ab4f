import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildMoonTable } from '../../../src/domain/ephemeris/index';
import {
  findCommonWindows,
  type CommonWindow,
  type WindowSearch,
} from '../../../src/domain/window/index';
import { HOUR_MS, subtractIntervals, type Interval } from '../../../src/domain/time/interval';
import {
  bruteForce,
  naiveReasonAt,
  pairArbitrary,
  skyArbitrary,
  spanArbitrary,
  stationArbitrary,
} from './naive';

/** Edges are whole milliseconds; the solver itself is good to one. */
const EDGE_MS = 3;
const CLOSE_TO_EDGE_MS = 1000;
const RUNS = 80;
/** A second or two on a free machine. */
const PATIENCE_MS = 120_000;

const searchArbitrary = fc.record({
  span: spanArbitrary,
  stations: pairArbitrary,
  refraction: fc.boolean(),
});

type Case = typeof searchArbitrary extends fc.Arbitrary<infer T> ? T : never;

function searchOf({ span, stations, refraction }: Case): WindowSearch {
  return { ...span, stations: [...stations], refraction, minimumMinutes: 0 };
}

function holds(windows: readonly Interval[], timeMs: number): boolean {
  return windows.some(({ startMs, endMs }) => timeMs >= startMs && timeMs < endMs);
}

function nearEdge(windows: readonly Interval[], timeMs: number): boolean {
  return windows.some(
    ({ startMs, endMs }) =>
      Math.abs(timeMs - startMs) < CLOSE_TO_EDGE_MS || Math.abs(timeMs - endMs) < CLOSE_TO_EDGE_MS,
  );
}

/** An instant just before a window and one just after, within the gap to its neighbours. */
function outside(windows: readonly CommonWindow[], index: number, span: Interval) {
  const { startMs, endMs } = windows[index]!;
  const before = windows[index - 1]?.endMs ?? span.startMs;
  const after = windows[index + 1]?.startMs ?? span.endMs;
  return {
    beforeMs: startMs - Math.min(CLOSE_TO_EDGE_MS, (startMs - before) / 2),
    afterMs: endMs + Math.min(CLOSE_TO_EDGE_MS, (after - endMs) / 2),
  };
}

/** Every 30 s the windows must say what the plain rules say, but for the second around an edge. */
function expectAsLooked(search: WindowSearch): void {
  const { windows } = findCommonWindows(search);
  const looks = bruteForce(buildMoonTable(search), search.stations, search, search.refraction);
  for (const { timeMs, free } of looks) {
    if (timeMs >= search.endMs || free === holds(windows, timeMs)) continue;
    expect(nearEdge(windows, timeMs), new Date(timeMs).toISOString()).toBe(true);
  }
}

describe('windows with random limits against a look every 30 s', () => {
  it(
    'of one station',
    () => {
      fc.assert(
        fc.property(
          spanArbitrary,
          stationArbitrary('QA1LUN'),
          fc.boolean(),
          (span, station, refraction) => {
            expectAsLooked({ ...span, stations: [station], refraction, minimumMinutes: 0 });
          },
        ),
        { numRuns: 250 },
      );
    },
    PATIENCE_MS,
  );

  it(
    'of two stations',
    () => {
      fc.assert(
        fc.property(searchArbitrary, (given) => {
          expectAsLooked(searchOf(given));
        }),
        { numRuns: RUNS },
      );
    },
    PATIENCE_MS,
  );
});

describe('common windows of two stations with random limits', () => {
  it(
    'satisfy every limit from edge to edge, and the named limit fails just outside',
    () => {
      fc.assert(
        fc.property(searchArbitrary, (given) => {
          const search = searchOf(given);
          const table = buildMoonTable(search);
          const { windows } = findCommonWindows(search);
          const reasonOf = (callSign: string | null, timeMs: number) => {
            const station = search.stations.find((one) => one.callSign === callSign)!;
            return naiveReasonAt(table, station, timeMs, search.refraction);
          };
          windows.forEach((window, index) => {
            const lengthMs = window.endMs - window.startMs;
            if (lengthMs < 3 * EDGE_MS) return;
            for (const share of [0, 0.21, 0.5, 0.83, 1]) {
              const timeMs = window.startMs + EDGE_MS + (lengthMs - 2 * EDGE_MS) * share;
              for (const { callSign } of search.stations) {
                expect(reasonOf(callSign, timeMs)).toBeNull();
              }
            }
            const { beforeMs, afterMs } = outside(windows, index, search);
            if (window.opens.reason === 'searchLimit') expect(window.startMs).toBe(search.startMs);
            else if (window.startMs - beforeMs > EDGE_MS) {
              expect(reasonOf(window.opens.callSign, beforeMs)).not.toBeNull();
            }
            if (window.closes.reason === 'searchLimit') expect(window.endMs).toBe(search.endMs);
            else if (afterMs - window.endMs > EDGE_MS) {
              expect(reasonOf(window.closes.callSign, afterMs)).not.toBeNull();
            }
          });
        }),
        { numRuns: RUNS },
      );
    },
    PATIENCE_MS,
  );

  it(
    'do not depend on the order of the stations',
    () => {
      fc.assert(
        fc.property(searchArbitrary, (given) => {
          const search = searchOf(given);
          const there = findCommonWindows(search).windows;
          const back = findCommonWindows({
            ...search,
            stations: [...search.stations].reverse(),
          }).windows;
          expect(
            back.map(({ startMs, endMs, opens, closes }) => [startMs, endMs, opens, closes]),
          ).toEqual(
            there.map(({ startMs, endMs, opens, closes }) => [startMs, endMs, opens, closes]),
          );
        }),
        { numRuns: RUNS / 2 },
      );
    },
    PATIENCE_MS,
  );

  it(
    'and lost hours together are the whole search',
    () => {
      const limits = fc.record({
        minimumMinutes: fc.integer({ min: 0, max: 120 }),
        frequencyMhz: fc.constantFrom(144, 1296),
        maximumDegradationDb: fc.double({ min: 0.5, max: 6, noNaN: true }),
        minimumSunSeparationDeg: fc.double({ min: 0, max: 60, noNaN: true }),
      });
      fc.assert(
        fc.property(searchArbitrary, limits, (given, more) => {
          const search = { ...searchOf(given), ...more };
          const { windows, lost } = findCommonWindows(search);
          const windowHours = windows.reduce((sum, w) => sum + (w.endMs - w.startMs) / HOUR_MS, 0);
          const lostHours = lost.reduce((sum, { hours }) => sum + hours, 0);
          expect(windowHours + lostHours).toBeCloseTo((search.endMs - search.startMs) / HOUR_MS, 9);
          for (const { startMs, endMs } of windows) {
            expect(endMs - startMs).toBeGreaterThanOrEqual(more.minimumMinutes * 60_000);
          }
        }),
        { numRuns: RUNS / 2 },
      );
    },
    PATIENCE_MS,
  );

  it(
    'never lose a minute when a limit is widened',
    () => {
      fc.assert(
        fc.property(searchArbitrary, skyArbitrary, fc.nat(5), (given, wider, which) => {
          const search = searchOf(given);
          const [first, second] = given.stations;
          const { sky } = first;
          const widened = [
            { ...sky, elevationFromDeg: lower(sky.elevationFromDeg, wider.elevationFromDeg) },
            { ...sky, elevationToDeg: undefined },
            { ...sky, azimuthFromDeg: undefined, azimuthToDeg: undefined },
            { ...sky, blocked: sky.blocked?.slice(1) },
            { ...sky, transmitElevationFromDeg: undefined },
            {
              ...sky,
              horizon: sky.horizon?.map((p) => ({ ...p, elevationDeg: p.elevationDeg - 1 })),
            },
          ][which]!;
          const before = findCommonWindows(search).windows;
          const after = findCommonWindows({
            ...search,
            stations: [{ ...first, sky: widened }, second],
          }).windows;
          for (const { startMs, endMs } of subtractIntervals(before, after)) {
            expect(endMs - startMs).toBeLessThan(EDGE_MS);
          }
        }),
        { numRuns: RUNS },
      );
    },
    PATIENCE_MS,
  );
});

/** The lower of two elevation limits, an absent one being 0. */
function lower(a: number | undefined, b: number | undefined): number {
  return Math.min(a ?? 0, b ?? 0);
}
