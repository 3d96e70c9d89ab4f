import { describe, expect, it } from 'vitest';
import { positionToLocator, locatorToPosition } from '../../src/domain/locator/locator';

/**
 * Published: J. Tyson, "Conversion between geodetic and grid locator systems", QST January 1989, and
 * other published examples. Each is a place and its six-character locator.
 */
const PUBLISHED = [
  [48.14666, 11.60833, 'JN58td'],
  [-34.91, -56.21166, 'GF15vc'],
  [38.92, -77.065, 'FM18lw'],
  [-41.28333, 174.745, 'RE78ir'],
  [41.714775, -72.72726, 'FN31pr'],
  [37.413708, -122.1073236, 'CM87wj'],
  [35.0542, -85.1142, 'EM75kb'],
] as const;

/** Computed by hand from the definition, not published. */
const COMPUTED = [
  [48.14666, 11.60833, 'JN58td25xe'],
  [41.714775, -72.72726, 'FN31pr21rn'],
] as const;

describe('locator against published examples', () => {
  it.each(PUBLISHED)('%f %f is %s', (latitudeDeg, longitudeDeg, locator) => {
    expect(positionToLocator({ latitudeDeg, longitudeDeg }, 6)).toBe(locator);
  });

  it.each([...PUBLISHED, ...COMPUTED])(
    '%f %f lies in the cell of %s',
    (latitudeDeg, longitudeDeg, locator) => {
      const { cell } = locatorToPosition(locator);
      expect(latitudeDeg).toBeGreaterThanOrEqual(cell.south);
      expect(latitudeDeg).toBeLessThan(cell.north);
      expect(longitudeDeg).toBeGreaterThanOrEqual(cell.west);
      expect(longitudeDeg).toBeLessThan(cell.east);
    },
  );

  it.each(COMPUTED)('%f %f is %s to ten characters', (latitudeDeg, longitudeDeg, locator) => {
    expect(positionToLocator({ latitudeDeg, longitudeDeg }, 10)).toBe(locator);
  });
});
