import { describe, expect, it } from 'vitest';
import { dishGainDbi } from '../../../src/domain/link/antenna';
import { powerDensityWm2 } from '../../../src/domain/link/exposure';
import { exposureEstimate } from '../../../src/domain/link/exposureEstimate';

const dish = {
  frequencyMhz: 1296,
  powerW: 500,
  gainDbi: dishGainDbi(3, 0.55, 1296),
  diameterM: 3,
};

describe('exposure estimate', () => {
  /** 24 dBi at 144 MHz, 1500 W, ground factor 2.56: 287 ft and 642 ft (published, read in the source). */
  it('gives the published distances of an array', () => {
    const { levels, dish: none } = exposureEstimate({
      frequencyMhz: 144,
      powerW: 1500,
      gainDbi: 24,
      groundFactor: 2.56,
    });
    const feet = levels.map(({ distanceM }) => distanceM / 0.3048);
    expect(Math.abs(feet[0]! - 287)).toBeLessThan(1);
    expect(Math.abs(feet[1]! - 642)).toBeLessThan(1);
    expect(levels.every(({ cautiousM }) => cautiousM === null)).toBe(true);
    expect(none).toBeNull();
  });

  it('meets each level at its distance, and exceeds it just before', () => {
    for (const { distanceM, limitWm2 } of exposureEstimate({ ...dish, duty: 0.5 }).levels) {
      const radiator = { ...dish, duty: 0.5 };
      expect(powerDensityWm2(radiator, distanceM)).toBeLessThanOrEqual(limitWm2);
      expect(powerDensityWm2(radiator, distanceM - 0.01)).toBeGreaterThan(limitWm2);
    }
  });

  it('warns of the near field where only the higher peak exceeds the level', () => {
    // 80 W: by OET-65 25 W/m² in the near field, by the other figure 84 W/m², against 43.2 W/m².
    const { levels, dish: field } = exposureEstimate({ ...dish, powerW: 80 });
    expect(field!.nearWm2).toBeLessThan(43.2);
    expect(field!.peakWm2).toBeGreaterThan(43.2);
    expect(levels[0]!.distanceM).toBe(0);
    expect(levels[0]!.cautiousM).toBeCloseTo(field!.nearEndM, 9);
    expect(levels[1]!.cautiousM).toBeNull();
    expect(exposureEstimate({ ...dish, powerW: 1 }).levels[0]).toMatchObject({
      distanceM: 0,
      cautiousM: null,
    });
  });

  it('counts duty and ground in every density', () => {
    const full = exposureEstimate(dish).dish!;
    const half = exposureEstimate({ ...dish, duty: 0.5, groundFactor: 2 }).dish!;
    expect(half.surfaceWm2).toBeCloseTo(full.surfaceWm2, 9);
    expect(half.nearWm2).toBeCloseTo(full.nearWm2, 9);
    expect(half.peakWm2).toBeCloseTo(full.peakWm2, 9);
    expect(exposureEstimate({ ...dish, duty: 0.5 }).dish!.peakWm2).toBeCloseTo(full.peakWm2 / 2, 9);
  });

  it.each([
    [{ powerW: -1 }, /power/],
    [{ duty: 1.2 }, /duty/],
    [{ diameterM: 0 }, /diameter/],
  ])('refuses %j', (wrong, sentence) => {
    expect(() => exposureEstimate({ ...dish, ...wrong })).toThrow(sentence);
  });
});
