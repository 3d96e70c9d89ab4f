import { MOON_RADIUS_KM, SPEED_OF_LIGHT_MPS } from '../ephemeris/constants';
import { DEG } from '../ephemeris/constants';

/** Share of the disc's area that reflects: about 0.065 to 0.07 from metre to millimetre waves. */
export const MOON_REFLECTIVITY = 0.065;

/**
 * Loss from one isotropic antenna over the Moon to another, dB, positive:
 * 10 log[(4π)³ d1² d2² / (λ² ρ π r²)] with topocentric ranges to the Moon's centre.
 * Published for 144/432/1296 MHz: 252/261/271 dB (read in the source: Berry, "EME path loss").
 */
export function pathLossDb(frequencyMhz: number, rangeKm: number, otherRangeKm = rangeKm): number {
  const wavelengthKm = wavelengthM(frequencyMhz) / 1000;
  const crossSection = MOON_REFLECTIVITY * Math.PI * MOON_RADIUS_KM ** 2;
  const ratio = (rangeKm * otherRangeKm) ** 2 / (wavelengthKm ** 2 * crossSection);
  return 10 * Math.log10((4 * Math.PI) ** 3 * ratio);
}

export function wavelengthM(frequencyMhz: number): number {
  return SPEED_OF_LIGHT_MPS / (frequencyMhz * 1e6);
}

/** Angle under which the Moon's disc is seen, degrees. */
export function moonDiameterDeg(rangeKm: number): number {
  return (2 * Math.asin(MOON_RADIUS_KM / rangeKm)) / DEG;
}

/** From transmission to the echo's arrival, by the two ranges to the Moon's near side; about 2.4 to 2.7 s. */
export function echoDelayS(rangeKm: number, otherRangeKm = rangeKm): number {
  return ((rangeKm + otherRangeKm - 2 * MOON_RADIUS_KM) * 1000) / SPEED_OF_LIGHT_MPS;
}
