import { observerAt, type Observer } from '../ephemeris/observer';
import type { MoonTable } from '../ephemeris/table';
import type { Boundary } from '../sky/boundary';
import { freeAboveFloor, type FreeSky } from '../sky/free';
import type { Site } from '../sky/limits';
import { dipRoots, isDip, simpleRoot, type GridFunction } from './roots';

/**
 * From one node of 20 minutes to the next, the distance from a plane through the station changes by less than
 * `TURN` times the length of its normal across the Earth's axis, and `OWN` for the Moon's own way.
 */
const TURN = 0.0889;
const OWN = 0.004;
const MOST = 0.09;
/** So near a boundary at a node, the Moon may touch or cross it twice between this node and its neighbours. */
const NEAR = 0.002;
/** So far from the zenith (as a share of the horizontal component) the Moon cannot change halves in one step. */
const AROUND_ZENITH = 0.1;

interface Take {
  /** May be empty or the wrong way round, which then means nothing. */
  add(beginMs: number, endMs: number): void;
}

/**
 * When nothing in a station's sky forbids looking at the Moon, for one station after the other. The short way to
 * what `stationTimeline` finds with reasons, for skies without a profile. Every limit is a plane; all crossings are
 * found by the same few lines, which is what makes even the first search of a process quick.
 */
export class FreeScan implements GridFunction {
  readonly gridStartMs: number;
  readonly gridStepMs: number;
  readonly #grid: Float64Array;
  /** Station's place, normal and level of the plane looked at, and, for an azimuth, the way there; Earth-fixed. */
  readonly #plane = new Float64Array(10);
  readonly #direction = new Float64Array(3);
  /** Signed distance from the plane at the nodes that were visited. */
  readonly values: Float64Array;
  /** Nodes after which the plane is crossed, and, with a minus, those next to which it may be touched. */
  readonly #marks: Int32Array;
  #floorEdges: number[] = [];
  #edges: number[] = [];

  constructor(readonly table: MoonTable) {
    this.gridStartMs = table.gridStartMs;
    this.gridStepMs = table.gridStepMs;
    this.#grid = table.moonGrid();
    this.values = new Float64Array(table.gridNodes);
    this.#marks = new Int32Array(table.gridNodes);
  }

  evaluate(timeMs: number): number {
    const plane = this.#plane;
    const moon = this.#direction;
    this.table.moonEarthFixed(timeMs, moon);
    const x = moon[0]! - plane[0]!;
    const y = moon[1]! - plane[1]!;
    const z = moon[2]! - plane[2]!;
    const along = x * plane[3]! + y * plane[4]! + z * plane[5]!;
    return along / Math.sqrt(x * x + y * y + z * z) - plane[6]!;
  }

  /** Hands over every stretch in order, edges not yet rounded. */
  stretches(site: Site, sky: FreeSky, take: Take): void {
    const { startMs, endMs } = this.table;
    const observer = observerAt(site);
    const edges = this.#floorEdges;
    edges.length = 0;
    const last = this.values.length - 2;
    this.#lookAt(observer, sky.floor);
    const above = this.#crossings(1, last, false, edges);
    let beginMs = above ? startMs : -1;
    for (let index = 0; index < edges.length; index += 1) {
      if (beginMs < 0) beginMs = edges[index]!;
      else {
        this.#within(observer, sky, beginMs, edges[index]!, take);
        beginMs = -1;
      }
    }
    if (beginMs >= 0) this.#within(observer, sky, beginMs, endMs, take);
  }

  /** A stretch above the floor; crossings may lie a step outside of the span. */
  #within(observer: Observer, sky: FreeSky, beginMs: number, endMs: number, take: Take): void {
    const { startMs, endMs: lastMs } = this.table;
    const fromMs = Math.max(beginMs, startMs);
    const toMs = Math.min(endMs, lastMs);
    if (sky.boundaries.length === 0 || toMs <= fromMs) {
      take.add(fromMs, toMs);
      return;
    }
    const edges = this.#edges;
    edges.length = 0;
    const { gridStartMs, gridStepMs } = this;
    const first = Math.max(Math.floor((fromMs - gridStartMs) / gridStepMs), 1);
    const last = Math.min(Math.ceil((toMs - gridStartMs) / gridStepMs), this.values.length - 2);
    for (let index = 0; index < sky.boundaries.length; index += 1) {
      const boundary = sky.boundaries[index]!;
      this.#lookAt(observer, boundary);
      this.#crossings(first, last, boundary.up === 0, edges);
    }
    this.#between(observer, sky, fromMs, toMs, take);
  }

  /** Between two edges nothing changes: the middle of each stretch is asked, and free ones are joined. */
  #between(observer: Observer, sky: FreeSky, fromMs: number, toMs: number, take: Take): void {
    const direction = this.#direction;
    const edges = this.#edges;
    let pieceMs = fromMs;
    let openMs = -1;
    for (let index = 0; index <= edges.length; index += 1) {
      const edgeMs = index < edges.length ? Math.min(edges[index]!, toMs) : toMs;
      if (edgeMs - pieceMs < 1e-3) continue;
      this.table.moonDirection(observer, (pieceMs + edgeMs) / 2, direction);
      const free = freeAboveFloor(sky, direction[0]!, direction[1]!, direction[2]!);
      if (free && openMs < 0) openMs = pieceMs;
      if (!free && openMs >= 0) {
        take.add(openMs, pieceMs);
        openMs = -1;
      }
      pieceMs = edgeMs;
    }
    if (openMs >= 0) take.add(openMs, toMs);
  }

  #lookAt({ place, east, north, up }: Observer, boundary: Boundary): void {
    const plane = this.#plane;
    const { east: e, north: n, up: u, halfEast, halfNorth } = boundary;
    plane[0] = place[0];
    plane[1] = place[1];
    plane[2] = place[2];
    plane[3] = e * east[0] + n * north[0] + u * up[0];
    plane[4] = e * east[1] + n * north[1] + u * up[1];
    plane[5] = n * north[2] + u * up[2];
    plane[6] = boundary.level;
    plane[7] = halfEast * east[0] + halfNorth * north[0];
    plane[8] = halfEast * east[1] + halfNorth * north[1];
    plane[9] = halfNorth * north[2];
  }

  /** Adds the crossings between two nodes, in order of time; returns whether the Moon is above at the first. */
  #crossings(first: number, last: number, azimuth: boolean, edges: number[]): boolean {
    const { values } = this;
    const marks = this.#marks;
    const found = this.#visit(first, last);
    for (let index = 0; index < found; index += 1) {
      const mark = marks[index]!;
      const known = edges.length;
      if (mark < 0) {
        if (isDip(values, -mark)) dipRoots(this, -mark, edges);
      } else if (!azimuth || this.#ahead(mark) || this.#ahead(mark + 1)) {
        edges.push(simpleRoot(this, mark));
      }
      sortFrom(edges, known);
    }
    return values[first]! >= 0;
  }

  /** Whether the Moon is, or may be within a step, on the half of the plane that is meant. */
  #ahead(node: number): boolean {
    const grid = this.#grid;
    const plane = this.#plane;
    const x = grid[node * 3]! - plane[0]!;
    const y = grid[node * 3 + 1]! - plane[1]!;
    const z = grid[node * 3 + 2]! - plane[2]!;
    const along = x * plane[7]! + y * plane[8]! + z * plane[9]!;
    return along > -AROUND_ZENITH * Math.sqrt(x * x + y * y + z * z);
  }

  /**
   * Fills the distance from the plane at the nodes from one before `first` to one after `last`, leaping over those
   * that are far from it, and marks where roots are to be solved. Returns how many marks.
   */
  #visit(first: number, last: number): number {
    const grid = this.#grid;
    const plane = this.#plane;
    const { values } = this;
    const marks = this.#marks;
    const px = plane[0]!;
    const py = plane[1]!;
    const pz = plane[2]!;
    const nx = plane[3]!;
    const ny = plane[4]!;
    const nz = plane[5]!;
    const level = plane[6]!;
    const step = Math.min(TURN * Math.sqrt(nx * nx + ny * ny) + OWN, MOST);
    const far = 3 * step;
    let found = 0;
    let before = 0;
    let node = first - 1;
    while (node <= last + 1) {
      const at = node * 3;
      const x = grid[at]! - px;
      const y = grid[at + 1]! - py;
      const z = grid[at + 2]! - pz;
      const value = (x * nx + y * ny + z * nz) / Math.sqrt(x * x + y * y + z * z) - level;
      values[node] = value;
      if (node > first) {
        if (value < 0 !== before < 0) {
          if (node <= last) {
            marks[found] = node - 1;
            found += 1;
          }
        } else if (Math.abs(before) < NEAR) {
          marks[found] = 1 - node;
          found += 1;
        }
      }
      before = value;
      const distance = Math.abs(value);
      // The node leapt to is still a whole step from the plane, so that none of its neighbours is missed.
      if (distance > far && node >= first) node += Math.floor(distance / step) - 1;
      else node += 1;
    }
    return found;
  }
}

/** Brings the values from this index on to their places among those before, which are in order. */
function sortFrom(values: number[], from: number): void {
  for (let index = from; index < values.length; index += 1) {
    const value = values[index]!;
    let place = index;
    while (place > 0 && values[place - 1]! > value) {
      values[place] = values[place - 1]!;
      place -= 1;
    }
    values[place] = value;
  }
}
