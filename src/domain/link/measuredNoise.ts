import { formatNumber } from '../time/format';
import { fromDb } from './decibel';
import { LinkInputError } from './inputError';
import { wavelengthM } from './pathLoss';
import { noiseFigureDb, receiverFromYFactorK } from './receiveChain';
import { gainOverTemperatureDb, solarFluxSfu } from './sun';

/** `10cm`: the index published daily, carried to the band by `solarFluxSfu`. `band`: measured near the band. */
export type FluxAt = '10cm' | 'band';

/** A step in noise, and what it was between. */
export type NoiseMeasurement =
  | { method: 'hotCold'; yDb: number; hotK: number; coldK: number }
  | {
      method: 'sun';
      yDb: number;
      fluxSfu: number;
      fluxAt: FluxAt;
      /** Of the antenna when it was measured. */
      gainDbi: number;
      beamwidthDeg: number;
    };

export interface NoiseFigures {
  /** On cold sky, K. */
  systemTemperatureK: number;
  /** At the place of the hot load, without the sky; null: the Sun cannot tell it from the rest. */
  receiverTemperatureK: number | null;
  noiseFigureDb: number | null;
  /** From the Sun only: needs no gain, so it is the surest of these. */
  gainOverTemperatureDb: number | null;
}

/** What a stored system temperature may be, K. */
export const LEAST_SYSTEM_K = 3;
export const MOST_SYSTEM_K = 30_000;

/**
 * Temperatures behind a measured step. Hot load and cold sky: T_rx = (T_hot − Y T_cold)/(Y − 1), T_sys = T_rx +
 * T_cold. Sun: G/T by `gainOverTemperatureDb`, T_sys = G/(G/T). The air between is not taken out. Throws
 * LinkInputError with a sentence when no receiver can have shown this step.
 */
export function noiseFigures(measurement: NoiseMeasurement, frequencyMhz: number): NoiseFigures {
  return measurement.method === 'hotCold'
    ? fromHotCold(measurement)
    : fromSun(measurement, frequencyMhz);
}

function fromHotCold({
  yDb,
  hotK,
  coldK,
}: Extract<NoiseMeasurement, { method: 'hotCold' }>): NoiseFigures {
  if (!(yDb > 0)) throw new LinkInputError('yDb', 'The step must be more than 0 dB.');
  if (!(hotK > coldK)) {
    throw new LinkInputError('coldK', 'The cold sky must be colder than the hot load.');
  }
  const receiverTemperatureK = receiverFromYFactorK(yDb, hotK, coldK);
  if (receiverTemperatureK < 0) {
    const mostDb = 10 * Math.log10(hotK / coldK);
    throw new LinkInputError(
      'yDb',
      `Between ${shown(hotK)} K and ${shown(coldK)} K even a receiver without noise shows a step of only ${formatNumber(mostDb, 2)} dB. Check the step and both temperatures.`,
    );
  }
  return {
    systemTemperatureK: receiverTemperatureK + coldK,
    receiverTemperatureK,
    noiseFigureDb: noiseFigureDb(receiverTemperatureK),
    gainOverTemperatureDb: null,
  };
}

function fromSun(
  { yDb, fluxSfu, fluxAt, gainDbi, beamwidthDeg }: Extract<NoiseMeasurement, { method: 'sun' }>,
  frequencyMhz: number,
): NoiseFigures {
  if (!(yDb > 0)) throw new LinkInputError('yDb', 'The step must be more than 0 dB.');
  if (!(fluxSfu > 0)) throw new LinkInputError('fluxSfu', 'The flux must be more than 0 SFU.');
  const flux = fluxAt === '10cm' ? solarFluxSfu(frequencyMhz, fluxSfu) : fluxSfu;
  const ratioDb = gainOverTemperatureDb(yDb, flux, wavelengthM(frequencyMhz), beamwidthDeg);
  return {
    systemTemperatureK: fromDb(gainDbi - ratioDb),
    receiverTemperatureK: null,
    noiseFigureDb: null,
    gainOverTemperatureDb: ratioDb,
  };
}

/** Why a system temperature cannot be kept, in a sentence; null when it can. */
export function systemOutOfRange(
  measurement: NoiseMeasurement,
  { systemTemperatureK }: NoiseFigures,
): string | null {
  if (systemTemperatureK >= LEAST_SYSTEM_K && systemTemperatureK <= MOST_SYSTEM_K) return null;
  const found = `This step would mean a system temperature of ${shown(systemTemperatureK)} K, outside ${LEAST_SYSTEM_K} to ${shown(MOST_SYSTEM_K)} K.`;
  return measurement.method === 'sun'
    ? `${found} That is with the antenna’s gain of ${formatNumber(measurement.gainDbi, 1)} dBi. Check the step, the flux and the antenna.`
    : `${found} Check the step and both temperatures.`;
}

function shown(kelvin: number): string {
  return formatNumber(kelvin, kelvin < 100 && !Number.isInteger(kelvin) ? 1 : 0);
}

/** How much the system temperature moves, K, when the step was read 0.1 dB too large or too small; the greater. */
export function systemKForTenthDb(measurement: NoiseMeasurement, frequencyMhz: number): number {
  const { systemTemperatureK } = noiseFigures(measurement, frequencyMhz);
  const y = fromDb(measurement.yDb);
  const low = fromDb(measurement.yDb - 0.1);
  if (low <= 1) return Infinity;
  return systemTemperatureK * ((y - 1) / (low - 1) - 1);
}
