import type { Interval } from '../time/interval';
import type { Timeline } from './timeline';
import type { LimitCause, LimitReason } from './types';

/**
 * Whose fault an hour is when several limits forbid it: the first in this order, and within one reason the
 * station whose call sign sorts first. What cannot be changed comes before what can.
 */
export const REASON_ORDER: readonly LimitReason[] = [
  'searchLimit',
  'horizon',
  'horizonProfile',
  'elevationLimit',
  'transmitElevation',
  'azimuthLimit',
  'blockedSector',
  'usableHours',
  'sunSeparation',
  'degradation',
  'margin',
  'tooShort',
];

/** A stretch in which one and the same limit forbids, or (cause null) nothing does. */
export interface Stretch extends Interval {
  cause: LimitCause | null;
}

const FREE = REASON_ORDER.length;

/** Lays timelines of one span over each other; the stretches join up and cover the span. */
export function sweepTimelines(span: Interval, timelines: readonly Timeline[]): Stretch[] {
  const ranks = timelines.map((timeline) =>
    timeline.causes.map((cause) => (cause ? REASON_ORDER.indexOf(cause.reason) : FREE)),
  );
  const positions = timelines.map(() => 0);
  const stretches: Stretch[] = [];
  let nowMs = span.startMs;
  while (nowMs < span.endMs) {
    let untilMs = span.endMs;
    let least = FREE;
    let cause: LimitCause | null = null;
    for (let index = 0; index < timelines.length; index += 1) {
      const { beginsMs, codes, causes } = timelines[index]!;
      let position = positions[index]!;
      while (position + 1 < beginsMs.length && beginsMs[position + 1]! <= nowMs) position += 1;
      positions[index] = position;
      const next = beginsMs[position + 1];
      if (next !== undefined && next < untilMs) untilMs = next;
      const code = codes[position]!;
      const rank = ranks[index]![code]!;
      if (rank < least) {
        least = rank;
        cause = causes[code]!;
      }
    }
    const last = stretches.at(-1);
    if (last && last.cause === cause) last.endMs = untilMs;
    else stretches.push({ startMs: nowMs, endMs: untilMs, cause });
    nowMs = untilMs;
  }
  return stretches;
}
