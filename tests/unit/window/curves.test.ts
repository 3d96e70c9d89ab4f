import { describe, expect, it } from 'vitest';
import { buildMoonTable } from '~/domain/ephemeris';
import { computeLink } from '~/domain/link/budget';
import { degradationModel, skyAndDegradation } from '~/domain/link/degradation';
import { dopplerHz } from '~/domain/link/doppler';
import { createLinkEvaluator } from '~/domain/link/evaluator';
import { parallacticFromSkyDeg, polarizationOffsetDeg } from '~/domain/link/polarization';
import { libration, spreadHz } from '~/domain/link/spread';
import { HOUR_MS, MINUTE_MS } from '~/domain/time/interval';
import { curvePanels, valueAt } from '~/domain/window/curvePanels';
import { CURVE_STEP_MS, windowCurves } from '~/domain/window/curves';
import { NORTH, SOUTH, UP_MS, WEST } from '../link/stations';

const MHZ = 1296.1;
const span = { startMs: UP_MS - 7 * HOUR_MS - 90_000, endMs: UP_MS + 7 * HOUR_MS + 90_000 };
const table = buildMoonTable({ startMs: span.startMs - HOUR_MS, endMs: span.endMs + HOUR_MS });
const sites = [NORTH.site, WEST.site];
const link = createLinkEvaluator([NORTH, WEST], MHZ, 'q65-60c');
const curves = windowCurves({ table, span, sites, frequencyMhz: MHZ, link });

describe('curves of a window', () => {
  it('stand on whole five minutes of UTC within the span', () => {
    expect(curves.timesMs).toHaveLength((14 * HOUR_MS) / CURVE_STEP_MS + 1);
    for (const timeMs of curves.timesMs) {
      expect(timeMs % CURVE_STEP_MS).toBe(0);
      expect(timeMs).toBeGreaterThanOrEqual(span.startMs);
      expect(timeMs).toBeLessThanOrEqual(span.endMs);
    }
  });

  it('equal the direct functions at every eleventh sample', () => {
    const model = degradationModel(MHZ);
    for (let index = 0; index < curves.timesMs.length; index += 11) {
      const timeMs = curves.timesMs[index]!;
      const seen = sites.map((site) => table.sample(site, timeMs));
      seen.forEach((sample, at) => {
        expect(curves.elevationDeg[at]![index]).toBeCloseTo(sample.elevationDeg, 9);
        expect(curves.ownEchoHz[at]![index]).toBeCloseTo(dopplerHz(MHZ, sample.rangeRateMps), 6);
      });
      const mutual = dopplerHz(MHZ, seen[0]!.rangeRateMps, seen[1]!.rangeRateMps);
      expect(Math.abs(curves.pair!.mutualHz[index]! - mutual)).toBeLessThan(0.05);
      const { degradationDb } = skyAndDegradation(model, timeMs);
      expect(curves.degradationDb[index]).toBeCloseTo(degradationDb, 3);
      const spread = spreadHz(
        MHZ,
        libration(NORTH.site, timeMs, table),
        libration(WEST.site, timeMs, table),
      );
      expect(Math.abs(curves.pair!.spreadHz[index]! - spread)).toBeLessThan(0.01);
      const [first, second] = sites.map((site, at) =>
        parallacticFromSkyDeg(site.latitudeDeg, seen[at]!.azimuthDeg, seen[at]!.elevationDeg),
      );
      const turned =
        curves.pair!.polarizationOffsetDeg[index]! - polarizationOffsetDeg(first!, second!);
      expect(Math.abs(Math.sin((turned * Math.PI) / 180))).toBeLessThan(0.001);
    }
  });

  it('have the margins of both directions where the Moon is up for both, and nothing elsewhere', () => {
    const [there, back] = curves.pair!.marginDb!;
    let up = 0;
    curves.timesMs.forEach((timeMs, index) => {
      const bothUp = curves.elevationDeg.every((elevation) => elevation[index]! > 0);
      expect(Number.isNaN(there[index])).toBe(!bothUp);
      expect(Number.isNaN(back[index])).toBe(!bothUp);
      if (!bothUp || index % 6 !== 0) return;
      up += 1;
      const { directions } = computeLink({
        stations: [NORTH, WEST],
        frequencyMhz: MHZ,
        mode: 'q65-60c',
        timeMs,
      });
      expect(there[index]).toBeCloseTo(directions[0].marginDb, 2);
      expect(back[index]).toBeCloseTo(directions[1].marginDb, 2);
    });
    expect(up).toBeGreaterThan(5);
    expect(there.some(Number.isNaN)).toBe(true);
  });

  it('have no margin without a link, and nothing of a pair for three stations', () => {
    const part = { table, span, frequencyMhz: MHZ, link: null };
    expect(windowCurves({ ...part, sites }).pair!.marginDb).toBeNull();
    const three = windowCurves({ ...part, sites: [...sites, SOUTH.site] });
    expect(three.pair).toBeNull();
    expect(three.elevationDeg).toHaveLength(3);
  });
});

describe('panels of curves', () => {
  const panels = curvePanels(curves, ['QA1LUN', 'QB7TID'], MHZ);

  it('name every line', () => {
    expect(panels.map(({ title }) => title)).toEqual([
      'Elevation',
      'Degradation',
      'Doppler',
      'Spread',
      'Polarisation offset',
      'Margin',
    ]);
    expect(panels.at(-1)!.lines.map(({ label }) => label)).toEqual([
      'QA1LUN to QB7TID',
      'QB7TID to QA1LUN',
    ]);
    expect(panels[2]!.lines.map(({ label }) => label)).toEqual([
      'QA1LUN own echo',
      'QB7TID own echo',
      'Mutual',
    ]);
  });

  it('read a value between samples, not over a wrap or a gap, nor beyond the ends', () => {
    const times = Float64Array.of(0, 10 * MINUTE_MS, 20 * MINUTE_MS, 30 * MINUTE_MS);
    const values = Float64Array.of(170, 178, 2, NaN);
    expect(valueAt(times, values, 5 * MINUTE_MS, 180)).toBe(174);
    expect(valueAt(times, values, 14 * MINUTE_MS, 180)).toBe(178);
    expect(valueAt(times, values, 16 * MINUTE_MS, 180)).toBe(2);
    expect(valueAt(times, values, 20 * MINUTE_MS, 180)).toBe(2);
    expect(valueAt(times, values, 25 * MINUTE_MS)).toBeNaN();
    expect(valueAt(times, values, -1)).toBeNaN();
    expect(valueAt(times, values, 31 * MINUTE_MS)).toBeNaN();
  });
});
