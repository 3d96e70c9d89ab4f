import { Board } from './board';
import type { PlanGrid } from './grid';
import { reduceGrid, type ReducedGrid } from './reduce';

/**
 * The grid with only some wishes free: those may take any option that does not stand against the rest, which keep the
 * option that they have. A plan of it is a plan of the whole.
 */
export function neighbourhood(
  grid: PlanGrid,
  chosen: Int32Array,
  free: ReadonlySet<number>,
): ReducedGrid {
  const board = new Board(grid);
  for (let wish = 0; wish < grid.wishes; wish += 1) {
    if (chosen[wish]! >= 0 && !free.has(wish)) board.place(chosen[wish]!);
  }
  const options: number[] = [];
  for (let wish = 0; wish < grid.wishes; wish += 1) {
    if (!free.has(wish)) {
      if (chosen[wish]! >= 0) options.push(chosen[wish]!);
      continue;
    }
    for (let option = grid.firsts[wish]!; option < grid.firsts[wish + 1]!; option += 1) {
      if (option === chosen[wish] || board.fits(option)) options.push(option);
    }
  }
  const reduced = reduceGrid(grid, Int32Array.from(options));
  const pinned = reduced.grid.pinned.slice();
  for (let wish = 0; wish < grid.wishes; wish += 1) {
    if (!free.has(wish) && chosen[wish]! >= 0) pinned[wish] = reduced.grid.firsts[wish]!;
  }
  return { options: reduced.options, grid: { ...reduced.grid, pinned } };
}

/** So many wishes that are left out are all free in every neighbourhood. */
const FEW = 60;

/** Around each wish that is left out: the wishes of its two stations, and others that are left out where they are few. */
export function openNeighbourhoods(grid: PlanGrid, chosen: Int32Array): Set<number>[] {
  const possible = Array.from({ length: grid.wishes }, (_, wish) => wish).filter(
    (wish) => grid.firsts[wish]! < grid.firsts[wish + 1]! && grid.pinned[wish]! < 0,
  );
  const open = possible.filter((wish) => chosen[wish]! < 0);
  return open.map((centre) => {
    const ends = [grid.wishA[centre]!, grid.wishB[centre]!];
    const near = possible.filter(
      (wish) => ends.includes(grid.wishA[wish]!) || ends.includes(grid.wishB[wish]!),
    );
    return new Set(open.length <= FEW ? [...open, ...near] : near);
  });
}
