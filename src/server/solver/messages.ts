import type { Plan, PlanProblem, PlanProgress, PlanResult } from '../../domain/activity/plan/types';

/** What a solver thread is started with. */
export interface ThreadData {
  problem: PlanProblem;
  timeLimitS: number;
  gapGoal: number;
  /** One 32-bit word; 1: stop. Read even while HiGHS blocks the thread. */
  stopFlag: SharedArrayBuffer;
}

export type ThreadMessage =
  /** `plan` where it is better than the one before. */
  | { kind: 'progress'; progress: PlanProgress; plan: Plan | null }
  | { kind: 'done'; result: PlanResult }
  /** The problem itself is wrong. */
  | { kind: 'refused'; sentences: string[] };
