import type { ReceiveStage } from './setup';

export interface ChainPreset {
  label: string;
  stages: ReceiveStage[];
}

interface UsualParts {
  toMhz: number;
  relayDb: number;
  amplifier: { noiseFigureDb: number; gainDb: number };
  cableDb: number;
  receiverDb: number;
}

/** Round figures of the kind that is common on each band; invented, of no maker's part. */
const USUAL: readonly UsualParts[] = [
  {
    toMhz: 250,
    relayDb: 0.1,
    amplifier: { noiseFigureDb: 0.5, gainDb: 20 },
    cableDb: 1.5,
    receiverDb: 5,
  },
  {
    toMhz: 500,
    relayDb: 0.1,
    amplifier: { noiseFigureDb: 0.5, gainDb: 20 },
    cableDb: 2.5,
    receiverDb: 5,
  },
  {
    toMhz: 1500,
    relayDb: 0.1,
    amplifier: { noiseFigureDb: 0.35, gainDb: 18 },
    cableDb: 4,
    receiverDb: 6,
  },
  {
    toMhz: 4000,
    relayDb: 0.1,
    amplifier: { noiseFigureDb: 0.5, gainDb: 16 },
    cableDb: 5,
    receiverDb: 6,
  },
  {
    toMhz: 12_000,
    relayDb: 0.15,
    amplifier: { noiseFigureDb: 0.8, gainDb: 14 },
    cableDb: 1,
    receiverDb: 6,
  },
  {
    toMhz: 30_000,
    relayDb: 0.3,
    amplifier: { noiseFigureDb: 1.6, gainDb: 12 },
    cableDb: 0.5,
    receiverDb: 8,
  },
  {
    toMhz: Infinity,
    relayDb: 0.5,
    amplifier: { noiseFigureDb: 3, gainDb: 12 },
    cableDb: 0.5,
    receiverDb: 9,
  },
];

const SECOND = { noiseFigureDb: 1, gainDb: 18 };

/** Chains to begin from; every figure is to be replaced by the station's own. */
export function chainPresets(frequencyMhz: number): ChainPreset[] {
  const parts = USUAL.find((row) => frequencyMhz <= row.toMhz)!;
  const relay: ReceiveStage = { kind: 'loss', name: 'Relay', lossDb: parts.relayDb };
  const first: ReceiveStage = { kind: 'amplifier', name: 'Preamplifier', ...parts.amplifier };
  const second: ReceiveStage = { kind: 'amplifier', name: 'Second amplifier', ...SECOND };
  const cable: ReceiveStage = { kind: 'loss', name: 'Cable', lossDb: parts.cableDb };
  const receiver: ReceiveStage = {
    kind: 'amplifier',
    name: 'Receiver',
    noiseFigureDb: parts.receiverDb,
    gainDb: 0,
  };
  return [
    { label: 'Two amplifiers at the feed, cable', stages: [relay, first, second, cable, receiver] },
    { label: 'One amplifier at the feed, cable', stages: [relay, first, cable, receiver] },
    { label: 'Receiver at the feed', stages: [relay, first, receiver] },
    { label: 'Cable before the receiver', stages: [relay, cable, receiver] },
  ];
}
