import { DEG } from '../ephemeris/constants';
import { compileSky, skyCode, type CompiledSky, type SkyCause } from './compile';
import type { SkyLimits } from './limits';

/**
 * The first limit that forbids looking at an azimuth and an airless elevation, or null where none does.
 * With `refraction` the limits are compared with the elevation at which the Moon appears.
 */
export function skyCause(
  limits: SkyLimits,
  azimuthDeg: number,
  elevationDeg: number,
  refraction = false,
): SkyCause | null {
  return compiledSkyCause(compileSky(limits, refraction), azimuthDeg, elevationDeg);
}

/** As `skyCause`, for many questions to the same limits. */
export function compiledSkyCause(
  sky: CompiledSky,
  azimuthDeg: number,
  elevationDeg: number,
): SkyCause | null {
  const across = Math.cos(elevationDeg * DEG);
  const east = across * Math.sin(azimuthDeg * DEG);
  const north = across * Math.cos(azimuthDeg * DEG);
  return sky.causes[skyCode(sky, east, north, Math.sin(elevationDeg * DEG))] ?? null;
}

/** Whether nothing forbids looking there. */
export function skyFree(limits: SkyLimits, azimuthDeg: number, elevationDeg: number): boolean {
  return skyCause(limits, azimuthDeg, elevationDeg) === null;
}
