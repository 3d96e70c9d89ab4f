import type { StationTrack } from '../ephemeris/track';
import { boundaryValue, type Boundary } from '../sky/boundary';
import { gridRoots, type GridFunction } from './roots';

/** So far from the zenith (as a share of the horizontal component) the Moon cannot change halves in one step. */
const AROUND_ZENITH = 0.1;
/** From one node to the next, 5° of the Earth's turn, the distance from any plane changes by less than this. */
const STEP = 0.09;
/** Nodes so far from the boundary are leapt over. */
const FAR = 3 * STEP;

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
    let from = first;
    let node = first - 1;
    while (node <= last + 1) {
      const value = be * east[node]! + bn * north[node]! + bu * up[node]! - level;
      values[node] = value;
      const distance = Math.abs(value);
      if (distance > FAR) {
        if (node > from) gridRoots(this, from, Math.min(node, last), edges);
        node += Math.floor(distance / STEP) - 1;
        // The node leapt to is still a whole step from the boundary, and the one before it is not filled.
        from = node + 1;
      } else node += 1;
    }
    if (from < last) gridRoots(this, from, last, edges);
  }
}
