import loadHighs, { type Highs, type HighsCallbackMap, type Model, type SparseMatrix } from 'highs';
import type { PlanModel, PlanRow } from '../../domain/activity/plan/model';

export { loadHighs, type Highs };

export interface HighsControl {
  timeLimitS: number;
  /** Asked at HiGHS' checkpoints. */
  stop: () => boolean;
}

export interface RelaxationControl extends HighsControl {
  /**
   * Gets values of the columns and duals of the rows (those added included) after each round; the rows that it returns
   * are added and the relaxation solved again.
   */
  onRound: (columns: Float64Array, duals: Float64Array) => readonly PlanRow[];
}

/** Solves the linear relaxation, again and again while rows are added; `model` gets them too. */
export function solveRelaxation(highs: Highs, model: PlanModel, control: RelaxationControl): void {
  highs.withModel((instance) => {
    pass(highs, instance, model, false);
    // Rows that others imply are left out already; presolve takes longer than it saves.
    instance.options.set({ presolve: 'off', solver: 'simplex', time_limit: control.timeLimitS });
    const { simplexInterrupt } = highs.constants.callbackType;
    for (;;) {
      const result = instance.run(interruptible(simplexInterrupt, control.stop));
      if (result.modelStatus !== highs.constants.modelStatus.optimal) return;
      const solution = instance.getSolution();
      const columns = Float64Array.from(solution.colValue);
      const duals = Float64Array.from(solution.rowDual);
      if (columns.length !== model.columns || duals.length !== model.rows.length) return;
      const rows = control.onRound(columns, duals);
      if (rows.length === 0) return;
      model.rows.push(...rows);
      instance.addRows({
        lower: Float64Array.from(rows, ({ upper, equal }) => (equal ? upper : -highs.infinity)),
        upper: Float64Array.from(rows, ({ upper }) => upper),
        matrix: byRow(rows, model.columns),
      });
    }
  });
}

export interface MipAnswer {
  /** Best columns found, rounded; null: none. */
  columns: Float64Array | null;
  /** No better plan than this can be, as HiGHS proved it. */
  bound: number;
  proven: boolean;
}

export interface MipControl extends HighsControl {
  /** Ends when no more than this is between the best plan and the bound. */
  within: number;
  onSolution: (columns: Float64Array) => void;
  onBound: (bound: number) => void;
}

/**
 * Branch and bound from a plan that is known. Objective values that HiGHS reports are not used: every plan is counted
 * anew by whoever takes its columns.
 */
export function solveMip(
  highs: Highs,
  model: PlanModel,
  start: Float64Array,
  control: MipControl,
): MipAnswer {
  return highs.withModel((instance): MipAnswer => {
    pass(highs, instance, model, true);
    instance.options.set({
      mip_rel_gap: 0,
      mip_abs_gap: control.within,
      time_limit: control.timeLimitS,
    });
    instance.setSolution({ colValue: start });
    const types = highs.constants.callbackType;
    const result = instance.run({
      ...interruptible(types.mipInterrupt, control.stop, control.onBound),
      [types.mipImprovingSolution](event) {
        const columns = event.data.mip_solution;
        if (columns?.length === model.columns) control.onSolution(rounded(columns));
        return undefined;
      },
    });
    const { colValue } = instance.getSolution();
    const whole = colValue.length === model.columns;
    return {
      columns: whole ? rounded(Float64Array.from(colValue)) : null,
      bound: Number(instance.info.get('mip_dual_bound')),
      proven: result.modelStatus === highs.constants.modelStatus.optimal,
    };
  });
}

function interruptible(
  type: 1 | 6,
  stop: () => boolean,
  onBound?: (bound: number) => void,
): HighsCallbackMap {
  return {
    [type](event: {
      data: { readonly mip_dual_bound?: number };
      interrupt: () => void;
    }): undefined {
      const bound = event.data.mip_dual_bound;
      if (bound !== undefined) onBound?.(bound);
      if (stop()) event.interrupt();
      return undefined;
    },
  };
}

function pass(highs: Highs, instance: Model, model: PlanModel, whole: boolean): void {
  const { options, columns, rows } = model;
  instance.options.set({ output_flag: false, random_seed: 1 });
  instance.passModel({
    numCols: columns,
    numRows: rows.length,
    sense: highs.constants.objectiveSense.maximize,
    colCost: model.cost,
    colLower: model.lower,
    colUpper: new Float64Array(columns).fill(1),
    rowLower: rows.map(({ upper, equal }) => (equal ? upper : -highs.infinity)),
    rowUpper: rows.map(({ upper }) => upper),
    matrix: byRow(rows, columns),
    ...(whole ? { integrality: new Int32Array(columns).fill(1, 0, options) } : {}),
  });
  const { numCols } = instance.getDimensions();
  if (numCols !== columns) {
    throw new Error(`The model has ${columns} columns, but HiGHS took ${numCols}.`);
  }
}

function byRow(rows: readonly PlanRow[], columns: number): SparseMatrix {
  const starts = [0];
  const indices: number[] = [];
  const values: number[] = [];
  for (const row of rows) {
    row.columns.forEach((column, at) => {
      indices.push(column);
      values.push(row.signs?.[at] ?? 1);
    });
    starts.push(indices.length);
  }
  return {
    format: 'csr',
    numRows: rows.length,
    numCols: columns,
    starts: Int32Array.from(starts),
    indices: Int32Array.from(indices),
    values: Float64Array.from(values),
  };
}

function rounded(columns: Float64Array): Float64Array {
  return columns.map(Math.round);
}
