import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { changeSked, type ChangeOutcome } from './change';
import type { SkedAnswer } from './schemas';

/** Says no to the slot now offered. A party may still move the sked to another time. Throws as `changeSked`. */
export function declineSked(
  services: Services,
  viewer: Viewer,
  skedId: string,
  input: SkedAnswer,
): Promise<ChangeOutcome> {
  return changeSked(services, viewer, {
    skedId,
    ...input,
    command: (by) => ({ kind: 'decline', by, version: input.version }),
  });
}
