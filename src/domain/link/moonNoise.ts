import { DEG } from '../ephemeris/constants';

/** Share of an antenna's response that lies in the main beam. */
const MAIN_BEAM_SHARE = 0.75;

/** The Moon is warmest this long after full, degrees of elongation. */
const PHASE_LAG_DEG = 45;

/** Mean and half swing of the disc's brightness temperature (RATAN-600 observers' handbook, read in the source). */
const BRIGHTNESS = [
  { mhz: 1296, meanK: 226, swingK: 4.5 },
  { mhz: 2304, meanK: 221, swingK: 5.5 },
  { mhz: 5760, meanK: 213, swingK: 9 },
  { mhz: 10_368, meanK: 210, swingK: 14 },
  { mhz: 24_048, meanK: 208, swingK: 28 },
] as const;

/** Brightness of the disc at one frequency: mean + swing · phase term. */
export interface MoonBrightness {
  meanK: number;
  swingK: number;
}

/** Linear in log f between the published frequencies, held outside them (1.3 to 24 GHz). */
export function moonBrightness(frequencyMhz: number): MoonBrightness {
  const first = BRIGHTNESS[0];
  const last = BRIGHTNESS[BRIGHTNESS.length - 1]!;
  if (frequencyMhz <= first.mhz) return first;
  if (frequencyMhz >= last.mhz) return last;
  const upper = BRIGHTNESS.findIndex((row) => row.mhz >= frequencyMhz);
  const [low, high] = [BRIGHTNESS[upper - 1]!, BRIGHTNESS[upper]!];
  const reach = Math.log(frequencyMhz / low.mhz) / Math.log(high.mhz / low.mhz);
  return {
    meanK: low.meanK + (high.meanK - low.meanK) * reach,
    swingK: low.swingK + (high.swingK - low.swingK) * reach,
  };
}

/**
 * Phase term −1 … 1 from cosine and sine of the Moon's elongation, counted eastward from the Sun (0 new, 180°
 * full): cos(elongation − 180° − 45°).
 */
export function moonPhaseTerm(cosElongation: number, sinElongation: number): number {
  return -(cosElongation * COS_LAG + sinElongation * SIN_LAG);
}

const COS_LAG = Math.cos(PHASE_LAG_DEG * DEG);
const SIN_LAG = Math.sin(PHASE_LAG_DEG * DEG);

/**
 * What the Moon adds to the antenna temperature with the beam on it, K:
 * η_b T_moon [1 − exp(−ln2 (θ_moon/θ)²)] with η_b 0.75. The sky hidden behind the disc is not taken off (under 1 K
 * wherever the disc fills a share of the beam).
 */
export function moonNoiseK(
  brightnessK: number,
  moonDiameterDeg: number,
  beamwidthDeg: number,
): number {
  const ratio = moonDiameterDeg / beamwidthDeg;
  return MAIN_BEAM_SHARE * brightnessK * -Math.expm1(-Math.LN2 * ratio * ratio);
}
