import type { Viewer } from '../auth/viewer';
import { tellGivenBack } from '../activities/tellGivenBack';
import type { Services } from '../services';
import { changeSked, type ChangeOutcome } from './change';
import type { SkedAnswer } from './schemas';

/**
 * Cancels an agreed sked before it is over: the booking is freed and everybody's calendar entry cancelled. A slot of an
 * activity's plan is given back by it, and its coordinator is told. Throws as `changeSked`.
 */
export function cancelSked(
  services: Services,
  viewer: Viewer,
  skedId: string,
  input: SkedAnswer,
): Promise<ChangeOutcome> {
  return changeSked(services, viewer, {
    skedId,
    ...input,
    command: (by) => ({ kind: 'cancel', by, version: input.version }),
    also: (tx, by) => tellGivenBack(tx, services, { skedId, by, words: input.words, viewer }),
  });
}
