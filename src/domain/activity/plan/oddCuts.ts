import { rowFamilies } from './families';
import type { PlanGrid } from './grid';
import { atMost, type PlanRow } from './model';

const LEAST_BROKEN = 0.01;

/**
 * Rows that a relaxed answer breaks and no plan does. Contacts at one time are a matching of the stations: among an
 * odd number of them, 2k + 1, there are at most k (Edmonds 1965), three at three of them least of all. Looked for among
 * triangles and among stations that hang together by fractions.
 */
export function oddCuts(grid: PlanGrid, columns: Float64Array): PlanRow[] {
  const cuts: PlanRow[] = [];
  const known = new Set<string>();
  for (const { offsets, length, capacity } of rowFamilies(grid)) {
    if (capacity !== 1) continue;
    const windows = new Map<number, Edge[]>();
    for (let option = 0; option < grid.optionWish.length; option += 1) {
      const share = columns[option]!;
      if (share < 1e-6 || share > 1 - 1e-6) continue;
      const last = grid.optionStep[option]! - offsets[grid.optionBand[option]!]!;
      for (let p = last - length + 1; p <= last; p += 1) addEdge(windows, p, grid, option, share);
    }
    for (const [p, edges] of windows) {
      for (const stations of brokenSets(edges)) {
        const row = rowOf(grid, stations, offsets, length, p);
        const key = row.columns.join();
        if (known.has(key)) continue;
        known.add(key);
        cuts.push(row);
      }
    }
  }
  return cuts;
}

interface Edge {
  a: number;
  b: number;
  share: number;
}

function addEdge(
  windows: Map<number, Edge[]>,
  p: number,
  grid: PlanGrid,
  option: number,
  share: number,
): void {
  const wish = grid.optionWish[option]!;
  const one = grid.wishA[wish]!;
  const other = grid.wishB[wish]!;
  const a = Math.min(one, other);
  const b = Math.max(one, other);
  let edges = windows.get(p);
  if (!edges) windows.set(p, (edges = []));
  const edge = edges.find((known) => known.a === a && known.b === b);
  if (edge) edge.share += share;
  else edges.push({ a, b, share });
}

/** Sets of stations whose edges sum to more than they may. */
function brokenSets(edges: readonly Edge[]): number[][] {
  if (edges.length < 3) return [];
  const sum = (stations: readonly number[]) =>
    edges.reduce(
      (total, { a, b, share }) =>
        stations.includes(a) && stations.includes(b) ? total + share : total,
      0,
    );
  const broken = (stations: readonly number[]) =>
    stations.length % 2 === 1 &&
    stations.length >= 3 &&
    sum(stations) > (stations.length - 1) / 2 + LEAST_BROKEN;
  const found = triangles(edges).filter(broken);
  for (const together of components(edges)) {
    if (together.length < 5) continue;
    if (together.length % 2 === 1) {
      if (broken(together)) found.push(together);
    } else {
      for (const without of together) {
        const rest = together.filter((station) => station !== without);
        if (broken(rest)) found.push(rest);
      }
    }
  }
  return found;
}

function triangles(edges: readonly Edge[]): number[][] {
  const joined = new Set(edges.map(({ a, b }) => `${a} ${b}`));
  const found: number[][] = [];
  for (const one of edges) {
    for (const other of edges) {
      if (one.a === other.a && one.b < other.b && joined.has(`${one.b} ${other.b}`)) {
        found.push([one.a, one.b, other.b]);
      }
    }
  }
  return found;
}

function components(edges: readonly Edge[]): number[][] {
  const parent = new Map<number, number>();
  const root = (station: number): number => {
    let at = station;
    while (parent.get(at) !== at) at = parent.get(at)!;
    return at;
  };
  for (const { a, b } of edges) {
    if (!parent.has(a)) parent.set(a, a);
    if (!parent.has(b)) parent.set(b, b);
    parent.set(root(a), root(b));
  }
  const byRoot = new Map<number, number[]>();
  for (const station of parent.keys()) {
    const at = root(station);
    const own = byRoot.get(at);
    if (own) own.push(station);
    else byRoot.set(at, [station]);
  }
  return [...byRoot.values()];
}

/** All options between two of the stations in the window, whatever they are now. */
function rowOf(
  grid: PlanGrid,
  stations: readonly number[],
  offsets: readonly number[],
  length: number,
  p: number,
): PlanRow {
  const inside = new Set(stations);
  const columns: number[] = [];
  for (let wish = 0; wish < grid.wishes; wish += 1) {
    if (!inside.has(grid.wishA[wish]!) || !inside.has(grid.wishB[wish]!)) continue;
    for (let option = grid.firsts[wish]!; option < grid.firsts[wish + 1]!; option += 1) {
      const at = grid.optionStep[option]! - offsets[grid.optionBand[option]!]! - p;
      if (at >= 0 && at < length) columns.push(option);
    }
  }
  return atMost((stations.length - 1) / 2, columns);
}
