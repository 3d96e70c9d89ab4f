/** Modes in which a sked can be worked. */
export const MODES = [
  { id: 'cw', label: 'CW' },
  { id: 'ssb', label: 'SSB' },
  { id: 'jt65b', label: 'JT65B' },
  { id: 'jt65c', label: 'JT65C' },
  { id: 'q65-30b', label: 'Q65-30B' },
  { id: 'q65-60b', label: 'Q65-60B' },
  { id: 'q65-60c', label: 'Q65-60C' },
  { id: 'q65-60d', label: 'Q65-60D' },
  { id: 'q65-60e', label: 'Q65-60E' },
  { id: 'q65-120d', label: 'Q65-120D' },
] as const;

export type ModeId = (typeof MODES)[number]['id'];

export const MODE_IDS = MODES.map((mode) => mode.id) as [ModeId, ...ModeId[]];

export function modeById(id: ModeId): (typeof MODES)[number] {
  return MODES.find((mode) => mode.id === id)!;
}
