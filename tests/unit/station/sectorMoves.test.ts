import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readFigure, showFigure } from '../../../src/components/station/readFigure';
import {
  edgeDirection,
  moveEdge,
  moveSector,
  sectorBetween,
  type SectorEdge,
} from '../../../src/components/station/sectorMoves';
import { azimuthWidthDeg } from '../../../src/domain/sky';
import { blockedSectorSchema } from '../../../src/domain/station/skySchema';

const BARN = {
  azimuthFromDeg: 350,
  azimuthToDeg: 20,
  elevationFromDeg: 5,
  elevationToDeg: 25,
  name: 'barn',
};

const sector = fc
  .record({
    azimuthFromDeg: fc.integer({ min: 0, max: 359 }),
    width: fc.integer({ min: 1, max: 359 }),
    elevationFromDeg: fc.integer({ min: 0, max: 88 }),
    height: fc.integer({ min: 1, max: 90 }),
  })
  .map(({ azimuthFromDeg, width, elevationFromDeg, height }) => ({
    azimuthFromDeg,
    azimuthToDeg: (azimuthFromDeg + width) % 360,
    elevationFromDeg,
    elevationToDeg: Math.min(90, elevationFromDeg + height),
  }));
const direction = fc.record({
  azimuthDeg: fc.integer({ min: -400, max: 400 }),
  elevationDeg: fc.integer({ min: -100, max: 100 }),
});

describe('moving blocked sectors', () => {
  it('keeps the size and stays between horizon and zenith', () => {
    fc.assert(
      fc.property(sector, direction, (before, by) => {
        const after = moveSector(before, by);
        expect(blockedSectorSchema.safeParse(after).success).toBe(true);
        expect(azimuthWidthDeg(after.azimuthFromDeg, after.azimuthToDeg)).toBeCloseTo(
          azimuthWidthDeg(before.azimuthFromDeg, before.azimuthToDeg),
        );
        expect(after.elevationToDeg - after.elevationFromDeg).toBeCloseTo(
          before.elevationToDeg - before.elevationFromDeg,
        );
        expect(after.elevationFromDeg).toBeGreaterThanOrEqual(0);
        expect(after.elevationToDeg).toBeLessThanOrEqual(90);
      }),
    );
  });

  it('passes north', () => {
    expect(moveSector(BARN, { azimuthDeg: 15, elevationDeg: -10 })).toEqual({
      ...BARN,
      azimuthFromDeg: 5,
      azimuthToDeg: 35,
      elevationFromDeg: 0,
      elevationToDeg: 20,
    });
    expect(edgeDirection(BARN, 'elevationTo')).toEqual({ azimuthDeg: 5, elevationDeg: 25 });
  });

  it('an edge never turns the sector inside out', () => {
    const edges: SectorEdge[] = ['azimuthFrom', 'azimuthTo', 'elevationFrom', 'elevationTo'];
    fc.assert(
      fc.property(sector, direction, fc.constantFrom(...edges), (before, to, edge) => {
        const after = moveEdge(before, edge, to);
        expect(blockedSectorSchema.safeParse(after).success).toBe(true);
      }),
    );
    expect(moveEdge(BARN, 'azimuthTo', { azimuthDeg: 350.4, elevationDeg: 0 })).toBe(BARN);
  });

  it('is drawn the short way round from any corner, and of handy size by a press', () => {
    const a = { azimuthDeg: 355, elevationDeg: 30 };
    const b = { azimuthDeg: 12, elevationDeg: 4 };
    const drawn = {
      azimuthFromDeg: 355,
      azimuthToDeg: 12,
      elevationFromDeg: 4,
      elevationToDeg: 30,
    };
    expect(sectorBetween(a, b)).toEqual(drawn);
    expect(sectorBetween(b, a)).toEqual(drawn);
    expect(sectorBetween(a, a)).toEqual({
      azimuthFromDeg: 345,
      azimuthToDeg: 5,
      elevationFromDeg: 23,
      elevationToDeg: 38,
    });
    fc.assert(
      fc.property(direction, direction, (start, end) => {
        expect(blockedSectorSchema.safeParse(sectorBetween(start, end)).success).toBe(true);
      }),
    );
  });
});

describe('figures in fields', () => {
  it('reads commas, signs and units, and says what is no number', () => {
    expect(
      ['', ' 8,5 ', '\u22124', '-4', '12°', '1 000', 'eight', '1e3', '.5', '-'].map(readFigure),
    ).toEqual([undefined, 8.5, -4, -4, 12, 1000, NaN, NaN, 0.5, NaN]);
  });

  it('comes back as it is shown', () => {
    fc.assert(
      fc.property(fc.integer({ min: -1e9, max: 1e9 }), (millis) => {
        expect(readFigure(showFigure(millis / 1000))).toBeCloseTo(millis / 1000, 9);
      }),
    );
  });
});
