import { toDb } from './decibel';

/**
 * Below this frequency the echo comes from the middle of the disc and dishes in use see all of it; from here up
 * beams narrower than the Moon are usual and the disc is rough enough to echo as a whole.
 */
export const BEAM_FILL_FROM_MHZ = 20_000;

/**
 * Loss because the beams light and see only part of the Moon, dB, 0 or positive: the cross-section shrinks to
 * [1 − e^(−x)]/x with x = ln2 · θ_moon² (1/θ_1² + 1/θ_2²), for Gaussian beams of half-power width θ on a disc that
 * is evenly bright (computed for the project; equal beams give x = 2 ln2 (θ_moon/θ)²). 0 below 20 GHz.
 */
export function beamFillLossDb(
  frequencyMhz: number,
  moonDiameterDeg: number,
  beamwidthDeg: number,
  otherBeamwidthDeg = beamwidthDeg,
): number {
  if (frequencyMhz < BEAM_FILL_FROM_MHZ) return 0;
  const inverse = 1 / beamwidthDeg ** 2 + 1 / otherBeamwidthDeg ** 2;
  const x = Math.LN2 * moonDiameterDeg ** 2 * inverse;
  return -toDb(-Math.expm1(-x) / x);
}
