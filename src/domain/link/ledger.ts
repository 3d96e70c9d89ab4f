import type { LinkModel } from './model';
import type { DirectionFigures } from './moment';
import { toDb } from './decibel';

/** Terms of a budget, in the order in which they are added up. */
export type SignalKey =
  | 'transmitPower'
  | 'transmitGain'
  | 'transmitPointing'
  | 'atmosphereUp'
  | 'pathLoss'
  | 'beamFill'
  | 'atmosphereDown'
  | 'polarization'
  | 'receivePointing'
  | 'receiveGain'
  | 'noiseFloor'
  | 'spread'
  | 'threshold';

export type NoiseKey =
  'receiver' | 'measuredSystem' | 'spillover' | 'sky' | 'warmerSky' | 'atmosphere' | 'moon' | 'sun';

export interface LedgerTerm<Key extends string> {
  /** Names the term's explanation in `LEDGER_EXPLANATIONS`. */
  key: Key;
  /** What this term adds, with its sign. */
  value: number;
  /** The sum up to and with this term. */
  level: number;
}

/** One direction added up. */
export interface Ledger {
  /** dB on a power in dBW; after `noiseFloor` the level is the ratio to noise, after `threshold` the margin, in dB. */
  signal: LedgerTerm<SignalKey>[];
  /** K; the last level is the system temperature. */
  noise: LedgerTerm<NoiseKey>[];
}

/** What each term is, for people. */
export const LEDGER_EXPLANATIONS: Readonly<
  Record<SignalKey | NoiseKey, { label: string; sentence: string }>
> = {
  transmitPower: {
    label: 'Power at the feed',
    sentence: 'Transmitter power after the feed line, in dB over 1 W.',
  },
  transmitGain: {
    label: 'Transmitting antenna',
    sentence: 'Gain over an isotropic antenna; of a dish η(πD/λ)².',
  },
  transmitPointing: {
    label: 'Pointing, transmitting',
    sentence: 'Loss by pointing beside the Moon: 12 (error/beamwidth)² dB in the main lobe.',
  },
  atmosphereUp: {
    label: 'Atmosphere, up',
    sentence: 'Absorption by oxygen and water vapour in clear air at this elevation.',
  },
  pathLoss: {
    label: 'Path to the Moon and back',
    sentence:
      'Loss between isotropic antennas over the Moon, which reflects 6.5 % of what falls on its disc.',
  },
  beamFill: {
    label: 'Part of the Moon in the beam',
    sentence: 'Loss because the beams are narrower than the disc; counted from 20 GHz.',
  },
  atmosphereDown: {
    label: 'Atmosphere, down',
    sentence: 'Absorption by oxygen and water vapour in clear air at the receiving station.',
  },
  polarization: {
    label: 'Polarisation',
    sentence:
      'Loss between the arriving wave and the feed. Linear feeds below 500 MHz: 3 dB, the mean over an unknown Faraday angle.',
  },
  receivePointing: {
    label: 'Pointing, receiving',
    sentence: 'Loss by pointing beside the Moon, at the receiving antenna.',
  },
  receiveGain: {
    label: 'Receiving antenna',
    sentence: 'Gain over an isotropic antenna; of a dish η(πD/λ)².',
  },
  noiseFloor: {
    label: 'Noise in 2500 Hz',
    sentence:
      'Noise power kTB of the system temperature in 2500 Hz, taken off: what is left is the ratio of signal to noise.',
  },
  spread: {
    label: 'Spread against the mode',
    sentence:
      'Loss when the echo’s half-power width exceeds the mode’s tone spacing: 5 log of their ratio.',
  },
  threshold: { label: 'The mode’s threshold', sentence: 'Taken off: what is left is the margin.' },
  receiver: {
    label: 'Receiver',
    sentence: 'Noise of the receive chain at the feed, by Friis’ formula.',
  },
  measuredSystem: {
    label: 'Measured system',
    sentence:
      'System temperature as measured on cold sky; only Moon, Sun and warmer sky are added.',
  },
  spillover: {
    label: 'Spillover',
    sentence:
      'Ground seen past the reflector, through its mesh and by its struts; 0 when not given.',
  },
  sky: {
    label: 'Sky behind the Moon',
    sentence: 'Galactic noise and cosmic background in this antenna’s beam.',
  },
  warmerSky: {
    label: 'Warmer sky',
    sentence: 'By how much the sky behind the Moon is warmer than the coldest sky of its path.',
  },
  atmosphere: { label: 'Atmosphere', sentence: 'Noise of the absorbing air along the beam.' },
  moon: {
    label: 'Moon',
    sentence: 'The Moon’s own heat, as far as the beam is filled by its disc.',
  },
  sun: {
    label: 'Sun',
    sentence: 'The Sun in the main lobe or in the sidelobes, when it is above the horizon.',
  },
};

/** Adds one direction up again, term by term; `way` 0 is first to second station. */
export function ledgerOf(
  model: LinkModel,
  way: 0 | 1,
  figures: DirectionFigures,
  pathLossDb: number,
): Ledger {
  const from = model.terminals[way];
  const to = model.terminals[way === 0 ? 1 : 0];
  const noiseFloorDbw = toDb(1.380649e-23 * 2500 * figures.systemTemperatureK);
  const surroundings: [NoiseKey, number][] = to.measured
    ? [
        ['measuredSystem', to.steadyK],
        ['warmerSky', Math.max(figures.skyTemperatureK - to.coldSkyK, 0)],
      ]
    : [
        ['receiver', to.receiverK],
        ['spillover', to.spilloverK],
        ['sky', figures.skyTemperatureK],
        ['atmosphere', figures.atmosphereTemperatureK],
      ];
  return {
    signal: addUp([
      ['transmitPower', from.powerDbw],
      ['transmitGain', from.gainDbi],
      ['transmitPointing', -from.pointingLossDb],
      ['atmosphereUp', -figures.atmosphereUpDb],
      ['pathLoss', -pathLossDb],
      ['beamFill', -figures.beamFillLossDb],
      ['atmosphereDown', -figures.atmosphereDownDb],
      ['polarization', -figures.polarizationLossDb],
      ['receivePointing', -to.pointingLossDb],
      ['receiveGain', to.gainDbi],
      ['noiseFloor', -noiseFloorDbw],
      ['spread', -figures.spreadLossDb],
      ['threshold', -model.mode.thresholdDb],
    ]),
    noise: addUp([
      ...surroundings,
      ['moon', figures.moonTemperatureK],
      ['sun', figures.sunTemperatureK],
    ]),
  };
}

function addUp<Key extends string>(terms: readonly (readonly [Key, number])[]): LedgerTerm<Key>[] {
  let level = 0;
  return terms.map(([key, value]) => {
    level += value;
    return { key, value: value === 0 ? 0 : value, level };
  });
}
