import { DEG } from '../ephemeris/constants';
import type { StationTrack } from '../ephemeris/track';
import { gridRoots, type GridFunction } from './roots';
import { timelineOfSign, type Timeline } from './timeline';

/** cos(least separation) − cos(separation) as seen from one station: positive where far enough apart. */
class SunClearance implements GridFunction {
  readonly gridStartMs: number;
  readonly gridStepMs: number;
  readonly values: Float64Array;
  readonly #moon = new Float64Array(3);
  readonly #sun = new Float64Array(3);

  constructor(
    readonly track: StationTrack,
    readonly limit: number,
  ) {
    const { table } = track;
    this.gridStartMs = table.gridStartMs;
    this.gridStepMs = table.gridStepMs;
    this.values = new Float64Array(table.gridNodes);
    const moonGrid = table.moonGrid();
    const sunGrid = table.sunGrid();
    const { place } = track.observer;
    for (let node = 0; node < this.values.length; node += 1) {
      this.values[node] = limit - cosSeparation(place, moonGrid, sunGrid, node * 3);
    }
  }

  evaluate(timeMs: number): number {
    this.track.table.moonEarthFixed(timeMs, this.#moon);
    this.track.table.sunEarthFixed(timeMs, this.#sun);
    return this.limit - cosSeparation(this.track.observer.place, this.#moon, this.#sun, 0);
  }
}

/** Free while Moon and Sun stand at least so far apart as seen from this station (topocentric, airless). */
export function sunTimeline(track: StationTrack, minimumSeparationDeg: number): Timeline {
  const clearance = new SunClearance(track, Math.cos(minimumSeparationDeg * DEG));
  const edges: number[] = [];
  gridRoots(clearance, 1, clearance.values.length - 2, edges);
  return timelineOfSign(track.table, clearance, edges, {
    callSign: null,
    reason: 'sunSeparation',
  });
}

function cosSeparation(
  place: readonly number[],
  moon: Float64Array,
  sun: Float64Array,
  at: number,
): number {
  const mx = moon[at]! - place[0]!;
  const my = moon[at + 1]! - place[1]!;
  const mz = moon[at + 2]! - place[2]!;
  const sx = sun[at]! - place[0]!;
  const sy = sun[at + 1]! - place[1]!;
  const sz = sun[at + 2]! - place[2]!;
  const lengths = Math.sqrt((mx * mx + my * my + mz * mz) * (sx * sx + sy * sy + sz * sz));
  return (mx * sx + my * sy + mz * sz) / lengths;
}
