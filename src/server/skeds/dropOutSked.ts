import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { changeSked, type ChangeOutcome } from './change';
import type { SkedAnswer } from './schemas';
import { requireFree, requireMoon } from './slotCheck';

/**
 * Leaves a sked of three or more stations; the rest keep the slot. Where all of them have accepted it, the sked is
 * agreed by that, so the slot is looked at again as when accepting. Throws as `changeSked`.
 */
export function dropOutSked(
  services: Services,
  viewer: Viewer,
  skedId: string,
  input: SkedAnswer,
): Promise<ChangeOutcome> {
  return changeSked(services, viewer, {
    skedId,
    ...input,
    command: (by) => ({ kind: 'dropOut', by, version: input.version }),
    check: async (tx, { sked, stations }, next) => {
      if (next.state !== 'agreed' || sked.state === 'agreed') return [];
      const left = next.parties.filter((party) => party.left).map((party) => party.stationId);
      const rest = stations.filter((station) => !left.includes(station.id));
      requireMoon(rest, next);
      await requireFree(tx, rest, next, skedId);
      return [];
    },
  });
}
