import { Board } from './board';
import type { PlanGrid } from './grid';

/** First fit: the options in order of their worth, the earlier first among equals, each put down where it still fits. */
export function greedyBoard(grid: PlanGrid): Board {
  const board = new Board(grid);
  board.pin();
  const order = Int32Array.from(grid.optionWish, (_, option) => option);
  order.sort(
    (one, other) =>
      grid.optionValue[other]! - grid.optionValue[one]! ||
      grid.optionStep[one]! - grid.optionStep[other]! ||
      one - other,
  );
  for (const option of order) {
    if (board.chosen[grid.optionWish[option]!]! < 0 && board.fits(option)) board.place(option);
  }
  return board;
}
