import { fitsTogether, gapOf, planOf } from '../../domain/activity/plan/answer';
import { Board } from '../../domain/activity/plan/board';
import type { PlanGrid } from '../../domain/activity/plan/grid';
import type { Plan, PlanPhase, PlanProgress, PlanResult } from '../../domain/activity/plan/types';

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

/** The best plan and the best bound of a run, and whether it goes on. */
export class SoFar {
  readonly #startMs: number;
  #best: Int32Array;
  #value = -Infinity;
  #bound = Infinity;

  constructor(
    readonly grid: PlanGrid,
    readonly control: SolveControl,
    startMs: number,
  ) {
    this.#startMs = startMs;
    this.#best = new Int32Array(grid.wishes).fill(-1);
  }

  /** Option of each wish in the best plan. */
  get best(): Int32Array {
    return this.#best;
  }

  /** Of the best plan, units. */
  get value(): number {
    return this.#value;
  }

  /** Takes a plan where it is better and breaks no rule, which is asked here whoever made it. */
  take(chosen: Int32Array, phase: PlanPhase): void {
    const board = new Board(this.grid);
    for (const option of chosen) if (option >= 0) board.place(option);
    if (board.value > this.#value && fitsTogether(this.grid, chosen)) {
      this.#value = board.value;
      this.#best = chosen;
    }
    this.report(phase);
  }

  /** A bound on plans better than the best: with nothing better there is the best itself. */
  lower(bound: number, phase: PlanPhase): void {
    const safe = Math.max(bound * (1 + 1e-9), this.#value);
    if (safe >= this.#bound) return;
    this.#bound = safe;
    this.report(phase);
  }

  plan(): Plan {
    const bound = Number.isFinite(this.#bound) ? this.#bound : null;
    return planOf(this.grid, this.#best, bound, this.control.provenWithin);
  }

  report(phase: PlanPhase): void {
    const plan = this.plan();
    this.control.onProgress(
      {
        phase,
        placed: plan.slots.length,
        worth: plan.worth,
        objective: plan.objective,
        bound: plan.bound,
        gap: plan.gap,
        elapsedMs: this.elapsedMs(),
      },
      () => plan,
    );
  }

  ending(plan: Plan): PlanResult['ending'] {
    if (plan.gap === 0) return 'proven';
    if (plan.gap !== null && plan.gap <= this.control.gapGoal) return 'withinGap';
    return this.control.stop() ? 'stopped' : 'timeLimit';
  }

  /** Told to stop, or out of time. */
  cut(): boolean {
    return this.control.stop() || this.leftS() <= 0;
  }

  /** Cut, or good enough. */
  over(): boolean {
    const { gapGoal, provenWithin } = this.control;
    return this.cut() || gapOf(this.#value, this.#bound, provenWithin) <= gapGoal;
  }

  elapsedMs(): number {
    return this.control.nowMs() - this.#startMs;
  }

  leftS(): number {
    return this.control.timeLimitS - this.elapsedMs() / 1000;
  }
}
