import { effectiveApertureM2 } from './antenna';
import { fromDb } from './decibel';
import { LinkInputError } from './inputError';
import { wavelengthM } from './pathLoss';

/** Power densities up to which exposure is allowed, W/m². */
export interface ExposureLimits {
  /** FCC, people who know and control their exposure; averaged over 6 minutes. */
  occupational: number;
  /** FCC, everybody else; averaged over 30 minutes. */
  general: number;
  /** ICNIRP 2020, everybody, whole body; averaged over 30 minutes. */
  icnirpGeneral: number;
}

export const OCCUPATIONAL_AVERAGING_MIN = 6;
export const GENERAL_AVERAGING_MIN = 30;

/**
 * Limits at a frequency from 30 MHz to 100 GHz: 47 CFR 1.1310 (read in the source) and ICNIRP 2020 (read second-hand).
 * National rules go first.
 */
export function exposureLimits(frequencyMhz: number): ExposureLimits {
  if (!(frequencyMhz >= 30 && frequencyMhz <= 100_000)) {
    throw new LinkInputError('frequencyMhz', 'The frequency must lie between 30 MHz and 100 GHz.');
  }
  const f = frequencyMhz;
  return {
    occupational: f <= 300 ? 10 : f <= 1500 ? (f * 10) / 300 : 50,
    general: f <= 300 ? 2 : f <= 1500 ? (f * 10) / 1500 : 10,
    icnirpGeneral: f <= 400 ? 2 : f <= 2000 ? f / 200 : 10,
  };
}

/** A radiating aperture, or an antenna known by its gain only. */
export interface Radiator {
  frequencyMhz: number;
  /** Average power at the feed while transmitting, W. */
  powerW: number;
  gainDbi: number;
  /** Of a dish; absent: an array, for which the far field is counted everywhere and reads too high close by. */
  diameterM?: number | undefined;
  /** Share of the averaging time spent transmitting, 0 … 1; default 1. */
  duty?: number | undefined;
  /** Reinforcement by reflection from the ground, of power density: 1 none, 2.56 usual for low beams. */
  groundFactor?: number | undefined;
}

/** The field of a dish by regions (OET Bulletin 65, read in the source). */
export interface ApertureField {
  /** 4P/A, right at the aperture, W/m². */
  surface: number;
  /** 16 η P/(π D²): the greatest on axis out to `nearEndM`. */
  near: number;
  /** D²/4λ. */
  nearEndM: number;
  /** 0.6 D²/λ: PG/4πR² from here on. */
  farStartM: number;
  /** About 7.4 P/A: a peak on axis given elsewhere (Kizer, from memory); shown as a caution. */
  axisPeak: number;
}

/** Peak values without duty and ground. Throws LinkInputError unless a diameter is given. */
export function apertureField(radiator: Radiator): ApertureField {
  check(radiator);
  const { diameterM, powerW, gainDbi, frequencyMhz } = radiator;
  if (diameterM === undefined) {
    throw new LinkInputError('diameterM', 'The field close to a dish needs its diameter.');
  }
  const wavelength = wavelengthM(frequencyMhz);
  const areaM2 = (Math.PI * diameterM ** 2) / 4;
  const efficiency = effectiveApertureM2(gainDbi, frequencyMhz) / areaM2;
  return {
    surface: (4 * powerW) / areaM2,
    near: (16 * efficiency * powerW) / (Math.PI * diameterM ** 2),
    nearEndM: diameterM ** 2 / (4 * wavelength),
    farStartM: (0.6 * diameterM ** 2) / wavelength,
    axisPeak: (7.4 * powerW) / areaM2,
  };
}

/**
 * Power density in the beam at a distance, W/m², averaged by the duty and with the ground's share: an upper estimate.
 * Dish: the near field's greatest to D²/4λ, then falling as 1/R to 0.6 D²/λ, then PG/4πR² (where the two last do not
 * meet the greater counts). Never rises with distance.
 */
export function powerDensityWm2(radiator: Radiator, distanceM: number): number {
  check(radiator);
  if (!(distanceM > 0)) {
    throw new LinkInputError('distanceM', 'The distance must be more than 0 m.');
  }
  const { powerW, gainDbi, duty = 1, groundFactor = 1 } = radiator;
  const share = duty * groundFactor;
  const far = (powerW * fromDb(gainDbi)) / (4 * Math.PI * distanceM ** 2);
  if (radiator.diameterM === undefined) return share * far;
  const field = apertureField(radiator);
  if (distanceM <= field.nearEndM) return share * field.near;
  const between = (field.near * field.nearEndM) / distanceM;
  if (distanceM < field.farStartM) return share * between;
  const atFarStart = (field.near * field.nearEndM) / field.farStartM;
  return share * Math.min(far, atFarStart);
}

/**
 * Distance in the beam beyond which the density stays below a limit, m; 0 when it never reaches it. Found by halving
 * on `powerDensityWm2`, to 1 mm.
 */
export function safeDistanceM(radiator: Radiator, limitWm2: number): number {
  if (!(limitWm2 > 0)) throw new LinkInputError('limitWm2', 'The limit must be more than 0 W/m².');
  const smallest = 1e-3;
  if (powerDensityWm2(radiator, smallest) <= limitWm2) return 0;
  let near = smallest;
  let far = 1;
  while (powerDensityWm2(radiator, far) > limitWm2) far *= 2;
  while (far - near > 1e-3) {
    const middle = (near + far) / 2;
    if (powerDensityWm2(radiator, middle) > limitWm2) near = middle;
    else far = middle;
  }
  return far;
}

function check({ powerW, gainDbi, diameterM, duty = 1, groundFactor = 1 }: Radiator): void {
  if (!(powerW >= 0 && powerW <= 1e6)) {
    throw new LinkInputError('powerW', 'The power must lie between 0 and 1 000 000 W.');
  }
  if (!(gainDbi >= -20 && gainDbi <= 100)) {
    throw new LinkInputError('gainDbi', 'The gain must lie between −20 and 100 dBi.');
  }
  if (diameterM !== undefined && !(diameterM > 0 && diameterM <= 1000)) {
    throw new LinkInputError('diameterM', 'The diameter must be more than 0 and at most 1000 m.');
  }
  if (!(duty >= 0 && duty <= 1)) {
    throw new LinkInputError('duty', 'The duty must lie between 0 and 1.');
  }
  if (!(groundFactor >= 1 && groundFactor <= 4)) {
    throw new LinkInputError('groundFactor', 'The ground factor must lie between 1 and 4.');
  }
}
