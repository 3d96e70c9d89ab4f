import type { PlanGrid } from './grid';

/** A grid with fewer options, and which option of the other grid each of them is. */
export interface ReducedGrid {
  grid: PlanGrid;
  options: Int32Array;
}

/** The grid with only these options, rising. A wish left without any is never placed. */
export function reduceGrid(grid: PlanGrid, options: Int32Array): ReducedGrid {
  const firsts = new Int32Array(grid.wishes + 1);
  for (const option of options) {
    const wish = grid.optionWish[option]!;
    firsts[wish + 1] = firsts[wish + 1]! + 1;
  }
  const possible = new Int32Array(grid.stations);
  for (let wish = 0; wish < grid.wishes; wish += 1) {
    if (firsts[wish + 1]! > 0) {
      const [a, b] = [grid.wishA[wish]!, grid.wishB[wish]!];
      possible[a] = possible[a]! + 1;
      possible[b] = possible[b]! + 1;
    }
    firsts[wish + 1] = firsts[wish + 1]! + firsts[wish]!;
  }
  const pinned = new Int32Array(grid.wishes).fill(-1);
  options.forEach((option, at) => {
    const wish = grid.optionWish[option]!;
    if (grid.pinned[wish] === option) pinned[wish] = at;
  });
  const pick = (all: Int32Array) => Int32Array.from(options, (option) => all[option]!);
  return {
    options,
    grid: {
      ...grid,
      firsts,
      pinned,
      optionWish: pick(grid.optionWish),
      optionBand: pick(grid.optionBand),
      optionStep: pick(grid.optionStep),
      optionValue: pick(grid.optionValue),
      optionWorth: pick(grid.optionWorth),
      most: grid.most.map((most, station) => Math.min(most, possible[station]!)),
    },
  };
}

/** The wishes' options as those of the reduced grid; an option that is not in it becomes −1. */
export function intoReduced(reduced: ReducedGrid, chosen: Int32Array): Int32Array {
  const inside = new Int32Array(chosen.length).fill(-1);
  reduced.options.forEach((option, at) => {
    const wish = reduced.grid.optionWish[at]!;
    if (chosen[wish] === option) inside[wish] = at;
  });
  return inside;
}

/** The wishes' options as those of the grid that was reduced. */
export function outOfReduced(reduced: ReducedGrid, chosen: Int32Array): Int32Array {
  return chosen.map((option) => (option < 0 ? -1 : reduced.options[option]!));
}
