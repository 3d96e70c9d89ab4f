import { formatNumber } from '../time/format';
import type { PlanPhase, PlanProgress } from './plan/types';
import type { RunState, RunView } from './run';

/** A gap that is shown as 0.0 %. */
const PROVEN_GAP = 0.0005;

const PHASE_WORDS: Record<PlanPhase, string> = {
  greedy: 'a first plan, wish by wish',
  search: 'moving and swapping slots',
  bound: 'asking how good any plan can be',
  proof: 'proving that no plan is better',
  done: 'finished',
};

/** Whether a run is still under way. */
export function isOpen({ state }: { state: RunState }): boolean {
  return state === 'queued' || state === 'running';
}

/** What a run is doing or how it ended, as a sentence. */
export function runSentence(run: RunView): string {
  switch (run.state) {
    case 'queued':
      return 'The plan waits for its turn. It begins within seconds.';
    case 'running':
      if (run.stopping) return 'Stopping. The best plan so far is kept.';
      return run.progress ? `Computing: ${PHASE_WORDS[run.progress.phase]}.` : 'Computing.';
    case 'failed':
      return `No plan came of it. ${run.error ?? ''}`.trim();
    case 'stopped':
      return run.progress
        ? 'Stopped. The best plan until then is the draft.'
        : 'Stopped before there was a plan.';
    case 'done':
      return (run.progress?.gap ?? 1) < PROVEN_GAP
        ? 'Done. No plan is worth more than this draft.'
        : 'Done. The best plan that was found is the draft.';
  }
}

/** "1.4 %"; a bound that is met is 0. */
export function gapText(gap: number | null): string {
  return gap === null ? 'not known yet' : `${formatNumber(Math.max(gap, 0) * 100, 1)} %`;
}

/** What is known of the best plan so far, for a list of terms. */
export function progressFacts(
  progress: PlanProgress,
  wishes: number,
): [term: string, value: string][] {
  return [
    ['Wishes with a slot', `${progress.placed} of ${wishes}`],
    ['Worth, priority × chance summed', formatNumber(progress.objective, 1)],
    [
      'No plan is over',
      progress.bound === null ? 'not known yet' : formatNumber(progress.bound, 1),
    ],
    ['Missing to that at most', gapText(progress.gap)],
    ['Time', `${formatNumber(progress.elapsedMs / 1000)} s`],
  ];
}
