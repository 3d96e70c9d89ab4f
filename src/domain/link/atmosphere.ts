import { DEG } from '../ephemeris/constants';
import { toDb } from './decibel';

/** Above this the table ends and its last value is held: the oxygen lines about 60 GHz are not in it. */
export const ATMOSPHERE_TABLE_ENDS_MHZ = 47_088;

/** Below this elevation the answer of this elevation is given. */
export const LOWEST_ELEVATION_DEG = 1;

const ELEVATIONS_DEG = [90, 30, 10, 5] as const;

/**
 * Zenith attenuation, dB, and noise temperature, K, at 90, 30, 10 and 5° of elevation: ITU-R P.676-12 line by line,
 * mean global reference atmosphere (computed for the project). Clear sky, no rain.
 */
const TABLE = [
  { mhz: 432, zenithDb: 0.02, noiseK: [1.2, 2.4, 6.6, 12.3] },
  { mhz: 1296, zenithDb: 0.033, noiseK: [2.0, 3.9, 10.9, 20.2] },
  { mhz: 2304, zenithDb: 0.036, noiseK: [2.1, 4.2, 11.8, 21.9] },
  { mhz: 3400, zenithDb: 0.037, noiseK: [2.2, 4.4, 12.3, 22.8] },
  { mhz: 5760, zenithDb: 0.04, noiseK: [2.4, 4.8, 13.4, 24.9] },
  { mhz: 10_368, zenithDb: 0.052, noiseK: [3.2, 6.3, 17.4, 32.2] },
  { mhz: 24_048, zenithDb: 0.397, noiseK: [23.9, 45.7, 112, 175] },
  { mhz: 47_088, zenithDb: 0.882, noiseK: [48.7, 88.7, 185, 244] },
] as const;

/** Half-width, GHz², of the oxygen's non-resonant spectrum f²/(f² + w²) that joins 432 and 1296 MHz in the table. */
const NONRESONANT_W2 = 0.1485;

/** The atmosphere at one frequency, ready to be asked for any elevation. Make it once. */
export interface Atmosphere {
  /** Its effective temperature: noise = T (1 − 10^(−loss/10)). */
  readonly effectiveK: number;
  /** ln of the optical depth at the table's elevations, and slopes against ln(1/sin el) between them. */
  readonly lnDepth: Float64Array;
  readonly slope: Float64Array;
}

/** ln(1/sin el) at the table's elevations. */
const LN_AIRMASS = ELEVATIONS_DEG.map((el) => -Math.log(Math.sin(el * DEG)));

/**
 * The table at one frequency: log-log between its rows; below 432 MHz by the oxygen's non-resonant spectrum; above
 * 47 088 MHz held. Between 10.4 and 24 GHz the water vapour line at 22.2 GHz makes it too low by up to a half.
 */
export function atmosphereAt(frequencyMhz: number): Atmosphere {
  const ghz = Math.min(frequencyMhz, ATMOSPHERE_TABLE_ENDS_MHZ) / 1000;
  let upper = TABLE.findIndex((row) => row.mhz >= ghz * 1000);
  if (upper <= 0) upper = upper === 0 ? 1 : TABLE.length - 1;
  const [low, high] = [rowDepths(TABLE[upper - 1]!), rowDepths(TABLE[upper]!)];
  const reach = Math.max(Math.log(ghz / low.ghz) / Math.log(high.ghz / low.ghz), 0);
  const fade = ghz < low.ghz ? nonresonant(ghz) / nonresonant(low.ghz) : 1;
  const lnDepth = new Float64Array(
    low.lnDepth.map((value, k) => value + (high.lnDepth[k]! - value) * reach + Math.log(fade)),
  );
  const slope = new Float64Array(3);
  for (let k = 0; k < 3; k += 1) {
    slope[k] = (lnDepth[k + 1]! - lnDepth[k]!) / (LN_AIRMASS[k + 1]! - LN_AIRMASS[k]!);
  }
  return {
    effectiveK: low.effectiveK + (high.effectiveK - low.effectiveK) * reach,
    lnDepth,
    slope,
  };
}

function nonresonant(ghz: number): number {
  return (ghz * ghz) / (ghz * ghz + NONRESONANT_W2);
}

/** Depths that give back the row's noise at each elevation and its attenuation at the zenith. */
function rowDepths(row: (typeof TABLE)[number]) {
  const zenithDepth = (row.zenithDb * Math.LN10) / 10;
  const effectiveK = row.noiseK[0] / -Math.expm1(-zenithDepth);
  const lnDepth = row.noiseK.map((noiseK) => Math.log(-Math.log1p(-noiseK / effectiveK)));
  return { ghz: row.mhz / 1000, effectiveK, lnDepth };
}

/** Optical depth (nepers of power) along a direction, from the sine of its elevation. */
function depth(atmosphere: Atmosphere, sinElevation: number): number {
  const { lnDepth, slope } = atmosphere;
  const lnAirmass = -Math.log(Math.max(sinElevation, SIN_LOWEST));
  const k = lnAirmass < LN_AIRMASS[1]! ? 0 : lnAirmass < LN_AIRMASS[2]! ? 1 : 2;
  return Math.exp(lnDepth[k]! + slope[k]! * (lnAirmass - LN_AIRMASS[k]!));
}

const SIN_LOWEST = Math.sin(LOWEST_ELEVATION_DEG * DEG);
const DB_PER_NEPER = 10 / Math.LN10;

/**
 * One-way loss, dB, from the sine of the elevation. Between the table's elevations a power law of 1/sin el, which
 * continues below 5° (estimate); below 1° the value of 1°. Never rising with elevation.
 */
export function atmosphereLossDb(atmosphere: Atmosphere, sinElevation: number): number {
  return depth(atmosphere, sinElevation) * DB_PER_NEPER;
}

/** Noise added at the antenna, K, for a loss of this atmosphere: T_eff (1 − 10^(−loss/10)). */
export function atmosphereNoiseK(atmosphere: Atmosphere, lossDb: number): number {
  return atmosphere.effectiveK * -Math.expm1(-lossDb / DB_PER_NEPER);
}

/** Zenith attenuation in dB; for display. */
export function zenithLossDb(frequencyMhz: number): number {
  return toDb(Math.exp(depth(atmosphereAt(frequencyMhz), 1)));
}
