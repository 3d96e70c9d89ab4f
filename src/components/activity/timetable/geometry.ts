import type { PlanProblem } from '../../../domain/activity/plan/types';
import { MOON_STEP_MINUTES } from '../../../domain/activity/timetableView';
import { HOUR_MS, MINUTE_MS, type Interval } from '../../../domain/time/interval';

const LEAST_HOUR_PX = 18.6;
/** So wide a slot has room for a partner's number of two digits. */
const LEAST_SLOT_PX = 16;
export const ROW_PX = 38;
/** Elevation that fills the row's height. */
const TOP_DEG = 90;

/** The stretch of time that the table shows, and how wide an hour is drawn. */
export interface Span extends Interval {
  hourPx: number;
}

/** Hours are as narrow as slots can be read: a weekend of long slots fits a desk, short ones scroll sideways. */
export function spanOf(
  { startMs, endMs }: Interval,
  { slotMinutes }: Pick<PlanProblem, 'slotMinutes'>,
): Span {
  return { startMs, endMs, hourPx: Math.max(LEAST_HOUR_PX, (LEAST_SLOT_PX * 60) / slotMinutes) };
}

export function xOf(span: Span, atMs: number): number {
  return Math.round(((atMs - span.startMs) / HOUR_MS) * span.hourPx * 10) / 10;
}

export function widthOf(span: Span): number {
  return xOf(span, span.endMs);
}

/** The Moon's height as a low hill over the row's foot; empty while it is down. */
export function hillPath(span: Span, elevationDeg: readonly number[]): string {
  const points = elevationDeg.map((degrees, step) => {
    const x = xOf(span, span.startMs + step * MOON_STEP_MINUTES * MINUTE_MS);
    const share = Math.min(1, Math.max(0, degrees) / TOP_DEG);
    return `${x} ${(ROW_PX - share * (ROW_PX - 8)).toFixed(1)}`;
  });
  if (points.length === 0) return '';
  return `M0 ${ROW_PX}L${points.join('L')}L${widthOf(span)} ${ROW_PX}Z`;
}

/** Whole UTC hours of the activity, each with how strong its line is. */
export function hourLines(
  span: Span,
): { x: number; atMs: number; line: 'day' | 'three' | 'hour' }[] {
  const lines: { x: number; atMs: number; line: 'day' | 'three' | 'hour' }[] = [];
  const firstMs = Math.ceil(span.startMs / HOUR_MS) * HOUR_MS;
  for (let atMs = firstMs; atMs < span.endMs; atMs += HOUR_MS) {
    const hour = (atMs / HOUR_MS) % 24;
    lines.push({
      x: xOf(span, atMs),
      atMs,
      line: hour === 0 ? 'day' : hour % 3 === 0 ? 'three' : 'hour',
    });
  }
  return lines;
}

/** Starts that follow each other on the grid, as stretches that their slots cover. */
export function stretchesOf(
  starts: readonly number[],
  gridMinutes: number,
  slotMinutes: number,
): Interval[] {
  const stretches: Interval[] = [];
  for (const startMs of [...starts].sort((a, b) => a - b)) {
    const endMs = startMs + slotMinutes * MINUTE_MS;
    const last = stretches.at(-1);
    const follows =
      last && startMs - (last.endMs - slotMinutes * MINUTE_MS) <= gridMinutes * MINUTE_MS;
    if (follows) last.endMs = endMs;
    else stretches.push({ startMs, endMs });
  }
  return stretches;
}
