/** Steps of the quality ramp, weakest first. `below`: the mode's threshold is not reached. */
export const QUALITY_STEPS = ['below', 'thin', 'fair', 'good', 'strong', 'ample'] as const;
export type QualityStep = (typeof QUALITY_STEPS)[number];

/** A figure in dB and the step it falls into. The figure is shown with its sign. */
export interface Quality {
  db: number;
  step: QualityStep;
}

/**
 * Quality of the path alone, from the degradation (0 dB: nearest Moon before the coldest sky).
 * The figure is the degradation taken as a loss (0 or negative), so that more is better.
 */
export function qualityOfDegradation(degradationDb: number): Quality {
  const step: QualityStep =
    degradationDb <= 0.7
      ? 'ample'
      : degradationDb <= 1.5
        ? 'strong'
        : degradationDb <= 2.5
          ? 'good'
          : degradationDb <= 4
            ? 'fair'
            : 'thin';
  return { db: -degradationDb, step };
}
