import type { Antenna } from '../station/setup';
import { fromDb, toDb } from './decibel';
import { wavelengthM } from './pathLoss';

/** What most dishes with a good feed reach; taken where a request names none. */
export const DEFAULT_APERTURE_EFFICIENCY = 0.55;

/** No beam is taken as wider; the formulas below have no meaning beyond. */
const WIDEST_BEAM_DEG = 180;

/** Pattern figures away from the beam, see `offAxisDb`. */
const FIRST_SIDELOBE_DB = 17;
const FAR_LOBES_BELOW_ISOTROPIC_DB = 10;

/**
 * Gain of a dish over an isotropic antenna, dBi: 10 log[η (πD/λ)²]; η the aperture efficiency, above 0 to 1.
 * Published: 1 m at 12 GHz with η 0.6: 39.8 dBi (read in the source named by the reference test).
 */
export function dishGainDbi(diameterM: number, efficiency: number, frequencyMhz: number): number {
  return toDb(efficiency * ((Math.PI * diameterM) / wavelengthM(frequencyMhz)) ** 2);
}

/** Half-power beamwidth of a dish with usual edge taper, degrees: 70 λ/D, at most 180. ±10 %. */
export function dishBeamwidthDeg(diameterM: number, frequencyMhz: number): number {
  return Math.min((70 * wavelengthM(frequencyMhz)) / diameterM, WIDEST_BEAM_DEG);
}

/** Half-power beamwidth of an array with a round beam, degrees: √(41 253 · 0.75 / G), at most 180 (from memory). ±15 %. */
export function arrayBeamwidthDeg(gainDbi: number): number {
  return Math.min(Math.sqrt((41_253 * 0.75) / fromDb(gainDbi)), WIDEST_BEAM_DEG);
}

/** Loss by a rough surface, dB: 686 (ε/λ)², ε the rms deviation (Ruze 1966, from memory; valid for ε below λ/16). */
export function surfaceLossDb(surfaceRmsM: number, frequencyMhz: number): number {
  return 686 * (surfaceRmsM / wavelengthM(frequencyMhz)) ** 2;
}

/** Collecting area, m²: Gλ²/4π. */
export function effectiveApertureM2(gainDbi: number, frequencyMhz: number): number {
  return (fromDb(gainDbi) * wavelengthM(frequencyMhz) ** 2) / (4 * Math.PI);
}

/**
 * How far the response lies below the beam's peak at an angle off axis, dB, 0 or positive, never falling with the
 * angle. In the main lobe 12 (ψ/θ)² with the half-power beamwidth θ (a Gaussian beam); outside it an envelope over
 * the sidelobes, 17 + 25 log(ψ/θ), and no lower than 10 dB under an isotropic antenna. The envelope is this
 * project's choice (slope of the usual coordination envelopes, from memory): ±5 dB.
 */
export function offAxisDb(offAxisDeg: number, beamwidthDeg: number, gainDbi: number): number {
  const beams = Math.abs(offAxisDeg) / beamwidthDeg;
  const mainLobe = 12 * beams * beams;
  if (mainLobe <= FIRST_SIDELOBE_DB) return mainLobe;
  const farLobes = Math.max(gainDbi + FAR_LOBES_BELOW_ISOTROPIC_DB, FIRST_SIDELOBE_DB);
  const sidelobes = FIRST_SIDELOBE_DB + 25 * Math.log10(Math.max(beams, 1));
  return Math.min(mainLobe, sidelobes, farLobes);
}

/** Loss by pointing beside the Moon, one antenna, dB; the main lobe is 12 (ψ/θ)². */
export function pointingLossDb(errorDeg: number, beamwidthDeg: number, gainDbi: number): number {
  return offAxisDb(errorDeg, beamwidthDeg, gainDbi);
}

/** Gain and beam of an antenna at one frequency. */
export interface AntennaFigures {
  gainDbi: number;
  beamwidthDeg: number;
}

/** A gain without a beamwidth is taken as an array with a round beam. */
export function antennaFigures(antenna: Antenna, frequencyMhz: number): AntennaFigures {
  if (antenna.kind === 'dish') {
    return {
      gainDbi: dishGainDbi(antenna.diameterM, antenna.apertureEfficiency, frequencyMhz),
      beamwidthDeg: dishBeamwidthDeg(antenna.diameterM, frequencyMhz),
    };
  }
  return {
    gainDbi: antenna.gainDbi,
    beamwidthDeg: Math.min(
      antenna.beamwidthDeg ?? arrayBeamwidthDeg(antenna.gainDbi),
      WIDEST_BEAM_DEG,
    ),
  };
}
