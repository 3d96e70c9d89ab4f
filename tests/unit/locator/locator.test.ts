import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { greatCircle } from '../../../src/domain/locator/greatCircle';
import {
  cutLocator,
  isLocator,
  LocatorError,
  locatorToPosition,
  positionToLocator,
  type LocatorLength,
} from '../../../src/domain/locator/locator';

const length = fc.constantFrom<LocatorLength>(4, 6, 8, 10);
const position = fc.record({
  latitudeDeg: fc.double({ min: -90, max: 90, noNaN: true }),
  longitudeDeg: fc.double({ min: -180, max: 180, noNaN: true }),
});

describe('locator', () => {
  it('comes back from the centre of its cell', () => {
    fc.assert(
      fc.property(position, length, (place, n) => {
        const locator = positionToLocator(place, n);
        expect(locator).toHaveLength(n);
        expect(positionToLocator(locatorToPosition(locator), n)).toBe(locator);
      }),
    );
  });

  it('holds the position in its cell', () => {
    fc.assert(
      fc.property(position, length, (place, n) => {
        const { cell } = locatorToPosition(positionToLocator(place, n));
        const slack = 1e-9;
        expect(place.latitudeDeg).toBeGreaterThanOrEqual(cell.south - slack);
        expect(place.latitudeDeg).toBeLessThanOrEqual(cell.north + slack);
        expect(place.longitudeDeg).toBeGreaterThanOrEqual(cell.west - slack);
        expect(place.longitudeDeg).toBeLessThanOrEqual(cell.east + slack);
      }),
    );
  });

  it('is cut to the locator of the larger cell', () => {
    fc.assert(
      fc.property(position, length, (place, n) => {
        expect(cutLocator(positionToLocator(place, 10), n)).toBe(positionToLocator(place, n));
      }),
    );
  });

  it('puts the corner into the cell north-east of it', () => {
    fc.assert(
      fc.property(position, length, (place, n) => {
        const locator = positionToLocator(place, n);
        const { cell } = locatorToPosition(locator);
        expect(positionToLocator({ latitudeDeg: cell.south, longitudeDeg: cell.west }, n)).toBe(
          locator,
        );
      }),
    );
  });

  it('knows the sizes of the cells', () => {
    const size = (text: string) => {
      const { cell } = locatorToPosition(text);
      return [cell.east - cell.west, cell.north - cell.south];
    };
    expect(size('JO97')).toEqual([2, 1]);
    expect(size('JO97ee')[0]).toBeCloseTo(5 / 60, 10);
    expect(size('JO97ee')[1]).toBeCloseTo(2.5 / 60, 10);
    expect(size('JO97ee55')[0]).toBeCloseTo(30 / 3600, 10);
    expect(size('JO97ee55aa')[1]).toBeCloseTo(15 / 3600 / 24, 10);
  });

  it('keeps pole and date line in the last cell', () => {
    expect(positionToLocator({ latitudeDeg: 90, longitudeDeg: 180 }, 6)).toBe('RR99xx');
    expect(positionToLocator({ latitudeDeg: -90, longitudeDeg: -180 }, 6)).toBe('AA00aa');
  });

  it('says what is wrong', () => {
    const sentence = (text: string) => {
      try {
        locatorToPosition(text);
      } catch (error) {
        if (error instanceof LocatorError) return error.message;
      }
      throw new Error('not refused');
    };
    expect(sentence('ZZ99')).toBe(
      'The first pair of the locator “ZZ99” is “ZZ”; it must be two letters A to R.',
    );
    expect(sentence('JO9')).toBe('The locator “JO9” has 3 characters; it needs 4, 6, 8 or 10.');
    expect(sentence('JOx7')).toContain('second pair');
    expect(sentence('JO97yy')).toContain('letters A to X');
    expect(sentence('')).toContain('is needed');
    expect(sentence('🌙🌙97')).toContain('first pair');
    expect(() => positionToLocator({ latitudeDeg: 91, longitudeDeg: 0 }, 6)).toThrow('Latitude 91');
    expect(() => positionToLocator({ latitudeDeg: NaN, longitudeDeg: 0 }, 6)).toThrow(LocatorError);
  });

  it('takes any case and spaces around', () => {
    expect(isLocator(' jo97EE ')).toBe(true);
    expect(cutLocator('jo97EE12', 6)).toBe('JO97ee');
    expect(isLocator('JO97e')).toBe(false);
  });
});

describe('great circle', () => {
  it('measures a quarter of the Earth', () => {
    const { distanceKm, bearingDeg } = greatCircle(
      { latitudeDeg: 0, longitudeDeg: 0 },
      { latitudeDeg: 0, longitudeDeg: 90 },
    );
    expect(distanceKm).toBeCloseTo(6371.0088 * (Math.PI / 2), 6);
    expect(bearingDeg).toBeCloseTo(90, 9);
  });

  it('is the same distance both ways', () => {
    fc.assert(
      fc.property(position, position, (a, b) => {
        expect(greatCircle(a, b).distanceKm).toBeCloseTo(greatCircle(b, a).distanceKm, 6);
      }),
    );
  });
});
