import { Board } from './board';
import { UNITS, slotOf, type PlanGrid } from './grid';
import type { Plan } from './types';

/** The plan that the wishes' options make, everything counted anew. @param boundUnits null: not known. */
export function planOf(
  grid: PlanGrid,
  chosen: Int32Array,
  boundUnits: number | null,
  within = PROVEN_WITHIN_UNITS,
): Plan {
  const board = new Board(grid);
  let worth = 0;
  for (const option of chosen) {
    if (option < 0) continue;
    board.place(option);
    worth += grid.optionWorth[option]!;
  }
  const slots = [...chosen]
    .filter((option) => option >= 0)
    .sort((one, other) => grid.optionStep[one]! - grid.optionStep[other]! || one - other)
    .map((option) => {
      const { priority } = grid.problem.wishes[grid.optionWish[option]!]!;
      const chance = Math.round((100 * grid.optionWorth[option]!) / (UNITS * priority)) / 100;
      return { ...slotOf(grid, option), chance };
    });
  const gap = boundUnits === null ? null : gapOf(board.value, boundUnits, within);
  return {
    slots,
    worth: worth / UNITS,
    objective: board.value / UNITS,
    bound: gap === 0 ? board.value / UNITS : boundUnits === null ? null : boundUnits / UNITS,
    gap,
  };
}

/**
 * A plan counts as proven when no other can be better by so many units: half of the least difference that the chance of
 * one contact can make. What is left below that is how evenly contacts that are worth the same are spread.
 */
export const PROVEN_WITHIN_UNITS = UNITS * 0.005;

/** (bound − value) / bound; 0 where less than `within` units are left. */
export function gapOf(value: number, bound: number, within = PROVEN_WITHIN_UNITS): number {
  return bound - value < within - 1e-6 ? 0 : (bound - value) / bound;
}

/** Whether the options can stand together: every rule that the board knows, asked one by one. */
export function fitsTogether(grid: PlanGrid, chosen: Int32Array): boolean {
  const board = new Board(grid);
  for (let wish = 0; wish < grid.wishes; wish += 1) {
    const option = chosen[wish]!;
    if (grid.pinned[wish]! >= 0 && option !== grid.pinned[wish]) return false;
    if (option < 0) continue;
    if (grid.optionWish[option] !== wish || !board.fits(option)) return false;
    board.place(option);
  }
  return true;
}
