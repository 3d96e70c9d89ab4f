import { parentPort, workerData } from 'node:worker_threads';
import { PlanProblemError } from '../../domain/activity/plan/grid';
import { loadHighs } from './highs';
import type { ThreadData, ThreadMessage } from './messages';
import { solvePlan } from './solve';

/** Entry of a solver thread: one problem, then it ends. Whatever is thrown ends it with an error. */
const { problem, timeLimitS, gapGoal, stopFlag } = workerData as ThreadData;
const stop = new Int32Array(stopFlag);
const post = (message: ThreadMessage) => {
  parentPort!.postMessage(message);
};

let posted = -Infinity;
try {
  const result = solvePlan(await loadHighs(), problem, {
    nowMs: () => performance.now(),
    stop: () => Atomics.load(stop, 0) === 1,
    timeLimitS,
    gapGoal,
    onProgress: (progress, plan) => {
      const better = progress.objective > posted;
      posted = Math.max(posted, progress.objective);
      post({ kind: 'progress', progress, plan: better ? plan() : null });
    },
  });
  post({ kind: 'done', result });
} catch (error) {
  if (!(error instanceof PlanProblemError)) throw error;
  post({ kind: 'refused', sentences: [...error.sentences] });
}
