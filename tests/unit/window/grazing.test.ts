import { describe, expect, it } from 'vitest';
import { buildMoonTable, moonTrack, type TrackPoint } from '../../../src/domain/ephemeris/index';
import type { Site, SkyLimits } from '../../../src/domain/sky/limits';
import { DAY_MS, MINUTE_MS, type Interval } from '../../../src/domain/time/interval';
import { visibleIntervals } from '../../../src/domain/window/index';

/** A limit is laid so that the Moon just passes it for a few minutes; the passage must be found, and its length. */
const LENGTH_TOLERANCE_MS = 2000;
const STEP_MS = 5000;

const sites: Site[] = [
  { latitudeDeg: 48, longitudeDeg: 11, heightM: 500 },
  { latitudeDeg: -33.5, longitudeDeg: -70.6, heightM: 500 },
  { latitudeDeg: 67, longitudeDeg: 20, heightM: 0 },
];
const lengthsMin = [1.2, 3, 9, 25];
const days = Array.from({ length: 9 }, (_, index) =>
  Date.UTC(2027, 2, 1 + 3 * index, 0, 7 * index),
);

function pathOf(site: Site, startMs: number): { span: Interval; path: TrackPoint[] } {
  const span = { startMs, endMs: startMs + 1.3 * DAY_MS };
  return { span, path: moonTrack(buildMoonTable(span), site, span, STEP_MS) };
}

/** Index of the greatest value, or null unless it is a true peak more than 40 minutes from both ends. */
function peak(path: readonly TrackPoint[], value: (point: TrackPoint) => number): number | null {
  let best = 0;
  path.forEach((point, index) => {
    if (value(point) > value(path[best]!)) best = index;
  });
  const margin = (40 * MINUTE_MS) / STEP_MS;
  return best > margin && best < path.length - margin ? best : null;
}

const cases = sites.flatMap((site) =>
  days.flatMap((startMs) => lengthsMin.map((minutes) => ({ site, startMs, minutes }))),
);

describe('grazing passages', () => {
  it('of an elevation limit just below the culmination', () => {
    let tried = 0;
    for (const { site, startMs, minutes } of cases) {
      const { span, path } = pathOf(site, startMs);
      const top = peak(path, (point) => point.elevationDeg);
      if (top === null || path[top]!.elevationDeg < 2) continue;
      tried += 1;
      const halfSteps = Math.round((minutes * MINUTE_MS) / 2 / STEP_MS);
      const limitDeg = path[top - halfSteps]!.elevationDeg;
      const after = path.findIndex((p, index) => index > top && p.elevationDeg < limitDeg);
      const expectedMs = path[after]!.timeMs - path[top - halfSteps]!.timeMs;
      const found = visibleIntervals(
        { callSign: 'QA1LUN', site, sky: { elevationFromDeg: limitDeg } },
        span,
      ).filter((one) => one.startMs < path[top]!.timeMs && one.endMs > path[top]!.timeMs);
      expect(found, JSON.stringify({ site, startMs, minutes })).toHaveLength(1);
      const lengthMs = found[0]!.endMs - found[0]!.startMs;
      expect(Math.abs(lengthMs - expectedMs)).toBeLessThan(LENGTH_TOLERANCE_MS + STEP_MS);
    }
    expect(tried).toBeGreaterThan(60);
  });

  it('of a highest elevation just below the culmination, which cuts a hole', () => {
    let tried = 0;
    for (const { site, startMs, minutes } of cases) {
      const { span, path } = pathOf(site, startMs);
      const top = peak(path, (point) => point.elevationDeg);
      if (top === null || path[top]!.elevationDeg < 2) continue;
      tried += 1;
      const halfSteps = Math.round((minutes * MINUTE_MS) / 2 / STEP_MS);
      const limitDeg = path[top - halfSteps]!.elevationDeg;
      const station = { callSign: 'QA1LUN', site, sky: { elevationToDeg: limitDeg } };
      const found = visibleIntervals(station, span);
      const inHole = found.some(
        (one) => one.startMs <= path[top]!.timeMs && one.endMs > path[top]!.timeMs,
      );
      expect(inHole, JSON.stringify({ site, startMs, minutes })).toBe(false);
    }
    expect(tried).toBeGreaterThan(60);
  });

  it('of the azimuth at which the Moon turns back', () => {
    const site = { latitudeDeg: 8, longitudeDeg: 100, heightM: 0 };
    let turned = 0;
    for (const startMs of days) {
      const { span, path } = pathOf(site, startMs);
      const east = (point: TrackPoint) =>
        point.elevationDeg > 5 && point.azimuthDeg < 180 ? point.azimuthDeg : -1;
      const top = peak(path, east);
      if (top === null) continue;
      const before = path[top - 60]!;
      const after = path[top + 60]!;
      if (east(before) < 0 || east(after) < 0 || east(before) > east(path[top]!)) continue;
      if (east(after) > east(path[top]!)) continue;
      turned += 1;
      for (const minutes of lengthsMin) {
        const limitDeg = path[top - Math.round((minutes * MINUTE_MS) / 2 / STEP_MS)]!.azimuthDeg;
        const sky: SkyLimits = { azimuthFromDeg: limitDeg, azimuthToDeg: 180 };
        const found = visibleIntervals({ callSign: 'QA1LUN', site, sky }, span);
        const inside = found.some(
          (one) => one.startMs < path[top]!.timeMs && one.endMs > path[top]!.timeMs,
        );
        expect(inside, JSON.stringify({ startMs, minutes })).toBe(true);
      }
    }
    expect(turned).toBeGreaterThan(2);
  });

  it('between two hills and behind a mast of a horizon profile', () => {
    const site = sites[0]!;
    let tried = 0;
    for (const startMs of days) {
      const { span, path } = pathOf(site, startMs);
      const at = path.findIndex(({ elevationDeg: el }, index) => {
        const rising = index > 0 && path[index - 1]!.elevationDeg < el;
        return rising && el > 12 && index > 1000 && index < path.length - 1000;
      });
      if (at < 0) continue;
      tried += 1;
      const { azimuthDeg, elevationDeg, timeMs } = path[at]!;
      const around = (centreDeg: number, besideDeg: number) => [
        { azimuthDeg: azimuthDeg - 0.4, elevationDeg: besideDeg },
        { azimuthDeg, elevationDeg: centreDeg },
        { azimuthDeg: azimuthDeg + 0.4, elevationDeg: besideDeg },
      ];
      const holds = (intervals: Interval[]) =>
        intervals.find((one) => one.startMs <= timeMs && one.endMs > timeMs);
      const visible = (horizon: SkyLimits['horizon']) =>
        visibleIntervals({ callSign: 'QA1LUN', site, sky: { horizon } }, span);
      const gap = holds(visible(around(elevationDeg - 10, elevationDeg + 10)));
      expect(gap, new Date(timeMs).toISOString()).toBeDefined();
      expect(gap!.endMs - gap!.startMs).toBeLessThan(5 * MINUTE_MS);
      expect(gap!.endMs - gap!.startMs).toBeGreaterThan(MINUTE_MS);
      const mast = visible(around(elevationDeg + 10, elevationDeg - 10));
      expect(holds(mast)).toBeUndefined();
      expect(mast.some((one) => Math.abs(one.endMs - timeMs) < 3 * MINUTE_MS)).toBe(true);
      expect(mast.some((one) => Math.abs(one.startMs - timeMs) < 3 * MINUTE_MS)).toBe(true);
    }
    expect(tried).toBeGreaterThan(4);
  });
});
