import {
  Body,
  EclipticGeoMoon,
  GeoVector,
  MakeTime,
  RotateVector,
  RotationAxis,
  Rotation_EQJ_EQD,
  SetDeltaTFunction,
  SiderealTime,
  e_tilt,
  type AstroTime,
} from 'astronomy-engine';
import { DEG, KM_PER_AU, LUNAR_DISTANCE_FACTOR, TT_MINUS_UTC_S } from './constants';

// Global state of the library, set once for every thread and page that loads this module: its own
// extrapolation of ΔT is 6 to 12 s too large for 2026–2035 and would be the largest error (0.002°).
SetDeltaTFunction(() => TT_MINUS_UTC_S);

const J2000_MS = 946_728_000_000;
const MS_PER_DAY = 86_400_000;

export type Vector = [x: number, y: number, z: number];

export function astroTime(timeMs: number): AstroTime {
  return MakeTime((timeMs - J2000_MS) / MS_PER_DAY);
}

/**
 * Geocentric Moon, true equator and equinox of date, km. Geometric: neither light time nor aberration is added,
 * because agreement with DE405 gets worse with them.
 * Within 0.00065° and 4.1 km of DE405 reduced by the IAU 2006/2000A models (computed for the project).
 */
export function moonOfDate(time: AstroTime): Vector {
  const ecliptic = EclipticGeoMoon(time);
  const obliquity = e_tilt(time).tobl * DEG;
  const distanceKm = ecliptic.dist * KM_PER_AU * LUNAR_DISTANCE_FACTOR;
  const across = distanceKm * Math.cos(ecliptic.lat * DEG);
  const y = across * Math.sin(ecliptic.lon * DEG);
  const z = distanceKm * Math.sin(ecliptic.lat * DEG);
  const cos = Math.cos(obliquity);
  const sin = Math.sin(obliquity);
  return [across * Math.cos(ecliptic.lon * DEG), y * cos - z * sin, y * sin + z * cos];
}

/** Geocentric apparent Sun (with light time and annual aberration), true equator and equinox of date, km. */
export function sunOfDate(time: AstroTime): Vector {
  const j2000 = GeoVector(Body.Sun, time, true);
  const ofDate = RotateVector(Rotation_EQJ_EQD(time), j2000);
  return [ofDate.x * KM_PER_AU, ofDate.y * KM_PER_AU, ofDate.z * KM_PER_AU];
}

/** Greenwich apparent sidereal time, degrees 0 … 360. UT1 is taken as UTC: at most 0.9 s or 0.004°. */
export function siderealDeg(time: AstroTime): number {
  return SiderealTime(time) * 15;
}

/** Unit vector of the Moon's north pole, true equator and equinox of date. */
export function moonPoleOfDate(time: AstroTime): Vector {
  const north = RotateVector(Rotation_EQJ_EQD(time), RotationAxis(Body.Moon, time).north);
  return [north.x, north.y, north.z];
}
