import {
  PROVEN_WITHIN_UNITS,
  fitsTogether,
  gapOf,
  planOf,
} from '../../domain/activity/plan/answer';
import { Board } from '../../domain/activity/plan/board';
import { greedyBoard } from '../../domain/activity/plan/greedy';
import { layGrid, type PlanGrid } from '../../domain/activity/plan/grid';
import {
  columnsOf,
  dualBound,
  planModel,
  type DualBound,
  type PlanRow,
} from '../../domain/activity/plan/model';
import { oddCuts } from '../../domain/activity/plan/oddCuts';
import { Prices } from '../../domain/activity/plan/prices';
import {
  intoReduced,
  outOfReduced,
  reduceGrid,
  type ReducedGrid,
} from '../../domain/activity/plan/reduce';
import { restCuts } from '../../domain/activity/plan/restCuts';
import { anneal } from '../../domain/activity/plan/search';
import type {
  Plan,
  PlanPhase,
  PlanProblem,
  PlanProgress,
  PlanResult,
} from '../../domain/activity/plan/types';
import { solveMip, solveRelaxation, type Highs } from './highs';

export interface SolveControl {
  /** Milliseconds on any clock that only goes forward. */
  nowMs: () => number;
  stop: () => boolean;
  onProgress: (progress: PlanProgress, plan: () => Plan) => void;
  timeLimitS: number;
  /** Ends once the gap is no greater. */
  gapGoal: number;
  /** Units within which a plan counts as proven; absent: PROVEN_WITHIN_UNITS. */
  provenWithin?: number;
}

/** Up to so many options the relaxation is solved before anything else is tried for long. */
const SMALL = 12_000;
/** Temperatures of annealing among what is still in question, units. */
const HEATS = [
  [3000, 20],
  [1500, 100],
  [800, 50],
] as const;
const PRICE_ROUNDS = 50;
const CUT_ROUNDS = 30;

/**
 * Plans in stages, the best plan and the best bound carried from one to the next: first fit, annealing, prices, the
 * linear relaxation, annealing and branch and bound among what is still in question. Without a time limit the answer
 * depends on the problem alone.
 */
export function solvePlan(highs: Highs, problem: PlanProblem, control: SolveControl): PlanResult {
  return new Solver(highs, problem, control).run();
}

class Solver {
  readonly #startMs: number;
  readonly #grid: PlanGrid;
  #best: Int32Array;
  #value = -Infinity;
  #bound = Infinity;
  #inQuestion: ReducedGrid;
  /** About the options in question. */
  #proof: DualBound | null = null;
  /** Rows for the options in question that are not the model's own. */
  #cuts: PlanRow[] = [];
  #seed = 1;

  constructor(
    readonly highs: Highs,
    problem: PlanProblem,
    readonly control: SolveControl,
  ) {
    this.#startMs = control.nowMs();
    this.#grid = layGrid(problem);
    this.#best = new Int32Array(this.#grid.wishes).fill(-1);
    const all = Int32Array.from(this.#grid.optionWish, (_, option) => option);
    this.#inQuestion = { grid: this.#grid, options: all };
  }

  run(): PlanResult {
    const greedy = greedyBoard(this.#grid);
    this.#take(greedy.chosen, 'greedy');
    const first = planOf(this.#grid, this.#best, null);
    this.#stages();
    const plan = this.#plan();
    this.#report('done');
    return {
      plan,
      ending: this.#ending(plan),
      elapsedMs: this.#elapsedMs(),
      greedy: { placed: first.slots.length, worth: first.worth, objective: first.objective },
    };
  }

  #stages(): void {
    const options = this.#grid.optionWish.length;
    if (options === 0) {
      this.#lower(this.#value, 'bound');
      return;
    }
    this.#anneal(2000, 200, moves(options, 100_000) + 20 * options);
    if (options > SMALL) {
      this.#price(1500);
      for (let round = 0; round < 4 && !this.#over(); round += 1) {
        this.#anneal(3000, 50, 120 * options);
      }
    }
    this.#relax();
    let idle = 0;
    for (let round = 0; round < 8 && idle < 3 && !this.#over(); round += 1) {
      this.#reduce();
      const before = this.#value;
      const left = this.#inQuestion.options.length;
      const [from, to] = HEATS[round % HEATS.length]!;
      this.#anneal(from, to, moves(left, 200_000) + 100 * left);
      idle = this.#value > before ? 0 : idle + 1;
    }
    this.#branch();
  }

  #anneal(fromUnits: number, toUnits: number, moves: number): void {
    if (this.#over()) return;
    const { grid } = this.#inQuestion;
    const board = new Board(grid);
    board.load(intoReduced(this.#inQuestion, this.#best));
    anneal(board, { seed: this.#seed, fromUnits, toUnits, moves, stop: () => this.#cut() });
    this.#seed += 1;
    this.#take(outOfReduced(this.#inQuestion, board.chosen), 'search');
  }

  #price(rounds: number): void {
    const prices = new Prices(this.#inQuestion.grid);
    for (let done = 0; done < rounds && !this.#over(); done += PRICE_ROUNDS) {
      prices.improve(PRICE_ROUNDS, this.#value);
      this.#lower(prices.bound, 'bound');
    }
    this.#prove(prices.proof());
  }

  /** The linear relaxation, with rows added that it breaks and no plan does. */
  #relax(): void {
    if (this.#over()) return;
    this.#reduce();
    const { grid } = this.#inQuestion;
    const model = planModel(grid);
    const rows = model.rows.length;
    let rounds = 0;
    solveRelaxation(this.highs, model, {
      timeLimitS: this.#leftS(),
      stop: () => this.#cut(),
      onRound: (columns, duals) => {
        this.#prove(dualBound(model, duals));
        rounds += 1;
        return this.#over() || rounds > CUT_ROUNDS ? [] : oddCuts(grid, columns);
      },
    });
    this.#cuts = model.rows.slice(rows);
  }

  /** Takes a proof about the options in question. */
  #prove(proof: DualBound): void {
    if (!this.#proof || proof.bound < this.#proof.bound) this.#proof = proof;
    this.#lower(proof.bound, 'bound');
  }

  /** Leaves only options that could stand in a better plan, and those of the best one. */
  #reduce(): void {
    const proof = this.#proof;
    if (!proof) return;
    const slack = proof.bound - this.#value;
    const before = this.#inQuestion;
    const inside = new Set(intoReduced(before, this.#best));
    const places = Int32Array.from(before.options, (_, place) => place).filter(
      (place) => proof.loss[place]! <= slack || inside.has(place),
    );
    if (places.length === before.options.length) return;
    this.#inQuestion = reduceGrid(
      this.#grid,
      places.map((place) => before.options[place]!),
    );
    this.#proof = { bound: proof.bound, loss: Float64Array.from(places, (p) => proof.loss[p]!) };
    const placeOf = new Map([...places].map((place, at) => [place, at]));
    this.#cuts = this.#cuts.map((row) => ({
      ...row,
      columns: row.columns.flatMap((column) => placeOf.get(column) ?? []),
    }));
  }

  /** Branch and bound; runs that are too long for a pause are cut off as they appear. */
  #branch(): void {
    while (!this.#over()) {
      this.#reduce();
      const { grid } = this.#inQuestion;
      const model = planModel(grid);
      model.rows.push(...this.#cuts);
      const board = new Board(grid);
      board.load(intoReduced(this.#inQuestion, this.#best));
      const answer = solveMip(this.highs, model, columnsOf(model, board), {
        timeLimitS: this.#leftS(),
        within: (this.control.provenWithin ?? PROVEN_WITHIN_UNITS) / 2,
        stop: () => this.#cut(),
        onSolution: (columns) => {
          const chosen = chosenOf(grid, columns);
          if (chosen && fitsTogether(grid, chosen)) {
            this.#take(outOfReduced(this.#inQuestion, chosen), 'proof');
          }
        },
        onBound: (bound) => {
          this.#lower(bound, 'proof');
        },
      });
      this.#lower(answer.bound, 'proof');
      const chosen = answer.columns && chosenOf(grid, answer.columns);
      if (!chosen) return;
      if (fitsTogether(grid, chosen)) {
        this.#take(outOfReduced(this.#inQuestion, chosen), 'proof');
        return;
      }
      const more = restCuts(grid, chosen);
      if (more.length === 0 || !answer.proven) return;
      this.#cuts.push(...more);
    }
  }

  #take(chosen: Int32Array, phase: PlanPhase): void {
    const board = new Board(this.#grid);
    for (const option of chosen) if (option >= 0) board.place(option);
    if (board.value > this.#value) {
      this.#value = board.value;
      this.#best = chosen;
    }
    this.#report(phase);
  }

  /** A bound on plans better than the best: with nothing better there is the best itself. */
  #lower(bound: number, phase: PlanPhase): void {
    const safe = Math.max(bound * (1 + 1e-9), this.#value);
    if (safe >= this.#bound) return;
    this.#bound = safe;
    this.#report(phase);
  }

  #plan(): Plan {
    const bound = Number.isFinite(this.#bound) ? this.#bound : null;
    return planOf(this.#grid, this.#best, bound, this.control.provenWithin);
  }

  #report(phase: PlanPhase): void {
    const plan = this.#plan();
    this.control.onProgress(
      {
        phase,
        placed: plan.slots.length,
        worth: plan.worth,
        objective: plan.objective,
        bound: plan.bound,
        gap: plan.gap,
        elapsedMs: this.#elapsedMs(),
      },
      () => plan,
    );
  }

  #ending(plan: Plan): PlanResult['ending'] {
    if (plan.gap === 0) return 'proven';
    if (plan.gap !== null && plan.gap <= this.control.gapGoal) return 'withinGap';
    return this.control.stop() ? 'stopped' : 'timeLimit';
  }

  #cut(): boolean {
    return this.control.stop() || this.#leftS() <= 0;
  }

  #over(): boolean {
    return (
      this.#cut() ||
      gapOf(this.#value, this.#bound, this.control.provenWithin) <= this.control.gapGoal
    );
  }

  #elapsedMs(): number {
    return this.control.nowMs() - this.#startMs;
  }

  #leftS(): number {
    return this.control.timeLimitS - this.#elapsedMs() / 1000;
  }
}

/** So many, but fewer for a handful of options. */
function moves(options: number, most: number): number {
  return Math.min(most, 500 * options);
}

/** Options of the wishes from the values of the columns; null where a wish would have two. */
function chosenOf(grid: PlanGrid, columns: Float64Array): Int32Array | null {
  const chosen = new Int32Array(grid.wishes).fill(-1);
  for (let option = 0; option < grid.optionWish.length; option += 1) {
    if (columns[option] !== 1) continue;
    const wish = grid.optionWish[option]!;
    if (chosen[wish]! >= 0) return null;
    chosen[wish] = option;
  }
  return chosen;
}
