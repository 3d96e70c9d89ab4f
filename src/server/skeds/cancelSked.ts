import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { changeSked, type ChangeOutcome } from './change';
import type { SkedAnswer } from './schemas';

/** Cancels an agreed sked before it is over: the booking is freed and everybody's calendar entry cancelled. Throws as `changeSked`. */
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
  });
}
