import { MINUTE_MS, type Interval } from '../time/interval';
import { qualityOfDegradation, type Quality, type QualityStep } from './quality';

/** Quality over a span: a figure at even steps, straight lines between them. */
export interface QualityCurve extends Interval {
  stepMs: number;
  /** dB, more is better. */
  valuesDb: Float64Array;
}

/** A stretch of one and the same step. */
export interface QualityBand extends Interval {
  step: QualityStep;
}

const CURVE_STEP_MS = 30 * MINUTE_MS;

/** Samples a degradation in dB over the span; the Moon's distance and the sky behind it change slowly. */
export function qualityCurve(
  span: Interval,
  degradationDb: (timeMs: number) => number,
): QualityCurve {
  const steps = Math.ceil((span.endMs - span.startMs) / CURVE_STEP_MS);
  const stepMs = (span.endMs - span.startMs) / steps;
  const valuesDb = new Float64Array(steps + 1);
  for (let index = 0; index <= steps; index += 1) {
    valuesDb[index] = qualityOfDegradation(degradationDb(span.startMs + index * stepMs)).db;
  }
  return { ...span, stepMs, valuesDb };
}

/** The quality at an instant; beyond the span that of its end. */
export function qualityAt(curve: QualityCurve, timeMs: number): Quality {
  const last = curve.valuesDb.length - 1;
  const position = Math.min(Math.max((timeMs - curve.startMs) / curve.stepMs, 0), last);
  const index = Math.min(Math.floor(position), last - 1);
  const before = curve.valuesDb[index]!;
  const after = curve.valuesDb[index + 1]!;
  return qualityOfDegradation(-(before + (position - index) * (after - before)));
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
