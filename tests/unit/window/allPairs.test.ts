import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DAY_MS, HOUR_MS, type Interval } from '~/domain/time/interval';
import {
  MOST_KEPT,
  PairRoom,
  allPairWindows,
  forEachPair,
  pairCount,
  pairIndex,
} from '~/domain/window/allPairs';
import {
  WindowCache,
  findCommonWindows,
  visibleIntervals,
  type WindowStation,
} from '~/domain/window';
import { seenTimes } from '~/domain/window/seenTimes';
import { pair as fullSkies } from '../../bench/pair';
import { manyStations } from '../../bench/manyStations';

const START_MS = Date.UTC(2027, 2, 3, 7);

/** The pair by the search that serves the pages. */
function byItself(span: Interval, stations: WindowStation[], minimumMinutes: number): Interval[] {
  const { windows } = findCommonWindows({ ...span, stations, minimumMinutes });
  return windows.map(({ startMs, endMs }) => ({ startMs, endMs }));
}

function everyPair(
  span: Interval,
  stations: WindowStation[],
  minimumMinutes: number,
): Interval[][] {
  const all = allPairWindows(seenTimes(span, stations), minimumMinutes);
  const { firsts, beginsAfterMs, endsAfterMs } = all;
  return Array.from({ length: firsts.length - 1 }, (_, pair) =>
    Array.from(beginsAfterMs.subarray(firsts[pair], firsts[pair + 1]), (afterMs, index) => ({
      startMs: all.startMs + afterMs,
      endMs: all.startMs + endsAfterMs[firsts[pair]! + index]!,
    })),
  );
}

const angle = (min: number, max: number) => fc.double({ min, max, noNaN: true });

const azimuths = fc.record({ azimuthFromDeg: angle(0, 359), azimuthToDeg: angle(0, 359) });

const sky = fc.record(
  {
    elevationFromDeg: angle(-20, 60),
    elevationToDeg: angle(0, 90),
    transmitElevationFromDeg: angle(0, 25),
    blocked: fc.array(
      azimuths.map((span) => ({
        ...span,
        elevationFromDeg: span.azimuthFromDeg / 12,
        elevationToDeg: 20 + span.azimuthToDeg / 6,
      })),
      { maxLength: 2 },
    ),
    horizon: fc.constant(fullSkies[0].sky.horizon!),
  },
  { requiredKeys: [] },
);

const station = fc.record({
  callSign: fc.constantFrom('QA1LUN', 'QB7TID', 'QK3OSL'),
  site: fc.record({
    latitudeDeg: angle(-90, 90),
    longitudeDeg: angle(-180, 180),
    heightM: angle(0, 3000),
  }),
  sky: fc.tuple(sky, fc.option(azimuths)).map(([limits, range]) => ({ ...limits, ...range })),
});

describe('windows of all pairs', () => {
  it('are to the millisecond those of each pair by itself, whatever limits the skies', () => {
    fc.assert(
      fc.property(
        fc.array(station, { minLength: 2, maxLength: 4 }),
        fc.integer({ min: 0, max: 4000 }),
        fc.integer({ min: 12, max: 240 }),
        fc.constantFrom(1, 30, 90),
        (drawn, day, hours, minutes) => {
          const stations = drawn.map((one, index) => ({ ...one, callSign: `Q${index}` }));
          const startMs = START_MS + day * DAY_MS;
          const span = { startMs, endMs: startMs + hours * HOUR_MS };
          const all = everyPair(span, stations, minutes);
          expect(all).toHaveLength(pairCount(stations.length));
          stations.forEach((first, one) => {
            stations.slice(one + 1).forEach((second, gap) => {
              const found = all[pairIndex(stations.length, one, one + 1 + gap)];
              expect(found).toEqual(byItself(span, [first, second], minutes));
            });
          });
        },
      ),
      { numRuns: 150 },
    );
  });

  it('are the same for 40 stations of the benchmark over 10 days, 780 pairs', () => {
    const stations = manyStations(40);
    const span = { startMs: START_MS, endMs: START_MS + 10 * DAY_MS };
    const all = everyPair(span, stations, 1);
    const cache = new WindowCache();
    let windows = 0;
    for (let first = 0; first < 40; first += 1) {
      for (let second = first + 1; second < 40; second += 1) {
        const search = { ...span, stations: [stations[first]!, stations[second]!] };
        const expected = findCommonWindows(search, cache).windows;
        const found = all[pairIndex(40, first, second)]!;
        expect(found).toEqual(expected.map(({ startMs, endMs }) => ({ startMs, endMs })));
        windows += found.length;
      }
    }
    expect(windows).toBeGreaterThan(2000);
  });

  it('count usable hours, those that touch each other as one', () => {
    const usable = [
      { startMs: START_MS + 2 * HOUR_MS, endMs: START_MS + 20 * HOUR_MS },
      { startMs: START_MS + 20 * HOUR_MS, endMs: START_MS + 30 * HOUR_MS },
      { startMs: START_MS + 50 * HOUR_MS, endMs: START_MS + 51.5 * HOUR_MS },
    ];
    const stations = manyStations(12).map((one, index) =>
      index % 2 === 0 ? { ...one, usable } : one,
    );
    const span = { startMs: START_MS, endMs: START_MS + 4 * DAY_MS };
    const all = everyPair(span, stations, 10);
    for (let second = 1; second < 12; second += 1) {
      expect(all[pairIndex(12, 0, second)]).toEqual(
        byItself(span, [stations[0]!, stations[second]!], 10),
      );
    }
    expect(all.flat().length).toBeGreaterThan(20);
  });

  it('begin with what each station sees by itself, with refraction too', () => {
    const polar = { ...fullSkies[0], site: { latitudeDeg: 85, longitudeDeg: 20, heightM: 0 } };
    const stations = [
      ...manyStations(20),
      ...fullSkies,
      polar,
      { ...polar, sky: {} },
      { ...polar, sky: { elevationFromDeg: 60 } },
      { ...polar, sky: { elevationFromDeg: 20, elevationToDeg: 25 } },
    ];
    const span = { startMs: START_MS, endMs: START_MS + 30 * DAY_MS };
    for (const refraction of [false, true]) {
      const { firsts, beginsMs, endsMs } = seenTimes(span, stations, refraction);
      stations.forEach((station, index) => {
        const own = Array.from(
          beginsMs.subarray(firsts[index], firsts[index + 1]),
          (startMs, at) => ({ startMs, endMs: endsMs[firsts[index]! + at]! }),
        );
        expect(own).toEqual(visibleIntervals(station, span, { refraction }));
      });
    }
  });

  it('are the same in room that held more before', () => {
    const room = new PairRoom();
    const many = seenTimes({ startMs: START_MS, endMs: START_MS + 9 * DAY_MS }, manyStations(30));
    const few = seenTimes({ startMs: START_MS, endMs: START_MS + 5 * DAY_MS }, manyStations(9));
    for (const seen of [few, many, few]) {
      expect(allPairWindows(seen, 15, room)).toEqual(allPairWindows(seen, 15));
    }
  });

  it('come pair by pair in the same order with the same windows', () => {
    const stations = manyStations(15);
    const seen = seenTimes({ startMs: START_MS, endMs: START_MS + 20 * DAY_MS }, stations);
    const { firsts, beginsAfterMs, endsAfterMs } = allPairWindows(seen, 20);
    const order: number[] = [];
    forEachPair(seen, 20, (first, second, { beginsMs, endsMs, from, to }) => {
      const pair = pairIndex(15, first, second);
      order.push(pair);
      const [begin, end] = [firsts[pair]!, firsts[pair + 1]!];
      const after = (timeMs: number) => timeMs - START_MS;
      expect(Array.from(beginsMs.subarray(from, to), after)).toEqual(
        Array.from(beginsAfterMs.subarray(begin, end)),
      );
      expect(Array.from(endsMs.subarray(from, to), after)).toEqual(
        Array.from(endsAfterMs.subarray(begin, end)),
      );
    });
    expect(order).toEqual(Array.from({ length: pairCount(15) }, (_, pair) => pair));
  });

  it('are none for one station or none, and are refused where too many to keep', () => {
    const span = { startMs: START_MS, endMs: START_MS + DAY_MS };
    expect(allPairWindows(seenTimes(span, [])).firsts).toHaveLength(1);
    expect(allPairWindows(seenTimes(span, manyStations(1))).beginsAfterMs).toHaveLength(0);
    const crowd = {
      ...span,
      stations: 2000,
      firsts: new Int32Array(2001).map((_, station) => station * (MOST_KEPT / 2000 / 1900)),
      beginsMs: new Float64Array(0),
      endsMs: new Float64Array(0),
    };
    expect(() => allPairWindows(crowd)).toThrow(RangeError);
    const year = { startMs: START_MS, endMs: START_MS + 365 * DAY_MS };
    expect(() => allPairWindows(seenTimes(year, manyStations(2)))).toThrow(RangeError);
  });
});
