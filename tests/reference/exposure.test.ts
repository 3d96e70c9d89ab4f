import { describe, expect, it } from 'vitest';
import { dishGainDbi } from '../../src/domain/link/antenna';
import {
  apertureField,
  exposureLimits,
  powerDensityWm2,
  safeDistanceM,
} from '../../src/domain/link/exposure';

const FOOT_M = 0.3048;

describe('limits in W/m²', () => {
  /** 47 CFR 1.1310 (read in the source) and ICNIRP 2020 (read second-hand); built from these. */
  it.each([
    [50, 10, 2, 2],
    [144, 10, 2, 2],
    [432, 14.4, 2.88, 2.16],
    [1296, 43.2, 8.64, 6.48],
    [2304, 50, 10, 10],
    [47_088, 50, 10, 10],
  ])('at %s MHz', (mhz, occupational, general, icnirpGeneral) => {
    const limits = exposureLimits(mhz);
    expect(limits.occupational).toBeCloseTo(occupational, 9);
    expect(limits.general).toBeCloseTo(general, 9);
    expect(limits.icnirpGeneral).toBeCloseTo(icnirpGeneral, 9);
  });

  it('do not jump where their pieces meet', () => {
    for (const mhz of [300, 400, 1500, 2000]) {
      const [below, above] = [exposureLimits(mhz - 1e-6), exposureLimits(mhz + 1e-6)];
      expect(above.occupational).toBeCloseTo(below.occupational, 5);
      expect(above.general).toBeCloseTo(below.general, 5);
      expect(above.icnirpGeneral).toBeCloseTo(below.icnirpGeneral, 5);
    }
  });
});

describe('distances', () => {
  /** OET Bulletin 65 (read in the source): a dish of 2.4 m at 6.1 GHz has its near field out to 29.28 m. */
  it('near field of a published example', () => {
    const field = apertureField({ frequencyMhz: 6100, powerW: 1, gainDbi: 41, diameterM: 2.4 });
    expect(Math.abs(field.nearEndM - 29.28)).toBeLessThan(0.03);
  });

  /** Published (read in the source): 24 dBi at 144 MHz, 1500 W, ground factor 2.56: 287 ft and 642 ft; not used to build. */
  it.each([
    ['occupational', 287],
    ['general', 642],
  ] as const)('%s: %s ft', (kind, feet) => {
    const array = { frequencyMhz: 144, powerW: 1500, gainDbi: 24, groundFactor: 2.56 };
    const found = safeDistanceM(array, exposureLimits(144)[kind]) / FOOT_M;
    expect(Math.abs(found - feet)).toBeLessThan(1);
  });
});

describe('a 3 m dish with 500 W at 1296 MHz', () => {
  const dish = {
    frequencyMhz: 1296,
    powerW: 500,
    gainDbi: dishGainDbi(3, 0.55, 1296),
    diameterM: 3,
  };

  it('has its greatest on axis near the dish, and less with every metre', () => {
    const field = apertureField(dish);
    expect(field.surface).toBeCloseTo((4 * 500) / (Math.PI * 2.25), 9);
    expect(field.near).toBeCloseTo((16 * 0.55 * 500) / (Math.PI * 9), 6);
    expect(field.axisPeak).toBeGreaterThan(field.near);
    let before = Infinity;
    for (let distanceM = 0.5; distanceM < 500; distanceM *= 1.03) {
      const now = powerDensityWm2(dish, distanceM);
      expect(now).toBeLessThanOrEqual(before);
      before = now;
    }
  });

  it('is PG/4πR² far away, and is averaged by the duty', () => {
    const plain = (500 * 10 ** (dish.gainDbi / 10)) / (4 * Math.PI * 300 ** 2);
    expect(powerDensityWm2(dish, 300)).toBeCloseTo(plain, 9);
    expect(powerDensityWm2({ ...dish, duty: 0.5 }, 300)).toBeCloseTo(plain / 2, 9);
  });

  it('needs no distance under a limit it never reaches', () => {
    expect(safeDistanceM({ ...dish, powerW: 0.01 }, 10)).toBe(0);
  });

  it('refuses what is no radiator', () => {
    expect(() => powerDensityWm2({ ...dish, duty: 1.2 }, 10)).toThrow(/duty/);
    expect(() => powerDensityWm2({ ...dish, powerW: -1 }, 10)).toThrow(/power/);
    expect(() => powerDensityWm2(dish, 0)).toThrow(/distance/);
    expect(() => exposureLimits(10)).toThrow(/30 MHz/);
  });
});
