import { MINUTE_MS, type Interval } from '../time/interval';
import { qualityOf, worthDb, type Quality, type QualityBasis, type QualityStep } from './quality';

/** Quality over a span: a figure at even steps, straight lines between them. */
export interface QualityCurve extends Interval {
  basis: QualityBasis;
  stepMs: number;
  /** dB as shown; NaN where there is nothing to judge, because the Moon is not up for all. */
  valuesDb: Float64Array;
}

/** A stretch of one and the same step. */
export interface QualityBand extends Interval {
  step: QualityStep;
}

const DEGRADATION_STEP_MS = 30 * MINUTE_MS;

/** Samples a degradation in dB over the span; the Moon's distance and the sky behind it change slowly. */
export function degradationCurve(
  span: Interval,
  degradationDb: (timeMs: number) => number,
): QualityCurve {
  return sampleCurve('degradation', span, DEGRADATION_STEP_MS, (timeMs) => degradationDb(timeMs));
}

/** A curve with steps as near to the wished one as fit into the span. */
export function sampleCurve(
  basis: QualityBasis,
  span: Interval,
  wishedStepMs: number,
  figureDb: (timeMs: number, stepMs: number) => number,
): QualityCurve {
  const steps = Math.max(1, Math.ceil((span.endMs - span.startMs) / wishedStepMs));
  const stepMs = (span.endMs - span.startMs) / steps;
  const valuesDb = Float64Array.from({ length: steps + 1 }, (_, index) =>
    figureDb(span.startMs + index * stepMs, stepMs),
  );
  return { startMs: span.startMs, endMs: span.endMs, basis, stepMs, valuesDb };
}

/** The figure at an instant; beyond the span that of its end, beside a gap that of the nearer side. */
export function figureAt({ startMs, stepMs, valuesDb }: QualityCurve, timeMs: number): number {
  const last = valuesDb.length - 1;
  const position = Math.min(Math.max((timeMs - startMs) / stepMs, 0), last);
  const index = Math.min(Math.floor(position), last - 1);
  const before = valuesDb[index]!;
  const after = valuesDb[index + 1]!;
  if (Number.isNaN(before)) return after;
  return Number.isNaN(after) ? before : before + (position - index) * (after - before);
}

/** The quality at an instant. */
export function qualityAt(curve: QualityCurve, timeMs: number): Quality {
  return qualityOf(curve.basis, figureAt(curve, timeMs));
}

/** The best moment of an interval on the curve; the first of equal ones. Whole milliseconds. */
export function bestMoment(
  curve: QualityCurve,
  { startMs, endMs }: Interval,
): { timeMs: number; quality: Quality } {
  const worthAt = (timeMs: number) => {
    const db = figureAt(curve, timeMs);
    return Number.isNaN(db) ? -Infinity : worthDb({ basis: curve.basis, db });
  };
  // Between the nodes lines are straight, so nothing but a node or an end can be best.
  let timeMs = startMs;
  let best = worthAt(startMs);
  const look = (atMs: number) => {
    const worth = worthAt(atMs);
    if (worth > best) {
      best = worth;
      timeMs = atMs;
    }
  };
  const firstNode = Math.floor((startMs - curve.startMs) / curve.stepMs) + 1;
  for (let node = firstNode; ; node += 1) {
    const atMs = Math.round(curve.startMs + node * curve.stepMs);
    if (atMs >= endMs) break;
    if (atMs > startMs) look(atMs);
  }
  look(endMs);
  return { timeMs, quality: qualityAt(curve, timeMs) };
}

const BAND_STEP_MS = 5 * MINUTE_MS;

/** Cuts intervals where the step changes, to five minutes. */
export function qualityBands(curve: QualityCurve, intervals: readonly Interval[]): QualityBand[] {
  const bands: QualityBand[] = [];
  for (const interval of intervals) {
    let open: QualityBand | null = null;
    for (let at = interval.startMs; at < interval.endMs; at += BAND_STEP_MS) {
      const endMs = Math.min(at + BAND_STEP_MS, interval.endMs);
      const { step } = qualityAt(curve, (at + endMs) / 2);
      if (open && open.step === step) open.endMs = endMs;
      else {
        open = { startMs: at, endMs, step };
        bands.push(open);
      }
    }
  }
  return bands;
}
