import { describe, expect, it } from 'vitest';
import { moonFootprint, moonSampleDirect } from '~/domain/ephemeris';

const DEG = Math.PI / 180;

/** A point so far from the middle of the footprint in a direction, on a round Earth. */
function pointAt(
  { latitudeDeg, longitudeDeg }: { latitudeDeg: number; longitudeDeg: number },
  awayDeg: number,
  bearingDeg: number,
) {
  const lat = latitudeDeg * DEG;
  const away = awayDeg * DEG;
  const sin =
    Math.sin(lat) * Math.cos(away) + Math.cos(lat) * Math.sin(away) * Math.cos(bearingDeg * DEG);
  const east = Math.atan2(
    Math.sin(bearingDeg * DEG) * Math.sin(away) * Math.cos(lat),
    Math.cos(away) - Math.sin(lat) * sin,
  );
  return {
    latitudeDeg: Math.asin(sin) / DEG,
    longitudeDeg: ((longitudeDeg + east / DEG + 540) % 360) - 180,
    heightM: 0,
  };
}

// Against the look angles, which are checked against DE405 (moonPosition.test.ts).
describe('the Moon’s footprint', () => {
  const instants = [0, 5, 11, 18, 23].map((day) => Date.UTC(2027, 0, 3 + day, 3 * day));

  it('has the Moon overhead in its middle, within 0.3°', () => {
    for (const timeMs of instants) {
      const middle = moonFootprint(timeMs);
      const { elevationDeg } = moonSampleDirect({ ...middle, heightM: 0 }, timeMs);
      expect(elevationDeg).toBeGreaterThan(89.7);
    }
  });

  it('has it on the horizon all along its edge, within 0.3°', () => {
    for (const timeMs of instants) {
      const footprint = moonFootprint(timeMs);
      for (let bearing = 0; bearing < 360; bearing += 30) {
        const site = pointAt(footprint, footprint.radiusDeg, bearing);
        expect(Math.abs(moonSampleDirect(site, timeMs).elevationDeg)).toBeLessThan(0.3);
      }
    }
  });
});
