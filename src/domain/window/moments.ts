import { directionAngles } from '../ephemeris/samples';
import type { StationTrack } from '../ephemeris/track';
import { DEG } from '../ephemeris/constants';
import type { Interval } from '../time/interval';
import type { DegradationTrack } from './degradationTimeline';
import { minimumBetween, type TimeFunction } from './roots';
import type { WindowStationSummary } from './types';

const BEST_TOLERANCE_MS = 30_000;

/** Where the Moon stands for one station at both ends of a window, and the highest it gets between. */
export function stationSummary(
  track: StationTrack,
  callSign: string,
  window: Interval,
): WindowStationSummary {
  const direction = new Float64Array(3);
  track.direction(window.startMs, direction);
  const start = directionAngles(direction);
  track.direction(window.endMs, direction);
  const end = directionAngles(direction);
  return {
    callSign,
    startAzimuthDeg: start.azimuthDeg,
    startElevationDeg: start.elevationDeg,
    endAzimuthDeg: end.azimuthDeg,
    endElevationDeg: end.elevationDeg,
    maximumElevationDeg: Math.max(
      start.elevationDeg,
      end.elevationDeg,
      culminationDeg(track, window, direction),
    ),
  };
}

/** Highest elevation at an inner maximum of the window, or −90 where there is none. */
function culminationDeg(track: StationTrack, window: Interval, direction: Float64Array): number {
  const { up, table } = track;
  const first = Math.ceil((window.startMs - table.gridStartMs) / table.gridStepMs);
  const last = Math.floor((window.endMs - table.gridStartMs) / table.gridStepMs);
  let highest = -90;
  for (let node = first - 1; node <= last + 1; node += 1) {
    const before = up[node - 1];
    const here = up[node];
    const after = up[node + 1];
    if (before === undefined || here === undefined || after === undefined) continue;
    if (here < before || here < after) continue;
    const bend = before - 2 * here + after;
    const shift = bend === 0 ? 0 : (before - after) / (2 * bend);
    const timeMs = Math.min(Math.max(track.nodeMs(node + shift), window.startMs), window.endMs);
    track.direction(timeMs, direction);
    const elevationDeg = Math.asin(Math.min(1, direction[2]!)) / DEG;
    highest = Math.max(highest, elevationDeg);
  }
  return highest;
}

/** The moment of the greatest lower elevation among the stations, whole milliseconds, to half a minute. */
export function highestLowerMoment(tracks: readonly StationTrack[], window: Interval): number {
  const { gridStartMs, gridStepMs } = tracks[0]!.table;
  const first = Math.ceil((window.startMs - gridStartMs) / gridStepMs);
  const last = Math.floor((window.endMs - gridStartMs) / gridStepMs);
  let best = -1;
  let bestUp = -Infinity;
  for (let node = first; node <= last; node += 1) {
    let lowest = Infinity;
    for (const track of tracks) lowest = Math.min(lowest, track.up[node]!);
    if (lowest > bestUp) {
      bestUp = lowest;
      best = node;
    }
  }
  return leastMoment(new LowestUp(tracks), -1, window, gridStartMs, gridStepMs, best);
}

/** Sine of the lowest elevation among the stations. */
class LowestUp implements TimeFunction {
  readonly #direction = new Float64Array(3);

  constructor(readonly tracks: readonly StationTrack[]) {}

  evaluate(timeMs: number): number {
    let lowest = Infinity;
    for (const track of this.tracks) {
      track.direction(timeMs, this.#direction);
      lowest = Math.min(lowest, this.#direction[2]!);
    }
    return lowest;
  }
}

/** The moment of least degradation in the window, whole milliseconds, to half a minute. */
export function leastDegradationMoment(track: DegradationTrack, window: Interval): number {
  const { gridStartMs, gridStepMs, values } = track;
  const first = Math.ceil((window.startMs - gridStartMs) / gridStepMs);
  const last = Math.floor((window.endMs - gridStartMs) / gridStepMs);
  let best = -1;
  for (let node = first; node <= last; node += 1) {
    if (best < 0 || values[node]! < values[best]!) best = node;
  }
  return leastMoment(track, 1, window, gridStartMs, gridStepMs, best);
}

/** Where `side` · f is least in the window, given the grid node inside at which it is least (−1: none inside). */
function leastMoment(
  f: TimeFunction,
  side: 1 | -1,
  window: Interval,
  gridStartMs: number,
  gridStepMs: number,
  bestNode: number,
): number {
  const nodeMs = gridStartMs + bestNode * gridStepMs;
  const fromMs = bestNode < 0 ? window.startMs : Math.max(window.startMs, nodeMs - gridStepMs);
  const toMs = bestNode < 0 ? window.endMs : Math.min(window.endMs, nodeMs + gridStepMs);
  const innerMs = minimumBetween(f, side, fromMs, toMs, BEST_TOLERANCE_MS);
  const inner = side * f.evaluate(innerMs);
  const start = side * f.evaluate(window.startMs);
  const end = side * f.evaluate(window.endMs);
  if (start <= inner && start <= end) return window.startMs;
  if (end <= inner) return window.endMs;
  return Math.round(innerMs);
}
