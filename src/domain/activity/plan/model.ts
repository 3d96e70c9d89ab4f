import type { Board } from './board';
import type { PlanGrid } from './grid';
import type { Prices } from './prices';
import type { RestCut } from './restCuts';

/**
 * The plan as a linear program over 0 and 1. Columns v0 … are the options, then for every
 * station one column per contact with what that contact adds (`PlanGrid.gain`; falling, so they need not be whole).
 * Maximise; rows have no lower side but `equal` ones. Entries by column (CSC).
 */
export interface PlanModel {
  /** How many of the columns, the first ones, are options. */
  options: number;
  columns: number;
  rows: number;
  cost: Float64Array;
  /** Lowest value of a column: 1 for a pinned option, else 0. The greatest is 1. */
  lower: Float64Array;
  rowUpper: Float64Array;
  /** Of rows that are exactly their upper side: 1. */
  equal: Uint8Array;
  starts: Int32Array;
  indices: Int32Array;
  values: Float64Array;
  /** Where the price of each row stands in `Prices`; −1: nowhere. */
  prices: Int32Array;
  /** First gain column of each station, and the end. */
  gainFirsts: Int32Array;
}

export function planModel(
  grid: PlanGrid,
  prices: Prices,
  cuts: readonly RestCut[] = [],
): PlanModel {
  const list = new RowList();
  for (let wish = 0; wish < grid.wishes; wish += 1) {
    const from = grid.firsts[wish]!;
    const count = grid.firsts[wish + 1]! - from;
    list.atMost(
      Array.from({ length: count }, (_, at) => from + at),
      1,
    );
  }
  const own = optionsByStation(grid);
  for (let station = 0; station < grid.stations; station += 1) {
    stationRows(grid, station, own[station]!, prices, list);
  }
  for (const cut of cuts) {
    list.atMost(cut.options, cut.capacity);
  }
  return finish(grid, own, prices, list);
}

class RowList {
  readonly columns: number[][] = [];
  readonly signs: (number[] | null)[] = [];
  readonly upper: number[] = [];
  readonly equal: number[] = [];
  readonly prices: number[] = [];

  /** Rows that cannot be broken are left out. */
  atMost(columns: readonly number[], capacity: number, price = -1): void {
    if (columns.length <= capacity) return;
    this.columns.push([...columns]);
    this.signs.push(null);
    this.upper.push(capacity);
    this.equal.push(0);
    this.prices.push(price);
  }

  exactly(columns: readonly number[], signs: readonly number[], price: number): void {
    this.columns.push([...columns]);
    this.signs.push([...signs]);
    this.upper.push(0);
    this.equal.push(1);
    this.prices.push(price);
  }
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

function stationRows(
  grid: PlanGrid,
  station: number,
  own: readonly number[],
  prices: Prices,
  list: RowList,
): void {
  prices.families.forEach(({ offsets, length, capacity }, family) => {
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
    const rows = [...byStep].sort(([one], [other]) => one - other);
    rows.forEach(([p, columns], at) => {
      const before = rows[at - 1]?.[1];
      const after = rows[at + 1]?.[1];
      if (before && within(columns, before) && before.length > columns.length) return;
      if (after && within(columns, after)) return;
      list.atMost(columns, capacity, prices.rowAt(family, station, p));
    });
  });
}

function within(few: readonly number[], many: readonly number[]): boolean {
  if (few.length > many.length) return false;
  const held = new Set(many);
  return few.every((column) => held.has(column));
}

function finish(
  grid: PlanGrid,
  own: readonly (readonly number[])[],
  prices: Prices,
  list: RowList,
): PlanModel {
  const cost: number[] = [...grid.optionValue];
  const lower: number[] = Array.from(grid.optionWish, (wish, option) =>
    grid.pinned[wish] === option ? 1 : 0,
  );
  const gainFirsts = new Int32Array(grid.stations + 1);
  for (let station = 0; station < grid.stations; station += 1) {
    gainFirsts[station] = cost.length;
    const wishes = new Set(own[station]!.map((option) => grid.optionWish[option]!));
    const most = Math.min(grid.most[station]!, wishes.size);
    const columns = [...own[station]!];
    const signs = columns.map(() => 1);
    for (let n = 1; n <= most; n += 1) {
      columns.push(cost.length);
      signs.push(-1);
      cost.push(grid.gain[n]! - grid.gain[n - 1]!);
      lower.push(0);
    }
    if (columns.length > 0) list.exactly(columns, signs, prices.contactAt(station));
  }
  gainFirsts[grid.stations] = cost.length;
  return {
    options: grid.optionWish.length,
    columns: cost.length,
    rows: list.columns.length,
    cost: Float64Array.from(cost),
    lower: Float64Array.from(lower),
    rowUpper: Float64Array.from(list.upper),
    equal: Uint8Array.from(list.equal),
    prices: Int32Array.from(list.prices),
    gainFirsts,
    ...byColumn(cost.length, list),
  };
}

function byColumn(
  columns: number,
  { columns: rows, signs }: RowList,
): Pick<PlanModel, 'starts' | 'indices' | 'values'> {
  const starts = new Int32Array(columns + 1);
  for (const row of rows) for (const column of row) starts[column + 1] = starts[column + 1]! + 1;
  for (let column = 0; column < columns; column += 1) {
    starts[column + 1] = starts[column + 1]! + starts[column]!;
  }
  const next = starts.slice();
  const indices = new Int32Array(starts[columns]!);
  const values = new Float64Array(starts[columns]!);
  rows.forEach((row, index) => {
    row.forEach((column, at) => {
      const place = next[column]!;
      next[column] = place + 1;
      indices[place] = index;
      values[place] = signs[index]?.[at] ?? 1;
    });
  });
  return { starts, indices, values };
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
