import { observerAt, type Observer } from '../ephemeris/observer';
import type { MoonTable } from '../ephemeris/table';
import type { Site } from '../sky/limits';
import { gridRoots, type GridFunction } from './roots';

/** Between two nodes of 20 minutes the sine of elevation rises at most 0.00095 above both. */
const BULGE = 0.002;
/** From one node to the next, 5° of the Earth's turn, the sine of elevation changes by less than this. */
const STEP_SIN = 0.09;
/** Nodes so far from the level are leapt over. */
const FAR = 3 * STEP_SIN;

interface Take {
  /** May be empty or the wrong way round, which then means nothing. */
  add(beginMs: number, endMs: number): void;
}

/**
 * When the Moon stands between a lowest and a highest elevation, for one station after the other. The short way to
 * what `stationTimeline` finds for such a sky: no azimuth is computed and nothing is allocated.
 */
export class ElevationScan implements GridFunction {
  readonly gridStartMs: number;
  readonly gridStepMs: number;
  /** Sine of elevation less the level looked at. */
  readonly values: Float64Array;
  readonly #direction = new Float64Array(3);
  readonly #edges: number[] = [];
  #observer: Observer = observerAt({ latitudeDeg: 0, longitudeDeg: 0, heightM: 0 });
  #level = 0;

  constructor(readonly table: MoonTable) {
    this.gridStartMs = table.gridStartMs;
    this.gridStepMs = table.gridStepMs;
    this.values = new Float64Array(table.gridNodes);
  }

  evaluate(timeMs: number): number {
    this.table.moonDirection(this.#observer, timeMs, this.#direction);
    return this.#direction[2]! - this.#level;
  }

  /** Hands over every stretch in order, edges not yet rounded. */
  stretches(
    site: Site,
    { floorSin, highSin }: { floorSin: number; highSin: number },
    take: Take,
  ): void {
    const edges = this.#edges;
    edges.length = 0;
    this.#observer = observerAt(site);
    const topSin = this.#crossings(floorSin, highSin >= 1);
    if (highSin >= topSin + BULGE) {
      const { values } = this;
      const begin = Math.abs(values[0]!) > FAR ? values[0]! : values[1]!;
      this.#everySecond(begin >= 0, take);
      return;
    }
    this.#crossings(highSin, true);
    edges.sort((a, b) => a - b);
    this.#between(floorSin, highSin, take);
  }

  /** Every crossing of one elevation changes sides. */
  #everySecond(beginsAbove: boolean, take: Take): void {
    const edges = this.#edges;
    if (beginsAbove) edges.unshift(this.table.startMs);
    for (let index = 0; index < edges.length; index += 2) {
      this.#give(edges[index]!, edges[index + 1] ?? this.table.endMs, take);
    }
  }

  /** Crossings may lie a step outside of the span. */
  #give(beginMs: number, endMs: number, take: Take): void {
    const { table } = this;
    take.add(Math.max(beginMs, table.startMs), Math.min(endMs, table.endMs));
  }

  /** Where either of two elevations is crossed, the middle of each stretch is asked. */
  #between(floorSin: number, highSin: number, take: Take): void {
    this.#level = 0;
    let fromMs = this.table.startMs;
    let openMs = -1;
    for (const edgeMs of [...this.#edges, this.table.endMs]) {
      if (edgeMs - fromMs < 1e-3) continue;
      const sine = this.evaluate((fromMs + edgeMs) / 2);
      const free = sine >= floorSin && sine <= highSin;
      if (free && openMs < 0) openMs = fromMs;
      if (!free && openMs >= 0) {
        this.#give(openMs, fromMs, take);
        openMs = -1;
      }
      fromMs = edgeMs;
    }
    if (openMs >= 0) this.#give(openMs, this.table.endMs, take);
  }

  /**
   * Appends every crossing of a level to the edges, and returns the greatest sine of elevation met. Nodes are filled
   * only where the Moon may be near the level, or, unless `leapAbove`, anywhere above it.
   */
  #crossings(level: number, leapAbove: boolean): number {
    this.#level = level;
    const { values } = this;
    const nodes = values.length;
    const grid = this.table.moonGrid();
    const { place, up } = this.#observer;
    const [px, py, pz] = place;
    const [ux, uy, uz] = up;
    let top = -1;
    let first = 1;
    let node = 0;
    while (node < nodes) {
      const at = node * 3;
      const x = grid[at]! - px;
      const y = grid[at + 1]! - py;
      const z = grid[at + 2]! - pz;
      const sine = (x * ux + y * uy + z * uz) / Math.sqrt(x * x + y * y + z * z);
      const value = sine - level;
      values[node] = value;
      if (sine > top) top = sine;
      if (value < -FAR || (leapAbove && value > FAR)) {
        if (node > first) gridRoots(this, first, node, this.#edges);
        node += Math.floor(Math.abs(value) / STEP_SIN) - 1;
        // The node leapt to is still a whole step from the level, and the one before it is not filled.
        first = node + 1;
      } else node += 1;
    }
    if (first < nodes - 2) gridRoots(this, first, nodes - 2, this.#edges);
    return top;
  }
}
