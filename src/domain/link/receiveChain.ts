import type { ReceiveStage } from '../station/setup';
import { fromDb, toDb } from './decibel';
import { LinkInputError } from './inputError';

export const REFERENCE_TEMPERATURE_K = 290;

/** Noise temperature of a noise figure, K: 290 (F − 1). */
export function noiseTemperatureK(noiseFigureDb: number): number {
  return REFERENCE_TEMPERATURE_K * Math.expm1((noiseFigureDb * Math.LN10) / 10);
}

/** Noise figure of a noise temperature, dB. */
export function noiseFigureDb(temperatureK: number): number {
  return toDb(1 + temperatureK / REFERENCE_TEMPERATURE_K);
}

/** Noise that a passive loss adds at its own input, K: (L − 1) T_physical. */
export function lossTemperatureK(
  lossDb: number,
  physicalTemperatureK = REFERENCE_TEMPERATURE_K,
): number {
  return physicalTemperatureK * Math.expm1((lossDb * Math.LN10) / 10);
}

/**
 * Noise temperature of a chain at its input, K, by Friis: T1 + T2/G1 + T3/(G1 G2) + …; stages in order, feed first.
 * A loss counts with its physical temperature (290 K unless given). Throws LinkInputError for an empty chain.
 */
export function chainTemperatureK(stages: readonly ReceiveStage[], path = 'stages'): number {
  if (stages.length === 0) {
    throw new LinkInputError(path, 'The receive chain has no stage. Name at least the receiver.');
  }
  let gain = 1;
  let totalK = 0;
  for (const stage of stages) {
    if (stage.kind === 'amplifier') {
      totalK += noiseTemperatureK(stage.noiseFigureDb) / gain;
      gain *= fromDb(stage.gainDb);
    } else {
      totalK += lossTemperatureK(stage.lossDb, stage.physicalTemperatureK) / gain;
      gain /= fromDb(stage.lossDb);
    }
  }
  return totalK;
}

/** What each stage adds at the chain's input, K, in order; their sum is `chainTemperatureK`. */
export function stageSharesK(stages: readonly ReceiveStage[]): number[] {
  return stages.map((_, index) => {
    const upTo = chainTemperatureK(stages.slice(0, index + 1));
    return index === 0 ? upTo : upTo - chainTemperatureK(stages.slice(0, index));
  });
}

/** Y factor between a hot and a cold source, dB: (T_hot + T_rx)/(T_cold + T_rx). */
export function yFactorDb(hotK: number, coldK: number, receiverK: number): number {
  return toDb((hotK + receiverK) / (coldK + receiverK));
}

/** Receiver temperature behind a measured Y factor, K; negative when the Y factor is impossibly large. */
export function receiverFromYFactorK(yDb: number, hotK: number, coldK: number): number {
  const y = fromDb(yDb);
  return (hotK - y * coldK) / (y - 1);
}
