import { formatNumber, formatSigned } from '../time/format';

/** Steps of the quality ramp, weakest first. `below`: not worth a fill. */
export const QUALITY_STEPS = ['below', 'thin', 'fair', 'good', 'strong', 'ample'] as const;
export type QualityStep = (typeof QUALITY_STEPS)[number];

/**
 * What a quality is read from. `margin`: that of the weaker direction between equipped stations, more is better.
 * `degradation`: what the path loses against its best, for stations whose equipment is not known; less is better.
 */
export type QualityBasis = 'margin' | 'degradation';

/** A figure in dB as it is shown, and the step it falls into. */
export interface Quality {
  basis: QualityBasis;
  db: number;
  step: QualityStep;
}

interface ScaleEntry {
  step: QualityStep;
  /** The figure nearest to the weaker step that still belongs to this one. */
  edgeDb: number;
}

/** The filled steps, weakest first: margins from the edge on, degradations up to it. */
export const QUALITY_SCALES: Record<QualityBasis, readonly ScaleEntry[]> = {
  margin: [
    { step: 'thin', edgeDb: 0 },
    { step: 'fair', edgeDb: 1.5 },
    { step: 'good', edgeDb: 3 },
    { step: 'strong', edgeDb: 4.5 },
    { step: 'ample', edgeDb: 6 },
  ],
  degradation: [
    { step: 'thin', edgeDb: Infinity },
    { step: 'fair', edgeDb: 4 },
    { step: 'good', edgeDb: 2.5 },
    { step: 'strong', edgeDb: 1.5 },
    { step: 'ample', edgeDb: 0.7 },
  ],
};

/** What the figure is, for heads of columns and legends. */
export const QUALITY_NAMES: Record<QualityBasis, string> = {
  margin: 'Margin',
  degradation: 'Degradation',
};

/** More is better, for either basis. */
export function worthDb({ basis, db }: Pick<Quality, 'basis' | 'db'>): number {
  return basis === 'margin' ? db : -db;
}

/** Quality of a figure. The one place that decides the step of a window; judged as it is shown, to 0.1 dB. */
export function qualityOf(basis: QualityBasis, db: number): Quality {
  const worth = worthDb({ basis, db: Math.round(db * 10) / 10 });
  let step: QualityStep = 'below';
  for (const entry of QUALITY_SCALES[basis]) {
    if (worth >= worthDb({ basis, db: entry.edgeDb })) step = entry.step;
  }
  return { basis, db, step };
}

/** From the margin of the weaker direction over what the mode needs. */
export function qualityOfMargin(marginDb: number): Quality {
  return qualityOf('margin', marginDb);
}

/** Quality of the path alone; 0 dB: nearest Moon before the coldest sky. */
export function qualityOfDegradation(degradationDb: number): Quality {
  return qualityOf('degradation', degradationDb);
}

/** "+6.1" or "−0.4" for a margin, "0.6" for a degradation. */
export function qualityFigure({ basis, db }: Quality): string {
  return basis === 'margin' ? formatSigned(db, 1) : formatNumber(db, 1);
}

/** "+6.1 dB, ample" */
export function qualityWords(quality: Quality): string {
  return `${qualityFigure(quality)} dB, ${quality.step}`;
}

/** Where a step begins, for a legend: "thin from 0.0", "ample up to 0.7", "thin over 4.0". */
export function scaleWords(basis: QualityBasis): { step: QualityStep; words: string }[] {
  const scale = QUALITY_SCALES[basis];
  return scale.map(({ step, edgeDb }, index) => {
    if (basis === 'margin') return { step, words: `from ${formatNumber(edgeDb, 1)}` };
    if (Number.isFinite(edgeDb)) return { step, words: `up to ${formatNumber(edgeDb, 1)}` };
    return { step, words: `over ${formatNumber(scale[index + 1]!.edgeDb, 1)}` };
  });
}
