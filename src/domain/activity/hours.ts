import { HOUR_MS, intersectIntervals, unionIntervals, type Interval } from '../time/interval';

/** One hour of an activity that can be chosen; the first and the last may be shorter. */
export interface ActivityHour extends Interval {
  /** Its number, by which a form names it. */
  at: number;
  /** Whether it is chosen. */
  chosen: boolean;
}

/** The hours of an activity by UTC day, each chosen where the whole of it lies within the given intervals. */
export function activityHours(
  span: Interval,
  usable: readonly Interval[],
): { dayMs: number; hours: ActivityHour[] }[] {
  const days: { dayMs: number; hours: ActivityHour[] }[] = [];
  const firstMs = Math.floor(span.startMs / HOUR_MS) * HOUR_MS;
  for (let at = 0; firstMs + at * HOUR_MS < span.endMs; at += 1) {
    const hour = clipped(span, firstMs + at * HOUR_MS);
    const dayMs = Math.floor(hour.startMs / (24 * HOUR_MS)) * 24 * HOUR_MS;
    if (days.at(-1)?.dayMs !== dayMs) days.push({ dayMs, hours: [] });
    const [part] = intersectIntervals([hour], usable);
    const chosen = part !== undefined && part.startMs <= hour.startMs && part.endMs >= hour.endMs;
    days.at(-1)!.hours.push({ ...hour, at, chosen });
  }
  return days;
}

/** The chosen hours as joined intervals. Numbers that are no hour of the activity are ignored. */
export function intervalsOfHours(span: Interval, chosen: ReadonlySet<number>): Interval[] {
  const hours = activityHours(span, []).flatMap((day) => day.hours);
  return unionIntervals(
    hours.filter(({ at }) => chosen.has(at)).map(({ startMs, endMs }) => ({ startMs, endMs })),
  );
}

function clipped(span: Interval, fromMs: number): Interval {
  return {
    startMs: Math.max(fromMs, span.startMs),
    endMs: Math.min(fromMs + HOUR_MS, span.endMs),
  };
}

/** Milliseconds of all intervals together. */
export function lengthMs(intervals: readonly Interval[]): number {
  return intervals.reduce((sum, { startMs, endMs }) => sum + endMs - startMs, 0);
}
