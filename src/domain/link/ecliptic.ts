import { DEG, wrap360 } from '../ephemeris/constants';

const J2000_MS = 946_728_000_000;
const MS_PER_CENTURY = 36_525 * 86_400_000;

export interface Ecliptic {
  /** 0 … below 360. */
  longitudeDeg: number;
  latitudeDeg: number;
}

/**
 * Turns a vector of date (equator) into J2000 ecliptic angles by the mean obliquity and the general precession in
 * longitude (IAU 2006 first-order terms, from memory); nutation is left out: within 0.01°, enough for sky noise.
 */
export function eclipticJ2000(ofDate: ArrayLike<number>, timeMs: number): Ecliptic {
  const centuries = (timeMs - J2000_MS) / MS_PER_CENTURY;
  const obliquity = (23.43928 - 0.013 * centuries) * DEG;
  const cos = Math.cos(obliquity);
  const sin = Math.sin(obliquity);
  const [x, y, z] = [ofDate[0]!, ofDate[1]!, ofDate[2]!];
  const ye = y * cos + z * sin;
  const ze = z * cos - y * sin;
  return {
    longitudeDeg: wrap360(Math.atan2(ye, x) / DEG - 1.39697 * centuries),
    latitudeDeg: Math.atan2(ze, Math.hypot(x, ye)) / DEG,
  };
}
