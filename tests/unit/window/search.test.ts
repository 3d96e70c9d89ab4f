import { describe, expect, it } from 'vitest';
import { buildMoonTable, moonSampleDirect, moonTrack } from '../../../src/domain/ephemeris';
import { degradationModel, skyAndDegradation } from '../../../src/domain/link';
import { DAY_MS, HOUR_MS, MINUTE_MS } from '../../../src/domain/time/interval';
import {
  WindowCache,
  commonMoonUp,
  findCommonWindows,
  visibleIntervals,
  type WindowSearch,
  type WindowStation,
} from '../../../src/domain/window';

const A: WindowStation = {
  callSign: 'QA1LUN',
  site: { latitudeDeg: 50, longitudeDeg: 10, heightM: 0 },
  sky: {},
};
const B: WindowStation = {
  callSign: 'QB2MOO',
  site: { latitudeDeg: 40, longitudeDeg: -75, heightM: 0 },
  sky: {},
};
const SPAN = { startMs: Date.UTC(2027, 0, 10), endMs: Date.UTC(2027, 0, 20) };
const SEARCH: WindowSearch = { ...SPAN, stations: [A, B] };

function lostHours(search: WindowSearch, reason: string): number {
  const { lost } = findCommonWindows(search);
  return lost.filter((one) => one.reason === reason).reduce((sum, { hours }) => sum + hours, 0);
}

describe('who opens and closes', () => {
  it('is the western station at moonrise and the eastern at moonset', () => {
    for (const { opens, closes } of findCommonWindows(SEARCH).windows) {
      if (opens.reason !== 'searchLimit')
        expect(opens).toMatchObject({ callSign: 'QB2MOO', reason: 'horizon' });
      if (closes.reason !== 'searchLimit')
        expect(closes).toMatchObject({ callSign: 'QA1LUN', reason: 'horizon' });
    }
  });

  it('is the end of the search where the Moon stays up', () => {
    const [first] = findCommonWindows(SEARCH).windows;
    const half = (first!.startMs + first!.endMs) / 2;
    const cut = findCommonWindows({ ...SEARCH, startMs: half, endMs: half + HOUR_MS / 2 });
    expect(cut.windows).toHaveLength(1);
    expect(cut.windows[0]!.opens).toEqual({ callSign: null, reason: 'searchLimit' });
    expect(cut.windows[0]!.closes).toEqual({ callSign: null, reason: 'searchLimit' });
    expect(cut.lost).toEqual([]);
  });

  it('is a barn by its name, usable hours by their station', () => {
    const [first] = findCommonWindows(SEARCH).windows;
    const middleMs = (first!.startMs + first!.endMs) / 2;
    const { azimuthDeg } = moonSampleDirect(A.site, middleMs);
    const barn = {
      azimuthFromDeg: azimuthDeg,
      azimuthToDeg: (azimuthDeg + 5) % 360,
      elevationFromDeg: 0,
      elevationToDeg: 90,
      name: 'barn',
    };
    const behind = findCommonWindows({
      ...SEARCH,
      stations: [{ ...A, sky: { blocked: [barn] } }, B],
    });
    expect(behind.windows[0]!.closes).toEqual({
      callSign: 'QA1LUN',
      reason: 'blockedSector',
      name: 'barn',
    });
    expect(Math.abs(behind.windows[0]!.endMs - middleMs)).toBeLessThan(1000);
    expect(behind.windows[1]!.opens.name).toBe('barn');

    const usable = [{ startMs: middleMs, endMs: SPAN.endMs }];
    const asleep = findCommonWindows({ ...SEARCH, stations: [A, { ...B, usable }] });
    expect(asleep.windows[0]!.startMs).toBe(Math.ceil(middleMs));
    expect(asleep.windows[0]!.opens).toEqual({ callSign: 'QB2MOO', reason: 'usableHours' });
  });
});

describe('limits that belong to nobody', () => {
  it('drops windows that are too short and says so', () => {
    const longest = Math.max(
      ...findCommonWindows(SEARCH).windows.map((one) => one.endMs - one.startMs),
    );
    const minimumMinutes = longest / MINUTE_MS - 1;
    const { windows, lost } = findCommonWindows({ ...SEARCH, minimumMinutes });
    expect(windows).toHaveLength(1);
    expect(lost.find(({ reason }) => reason === 'tooShort')!.callSign).toBeNull();
  });

  it('keeps away from the Sun, as each station sees it', () => {
    const newMoon = { startMs: Date.UTC(2027, 1, 2), endMs: Date.UTC(2027, 1, 12) };
    const search = { ...SEARCH, ...newMoon, minimumSunSeparationDeg: 25 };
    const { windows } = findCommonWindows(search);
    for (const { startMs, endMs, opens, closes } of windows) {
      for (const timeMs of [startMs, (startMs + endMs) / 2, endMs]) {
        for (const { site } of [A, B]) {
          expect(moonSampleDirect(site, timeMs).sunSeparationDeg).toBeGreaterThan(25 - 1e-5);
        }
      }
      for (const [cause, timeMs] of [
        [opens, startMs],
        [closes, endMs],
      ] as const) {
        if (cause.reason !== 'sunSeparation') continue;
        const seen = [A, B].map(({ site }) => moonSampleDirect(site, timeMs).sunSeparationDeg);
        expect(Math.min(...seen)).toBeCloseTo(25, 4);
      }
    }
    expect(lostHours(search, 'sunSeparation')).toBeGreaterThan(10);
  });

  it('keeps the degradation under its limit', () => {
    const search = { ...SEARCH, endMs: SPAN.startMs + 28 * DAY_MS, frequencyMhz: 144 };
    const { windows } = findCommonWindows({ ...search, maximumDegradationDb: 3 });
    const model = degradationModel(144);
    const at = (timeMs: number) => skyAndDegradation(model, timeMs).degradationDb;
    expect(windows.length).toBeGreaterThan(5);
    let closedByIt = 0;
    for (const { startMs, endMs, closes, best } of windows) {
      for (const share of [0, 0.25, 0.5, 0.75, 1]) {
        expect(at(startMs + (endMs - startMs) * share)).toBeLessThan(3.002);
      }
      if (closes.reason === 'degradation') {
        closedByIt += 1;
        expect(at(endMs)).toBeCloseTo(3, 2);
      }
      expect(at(best.timeMs)).toBeCloseTo(best.degradationDb!, 2);
      for (const share of [0, 0.2, 0.4, 0.6, 0.8, 1]) {
        expect(best.degradationDb!).toBeLessThan(at(startMs + (endMs - startMs) * share) + 0.01);
      }
    }
    expect(closedByIt).toBeGreaterThan(0);
  });
});

describe('what is told about a window', () => {
  it('is the best moment and each station’s angles', () => {
    const table = buildMoonTable(SPAN);
    for (const window of findCommonWindows(SEARCH).windows) {
      const tracks = [A, B].map(({ site }) => moonTrack(table, site, window, 10_000));
      const lower = tracks[0]!.map(({ elevationDeg }, index) =>
        Math.min(elevationDeg, tracks[1]![index]!.elevationDeg),
      );
      const lowerAtBest = Math.min(
        ...[A, B].map(({ site }) => moonSampleDirect(site, window.best.timeMs).elevationDeg),
      );
      expect(lowerAtBest).toBeGreaterThan(Math.max(...lower) - 0.1);
      window.stations.forEach((station, index) => {
        const track = tracks[index]!;
        expect(station.callSign).toBe([A, B][index]!.callSign);
        expect(station.startElevationDeg).toBeCloseTo(track[0]!.elevationDeg, 6);
        expect(station.endAzimuthDeg).toBeCloseTo(track.at(-1)!.azimuthDeg, 6);
        const highest = Math.max(...track.map(({ elevationDeg }) => elevationDeg));
        expect(Math.abs(station.maximumElevationDeg - highest)).toBeLessThan(0.002);
      });
    }
  });
});

describe('far from the usual', () => {
  it('a pole has the Moon for a fortnight', () => {
    const pole = { ...A, site: { latitudeDeg: 90, longitudeDeg: 0, heightM: 0 } };
    const month = { startMs: Date.UTC(2027, 0, 1), endMs: Date.UTC(2027, 2, 1) };
    const up = visibleIntervals(pole, month);
    expect(up.length).toBeGreaterThanOrEqual(2);
    expect(Math.max(...up.map((one) => one.endMs - one.startMs))).toBeGreaterThan(12 * DAY_MS);
  });

  it('refraction opens earlier by some minutes', () => {
    const plain = visibleIntervals(A, SPAN)[1]!;
    const bent = visibleIntervals(A, SPAN, { refraction: true })[1]!;
    const earlierMs = plain.startMs - bent.startMs;
    expect(earlierMs).toBeGreaterThan(2.5 * MINUTE_MS);
    expect(earlierMs).toBeLessThan(6 * MINUTE_MS);
  });

  it('16 stations share what each pair of them shares', () => {
    const stations = Array.from({ length: 16 }, (_, index) => ({
      ...A,
      callSign: `Q${String.fromCharCode(65 + index)}1A`,
      site: { latitudeDeg: 35 + index, longitudeDeg: -10 + 3 * index, heightM: 0 },
    }));
    const { windows } = findCommonWindows({ ...SPAN, stations });
    expect(windows.length).toBeGreaterThan(5);
    for (const { startMs, endMs } of windows) {
      for (const { site } of stations) {
        for (const timeMs of [startMs + 5, endMs - 5]) {
          expect(moonSampleDirect(site, timeMs).elevationDeg).toBeGreaterThan(-1e-5);
        }
      }
    }
  });

  it('refuses a search without stations', () => {
    expect(() => findCommonWindows({ ...SPAN, stations: [] })).toThrow(RangeError);
  });
});

describe('a cache', () => {
  it('changes nothing but the time it takes', () => {
    const cache = new WindowCache();
    for (const elevationFromDeg of [3, 9, 9, 15]) {
      const search = { ...SEARCH, stations: [{ ...A, sky: { elevationFromDeg } }, B] };
      expect(findCommonWindows(search, cache)).toEqual(findCommonWindows(search));
    }
  });
});

describe('the Moon up for all, and what hides it', () => {
  it('adds up: up = windows + hidden', () => {
    const usable = [{ startMs: SPAN.startMs + 3 * DAY_MS, endMs: SPAN.endMs }];
    const limited = {
      ...SEARCH,
      stations: [
        { ...A, sky: { elevationFromDeg: 20 } },
        { ...B, usable },
      ],
    };
    const length = (list: readonly { startMs: number; endMs: number }[]) =>
      list.reduce((sum, { startMs, endMs }) => sum + endMs - startMs, 0);
    const { up, hidden } = commonMoonUp(limited);
    const { windows } = findCommonWindows({ ...limited, minimumMinutes: 0 });
    expect(length(up)).toBe(length(windows) + length(hidden));
    expect(length(up)).toBe(length(findCommonWindows({ ...SEARCH, minimumMinutes: 0 }).windows));
    expect(new Set(hidden.map(({ cause }) => cause.reason))).toEqual(
      new Set(['elevationLimit', 'usableHours']),
    );
  });
});
