import { astroTime, moonOfDate, sunOfDate, type Vector } from '../../domain/ephemeris/engine';
import { degradationModel, skyAndDegradation, type DegradationModel } from '../../domain/link';
import { HOUR_MS, MINUTE_MS } from '../../domain/time/interval';

/** The Moon as the line under every page tells it, seen from the centre of the Earth. */
export interface EphemerisNow {
  distanceKm: number;
  closing: boolean;
  declinationDeg: number;
  climbing: boolean;
  sunSeparationDeg: number;
  frequencyMhz: number;
  skyTemperatureK: number;
  degradationDb: number;
}

const FREQUENCY_MHZ = 1296;
const KEPT_MS = MINUTE_MS;
const RATE_STEP_MS = HOUR_MS / 2;
const DEG = Math.PI / 180;

let model: DegradationModel | undefined;
let kept: { atMs: number; values: EphemerisNow } | undefined;

/** Computed at most once a minute in each process: every page asks for it. */
export function ephemerisNow(nowMs: number): EphemerisNow {
  const atMs = Math.floor(nowMs / KEPT_MS) * KEPT_MS;
  if (kept?.atMs !== atMs) kept = { atMs, values: ephemerisAt(atMs) };
  return kept.values;
}

/** The same for any instant, computed anew. */
export function ephemerisAt(atMs: number): EphemerisNow {
  model ??= degradationModel(FREQUENCY_MHZ);
  const moon = moonOfDate(astroTime(atMs));
  const later = moonOfDate(astroTime(atMs + RATE_STEP_MS));
  const sun = sunOfDate(astroTime(atMs));
  return {
    distanceKm: Math.hypot(...moon),
    closing: Math.hypot(...later) < Math.hypot(...moon),
    declinationDeg: declination(moon),
    climbing: declination(later) > declination(moon),
    sunSeparationDeg: separation(moon, sun),
    frequencyMhz: FREQUENCY_MHZ,
    ...skyAndDegradation(model, atMs, moon),
  };
}

function declination([x, y, z]: Vector): number {
  return Math.atan2(z, Math.hypot(x, y)) / DEG;
}

function separation(a: Vector, b: Vector): number {
  const dot = a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
  return Math.acos(dot / (Math.hypot(...a) * Math.hypot(...b))) / DEG;
}
