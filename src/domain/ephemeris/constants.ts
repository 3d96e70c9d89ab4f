export const DEG = Math.PI / 180;
export const MOON_RADIUS_KM = 1737.4;
export const SPEED_OF_LIGHT_MPS = 299_792_458;
export const KM_PER_AU = 149_597_870.69098932;

/** TT − UTC: 37 leap seconds and 32.184 s; none has been announced beyond them. */
export const TT_MINUS_UTC_S = 69.184;

/**
 * The lunar theory used is 10.6 km short of JPL DE405 on average (computed for the project over 320 instants
 * 2026–2035); with this factor at most 4.1 km remain.
 */
export const LUNAR_DISTANCE_FACTOR = 1.0000278;

/** Mean rotation of the Earth against the equinox of date, degrees a day of 86 400 s. */
export const SIDEREAL_DEG_PER_DAY = 360.985_647_366_29;

export const SIDEREAL_RAD_PER_MS = (SIDEREAL_DEG_PER_DAY * DEG) / 86_400_000;

export function wrap360(angleDeg: number): number {
  const wrapped = angleDeg % 360;
  return wrapped < 0 ? wrapped + 360 : wrapped;
}

/** The angle brought into −180 … below 180. */
export function wrap180(angleDeg: number): number {
  return wrap360(angleDeg + 180) - 180;
}
