import type { Site } from '../sky/limits';
import { observerAt, type Observer } from './observer';
import type { MoonTable } from './table';

/**
 * The Moon's direction from one site at the nodes of a table's grid, as unit components towards east, north and
 * up, and a way to get the same at any instant between. No trigonometry in either.
 */
export class StationTrack {
  readonly table: MoonTable;
  site: Site;
  observer: Observer;
  readonly east: Float64Array;
  readonly north: Float64Array;
  /** Sine of the airless elevation. */
  readonly up: Float64Array;

  constructor(table: MoonTable, site: Site) {
    this.table = table;
    this.site = site;
    this.observer = observerAt(site);
    const nodes = table.gridNodes;
    this.east = new Float64Array(nodes);
    this.north = new Float64Array(nodes);
    this.up = new Float64Array(nodes);
    this.#fill();
  }

  /** Makes this the track of another site, in the same arrays: for work through many stations, one after the other. */
  moveTo(site: Site): void {
    this.site = site;
    this.observer = observerAt(site);
    this.#fill();
  }

  #fill(): void {
    const nodes = this.table.gridNodes;
    const grid = this.table.moonGrid();
    const { place, east: e, north: n, up: u } = this.observer;
    const [px, py, pz] = place;
    const [ex, ey] = e;
    const [nx, ny, nz] = n;
    const [ux, uy, uz] = u;
    for (let node = 0, at = 0; node < nodes; node += 1, at += 3) {
      const x = grid[at]! - px;
      const y = grid[at + 1]! - py;
      const z = grid[at + 2]! - pz;
      const scale = 1 / Math.sqrt(x * x + y * y + z * z);
      this.east[node] = (x * ex + y * ey) * scale;
      this.north[node] = (x * nx + y * ny + z * nz) * scale;
      this.up[node] = (x * ux + y * uy + z * uz) * scale;
    }
  }

  nodeMs(node: number): number {
    return this.table.gridStartMs + node * this.table.gridStepMs;
  }

  /** Writes the unit direction of the Moon: east, north, up. */
  direction(timeMs: number, out: Float64Array): void {
    this.table.moonDirection(this.observer, timeMs, out);
  }
}
