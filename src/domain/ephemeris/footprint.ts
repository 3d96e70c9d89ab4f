import { DEG } from './constants';
import { astroTime, moonOfDate, siderealDeg } from './engine';
import { toEarthFixed } from './observer';

const EARTH_RADIUS_KM = 6371.0;

/** Where the Moon stands overhead, and how far from there it can be seen. */
export interface Footprint {
  /** Geocentric; at most 0.2° from the geodetic latitude. */
  latitudeDeg: number;
  /** East positive. */
  longitudeDeg: number;
  /** Great-circle distance to where its centre is on the horizon, airless, for a round Earth. Some 89.1°. */
  radiusDeg: number;
}

/** The half of the Earth that sees the Moon at an instant, for maps: edges are good to some 0.3° of a great circle. */
export function moonFootprint(timeMs: number): Footprint {
  const time = astroTime(timeMs);
  const [x, y, z] = toEarthFixed(moonOfDate(time), siderealDeg(time) * DEG);
  const distanceKm = Math.hypot(x, y, z);
  return {
    latitudeDeg: Math.asin(z / distanceKm) / DEG,
    longitudeDeg: Math.atan2(y, x) / DEG,
    radiusDeg: Math.acos(EARTH_RADIUS_KM / distanceKm) / DEG,
  };
}
