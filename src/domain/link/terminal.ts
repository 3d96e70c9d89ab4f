import { antennaFigures, pointingLossDb } from './antenna';
import { fromDb, toDb } from './decibel';
import { chainTemperatureK } from './receiveChain';
import type { LinkSetup } from './setup';
import { skyBeam, type SkyBeam } from './skyNoise';
import { coldestOnPathK } from './skyPath';
import { sunView, type SunView } from './sun';

/** Everything about one station at one frequency that does not change with time. */
export interface Terminal {
  gainDbi: number;
  beamwidthDeg: number;
  powerDbw: number;
  /** One antenna's. */
  pointingLossDb: number;
  /** The same as a factor of power, 0 … 1. */
  pointingShare: number;
  /** Noise that is always there, K: receiver and spillover, or the measured system on cold sky. */
  steadyK: number;
  receiverK: number;
  spilloverK: number;
  /** Set when the system temperature was measured: its cold sky and atmosphere are in it already. */
  measured: boolean;
  /** With a measured system only sky warmer than this is added, K; else 0. */
  coldSkyK: number;
  beam: SkyBeam;
  sun: SunView;
}

/** The setup must have passed `checkSetup`. */
export function terminalOf(setup: LinkSetup, frequencyMhz: number, flux10cmSfu: number): Terminal {
  const antenna = antennaFigures(setup.antenna, frequencyMhz);
  const pointing = pointingLossDb(
    setup.pointingErrorDeg ?? 0,
    antenna.beamwidthDeg,
    antenna.gainDbi,
  );
  const beam = skyBeam(frequencyMhz, antenna.beamwidthDeg);
  const { receive } = setup;
  const measured = receive.kind === 'measured';
  const receiverK =
    receive.kind === 'measured'
      ? receive.systemTemperatureK
      : receive.kind === 'receiver'
        ? receive.receiverTemperatureK
        : chainTemperatureK(receive.stages);
  const spilloverK = receive.kind === 'measured' ? 0 : (receive.spilloverK ?? 0);
  return {
    ...antenna,
    powerDbw: toDb(setup.powerAtFeedW),
    pointingLossDb: pointing,
    pointingShare: fromDb(-pointing),
    steadyK: receiverK + spilloverK,
    receiverK,
    spilloverK,
    measured,
    coldSkyK: measured ? coldestOnPathK(beam) : 0,
    beam,
    sun: sunView(antenna, frequencyMhz, flux10cmSfu),
  };
}
