import { Worker } from 'node:worker_threads';
import { PlanProblemError } from '../../domain/activity/plan/grid';
import type { Plan, PlanProblem, PlanProgress, PlanResult } from '../../domain/activity/plan/types';
import type { ThreadData, ThreadMessage } from './messages';

export interface PlanRunOptions {
  onProgress?: (progress: PlanProgress) => void;
  /** Default 60. */
  timeLimitS?: number;
  /** The run ends once (bound − objective) / bound is no greater. Default 0: goes on until proven best. */
  gapGoal?: number;
  /** How long after a stop or the time limit the thread may take to end by itself. Default 15. */
  graceS?: number;
}

export interface PlanRun {
  /** Ends the run soon; `done` then gives the best plan so far. */
  stop: () => void;
  /** Rejects with PlanProblemError for a problem that no plan fits, with PlanRunFailed when the thread dies. */
  done: Promise<PlanResult>;
}

/** The solver's thread ended without an answer. The next run is not affected. */
export class PlanRunFailed extends Error {
  constructor(
    reason: string,
    /** Best plan that was known by then. */
    readonly best: Plan | null,
    options?: ErrorOptions,
  ) {
    super(`The planning run failed: ${reason}`, options);
    this.name = 'PlanRunFailed';
  }
}

const STARTING_S = 15;

/**
 * Solves a problem in a thread of its own, which HiGHS blocks. The thread is ended by force where neither a stop nor
 * the time limit ends it in time; the best plan that it told of is kept.
 */
export function startPlanRun(problem: PlanProblem, options: PlanRunOptions = {}): PlanRun {
  const { timeLimitS = 60, gapGoal = 0, graceS = 15, onProgress } = options;
  const stopFlag = new SharedArrayBuffer(4);
  const workerData: ThreadData = { problem, timeLimitS, gapGoal, stopFlag };
  const thread = new Worker(new URL('./thread.mjs', import.meta.url), { workerData, execArgv: [] });
  let stopped = false;
  let hardStop: NodeJS.Timeout | undefined;
  const known = new KnownSoFar();
  const endSoon = () => {
    Atomics.store(new Int32Array(stopFlag), 0, 1);
    hardStop ??= setTimeout(() => void thread.terminate(), graceS * 1000);
  };
  const limit = setTimeout(endSoon, (timeLimitS + STARTING_S) * 1000);

  const done = new Promise<PlanResult>((resolve, reject) => {
    thread.on('message', (message: ThreadMessage) => {
      if (message.kind === 'progress') {
        known.take(message.progress, message.plan);
        onProgress?.(message.progress);
      } else if (message.kind === 'done') resolve(message.result);
      else reject(new PlanProblemError(message.sentences));
    });
    thread.on('error', (error) => {
      reject(new PlanRunFailed(error.message, known.plan, { cause: error }));
    });
    thread.on('exit', () => {
      const result = hardStop === undefined ? null : known.result(stopped);
      if (result) resolve(result);
      else reject(new PlanRunFailed('its thread ended without an answer.', known.plan));
    });
  }).finally(() => {
    clearTimeout(hardStop);
    clearTimeout(limit);
    void thread.terminate();
  });

  const stop = () => {
    stopped = true;
    endSoon();
  };
  return { stop, done };
}

/** What a thread has told of until now. */
class KnownSoFar {
  plan: Plan | null = null;
  #first: PlanProgress | null = null;
  #last: PlanProgress | null = null;

  take(progress: PlanProgress, plan: Plan | null): void {
    this.#first ??= progress;
    this.#last = progress;
    if (plan) this.plan = plan;
  }

  result(stopped: boolean): PlanResult | null {
    const { plan } = this;
    if (!plan || !this.#first || !this.#last) return null;
    const { placed, worth, objective } = this.#first;
    return {
      plan: { ...plan, bound: this.#last.bound, gap: this.#last.gap },
      ending: stopped ? 'stopped' : 'timeLimit',
      elapsedMs: this.#last.elapsedMs,
      greedy: { placed, worth, objective },
    };
  }
}
