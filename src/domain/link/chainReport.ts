import type { Antenna, ReceiveStage } from '../station/setup';
import { antennaFigures } from './antenna';
import { atmosphereAt, atmosphereLossDb, atmosphereNoiseK } from './atmosphere';
import { fromDb } from './decibel';
import { chainTemperatureK, noiseFigureDb, stageSharesK } from './receiveChain';
import { coldestOnPathK } from './skyPath';
import { skyBeam } from './skyNoise';

/** Elevation for which `coldSkyK` counts the air. */
export const COLD_SKY_ELEVATION_DEG = 30;

/** Coldest sky on the Moon's path in this antenna's beam, through the air at 30° of elevation, and the air's own, K. */
export function coldSkyK(antenna: Antenna, frequencyMhz: number): number {
  const { beamwidthDeg } = antennaFigures(antenna, frequencyMhz);
  const air = atmosphereAt(frequencyMhz);
  const lossDb = atmosphereLossDb(air, Math.sin((COLD_SKY_ELEVATION_DEG * Math.PI) / 180));
  const skyK = coldestOnPathK(skyBeam(frequencyMhz, beamwidthDeg));
  return skyK * fromDb(-lossDb) + atmosphereNoiseK(air, lossDb);
}

/** One contribution to the system temperature. */
export interface NoiseShare {
  kelvin: number;
  /** Of the system temperature, 0 … 1. */
  share: number;
}

export interface ChainReport {
  sky: NoiseShare;
  ground: NoiseShare;
  /** In the order of the stages. */
  stages: NoiseShare[];
  receiverK: number;
  noiseFigureDb: number;
  systemK: number;
}

/** Where the system temperature of a chain behind cold sky and ground comes from. Throws as `chainTemperatureK`. */
export function chainReport(
  stages: readonly ReceiveStage[],
  skyK: number,
  groundK: number,
): ChainReport {
  const receiverK = chainTemperatureK(stages);
  const systemK = skyK + groundK + receiverK;
  const shareOf = (kelvin: number): NoiseShare => ({ kelvin, share: kelvin / systemK });
  return {
    sky: shareOf(skyK),
    ground: shareOf(groundK),
    stages: stageSharesK(stages).map(shareOf),
    receiverK,
    noiseFigureDb: noiseFigureDb(receiverK),
    systemK,
  };
}
