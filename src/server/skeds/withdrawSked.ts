import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { changeSked, type ChangeOutcome } from './change';
import type { SkedAnswer } from './schemas';

/** Takes back an offer that is not agreed yet; only the side whose offer it is can do so. Throws as `changeSked`. */
export function withdrawSked(
  services: Services,
  viewer: Viewer,
  skedId: string,
  input: SkedAnswer,
): Promise<ChangeOutcome> {
  return changeSked(services, viewer, {
    skedId,
    ...input,
    command: (by) => ({ kind: 'withdraw', by, version: input.version }),
  });
}
