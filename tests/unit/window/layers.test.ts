import { describe, expect, it } from 'vitest';
import {
  DAY_MS,
  HOUR_MS,
  intersectIntervals,
  unionIntervals,
  type Interval,
} from '~/domain/time/interval';
import { LayersCache, lowestElevationDeg, searchOf, windowLayers } from '~/domain/window/layers';
import { qualityOfDegradation } from '~/domain/window/quality';
import { qualityAt, qualityBands, type QualityCurve } from '~/domain/window/qualityBands';
import { emptyQuestion, questionSpan, type WindowQuestion } from '~/domain/window/question';
import type { ChosenStation } from '~/domain/window/searchData';

const FROM_MS = Date.parse('2027-01-18T00:00:00Z');

/** Awake each day from 16:00 to 23:30 UTC. */
const EVENINGS: Interval[] = Array.from({ length: 30 }, (_, day) => ({
  startMs: FROM_MS + day * DAY_MS + 16 * HOUR_MS,
  endMs: FROM_MS + day * DAY_MS + 23.5 * HOUR_MS,
}));

function station(callSign: string, latitudeDeg: number, longitudeDeg: number): ChosenStation {
  return {
    token: callSign,
    id: callSign,
    callSign,
    site: { latitudeDeg, longitudeDeg, heightM: 0 },
    sky: { elevationFromDeg: 8 },
    usable: EVENINGS,
    placeName: null,
    locator: 'JO00',
    timeZone: 'UTC',
    equipment: [],
    own: false,
  };
}

const PAIR = [station('QA1LUN', 58.4, 18.6), station('QB7TID', 43.8, -71.6)];
const question: WindowQuestion = {
  ...emptyQuestion(FROM_MS),
  stations: ['QA1LUN', 'QB7TID'],
  lowestDeg: [null, null],
};

const lengthMs = (intervals: readonly Interval[]) =>
  intervals.reduce((sum, at) => sum + at.endMs - at.startMs, 0);

describe('layers of an answer', () => {
  const layers = windowLayers(question, PAIR);

  it('fill each window with bands and nothing else', () => {
    expect(layers.windows.length).toBeGreaterThan(3);
    const plain = layers.windows.map(({ startMs, endMs }) => ({ startMs, endMs }));
    const filled = unionIntervals(layers.bands).map(({ startMs, endMs }) => ({ startMs, endMs }));
    expect(filled).toEqual(plain);
  });

  it('keep windows, clear but uncounted, and hidden hours apart', () => {
    expect(lengthMs(layers.outside)).toBeGreaterThan(HOUR_MS);
    expect(lengthMs(layers.hidden)).toBeGreaterThan(HOUR_MS);
    const outside = unionIntervals(layers.outside);
    expect(intersectIntervals(layers.windows, outside)).toEqual([]);
    expect(intersectIntervals(layers.windows, layers.hidden)).toEqual([]);
    expect(intersectIntervals(outside, layers.hidden)).toEqual([]);
  });

  it('give the days all that the windows have', () => {
    expect(layers.days).toHaveLength(30);
    expect(layers.phases).toHaveLength(30);
    const total = layers.days.reduce((sum, day) => sum + day.usableMs, 0);
    expect(total).toBe(lengthMs(layers.windows));
    for (const day of layers.days) expect(day.best === null).toBe(day.usableMs === 0);
  });

  it('count every hour: with all hours there is nothing left outside but what is too short', () => {
    const any = windowLayers({ ...question, counting: 'any', minimumMinutes: 1 }, PAIR);
    expect(lengthMs(any.windows)).toBeGreaterThan(lengthMs(layers.windows));
    for (const band of any.outside) expect(band.endMs - band.startMs).toBeLessThan(60_000);
  });

  it('are the same from a warm cache after another question as from a cold one', () => {
    const cache = new LayersCache();
    windowLayers(question, PAIR, cache);
    windowLayers({ ...question, lowestDeg: [20, null] }, PAIR, cache);
    const raised = { ...question, lowestDeg: [14, null] };
    expect(windowLayers(raised, PAIR, cache)).toEqual(windowLayers(raised, PAIR));
  });

  it('lose hours when the lowest elevation rises', () => {
    const raised = windowLayers({ ...question, lowestDeg: [25, null] }, PAIR);
    expect(lengthMs(raised.windows)).toBeLessThan(lengthMs(layers.windows));
    for (const window of raised.windows) {
      expect(window.stations[0]!.startElevationDeg).toBeGreaterThan(24.99);
      expect(window.stations[0]!.endElevationDeg).toBeGreaterThan(24.99);
    }
  });

  it('show the Moon full on 22 January 2027 and new on 6 February', () => {
    const of = (day: number) => layers.phases[day]!;
    expect(of(4).illuminated).toBeGreaterThan(0.99);
    expect(of(19).illuminated).toBeLessThan(0.01);
    expect(of(0).waxing).toBe(true);
    expect(of(10).waxing).toBe(false);
    expect(of(25).waxing).toBe(true);
  });
});

describe('the search a question stands for', () => {
  it('takes usable hours only when they count', () => {
    expect(searchOf(question, PAIR).stations[0]!.usable).toBe(EVENINGS);
    expect(searchOf({ ...question, counting: 'any' }, PAIR).stations[0]!.usable).toBeUndefined();
  });

  it('never looks below the lowest elevation for transmitting', () => {
    const careful = { ...PAIR[0]!, sky: { elevationFromDeg: 5, transmitElevationFromDeg: 12 } };
    expect(lowestElevationDeg(careful, null)).toBe(12);
    const search = searchOf({ ...question, lowestDeg: [2, null] }, [careful, PAIR[1]!]);
    expect(search.stations[0]!.sky).toEqual({ elevationFromDeg: 2, transmitElevationFromDeg: 12 });
  });
});

describe('quality', () => {
  it.each([
    [0, 'ample'],
    [0.74, 'ample'],
    [0.76, 'strong'],
    [1.5, 'strong'],
    [1.56, 'good'],
    [2.5, 'good'],
    [4, 'fair'],
    [4.1, 'thin'],
    [12, 'thin'],
  ])('of %f dB of degradation is %s', (degradationDb, step) => {
    const quality = qualityOfDegradation(degradationDb);
    expect(quality.step).toBe(step);
    expect(quality).toMatchObject({ basis: 'degradation', db: degradationDb });
  });

  it('changes bands where a straight line crosses a step', () => {
    const curve: QualityCurve = {
      ...questionSpan(question),
      basis: 'degradation',
      stepMs: HOUR_MS,
      valuesDb: Float64Array.from({ length: 721 }, (_, hour) => hour / 10),
    };
    const bands = qualityBands(curve, [{ startMs: FROM_MS, endMs: FROM_MS + 20 * HOUR_MS }]);
    expect(bands.map((band) => band.step)).toEqual(['ample', 'strong', 'good']);
    // 0.75 dB is the first that is shown as 0.8.
    expect(Math.abs(bands[1]!.startMs - (FROM_MS + 7.5 * HOUR_MS))).toBeLessThanOrEqual(300_000);
    expect(bands.at(-1)!.endMs).toBe(FROM_MS + 20 * HOUR_MS);
    expect(qualityAt(curve, FROM_MS + 1.5 * HOUR_MS).db).toBeCloseTo(0.15, 12);
    expect(qualityAt(curve, FROM_MS - DAY_MS).db).toBeCloseTo(0, 12);
  });
});
