const WORDS = [
  'north',
  'north-east',
  'east',
  'south-east',
  'south',
  'south-west',
  'west',
  'north-west',
] as const;

/** The nearest of the eight winds. */
export function compassWord(azimuthDeg: number): (typeof WORDS)[number] {
  return WORDS[Math.round((((azimuthDeg % 360) + 360) % 360) / 45) % 8]!;
}
