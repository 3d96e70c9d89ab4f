import { effectiveApertureM2, offAxisDb, type AntennaFigures } from './antenna';
import { fromDb } from './decibel';

const BOLTZMANN = 1.380649e-23;

/** Taken when no 10.7 cm flux is given: between quiet and active. */
export const DEFAULT_SOLAR_FLUX_SFU = 120;

/** Diameter of the Sun, degrees, optical; at metre waves the corona makes it up to a third larger. */
export const SUN_DIAMETER_DEG = 0.533;

/**
 * Flux of the whole disc, SFU (1e-22 W/m²/Hz). Quiet: from memory. Active: means of the ranges published for
 * February 2025 (NOAA SWPC, read in the source).
 */
const SOLAR_TABLE = [
  { mhz: 245, quiet: 11, active: 27 },
  { mhz: 410, quiet: 26, active: 45 },
  { mhz: 610, quiet: 37, active: 76.5 },
  { mhz: 1415, quiet: 53, active: 128.5 },
  { mhz: 2695, quiet: 70, active: 188 },
  { mhz: 4995, quiet: 115, active: 220 },
  { mhz: 8800, quiet: 220, active: 298 },
  { mhz: 15_400, quiet: 500, active: 553 },
] as const;

/** The frequency of the 10.7 cm flux. */
const INDEX_MHZ = 2800;

interface QuietAndActive {
  quiet: number;
  /** Active over quiet. */
  ratio: number;
}

/** Log-log between rows; outside the table the quiet Sun goes on with the end's slope and the ratio is held. */
function quietAndActive(frequencyMhz: number): QuietAndActive {
  const last = SOLAR_TABLE.length - 1;
  let upper = SOLAR_TABLE.findIndex((row) => row.mhz >= frequencyMhz);
  upper = upper === -1 ? last : Math.max(upper, 1);
  const [low, high] = [SOLAR_TABLE[upper - 1]!, SOLAR_TABLE[upper]!];
  const reach = Math.log(frequencyMhz / low.mhz) / Math.log(high.mhz / low.mhz);
  const held = Math.min(Math.max(reach, 0), 1);
  const lowRatio = low.active / low.quiet;
  const highRatio = high.active / high.quiet;
  return {
    quiet: low.quiet * (high.quiet / low.quiet) ** reach,
    ratio: lowRatio * (highRatio / lowRatio) ** held,
  };
}

/**
 * Flux of the Sun at a frequency, SFU, from the flux measured at 10.7 cm (about 65 to 300): at the quiet level and
 * below in proportion to the quiet Sun, above it linear through quiet and active, because the slowly varying part
 * adds to the quiet Sun and is strongest about 10 cm. ±30 %, bursts aside.
 */
export function solarFluxSfu(frequencyMhz: number, flux10cmSfu: number): number {
  const index = quietAndActive(INDEX_MHZ);
  const here = quietAndActive(frequencyMhz);
  if (flux10cmSfu <= index.quiet) return (here.quiet * flux10cmSfu) / index.quiet;
  const activity = (flux10cmSfu - index.quiet) / (index.quiet * (index.ratio - 1));
  return here.quiet * (1 + activity * (here.ratio - 1));
}

/**
 * Beamwidth correction: how much a source as wide as the Sun loses against a point on axis, 1 or more:
 * 1 + 0.38 (W_sun/W_antenna)² (read in the source: Duffy, "Designing high performance VHF/UHF receive systems" 6).
 */
export function sunBeamwidthCorrection(beamwidthDeg: number): number {
  return 1 + 0.38 * (SUN_DIAMETER_DEG / beamwidthDeg) ** 2;
}

/** Antenna temperature with the beam on the Sun, K: S A_e / 2k / correction; only one polarisation is received. */
export function sunOnAxisK(antenna: AntennaFigures, frequencyMhz: number, fluxSfu: number): number {
  const apertureM2 = effectiveApertureM2(antenna.gainDbi, frequencyMhz);
  const pointK = (fluxSfu * 1e-22 * apertureM2) / (2 * BOLTZMANN);
  return pointK / sunBeamwidthCorrection(antenna.beamwidthDeg);
}

/** One antenna's view of the Sun at one frequency and flux. Make it once. */
export interface SunView {
  onAxisK: number;
  /** Beam widened by the Sun's own width. */
  beamwidthDeg: number;
  gainDbi: number;
}

export function sunView(
  antenna: AntennaFigures,
  frequencyMhz: number,
  flux10cmSfu: number,
): SunView {
  const fluxSfu = solarFluxSfu(frequencyMhz, flux10cmSfu);
  const { beamwidthDeg, gainDbi } = antenna;
  return {
    onAxisK: sunOnAxisK(antenna, frequencyMhz, fluxSfu),
    beamwidthDeg: beamwidthDeg * Math.sqrt(sunBeamwidthCorrection(beamwidthDeg)),
    gainDbi,
  };
}

/**
 * Noise of the Sun, K, when it stands `separationDeg` beside the beam; 0 below the horizon, rising over the disc's
 * width at it. Without the atmosphere's loss.
 */
export function sunNoiseK(view: SunView, separationDeg: number, sunElevationDeg: number): number {
  const above = sunElevationDeg / SUN_DIAMETER_DEG + 0.5;
  if (above <= 0) return 0;
  const offAxis = offAxisDb(separationDeg, view.beamwidthDeg, view.gainDbi);
  return view.onAxisK * fromDb(-offAxis) * Math.min(above, 1);
}

/**
 * G/T from a measured step from cold sky to the Sun, dB/K: (Y − 1)·8πk·correction/(S λ²)
 * (read in the source: Duffy, as above).
 */
export function gainOverTemperatureDb(
  yDb: number,
  fluxSfu: number,
  wavelengthM: number,
  beamwidthDeg: number,
): number {
  const numerator =
    (fromDb(yDb) - 1) * 8 * Math.PI * BOLTZMANN * sunBeamwidthCorrection(beamwidthDeg);
  return 10 * Math.log10(numerator / (fluxSfu * 1e-22 * wavelengthM ** 2));
}
