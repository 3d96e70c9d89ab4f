import type { Board } from './board';
import { rowFamilies } from './families';
import type { PlanGrid } from './grid';

/** Of these columns, each with its sign, the sum is at most `upper`, or exactly that. */
export interface PlanRow {
  columns: number[];
  /** null: all +1. */
  signs: number[] | null;
  upper: number;
  equal: boolean;
}

/**
 * The plan as a linear program, to be maximised, all columns from 0 to 1. The first are the grid's options, whole
 * numbers; then follows for every station one column per contact with what that contact adds (`PlanGrid.gain`; it
 * falls from one contact to the next, so they need not be whole).
 */
export interface PlanModel {
  options: number;
  columns: number;
  cost: Float64Array;
  /** 1 for a pinned option, else 0. */
  lower: Float64Array;
  rows: PlanRow[];
  /** First gain column of each station, and the end. */
  gainFirsts: Int32Array;
}

/** One row for each wish, the rows of all families that are not held by another, and what a station's contacts add. */
export function planModel(grid: PlanGrid): PlanModel {
  const rows: PlanRow[] = [];
  for (let wish = 0; wish < grid.wishes; wish += 1) {
    const from = grid.firsts[wish]!;
    const count = grid.firsts[wish + 1]! - from;
    if (count > 1)
      rows.push(
        atMost(
          1,
          Array.from({ length: count }, (_, at) => from + at),
        ),
      );
  }
  const cost = [...grid.optionValue];
  const gainFirsts = new Int32Array(grid.stations + 1);
  optionsByStation(grid).forEach((own, station) => {
    rows.push(...stationRows(grid, own));
    gainFirsts[station] = cost.length;
    const columns = [...own];
    const signs = own.map(() => 1);
    for (let n = 1; n <= grid.most[station]!; n += 1) {
      columns.push(cost.length);
      signs.push(-1);
      cost.push(grid.gain[n]! - grid.gain[n - 1]!);
    }
    if (own.length > 0) rows.push({ columns, signs, upper: 0, equal: true });
  });
  gainFirsts[grid.stations] = cost.length;
  const lower = new Float64Array(cost.length);
  for (const option of grid.pinned) if (option >= 0) lower[option] = 1;
  return {
    options: grid.optionWish.length,
    columns: cost.length,
    cost: Float64Array.from(cost),
    lower,
    rows,
    gainFirsts,
  };
}

export function atMost(upper: number, columns: number[]): PlanRow {
  return { columns, signs: null, upper, equal: false };
}

/** Options at each station, by step. */
export function optionsByStation(grid: PlanGrid): number[][] {
  const own: number[][] = Array.from({ length: grid.stations }, () => []);
  grid.optionWish.forEach((wish, option) => {
    own[grid.wishA[wish]!]!.push(option);
    own[grid.wishB[wish]!]!.push(option);
  });
  for (const options of own) {
    options.sort((one, other) => grid.optionStep[one]! - grid.optionStep[other]!);
  }
  return own;
}

function stationRows(grid: PlanGrid, own: readonly number[]): PlanRow[] {
  return rowFamilies(grid).flatMap(({ offsets, length, capacity }) => {
    // The row at p holds an option from p = step − offset − length + 1 to p = step − offset.
    const byStep = new Map<number, number[]>();
    for (const option of own) {
      const last = grid.optionStep[option]! - offsets[grid.optionBand[option]!]!;
      for (let p = last - length + 1; p <= last; p += 1) {
        const row = byStep.get(p);
        if (row) row.push(option);
        else byStep.set(p, [option]);
      }
    }
    const rows = [...byStep].sort(([one], [other]) => one - other).map(([, columns]) => columns);
    return rows
      .filter((columns, at) => {
        if (columns.length <= capacity) return false;
        const before = rows[at - 1];
        const after = rows[at + 1];
        if (before && before.length > columns.length && within(columns, before)) return false;
        return !(after && within(columns, after));
      })
      .map((columns) => atMost(capacity, columns));
  });
}

function within(few: readonly number[], many: readonly number[]): boolean {
  if (few.length > many.length) return false;
  const held = new Set(many);
  return few.every((column) => held.has(column));
}

/** The columns' values for a board. */
export function columnsOf(model: PlanModel, board: Board): Float64Array {
  const values = new Float64Array(model.columns);
  for (const option of board.chosen) if (option >= 0) values[option] = 1;
  for (let station = 0; station < board.grid.stations; station += 1) {
    const first = model.gainFirsts[station]!;
    for (let n = 0; n < board.count[station]!; n += 1) values[first + n] = 1;
  }
  return values;
}

/** What prices of the rows prove: no plan is worth more than `bound`, and one with an option by its `loss` less. */
export interface DualBound {
  bound: number;
  loss: Float64Array;
}

/**
 * Counts the bound that duals of the rows give, with our own sums, so that nothing rests on the tolerances of whoever
 * found them: for any prices, of no less than 0 where a row is not exact, plans are bounded by what the rows cost and
 * what each column is worth above its price.
 */
export function dualBound(model: PlanModel, duals: Float64Array): DualBound {
  const net = model.cost.slice();
  let bound = 0;
  model.rows.forEach(({ columns, signs, upper, equal }, row) => {
    const price = equal ? duals[row]! : Math.max(duals[row]!, 0);
    if (price === 0) return;
    bound += price * upper;
    columns.forEach((column, at) => {
      net[column] = net[column]! - (signs?.[at] ?? 1) * price;
    });
  });
  const loss = new Float64Array(model.options);
  for (let column = 0; column < model.columns; column += 1) {
    const value = net[column]!;
    bound += model.lower[column] === 1 ? value : Math.max(value, 0);
    if (column < model.options) loss[column] = Math.max(-value, 0);
  }
  return { bound, loss };
}
