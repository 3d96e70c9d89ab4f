import type { Interval } from '../time/interval';
import type { TimeFunction } from './roots';
import type { LimitCause } from './types';

/**
 * What one limit-giver (a station's sky, its people, the Sun, …) says over a span: stretch k begins at
 * `beginsMs[k]`, lasts to the next or to the end, and is forbidden for `causes[codes[k]]`, or free where that is
 * null. Whole milliseconds; free stretches are rounded inwards.
 */
export interface Timeline extends Interval {
  readonly beginsMs: readonly number[];
  readonly codes: readonly number[];
  readonly causes: readonly (LimitCause | null)[];
}

/** Collects stretches in order of time; code 0 is free. */
export class TimelineBuilder {
  readonly beginsMs: number[] = [];
  readonly codes: number[] = [];

  /** From here on this code holds. */
  begin(timeMs: number, code: number): void {
    const last = this.codes.length - 1;
    const before = this.codes[last];
    if (before === code) return;
    const edgeMs =
      code === 0 ? Math.ceil(timeMs) : before === 0 ? Math.floor(timeMs) : Math.round(timeMs);
    if (before !== undefined && edgeMs <= this.beginsMs[last]!) {
      this.codes.pop();
      const beginMs = this.beginsMs.pop()!;
      if (this.codes.at(-1) !== code) {
        this.codes.push(code);
        this.beginsMs.push(beginMs);
      }
      return;
    }
    this.beginsMs.push(edgeMs);
    this.codes.push(code);
  }

  finish(span: Interval, causes: readonly (LimitCause | null)[]): Timeline {
    while (this.beginsMs.length > 1 && this.beginsMs.at(-1)! >= span.endMs) {
      this.beginsMs.pop();
      this.codes.pop();
    }
    return {
      startMs: span.startMs,
      endMs: span.endMs,
      beginsMs: this.beginsMs,
      codes: this.codes,
      causes,
    };
  }
}

/** The free stretches. */
export function freeIntervals(timeline: Timeline): Interval[] {
  const free: Interval[] = [];
  timeline.codes.forEach((code, index) => {
    if (timeline.causes[code] !== null) return;
    free.push({
      startMs: timeline.beginsMs[index]!,
      endMs: timeline.beginsMs[index + 1] ?? timeline.endMs,
    });
  });
  return free;
}

/** Free within the intervals (sorted, disjoint), forbidden for the cause elsewhere. */
export function timelineOfIntervals(
  span: Interval,
  intervals: readonly Interval[],
  cause: LimitCause,
): Timeline {
  const builder = new TimelineBuilder();
  builder.begin(span.startMs, 1);
  for (const interval of intervals) {
    if (interval.endMs <= span.startMs || interval.startMs >= span.endMs) continue;
    builder.begin(Math.max(interval.startMs, span.startMs), 0);
    if (interval.endMs < span.endMs) builder.begin(interval.endMs, 1);
  }
  return builder.finish(span, [null, cause]);
}

/** Free where the function is not negative, given all its zeros in the span. */
export function timelineOfSign(
  span: Interval,
  f: TimeFunction,
  zerosMs: readonly number[],
  cause: LimitCause,
): Timeline {
  const builder = new TimelineBuilder();
  const edges = zerosMs.filter((zeroMs) => zeroMs < span.endMs).sort((a, b) => a - b);
  let fromMs = span.startMs;
  for (const edgeMs of [...edges, span.endMs]) {
    if (edgeMs - fromMs < 1e-3) continue;
    builder.begin(fromMs, f.evaluate((fromMs + edgeMs) / 2) >= 0 ? 0 : 1);
    fromMs = edgeMs;
  }
  return builder.finish(span, [null, cause]);
}
