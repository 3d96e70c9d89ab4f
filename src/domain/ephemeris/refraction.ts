import { DEG } from './constants';

const FADE_BELOW_DEG = -1;

/**
 * Refraction of the standard atmosphere (10 °C, 1010 hPa) at an airless elevation, degrees, never negative.
 * Sæmundsson, Sky & Telescope 72 (1986) 70, as given by Meeus, Astronomical Algorithms ch. 16 (from memory).
 * Below −1° it fades linearly to zero at the nadir, where the formula has no meaning. It is an optical figure;
 * at radio frequencies water vapour adds up to a quarter near the horizon.
 */
export function refractionDeg(elevationDeg: number): number {
  const el = Math.max(elevationDeg, FADE_BELOW_DEG);
  const full = 1.02 / Math.tan((el + 10.3 / (el + 5.11)) * DEG) / 60;
  const positive = Math.max(full, 0);
  if (elevationDeg >= FADE_BELOW_DEG) return positive;
  return (positive * (elevationDeg + 90)) / (90 + FADE_BELOW_DEG);
}

/** The elevation at which the Moon appears. */
export function refracted(elevationDeg: number): number {
  return elevationDeg + refractionDeg(elevationDeg);
}

/** The airless elevation that appears at the given one; the inverse of `refracted` to 1e-9°. */
export function unrefracted(apparentDeg: number): number {
  let airlessDeg = apparentDeg - refractionDeg(apparentDeg);
  for (let round = 0; round < 30; round += 1) {
    const missDeg = refracted(airlessDeg) - apparentDeg;
    airlessDeg -= missDeg;
    if (Math.abs(missDeg) < 1e-10) break;
  }
  return airlessDeg;
}
