import { describe, expect, it } from 'vitest';
import { buildMoonTable, moonSampleDirect } from '~/domain/ephemeris/index';
import { computeLink } from '~/domain/link/budget';
import { createLinkEvaluator } from '~/domain/link/evaluator';
import { dopplerHz, libration, pathLossDb, spreadHz } from '~/domain/link/index';
import { NORTH, WEST, withSetup } from './stations';

const DAY_MS = 86_400_000;
const SPAN = { startMs: Date.UTC(2026, 8, 1), endMs: Date.UTC(2026, 8, 8) };
const STEP_MS = 1_800_000;

describe('the series of a pair', () => {
  it.each([
    ['circular at 1296 MHz', 1296.1, NORTH, WEST],
    [
      'linear at 144 MHz',
      144.1,
      withSetup(NORTH, { polarization: 'horizontal', antenna: { kind: 'gain', gainDbi: 21 } }),
      withSetup(WEST, { polarization: 'vertical', antenna: { kind: 'gain', gainDbi: 19 } }),
    ],
    [
      'measured at 10 GHz',
      10_368.1,
      withSetup(NORTH, { receive: { kind: 'measured', systemTemperatureK: 80 } }),
      WEST,
    ],
  ])('says at every instant what the single link says: %s', (_name, mhz, first, second) => {
    const evaluator = createLinkEvaluator([first, second], mhz, 'q65-60c');
    const series = evaluator.series(SPAN, STEP_MS);
    expect(series.marginThereDb.length).toBe((7 * DAY_MS) / STEP_MS + 1);
    let up = 0;
    series.marginThereDb.forEach((marginDb, step) => {
      const timeMs = SPAN.startMs + step * STEP_MS;
      const single = computeLink({
        stations: [first, second],
        frequencyMhz: mhz,
        mode: 'q65-60c',
        timeMs,
      });
      expect(Number.isNaN(marginDb)).toBe(!single.moonUp);
      if (!single.moonUp) return;
      up += 1;
      expect(Math.abs(marginDb - single.directions[0].marginDb)).toBeLessThan(0.01);
      expect(Math.abs(series.marginBackDb[step]! - single.directions[1].marginDb)).toBeLessThan(
        0.01,
      );
      expect(Math.abs(series.contactChance[step]! - single.contactChance)).toBeLessThan(0.003);
    });
    expect(up).toBeGreaterThan(40);
  });

  it('rests on the same Moon as the single formulas', () => {
    const moment = createLinkEvaluator([NORTH, WEST], 1296, 'cw').over(buildMoonTable(SPAN));
    for (let timeMs = SPAN.startMs; timeMs < SPAN.endMs; timeMs += 3 * STEP_MS) {
      moment.compute(timeMs);
      const a = moonSampleDirect(NORTH.site, timeMs);
      const b = moonSampleDirect(WEST.site, timeMs);
      const { first, second } = moment.geometry;
      expect(Math.abs(moment.elevationDeg(0) - a.elevationDeg)).toBeLessThan(1e-4);
      expect(Math.abs(first.rangeRateMps - a.rangeRateMps)).toBeLessThan(0.01);
      expect(Math.abs(second.sunSeparationDeg - b.sunSeparationDeg)).toBeLessThan(1e-4);
      expect(Math.abs(second.sunElevationDeg - b.sunElevationDeg)).toBeLessThan(1e-4);
      expect(Math.abs(moment.pathLossDb - pathLossDb(1296, a.rangeKm, b.rangeKm))).toBeLessThan(
        1e-4,
      );
      expect(
        Math.abs(moment.dopplerHz - dopplerHz(1296, a.rangeRateMps, b.rangeRateMps)),
      ).toBeLessThan(0.1);
      const spread = spreadHz(1296, libration(NORTH.site, timeMs), libration(WEST.site, timeMs));
      expect(Math.abs(moment.spreadHz - spread)).toBeLessThan(0.01);
    }
  });

  it('takes a table it is given', () => {
    const evaluator = createLinkEvaluator([NORTH, WEST], 1296, 'cw');
    const table = buildMoonTable({ startMs: SPAN.startMs - DAY_MS, endMs: SPAN.endMs + DAY_MS });
    const own = evaluator.series(SPAN, STEP_MS);
    const given = evaluator.series(SPAN, STEP_MS, table);
    own.marginBackDb.forEach((marginDb, step) => {
      if (Number.isNaN(marginDb)) expect(given.marginBackDb[step]).toBeNaN();
      else expect(Math.abs(given.marginBackDb[step]! - marginDb)).toBeLessThan(0.01);
    });
  });
});
