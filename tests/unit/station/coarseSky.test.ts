import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { skyFree, type SkyLimits } from '../../../src/domain/sky';
import { coarseSky } from '../../../src/domain/station/coarseSky';
import { describeSky } from '../../../src/domain/station/describe';
import { skyLimitsSchema } from '../../../src/domain/station/skySchema';

const azimuth = fc.double({ min: 0, max: 359.9, noNaN: true });
const sky: fc.Arbitrary<SkyLimits> = fc.record({
  blocked: fc.array(
    fc
      .tuple(azimuth, fc.double({ min: 1, max: 359, noNaN: true }), fc.integer({ min: 0, max: 80 }))
      .map(([azimuthFromDeg, width, elevationFromDeg]) => ({
        azimuthFromDeg,
        azimuthToDeg: (azimuthFromDeg + width) % 360,
        elevationFromDeg,
        elevationToDeg: elevationFromDeg + 7.3,
        name: 'barn',
      })),
    { maxLength: 4 },
  ),
  horizon: fc.uniqueArray(
    fc.record({
      azimuthDeg: fc.integer({ min: 0, max: 359 }),
      elevationDeg: fc.double({ min: 0, max: 40, noNaN: true }),
    }),
    { maxLength: 20, selector: (point) => point.azimuthDeg },
  ),
});

describe('the sky for others', () => {
  it('is never freer than the exact one at the steps, and tells no name', () => {
    fc.assert(
      fc.property(
        sky,
        fc.integer({ min: 0, max: 35 }),
        fc.integer({ min: 0, max: 89 }),
        (exact, step, elevationDeg) => {
          const coarse = coarseSky(exact);
          expect(JSON.stringify(coarse)).not.toContain('barn');
          if (skyFree(coarse, step * 10, elevationDeg)) {
            expect(skyFree(exact, step * 10, elevationDeg)).toBe(true);
          }
        },
      ),
      { numRuns: 300 },
    );
  });

  it('stays a sky that can be drawn', () => {
    const coarse = coarseSky({
      elevationFromDeg: 8,
      blocked: [{ azimuthFromDeg: 2, azimuthToDeg: 1, elevationFromDeg: 1, elevationToDeg: 88 }],
    });
    expect(skyLimitsSchema.safeParse(coarse).success).toBe(true);
    expect(coarse.blocked?.[0]).toMatchObject({ azimuthFromDeg: 0, azimuthToDeg: 360 });
  });

  it('is said in sentences', () => {
    expect(describeSky({})).toEqual(['No limits given: taken as free down to 0°.']);
    expect(
      describeSky({
        azimuthFromDeg: 300,
        azimuthToDeg: 60,
        transmitElevationFromDeg: 9,
        blocked: [],
      }),
    ).toEqual(['Azimuth 300.0° clockwise to 60.0°.', 'Transmits from 9.0° up.']);
  });
});
