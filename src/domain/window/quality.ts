/** Steps of the quality ramp, weakest first. `below`: not worth a fill. */
export const QUALITY_STEPS = ['below', 'thin', 'fair', 'good', 'strong', 'ample'] as const;
export type QualityStep = (typeof QUALITY_STEPS)[number];

/** A figure in dB and the step it falls into. The figure is shown with its sign. */
export interface Quality {
  db: number;
  step: QualityStep;
}

/** The filled steps, weakest first, each with the least figure that still belongs to it. */
export const QUALITY_SCALE = [
  { step: 'thin', fromDb: -Infinity },
  { step: 'fair', fromDb: -4 },
  { step: 'good', fromDb: -2.5 },
  { step: 'strong', fromDb: -1.5 },
  { step: 'ample', fromDb: -0.7 },
] as const satisfies readonly { step: QualityStep; fromDb: number }[];

/** What the figure is, for heads of columns and legends. */
export const QUALITY_NAME = 'Degradation';

/**
 * Quality of the path alone, from the degradation (0 dB: nearest Moon before the coldest sky).
 * The figure is the degradation taken as a loss (0 or negative), so that more is better.
 * The one place that decides the step and the figure of a window.
 */
export function qualityOfDegradation(degradationDb: number): Quality {
  const db = -degradationDb;
  // Judged as it is shown, to 0.1 dB, so that a figure never stands beside a word it does not belong to.
  const shownDb = Math.round(db * 10) / 10;
  let step: QualityStep = 'thin';
  for (const entry of QUALITY_SCALE) if (shownDb >= entry.fromDb) step = entry.step;
  return { db, step };
}
