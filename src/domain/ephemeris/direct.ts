import type { Site } from '../sky/limits';
import { DEG, wrap360 } from './constants';
import { astroTime, moonOfDate, siderealDeg, sunOfDate, type Vector } from './engine';
import { lookAngles, observerAt, separationDeg, toEarthFixed, type Observer } from './observer';
import { refracted } from './refraction';

/** Where Moon and Sun stand for one site at one instant. */
export interface MoonSample {
  timeMs: number;
  /** From true north through east, 0 … below 360. */
  azimuthDeg: number;
  /** Airless, centre of the disc, above the geodetic horizon. */
  elevationDeg: number;
  refractedElevationDeg: number;
  /** Topocentric, geometric, to the Moon's centre. */
  rangeKm: number;
  /** Receding positive; central difference over ±30 s. */
  rangeRateMps: number;
  geocentricDistanceKm: number;
  /** Geocentric apparent, true equator and equinox of date, 0 … below 360. */
  rightAscensionDeg: number;
  declinationDeg: number;
  sunAzimuthDeg: number;
  sunElevationDeg: number;
  /** Between the centres of Moon and Sun as seen from the site, 0 … 180. */
  sunSeparationDeg: number;
}

export const RATE_STEP_MS = 30_000;

/**
 * Moon and Sun for one site without any table. Against DE405 (160 reference records): azimuth × cos(elevation),
 * elevation within 0.002°, right ascension and declination within 0.001°, range within 6 km,
 * range rate within 0.05 m/s; Sun within 0.001°.
 */
export function moonSampleDirect(site: Site, timeMs: number): MoonSample {
  const observer = observerAt(site);
  const time = astroTime(timeMs);
  const sidereal = siderealDeg(time) * DEG;
  const ofDate = moonOfDate(time);
  const moon = toEarthFixed(ofDate, sidereal);
  const sun = toEarthFixed(sunOfDate(time), sidereal);
  const before = directRangeKm(observer, timeMs - RATE_STEP_MS);
  const after = directRangeKm(observer, timeMs + RATE_STEP_MS);
  return assembleSample(timeMs, observer, ofDate, moon, sun, (after - before) / 0.06);
}

function directRangeKm(observer: Observer, timeMs: number): number {
  const time = astroTime(timeMs);
  const moon = toEarthFixed(moonOfDate(time), siderealDeg(time) * DEG);
  return lookAngles(observer, moon).rangeKm;
}

/** Puts a sample together from vectors in km; `moonOfDateKm` in the frame of date, the others Earth-fixed. */
export function assembleSample(
  timeMs: number,
  observer: Observer,
  moonOfDateKm: Vector,
  moon: Vector,
  sun: Vector,
  rangeRateMps: number,
): MoonSample {
  const toMoon = lookAngles(observer, moon);
  const toSun = lookAngles(observer, sun);
  const [x, y, z] = moonOfDateKm;
  return {
    timeMs,
    azimuthDeg: toMoon.azimuthDeg,
    elevationDeg: toMoon.elevationDeg,
    refractedElevationDeg: refracted(toMoon.elevationDeg),
    rangeKm: toMoon.rangeKm,
    rangeRateMps,
    geocentricDistanceKm: Math.hypot(x, y, z),
    rightAscensionDeg: wrap360(Math.atan2(y, x) / DEG),
    declinationDeg: Math.atan2(z, Math.hypot(x, y)) / DEG,
    sunAzimuthDeg: toSun.azimuthDeg,
    sunElevationDeg: toSun.elevationDeg,
    sunSeparationDeg: separationDeg(observer.place, moon, sun),
  };
}
