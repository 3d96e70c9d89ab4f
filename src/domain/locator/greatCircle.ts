import type { Position } from './locator';

const MEAN_EARTH_RADIUS_KM = 6371.0088;
const DEGREE = Math.PI / 180;

/**
 * Great-circle distance and first bearing (clockwise from north, 0 … 360) on a sphere of the Earth's
 * mean radius (IUGG, 6371.0088 km); within 0.6 % of the ellipsoid. Bearing 0 for the same place.
 */
export function greatCircle(
  from: Position,
  to: Position,
): { distanceKm: number; bearingDeg: number } {
  const from1 = from.latitudeDeg * DEGREE;
  const to1 = to.latitudeDeg * DEGREE;
  const east = (to.longitudeDeg - from.longitudeDeg) * DEGREE;
  const y = Math.sin(east) * Math.cos(to1);
  const x = Math.cos(from1) * Math.sin(to1) - Math.sin(from1) * Math.cos(to1) * Math.cos(east);
  const z = Math.sin(from1) * Math.sin(to1) + Math.cos(from1) * Math.cos(to1) * Math.cos(east);
  return {
    distanceKm: MEAN_EARTH_RADIUS_KM * Math.atan2(Math.hypot(x, y), z),
    bearingDeg: (Math.atan2(y, x) / DEGREE + 360) % 360,
  };
}
