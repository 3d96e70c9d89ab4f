/** A half-open stretch of time [startMs, endMs), both in milliseconds since 1970-01-01T00:00:00Z. */
export interface Interval {
  startMs: number;
  endMs: number;
}

export const MINUTE_MS = 60_000;
export const HOUR_MS = 3_600_000;
export const DAY_MS = 86_400_000;

/** Sorted, disjoint union of the given intervals. Touching intervals are joined; empty ones vanish. */
export function unionIntervals(intervals: readonly Interval[]): Interval[] {
  const sorted = intervals
    .filter((interval) => interval.endMs > interval.startMs)
    .sort((a, b) => a.startMs - b.startMs);
  const joined: Interval[] = [];
  for (const interval of sorted) {
    const last = joined.at(-1);
    if (last && interval.startMs <= last.endMs) {
      last.endMs = Math.max(last.endMs, interval.endMs);
    } else {
      joined.push({ ...interval });
    }
  }
  return joined;
}

/** Intersection of two sorted, disjoint lists; the result is sorted and disjoint. */
export function intersectIntervals(
  left: readonly Interval[],
  right: readonly Interval[],
): Interval[] {
  const common: Interval[] = [];
  let i = 0;
  let j = 0;
  while (i < left.length && j < right.length) {
    const a = left[i]!;
    const b = right[j]!;
    const startMs = Math.max(a.startMs, b.startMs);
    const endMs = Math.min(a.endMs, b.endMs);
    if (endMs > startMs) common.push({ startMs, endMs });
    if (a.endMs < b.endMs) i += 1;
    else j += 1;
  }
  return common;
}

/** What remains of `within` when the sorted, disjoint `removed` are cut out. */
export function subtractIntervals(
  within: readonly Interval[],
  removed: readonly Interval[],
): Interval[] {
  const kept: Interval[] = [];
  for (const whole of within) {
    let cursorMs = whole.startMs;
    for (const cut of removed) {
      if (cut.endMs <= cursorMs) continue;
      if (cut.startMs >= whole.endMs) break;
      if (cut.startMs > cursorMs) kept.push({ startMs: cursorMs, endMs: cut.startMs });
      cursorMs = Math.max(cursorMs, cut.endMs);
    }
    if (cursorMs < whole.endMs) kept.push({ startMs: cursorMs, endMs: whole.endMs });
  }
  return kept;
}

export function overlaps(a: Interval, b: Interval): boolean {
  return a.startMs < b.endMs && b.startMs < a.endMs;
}
