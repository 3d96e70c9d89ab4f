import { describe, expect, it } from 'vitest';
import { DAY_MS, HOUR_MS, MINUTE_MS } from '~/domain/time/interval';
import type { WindowLayers } from '~/domain/window/layers';
import { bestFirst, windowScore } from '~/domain/window/ranking';
import {
  causeWords,
  gapSentence,
  listWords,
  lostWords,
  nothingFound,
  totalWords,
  whyWords,
  windowSentence,
} from '~/domain/window/sentences';
import { judgeOf } from '~/domain/window/judge';
import { qualityOfDegradation } from '~/domain/window/quality';
import type { CommonWindow } from '~/domain/window/types';

const FROM_MS = Date.parse('2027-01-18T00:00:00Z');

function window(startHour: number, hours: number, part: Partial<CommonWindow> = {}): CommonWindow {
  const startMs = FROM_MS + startHour * HOUR_MS;
  const summary = (callSign: string, maximumElevationDeg: number) => ({
    callSign,
    startAzimuthDeg: 0,
    startElevationDeg: 0,
    endAzimuthDeg: 0,
    endElevationDeg: 0,
    maximumElevationDeg,
  });
  return {
    startMs,
    endMs: startMs + hours * HOUR_MS,
    opens: { callSign: 'QB7TID', reason: 'blockedSector', name: 'ridge' },
    closes: { callSign: 'QA1LUN', reason: 'elevationLimit' },
    best: { timeMs: startMs + HOUR_MS / 2, degradationDb: 1 },
    stations: [summary('QA1LUN', 45), summary('QB7TID', 33)],
    ...part,
  };
}

function layersOf(windows: CommonWindow[], part: Partial<WindowLayers> = {}): WindowLayers {
  const days = Array.from({ length: 30 }, (_, index) => {
    const startMs = FROM_MS + index * DAY_MS;
    const usableMs = windows.some((at) => at.startMs >= startMs && at.startMs < startMs + DAY_MS)
      ? HOUR_MS
      : 0;
    return { startMs, usableMs, best: null };
  });
  return {
    windows,
    windowQuality: windows.map(() => qualityOfDegradation(1)),
    lost: [],
    bands: [],
    outside: [],
    hidden: [],
    days,
    phases: [],
    curve: {
      startMs: 0,
      endMs: 1,
      basis: 'degradation',
      stepMs: 1,
      valuesDb: new Float64Array(2),
    },
    judge: judgeOf([], 1296.1, null),
    ...part,
  };
}

const degreesOf = (callSign: string, reason: string) =>
  callSign === 'QA1LUN' && reason === 'elevationLimit' ? 8 : null;

describe('one window', () => {
  it('says how long it is, where it opens and where it ends', () => {
    expect(windowSentence(window(16, 7 + 2 / 3), degreesOf)).toBe(
      '7 h 40 min. Opens at QB7TID’s ridge, ends at QA1LUN’s 8° limit.',
    );
  });

  it('knows words for limits that are nobody’s own', () => {
    expect(causeWords({ callSign: null, reason: 'sunSeparation' })).toBe(
      'the least distance from the Sun',
    );
    expect(causeWords({ callSign: 'QA1LUN', reason: 'blockedSector' })).toBe(
      'QA1LUN’s blocked sector',
    );
  });

  it('gives its reasons in words, the end last', () => {
    const why = (at: CommonWindow, km: number, skyLossDb: number) =>
      whyWords(at, { geocentricDistanceKm: km, skyLossDb, taken: [], degreesOf });
    expect(why(window(20, 2), 361_000, 0.05)).toBe(
      'Moon near perigee, cold sky, high for both, ends at QA1LUN’s 8° limit',
    );
    expect(why(window(20, 1), 404_500, 3)).toBe(
      'Moon near apogee, the Milky Way behind it, high for both, ends at QA1LUN’s 8° limit',
    );
    expect(why(window(20, 5), 385_000, 0.5)).toBe('High for both, long, ends at QA1LUN’s 8° limit');
  });

  it('names a sked that stands in it', () => {
    const at = window(20, 2);
    const slot = { startMs: at.startMs + 30 * MINUTE_MS, endMs: at.startMs + HOUR_MS };
    const taken = [
      { ...slot, state: 'offered' as const, callSigns: ['QA1LUN'], skedId: null, partner: null },
    ];
    expect(whyWords(at, { geocentricDistanceKm: 361_000, skyLossDb: 0, taken, degreesOf })).toBe(
      'Moon near perigee, cold sky, an offer at 20:30 stands in it, ends at QA1LUN’s 8° limit',
    );
  });
});

describe('ranking', () => {
  const strong = qualityOfDegradation(1);

  it('weighs twice the length as half a decibel, up to four hours', () => {
    expect(windowScore(window(0, 2), strong) - windowScore(window(0, 1), strong)).toBeCloseTo(0.5);
    expect(windowScore(window(0, 8), strong)).toBe(windowScore(window(0, 4), strong));
  });

  it('puts the best first and equal ones in order of time', () => {
    const windows = [window(0, 1), window(24, 1), window(48, 4), window(72, 1)];
    const quality = [strong, qualityOfDegradation(0.2), strong, strong];
    expect(bestFirst(windows, quality)).toEqual([2, 1, 0, 3]);
  });
});

describe('the month', () => {
  it('is summed up', () => {
    expect(totalWords([])).toEqual({ count: 'No common window', total: '.' });
    expect(totalWords([window(0, 1.5)])).toEqual({
      count: '1 common window',
      total: ', 1 h 30 min in all.',
    });
    expect(totalWords([window(0, 7), window(24, 5.6)])).toEqual({
      count: '2 common windows',
      total: ', 13 h in all.',
    });
  });

  it('names the longest gap with its reasons in order', () => {
    const at = (day: number, hours: number) => ({
      startMs: FROM_MS + day * DAY_MS,
      endMs: FROM_MS + day * DAY_MS + hours * HOUR_MS,
    });
    const layers = layersOf([window(20, 1), window(15 * 24, 1)], {
      outside: [{ ...at(3, 4), step: 'good' }],
      hidden: [at(9, 3)],
    });
    expect(gapSentence(layers)).toBe(
      'From 19 Jan to 1 Feb no hour fits: first the Moon is clear only outside the hours and limits you count, then it stays hidden or too low.',
    );
    expect(gapSentence({ ...layers, outside: [] })).toBe(
      'From 19 Jan to 1 Feb no hour fits: the Moon stays hidden or too low.',
    );
    expect(gapSentence({ ...layers, outside: [], hidden: [] })).toContain(
      'the Moon is never up for all at once',
    );
  });

  it('has no gap worth a sentence where windows lie close or where there are none at all', () => {
    const close = Array.from({ length: 10 }, (_, index) => window(index * 72, 1));
    expect(gapSentence(layersOf(close))).toBeNull();
    expect(gapSentence(layersOf([]))).toBeNull();
  });
});

describe('nothing found', () => {
  const hour = { startMs: FROM_MS, endMs: FROM_MS + HOUR_MS };

  it('offers to count other hours when somebody sleeps', () => {
    const layers = layersOf([], {
      outside: [{ ...hour, step: 'good' }],
      lost: [{ callSign: 'QA1LUN', reason: 'usableHours', hours: 1 }],
    });
    const nothing = nothingFound(layers, false);
    expect(nothing.title).toBe('No common window from 18 Jan to 16 Feb');
    expect(nothing.sentence).toContain('only while somebody sleeps or is away');
    expect(nothing.steps).toEqual(['countAny', 'otherDates']);
  });

  it('offers the stations’ own limits when they were raised', () => {
    const layers = layersOf([], { hidden: [hour] });
    expect(nothingFound(layers, true).steps).toEqual(['lower', 'otherDates']);
    expect(nothingFound(layers, false).steps).toEqual(['otherDates']);
    expect(nothingFound(layers, false).sentence).toContain('hidden or too low');
  });

  it('says so when the places never share the Moon', () => {
    expect(nothingFound(layersOf([]), false).sentence).toContain(
      'never stands above every horizon',
    );
  });
});

it('words for lost hours name the limit', () => {
  expect(lostWords({ callSign: 'QA1LUN', reason: 'blockedSector', name: 'barn', hours: 1 })).toBe(
    'behind the barn',
  );
  expect(lostWords({ callSign: null, reason: 'tooShort', hours: 1 })).toBe(
    'stretches shorter than you ask for',
  );
});

it('lists words as people do', () => {
  expect(listWords(['a'])).toBe('a');
  expect(listWords(['a', 'b'])).toBe('a and b');
  expect(listWords(['a', 'b', 'c'])).toBe('a, b and c');
});
