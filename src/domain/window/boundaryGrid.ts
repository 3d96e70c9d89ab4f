import type { StationTrack } from '../ephemeris/track';
import { boundaryValue, type Boundary } from '../sky/boundary';
import { gridRoots, type GridFunction } from './roots';

/** So far from the zenith (as a share of the horizontal component) the Moon cannot change halves in one step. */
const AROUND_ZENITH = 0.1;

/** One boundary of a station's sky after the other as a function of time along the Moon's track. */
export class BoundaryGrid implements GridFunction {
  readonly gridStartMs: number;
  readonly gridStepMs: number;
  readonly values: Float64Array;
  readonly #direction = new Float64Array(3);
  #boundary: Boundary | undefined;

  constructor(readonly track: StationTrack) {
    this.gridStartMs = track.table.gridStartMs;
    this.gridStepMs = track.table.gridStepMs;
    this.values = new Float64Array(track.table.gridNodes);
  }

  evaluate(timeMs: number): number {
    this.track.direction(timeMs, this.#direction);
    return boundaryValue(this.#boundary!, this.#direction);
  }

  skips(node: number): boolean {
    const { up, halfEast, halfNorth } = this.#boundary!;
    if (up !== 0) return false;
    return halfEast * this.track.east[node]! + halfNorth * this.track.north[node]! < -AROUND_ZENITH;
  }

  /** Appends every crossing between the nodes, unsorted; near the zenith perhaps some of the other half too. */
  crossings(boundary: Boundary, first: number, last: number, edges: number[]): void {
    this.#boundary = boundary;
    const { east, north, up } = this.track;
    const { values } = this;
    const { east: be, north: bn, up: bu, level } = boundary;
    for (let node = first - 1; node <= last + 1; node += 1) {
      values[node] = be * east[node]! + bn * north[node]! + bu * up[node]! - level;
    }
    gridRoots(this, first, last, edges);
  }
}
