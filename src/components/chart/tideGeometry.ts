import { HOUR_MS, type Interval } from '../../domain/time/interval';
import { round } from './rasterGeometry';

/** Elevation strips under one another on one axis of time, in pixels. */
export interface TideFrame extends Interval {
  width: number;
  left: number;
  right: number;
}

export interface ElevationPoint {
  timeMs: number;
  elevationDeg: number;
}

export function tideX(frame: TideFrame, atMs: number): number {
  const share = (atMs - frame.startMs) / (frame.endMs - frame.startMs);
  return frame.left + share * (frame.right - frame.left);
}

export function tideInstant(frame: TideFrame, x: number): number {
  const share = Math.min(1, Math.max(0, (x - frame.left) / (frame.right - frame.left)));
  return frame.startMs + share * (frame.endMs - frame.startMs);
}

/** Whole hours inside the frame, every `stepHours`, counted from midnight UTC. */
export function tideHours(frame: Interval, stepHours: number): number[] {
  const step = stepHours * HOUR_MS;
  const hours: number[] = [];
  for (let at = Math.ceil(frame.startMs / step) * step; at <= frame.endMs; at += step) {
    hours.push(at);
  }
  return hours;
}

/** Hours between labels so that they keep `room` pixels apart: 1, 2, 3, 4, 6 or 12. */
export function hourStep(frame: TideFrame, room = 44): number {
  const perHour = ((frame.right - frame.left) * HOUR_MS) / (frame.endMs - frame.startMs);
  return [1, 2, 3, 4, 6, 12].find((step) => step * perHour >= room) ?? 24;
}

/**
 * Area between the axis and the elevation within one interval; elevations under 0° lie on the axis.
 * `direction` −1 draws upwards, 1 downwards; `scale` is pixels a degree.
 */
export function tideArea(
  frame: TideFrame,
  points: readonly ElevationPoint[],
  within: Interval,
  axisY: number,
  direction: -1 | 1,
  scale: number,
): string {
  const startMs = Math.max(within.startMs, frame.startMs);
  const endMs = Math.min(within.endMs, frame.endMs);
  if (endMs <= startMs) return '';
  const y = (elevationDeg: number) => round(axisY + direction * Math.max(0, elevationDeg) * scale);
  let path = `M${round(tideX(frame, startMs))} ${axisY}`;
  path += `L${round(tideX(frame, startMs))} ${y(elevationAt(points, startMs))}`;
  for (const point of points) {
    if (point.timeMs <= startMs || point.timeMs >= endMs) continue;
    path += `L${round(tideX(frame, point.timeMs))} ${y(point.elevationDeg)}`;
  }
  path += `L${round(tideX(frame, endMs))} ${y(elevationAt(points, endMs))}`;
  return `${path}L${round(tideX(frame, endMs))} ${axisY}Z`;
}

/** The elevation curve itself, broken where the Moon is down. */
export function tideCurve(
  frame: TideFrame,
  points: readonly ElevationPoint[],
  axisY: number,
  direction: -1 | 1,
  scale: number,
): string {
  let path = '';
  let up = false;
  for (const point of points) {
    const isUp = point.elevationDeg >= 0;
    if (isUp) {
      const x = round(tideX(frame, point.timeMs));
      const y = round(axisY + direction * point.elevationDeg * scale);
      path += `${up ? 'L' : 'M'}${x} ${y}`;
    }
    up = isUp;
  }
  return path;
}

/** Linear between the points; the ends beyond them. */
export function elevationAt(points: readonly ElevationPoint[], atMs: number): number {
  const first = points[0];
  const last = points.at(-1);
  if (!first || !last) return 0;
  if (atMs <= first.timeMs) return first.elevationDeg;
  if (atMs >= last.timeMs) return last.elevationDeg;
  let low = 0;
  let high = points.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (points[middle]!.timeMs <= atMs) low = middle;
    else high = middle;
  }
  const before = points[low]!;
  const after = points[high]!;
  const share = (atMs - before.timeMs) / (after.timeMs - before.timeMs);
  return before.elevationDeg + share * (after.elevationDeg - before.elevationDeg);
}
