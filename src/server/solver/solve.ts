import { PROVEN_WITHIN_UNITS, fitsTogether, planOf } from '../../domain/activity/plan/answer';
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
import { neighbourhood, openNeighbourhoods } from '../../domain/activity/plan/neighbourhood';
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
import type { PlanProblem, PlanResult } from '../../domain/activity/plan/types';
import { solveMip, solveRelaxation, type Highs } from './highs';
import { SoFar, type SolveControl } from './soFar';

/** Up to so many options the relaxation is solved before anything else is tried for long. */
const SMALL = 12_000;
/** Temperatures of annealing among what is still in question, units. */
const HEATS = [
  [3000, 20],
  [1500, 100],
  [800, 50],
] as const;
const PRICE_ROUNDS = 50;
/** Rounds of rows added to the relaxation. */
const CUT_ROUNDS = 30;
/** A hard stop only: the number of nodes ends a neighbourhood. */
const NEIGHBOURHOOD_S = 10;

/**
 * Plans in stages, the best plan and the best bound carried from one to the next: first fit, annealing, prices, the
 * linear relaxation, annealing and branch and bound among what is still in question. Without a time limit the answer
 * depends on the problem alone.
 */
export function solvePlan(highs: Highs, problem: PlanProblem, control: SolveControl): PlanResult {
  return new Solver(highs, problem, control).run();
}

class Solver {
  readonly #grid: PlanGrid;
  readonly #soFar: SoFar;
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
    const startMs = control.nowMs();
    this.#grid = layGrid(problem);
    this.#soFar = new SoFar(this.#grid, control, startMs);
    const all = Int32Array.from(this.#grid.optionWish, (_, option) => option);
    this.#inQuestion = { grid: this.#grid, options: all };
  }

  run(): PlanResult {
    const greedy = greedyBoard(this.#grid);
    this.#soFar.take(greedy.chosen, 'greedy');
    const first = planOf(this.#grid, this.#soFar.best, null);
    this.#stages();
    const plan = this.#soFar.plan();
    this.#soFar.report('done');
    return {
      plan,
      ending: this.#soFar.ending(plan),
      elapsedMs: this.#soFar.elapsedMs(),
      greedy: { placed: first.slots.length, worth: first.worth, objective: first.objective },
    };
  }

  #stages(): void {
    const options = this.#grid.optionWish.length;
    if (options === 0) {
      this.#soFar.lower(this.#soFar.value, 'bound');
      return;
    }
    this.#anneal(2000, 200, moves(options, 100_000) + 20 * options);
    this.#price(options > SMALL ? 1500 : 100);
    if (options > SMALL) {
      for (let round = 0; round < 4 && !this.#soFar.over(); round += 1) {
        this.#anneal(3000, 50, 120 * options);
      }
      this.#neighbours();
    }
    this.#relax();
    let idle = 0;
    for (let round = 0; round < 8 && idle < 3 && !this.#soFar.over(); round += 1) {
      this.#reduce();
      const before = this.#soFar.value;
      const left = this.#inQuestion.options.length;
      const [from, to] = HEATS[round % HEATS.length]!;
      this.#anneal(from, to, moves(left, 200_000) + 100 * left);
      idle = this.#soFar.value > before ? 0 : idle + 1;
    }
    this.#neighbours();
    this.#branch();
  }

  /** Solves the surroundings of each wish that is left out exactly, the rest as it stands. */
  #neighbours(): void {
    this.#reduce();
    const { grid } = this.#inQuestion;
    const around = openNeighbourhoods(grid, intoReduced(this.#inQuestion, this.#soFar.best));
    for (const free of around) {
      if (this.#soFar.over()) return;
      const chosen = intoReduced(this.#inQuestion, this.#soFar.best);
      const near = neighbourhood(grid, chosen, free);
      const board = new Board(near.grid);
      board.load(intoReduced(near, chosen));
      const model = planModel(near.grid);
      const { columns } = solveMip(this.highs, model, columnsOf(model, board), {
        timeLimitS: Math.min(this.#soFar.leftS(), NEIGHBOURHOOD_S),
        mostNodes: 20,
        within: 1,
        stop: () => this.#soFar.cut(),
        onSolution: () => undefined,
        onBound: () => undefined,
      });
      const found = columns && chosenOf(near.grid, columns);
      if (!found || !fitsTogether(near.grid, found)) continue;
      this.#soFar.take(outOfReduced(this.#inQuestion, outOfReduced(near, found)), 'search');
    }
  }

  #anneal(fromUnits: number, toUnits: number, moves: number): void {
    if (this.#soFar.over()) return;
    const { grid } = this.#inQuestion;
    const board = new Board(grid);
    board.load(intoReduced(this.#inQuestion, this.#soFar.best));
    anneal(board, { seed: this.#seed, fromUnits, toUnits, moves, stop: () => this.#soFar.cut() });
    this.#seed += 1;
    this.#soFar.take(outOfReduced(this.#inQuestion, board.chosen), 'search');
  }

  #price(rounds: number): void {
    const prices = new Prices(this.#inQuestion.grid);
    for (let done = 0; done < rounds && !this.#soFar.over(); done += PRICE_ROUNDS) {
      prices.improve(PRICE_ROUNDS, this.#soFar.value);
      this.#soFar.lower(prices.bound, 'bound');
    }
    this.#prove(prices.proof());
  }

  /** The linear relaxation, with rows added that it breaks and no plan does. */
  #relax(): void {
    if (this.#soFar.over()) return;
    this.#reduce();
    const { grid } = this.#inQuestion;
    const model = planModel(grid);
    const rows = model.rows.length;
    let rounds = 0;
    solveRelaxation(this.highs, model, {
      timeLimitS: this.#soFar.leftS(),
      stop: () => this.#soFar.cut(),
      onRound: (columns, duals) => {
        this.#prove(dualBound(model, duals));
        rounds += 1;
        return this.#soFar.over() || rounds > CUT_ROUNDS ? [] : oddCuts(grid, columns);
      },
    });
    this.#cuts = model.rows.slice(rows);
  }

  /** Takes a proof about the options in question. */
  #prove(proof: DualBound): void {
    if (!this.#proof || proof.bound < this.#proof.bound) this.#proof = proof;
    this.#soFar.lower(proof.bound, 'bound');
  }

  /** Leaves only options that could stand in a better plan, and those of the best one. */
  #reduce(): void {
    const proof = this.#proof;
    if (!proof) return;
    const slack = proof.bound - this.#soFar.value;
    const before = this.#inQuestion;
    const inside = new Set(intoReduced(before, this.#soFar.best));
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
    while (!this.#soFar.over()) {
      this.#reduce();
      const { grid } = this.#inQuestion;
      const model = planModel(grid);
      model.rows.push(...this.#cuts);
      const board = new Board(grid);
      board.load(intoReduced(this.#inQuestion, this.#soFar.best));
      const answer = solveMip(this.highs, model, columnsOf(model, board), {
        timeLimitS: this.#soFar.leftS(),
        within: (this.control.provenWithin ?? PROVEN_WITHIN_UNITS) / 2,
        stop: () => this.#soFar.cut(),
        onSolution: (columns) => {
          const chosen = chosenOf(grid, columns);
          if (chosen && fitsTogether(grid, chosen)) {
            this.#soFar.take(outOfReduced(this.#inQuestion, chosen), 'proof');
          }
        },
        onBound: (bound) => {
          this.#soFar.lower(bound, 'proof');
        },
      });
      this.#soFar.lower(answer.bound, 'proof');
      const chosen = answer.columns && chosenOf(grid, answer.columns);
      if (!chosen) return;
      if (fitsTogether(grid, chosen)) {
        this.#soFar.take(outOfReduced(this.#inQuestion, chosen), 'proof');
        return;
      }
      const more = restCuts(grid, chosen);
      if (more.length === 0 || !answer.proven) return;
      this.#cuts.push(...more);
    }
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
