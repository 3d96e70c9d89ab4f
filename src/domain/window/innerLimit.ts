import type { Interval } from '../time/interval';
import { gridRoots, type GridFunction, type TimeFunction } from './roots';
import type { Stretch } from './sweep';
import { timelineOfSign } from './timeline';
import type { LimitCause } from './types';

/**
 * A limit too costly to ask over the whole search: it is looked at only in stretches that every other limit leaves
 * free, every `stepMs` and wherever it crosses zero. Free while the function is not negative.
 */
export interface InnerLimit extends TimeFunction {
  readonly cause: LimitCause;
  readonly stepMs: number;
}

/** The stretches with the free ones cut where the limit forbids. */
export function cutByLimit(stretches: readonly Stretch[], limit: InnerLimit): Stretch[] {
  return stretches.flatMap((stretch) => (stretch.cause ? [stretch] : cutOne(stretch, limit)));
}

function cutOne(stretch: Interval, limit: InnerLimit): Stretch[] {
  const steps = Math.max(2, Math.ceil((stretch.endMs - stretch.startMs) / limit.stepMs));
  const gridStepMs = (stretch.endMs - stretch.startMs) / steps;
  const grid: GridFunction = {
    gridStartMs: stretch.startMs,
    gridStepMs,
    values: Float64Array.from({ length: steps + 1 }, (_, node) =>
      limit.evaluate(stretch.startMs + node * gridStepMs),
    ),
    evaluate: (timeMs) => limit.evaluate(timeMs),
  };
  const zeros: number[] = [];
  gridRoots(grid, 0, steps, zeros);
  const { beginsMs, codes, causes } = timelineOfSign(stretch, limit, zeros, limit.cause);
  return codes.map((code, index) => ({
    startMs: beginsMs[index]!,
    endMs: beginsMs[index + 1] ?? stretch.endMs,
    cause: causes[code]!,
  }));
}
