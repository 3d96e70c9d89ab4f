import { describe, expect, it } from 'vitest';
import { visibleIntervals } from '../../src/domain/window/index';
import { crossingSeries, siteOf } from './fixtures';

/** Tolerance of a crossing: one second, or what 0.001° takes at the Moon's rate there. */
function toleranceS(rateDegPerS: number): number {
  return Math.max(1, 0.001 / Math.abs(rateDegPerS));
}

const SPAN = { startMs: Date.UTC(2027, 0, 1), endMs: Date.UTC(2027, 1, 1) };

describe('rise and set of January 2027 against JPL DE405', () => {
  it.each(crossingSeries.map((series) => [series.site.lat_deg, series.threshold_el_deg, series]))(
    'latitude %s°, elevation %s°: every event, none besides',
    (_latitude, thresholdDeg, series) => {
      const station = {
        callSign: 'QA1LUN',
        site: siteOf(series.site),
        sky: { elevationFromDeg: thresholdDeg },
      };
      const found = visibleIntervals(station, SPAN)
        .flatMap(({ startMs, endMs }) => [
          { kind: 'rise', timeMs: startMs },
          { kind: 'set', timeMs: endMs },
        ])
        .filter(({ timeMs }) => timeMs > SPAN.startMs && timeMs < SPAN.endMs);
      expect(found.map(({ kind }) => kind)).toEqual(series.events.map(({ kind }) => kind));
      series.events.forEach((event, index) => {
        const missS = Math.abs(found[index]!.timeMs - Date.parse(event.utc)) / 1000;
        expect(missS, event.utc).toBeLessThan(toleranceS(event.el_rate_deg_per_s));
      });
    },
  );
});
