import type { PlanGrid } from './grid';
import { atMost, optionsByStation, type PlanRow } from './model';

/**
 * For every run of contacts without a pause that is too long among the chosen options: a row that forbids it and all
 * like it. Each of the contacts may begin a little earlier or later as long as every choice is still a run: the
 * k-th between its step and the k-th end of the window, where the next window ends no later than one slot and a pause
 * after this one begins.
 */
export function restCuts(grid: PlanGrid, chosen: Int32Array): PlanRow[] {
  if (grid.inARow === 0) return [];
  const cuts: PlanRow[] = [];
  const own = optionsByStation(grid);
  for (let station = 0; station < grid.stations; station += 1) {
    const steps: number[] = [];
    for (let wish = 0; wish < grid.wishes; wish += 1) {
      const option = chosen[wish]!;
      if (option < 0 || (grid.wishA[wish] !== station && grid.wishB[wish] !== station)) continue;
      steps.push(grid.optionStep[option]!);
    }
    steps.sort((one, other) => one - other);
    for (const run of tooLong(grid, steps)) {
      const windows = spread(grid, run);
      const options = own[station]!.filter((option) => {
        const step = grid.optionStep[option]!;
        return windows.some(([from, to]) => step >= from && step <= to);
      });
      cuts.push(atMost(grid.inARow, options));
    }
  }
  return cuts;
}

/** Every inARow + 1 contacts that follow each other without a pause. */
function tooLong(grid: PlanGrid, steps: readonly number[]): number[][] {
  const found: number[][] = [];
  let from = 0;
  for (let at = 1; at <= steps.length; at += 1) {
    const goesOn = at < steps.length && steps[at]! - steps[at - 1]! < grid.slot + grid.pause;
    if (goesOn) continue;
    for (let first = from; first + grid.inARow < at; first += 1) {
      found.push(steps.slice(first, first + grid.inARow + 1));
    }
    from = at;
  }
  return found;
}

/** First and last step of each contact's window; windows hold less than a slot and do not meet. */
function spread(grid: PlanGrid, run: readonly number[]): [number, number][] {
  const windows: [number, number][] = [];
  run.forEach((step, at) => {
    const before = windows[at - 1];
    const next = run[at + 1] ?? Infinity;
    const last = before ? before[0] + grid.slot + grid.pause - 1 : Infinity;
    windows.push([step, Math.min(step + grid.slot - 1, next - 1, last)]);
  });
  return windows;
}
