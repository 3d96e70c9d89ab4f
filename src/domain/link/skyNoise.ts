import { DEG, wrap180 } from '../ephemeris/constants';
import { wavelengthM } from './pathLoss';

const BOLTZMANN = 1.380649e-23;
const CMB_K = 2.725;
const BASE_K = 11.21;
const SURVEY_MHZ = 408;
const SURVEY_BEAM_DEG = 1.3;
const FWHM_PER_SIGMA = 2.3548;

/** A patch of galactic emission: peak above the base in K, centre, half axes (1 σ) and turn in degrees. */
type Patch = readonly [
  peakK: number,
  longitude: number,
  latitude: number,
  sx: number,
  sy: number,
  turn: number,
];

/**
 * Brightness along the Moon's path at 408 MHz: a sum of elliptical patches in J2000 ecliptic coordinates, fitted
 * for this project to the all-sky survey of Haslam, Salter, Stoffel & Wilson 1982, A&AS 47, 1 (±10 % and ±3 K).
 * Fit against the survey: rms 3 % for a beam of 5°, 1 % for 10° (computed for the project).
 */
const PATCHES: readonly Patch[] = [
  [17.51, 291.0, 42.5, 114.52, 77.56, 117.4],
  [65.71, 261.75, -16.4, 78.42, 10.04, 63.9],
  [24.47, 274.26, -52.32, 60.45, 29.96, 137.4],
  [347.04, 265.83, -7.58, 21.02, 2.26, 60.2],
  [39.13, 83.89, -6.75, 19.63, 11.85, 124.9],
  [-15.05, 330.42, -10.14, 8.13, 18.5, 165.4],
  [-20.58, 80.7, -7.92, 4.44, 16.79, 42.3],
  [10.74, 110.68, 2.87, 8.75, 14.04, 29.1],
  [10.64, 43.06, 6.08, 13.31, 9.23, 55.9],
  [-6.18, 210.12, -0.79, 8.05, 14.17, 12.6],
  [9.83, 331.43, -4.98, 8.77, 5.62, 131.6],
  [-6.79, 359.02, -2.89, 6.79, 8.67, 14.6],
  [-6.63, 303.85, -2.09, 7.7, 6.09, 163.0],
  [7.85, 186.0, 1.81, 4.11, 8.4, 144.1],
  [-9.72, 181.15, 0.29, 2.53, 6.17, 7.2],
  [3.48, 151.02, 7.34, 11.22, 3.76, 30.4],
];

/** The Crab nebula, under-represented in the survey. */
const CRAB = { longitudeDeg: 84.1, latitudeDeg: -1.3, fluxJy408: 900, index: 0.3 };

/** A patch seen through one beam: peak, centre and the inverse covariance. */
interface SeenPatch {
  peakK: number;
  longitudeDeg: number;
  latitudeDeg: number;
  xx: number;
  xy: number;
  yy: number;
}

/** The sky seen by one beam at one frequency. Make it once, ask it often. */
export interface SkyBeam {
  readonly frequencyMhz: number;
  readonly beamwidthDeg: number;
  readonly patches: readonly SeenPatch[];
  readonly scale: number;
  readonly crabPeakK: number;
  readonly crabSigmaDeg: number;
}

/** `beamwidthDeg` is the half-power beam width. */
export function skyBeam(frequencyMhz: number, beamwidthDeg: number): SkyBeam {
  const seenDeg = Math.hypot(SURVEY_BEAM_DEG, beamwidthDeg);
  const beamVariance = (seenDeg / FWHM_PER_SIGMA) ** 2;
  const index = frequencyMhz < SURVEY_MHZ ? 2.55 : 2.7;
  const crabFluxJy = CRAB.fluxJy408 * (frequencyMhz / SURVEY_MHZ) ** -CRAB.index;
  const beamSr = 1.133 * (seenDeg * DEG) ** 2;
  return {
    frequencyMhz,
    beamwidthDeg,
    patches: PATCHES.map((patch) => throughBeam(patch, beamVariance)),
    scale: (frequencyMhz / SURVEY_MHZ) ** -index,
    crabPeakK: (crabFluxJy * 1e-26 * wavelengthM(frequencyMhz) ** 2) / (2 * BOLTZMANN * beamSr),
    crabSigmaDeg: seenDeg / FWHM_PER_SIGMA,
  };
}

function throughBeam(patch: Patch, beamVariance: number): SeenPatch {
  const [peakK, longitudeDeg, latitudeDeg, sx, sy, turn] = patch;
  const cos = Math.cos(turn * DEG);
  const sin = Math.sin(turn * DEG);
  const xx = cos * cos * sx * sx + sin * sin * sy * sy + beamVariance;
  const yy = sin * sin * sx * sx + cos * cos * sy * sy + beamVariance;
  const xy = cos * sin * (sx * sx - sy * sy);
  const determinant = xx * yy - xy * xy;
  return {
    peakK: (peakK * sx * sy) / Math.sqrt(determinant),
    longitudeDeg,
    latitudeDeg,
    xx: yy / determinant,
    xy: -xy / determinant,
    yy: xx / determinant,
  };
}

/**
 * Antenna temperature of the sky behind the Moon, K, without atmosphere, ground and Moon. Valid for ecliptic
 * latitudes (J2000) of ±7°. T(f) = 2.725 + (T408 − 2.725)(f/408)^−β, β 2.55 below and 2.7 above 408 MHz
 * (read in the sources: Mozdzen 2017, arXiv:1609.08705; Rogers & Bowman 2008, arXiv:0806.2868; Kogut 2012,
 * arXiv:1205.4041). ±20 % is a fair expectation.
 */
export function skyTemperatureK(
  beam: SkyBeam,
  eclipticLongitudeDeg: number,
  eclipticLatitudeDeg: number,
): number {
  let at408 = BASE_K;
  for (const patch of beam.patches) {
    const x = wrap180(eclipticLongitudeDeg - patch.longitudeDeg);
    const y = eclipticLatitudeDeg - patch.latitudeDeg;
    at408 +=
      patch.peakK * Math.exp(-0.5 * (patch.xx * x * x + 2 * patch.xy * x * y + patch.yy * y * y));
  }
  const crabX = wrap180(eclipticLongitudeDeg - CRAB.longitudeDeg) / beam.crabSigmaDeg;
  const crabY = (eclipticLatitudeDeg - CRAB.latitudeDeg) / beam.crabSigmaDeg;
  const crabK = beam.crabPeakK * Math.exp(-0.5 * (crabX * crabX + crabY * crabY));
  return CMB_K + (at408 - CMB_K) * beam.scale + crabK;
}
