import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  domeDirection,
  domePoint,
  horizonPath,
  patchPath,
  runsAboveHorizon,
  unreachablePaths,
} from '../../../src/components/chart/domeGeometry';

describe('sky dome', () => {
  it('puts north up, east right, the zenith in the middle, in equal steps', () => {
    const at = (azimuthDeg: number, elevationDeg: number) => {
      const { x, y } = domePoint(azimuthDeg, elevationDeg, 90);
      return [Math.round(x), Math.round(y)].map((value) => value + 0);
    };
    expect(at(0, 0)).toEqual([0, -90]);
    expect(at(90, 0)).toEqual([90, 0]);
    expect(at(180, 30)).toEqual([0, 60]);
    expect(at(270, 60)).toEqual([-30, 0]);
    expect(at(123, 90)).toEqual([0, 0]);
  });

  it('comes back from a point', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 359.99, noNaN: true }),
        fc.double({ min: 0, max: 89.9, noNaN: true }),
        (azimuthDeg, elevationDeg) => {
          const back = domeDirection(domePoint(azimuthDeg, elevationDeg, 118), 118);
          expect(back.elevationDeg).toBeCloseTo(elevationDeg, 8);
          expect(Math.abs(((back.azimuthDeg - azimuthDeg + 540) % 360) - 180)).toBeLessThan(1e-6);
        },
      ),
    );
  });

  it('draws the larger arc for a sector over 180°, and whole rings for the full circle', () => {
    const sector = { elevationFromDeg: 0, elevationToDeg: 20 };
    expect(patchPath({ ...sector, azimuthFromDeg: 350, azimuthToDeg: 10 }, 90)).toContain(
      'A90 90 0 0 1',
    );
    expect(patchPath({ ...sector, azimuthFromDeg: 10, azimuthToDeg: 350 }, 90)).toContain(
      'A90 90 0 1 1',
    );
    expect(
      patchPath({ ...sector, azimuthFromDeg: 0, azimuthToDeg: 360 }, 90).match(/Z/g),
    ).toHaveLength(2);
  });

  it('has no horizon area without a profile above 0', () => {
    expect(horizonPath({}, 90)).toBe('');
    expect(horizonPath({ horizon: [{ azimuthDeg: 0, elevationDeg: -1 }] }, 90)).toBe('');
    expect(horizonPath({ horizon: [{ azimuthDeg: 0, elevationDeg: 3 }] }, 90)).not.toBe('');
  });

  it('shows what is outside the ranges', () => {
    expect(unreachablePaths({}, 90)).toEqual([]);
    expect(
      unreachablePaths({ azimuthFromDeg: 0, azimuthToDeg: 360, elevationToDeg: 90 }, 90),
    ).toEqual([]);
    expect(
      unreachablePaths({ azimuthFromDeg: 90, azimuthToDeg: 270, elevationToDeg: 70 }, 90),
    ).toHaveLength(2);
  });

  it('cuts a track at the horizon', () => {
    const track = [-1, 2, 3, -1, -2, 4].map((elevationDeg) => ({ elevationDeg }));
    expect(runsAboveHorizon(track).map((run) => run.length)).toEqual([2, 1]);
  });
});
