import type { BandId } from './bands';

/** Modes in which a sked can be worked. Thresholds, periods and tone spacings: domain/link/modes.ts. */
export const MODES = [
  { id: 'cw', label: 'CW' },
  { id: 'ssb', label: 'SSB' },
  { id: 'jt65a', label: 'JT65A' },
  { id: 'jt65b', label: 'JT65B' },
  { id: 'jt65c', label: 'JT65C' },
  { id: 'q65-30a', label: 'Q65-30A' },
  { id: 'q65-30b', label: 'Q65-30B' },
  { id: 'q65-30c', label: 'Q65-30C' },
  { id: 'q65-30d', label: 'Q65-30D' },
  { id: 'q65-60a', label: 'Q65-60A' },
  { id: 'q65-60b', label: 'Q65-60B' },
  { id: 'q65-60c', label: 'Q65-60C' },
  { id: 'q65-60d', label: 'Q65-60D' },
  { id: 'q65-60e', label: 'Q65-60E' },
  { id: 'q65-120a', label: 'Q65-120A' },
  { id: 'q65-120b', label: 'Q65-120B' },
  { id: 'q65-120c', label: 'Q65-120C' },
  { id: 'q65-120d', label: 'Q65-120D' },
  { id: 'q65-120e', label: 'Q65-120E' },
  { id: 'q65-300a', label: 'Q65-300A' },
  { id: 'q65-300b', label: 'Q65-300B' },
  { id: 'q65-300c', label: 'Q65-300C' },
  { id: 'q65-300d', label: 'Q65-300D' },
  { id: 'q65-300e', label: 'Q65-300E' },
] as const;

export type ModeId = (typeof MODES)[number]['id'];

export const MODE_IDS = MODES.map((mode) => mode.id) as [ModeId, ...ModeId[]];

const DEFAULT_MODES: Partial<Record<BandId, ModeId>> = { '10368': 'q65-60d', '24048': 'q65-60e' };

/** What is proposed on a band until somebody chooses. */
export function defaultMode(band: BandId): ModeId {
  return DEFAULT_MODES[band] ?? 'q65-60c';
}

export function modeById(id: ModeId): (typeof MODES)[number] {
  return MODES.find((mode) => mode.id === id)!;
}
