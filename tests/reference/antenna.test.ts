import { describe, expect, it } from 'vitest';
import {
  arrayBeamwidthDeg,
  dishBeamwidthDeg,
  dishGainDbi,
  offAxisDb,
  surfaceLossDb,
} from '../../src/domain/link/antenna';
import { beamFillLossDb } from '../../src/domain/link/beamFill';

describe('dish', () => {
  /** Published examples (read in the source); not used to build. */
  it('of 1 m at 12 GHz with an efficiency of 0.6: 39.8 dBi, 1.75°', () => {
    expect(Math.abs(dishGainDbi(1, 0.6, 12_000) - 39.8)).toBeLessThan(0.05);
    expect(Math.abs(dishBeamwidthDeg(1, 12_000) - 1.75)).toBeLessThan(0.005);
  });

  it('of 1.2 m at 12 GHz with an efficiency of 0.55: 40.97 dBi', () => {
    expect(Math.abs(dishGainDbi(1.2, 0.55, 12_000) - 40.97)).toBeLessThan(0.02);
  });

  /** Computed for the project: two 3 m dishes, η 0.55; not used to build. */
  it('of 3 m at 1296 MHz with an efficiency of 0.55: 29.60 dBi', () => {
    expect(Math.abs(dishGainDbi(3, 0.55, 1296) - 29.6)).toBeLessThan(0.01);
  });
});

describe('array', () => {
  /** √(41 253 · 0.75 / G) (from memory): a gain of 21 dBi has a beam of about 16°. */
  it('of 21 dBi has a beam of 15.7°', () => {
    expect(Math.abs(arrayBeamwidthDeg(21) - 15.68)).toBeLessThan(0.02);
  });

  /** The two rules agree on a dish of usual efficiency within their errors. */
  it('agrees with the rule for dishes', () => {
    const byGain = arrayBeamwidthDeg(dishGainDbi(3, 0.55, 1296));
    expect(Math.abs(byGain / dishBeamwidthDeg(3, 1296) - 1)).toBeLessThan(0.15);
  });
});

describe('losses', () => {
  /** 12 (ψ/HPBW)²: 3 dB at half the beamwidth, by definition of it. */
  it('by pointing', () => {
    expect(offAxisDb(0.5, 1, 40)).toBeCloseTo(3, 12);
    expect(offAxisDb(0.25, 1, 40)).toBeCloseTo(0.75, 12);
    expect(offAxisDb(-0.25, 1, 40)).toBeCloseTo(0.75, 12);
  });

  /** Ruze: a sixteenth of a wavelength costs 2.68 dB. */
  it('by a rough surface', () => {
    const wavelength = 299.792458 / 10_368;
    expect(surfaceLossDb(wavelength / 16, 10_368)).toBeCloseTo(686 / 256, 9);
  });

  /** (1 − e^(−x))/x with x = 2 ln2 (θ_moon/θ)² (computed for the project); beam as wide as the Moon: x = 1.386. */
  it('by a beam as narrow as the Moon', () => {
    const x = 2 * Math.LN2;
    const expected = -10 * Math.log10((1 - Math.exp(-x)) / x);
    expect(beamFillLossDb(24_048, 0.52, 0.52)).toBeCloseTo(expected, 12);
    expect(beamFillLossDb(24_048, 0.52, 52)).toBeLessThan(0.001);
    expect(beamFillLossDb(10_368, 0.52, 0.52)).toBe(0);
  });
});
