import { describe, expect, it } from 'vitest';
import {
  atmosphereAt,
  atmosphereLossDb,
  atmosphereNoiseK,
  zenithLossDb,
} from '../../src/domain/link/atmosphere';
import { skyBeam, skyTemperatureK } from '../../src/domain/link/skyNoise';

const DEG = Math.PI / 180;

/**
 * ITU-R P.676-12 line by line, mean global reference atmosphere (computed for the project): zenith dB, K at
 * 90/30/10/5°. The model is built from these; the test guards its interpolation.
 */
const TABLE: [mhz: number, zenithDb: number, ...kelvin: number[]][] = [
  [432, 0.02, 1.2, 2.4, 6.6, 12.3],
  [1296, 0.033, 2.0, 3.9, 10.9, 20.2],
  [2304, 0.036, 2.1, 4.2, 11.8, 21.9],
  [3400, 0.037, 2.2, 4.4, 12.3, 22.8],
  [5760, 0.04, 2.4, 4.8, 13.4, 24.9],
  [10_368, 0.052, 3.2, 6.3, 17.4, 32.2],
  [24_048, 0.397, 23.9, 45.7, 112, 175],
  [47_088, 0.882, 48.7, 88.7, 185, 244],
];
const noiseK = (mhz: number, elevationDeg: number) => {
  const atmosphere = atmosphereAt(mhz);
  return atmosphereNoiseK(atmosphere, atmosphereLossDb(atmosphere, Math.sin(elevationDeg * DEG)));
};

describe('clear air', () => {
  it.each(TABLE)('at %s MHz', (mhz, zenithDb, ...kelvin) => {
    expect(zenithLossDb(mhz)).toBeCloseTo(zenithDb, 6);
    [90, 30, 10, 5].forEach((elevationDeg, index) => {
      expect(noiseK(mhz, elevationDeg)).toBeCloseTo(kelvin[index]!, 6);
    });
  });

  /** A(el) = A_z/sin el above 5° (simple form): within 10 % from 10° up; nearer the horizon it is too much. Not used to build. */
  it.each(TABLE)('at %s MHz loses nearly A_z/sin el', (mhz, zenithDb) => {
    for (const elevationDeg of [10, 20, 45, 70]) {
      const found = atmosphereLossDb(atmosphereAt(mhz), Math.sin(elevationDeg * DEG));
      const simple = zenithDb / Math.sin(elevationDeg * DEG);
      expect(Math.abs(found / simple - 1)).toBeLessThan(0.1);
    }
  });

  it('never falls towards the horizon and has an end below 1°', () => {
    let before = 0;
    for (let elevationDeg = 90; elevationDeg >= -5; elevationDeg -= 0.25) {
      const now = atmosphereLossDb(atmosphereAt(24_048), Math.sin(elevationDeg * DEG));
      expect(now).toBeGreaterThanOrEqual(before);
      before = now;
    }
    expect(before).toBe(atmosphereLossDb(atmosphereAt(24_048), Math.sin(1 * DEG)));
    expect(noiseK(24_048, -5)).toBeLessThan(290);
  });
});

/**
 * Anderson et al. 1991, Radio Science 26, 353 (read in the source): a radio telescope at the zenith at 1420 MHz has
 * 26.8 K in all, of which spillover 8.0, mesh 5.9, struts 5.8. The rest is sky and air. Not used to build.
 */
describe('a measured antenna temperature at 1420 MHz', () => {
  it('is met by spillover, mesh and struts with our cold sky and air', () => {
    const skyK = skyTemperatureK(skyBeam(1420, 1), 135, 0);
    const total = 8.0 + 5.9 + 5.8 + skyK + noiseK(1420, 90);
    expect(Math.abs(total - 26.8)).toBeLessThan(2.5);
  });
});
