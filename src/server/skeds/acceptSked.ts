import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { changeSked, type ChangeOutcome } from './change';
import type { SkedAnswer } from './schemas';
import { requireFree, requireMoon, slotWarnings } from './slotCheck';

/**
 * Accepts the slot now offered. Before that everything is looked at again inside the transaction: the Moon within
 * every station's limits, and no other agreed sked of any party; the database itself refuses an overlap as
 * the last word. Throws as `changeSked`; a slot that cannot be had is a `Conflict` with alternatives.
 */
export function acceptSked(
  services: Services,
  viewer: Viewer,
  skedId: string,
  input: SkedAnswer,
): Promise<ChangeOutcome> {
  return changeSked(services, viewer, {
    skedId,
    ...input,
    command: (by) => ({ kind: 'accept', by, version: input.version }),
    check: async (tx, { stations }, next) => {
      requireMoon(stations, next);
      await requireFree(tx, stations, next, skedId);
      return slotWarnings(tx, stations, next, skedId);
    },
  });
}
