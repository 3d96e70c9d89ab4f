import type { RevisionSlot } from './revision';
import type { PlanInput } from './plan/input';
import type { PlanProblem, PlanProgress, PlanSlot, PlanWeights } from './plan/types';

/** What is kept of a run, so that it can be replayed: all that its plan depends on. */
export interface SavedRun {
  input: PlanInput;
  pinned: PlanSlot[];
  keep: PlanSlot[];
  /** Slots that have begun, of pairs whose wish is no longer there: they stay in the plan as they are. */
  begun: RevisionSlot[];
  weights: PlanWeights;
  /** What follows from it; null until the run has begun. */
  problem: PlanProblem | null;
}

export type RunState = 'queued' | 'running' | 'done' | 'stopped' | 'failed';

/** A run as the coordinator sees it. */
export interface RunView {
  id: string;
  state: RunState;
  askedMs: number;
  endedMs: number | null;
  stopping: boolean;
  progress: PlanProgress | null;
  /** Why it failed, for people. */
  error: string | null;
  wishes: number;
}
