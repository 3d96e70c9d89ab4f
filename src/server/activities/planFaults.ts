import { checkPlan } from '../../domain/activity/plan/check';
import type { RevisionSlot } from '../../domain/activity/revision';
import type { Services } from '../services';
import { planInput, wishIdOf } from './planInput';
import type { ActivityRow } from './records';

/**
 * What an independent check finds wrong with the slots, computed anew from the stations as they are now, in sentences;
 * an empty list for a plan that may be published. Slots that have begun are history and are not asked again.
 */
export async function planFaults(
  services: Services,
  activity: ActivityRow,
  slots: readonly RevisionSlot[],
): Promise<string[]> {
  const nowMs = services.now();
  const input = await planInput(services, activity);
  const { violations } = checkPlan(input, {
    slots: slots
      .filter(({ startMs }) => startMs > nowMs)
      .map((slot) => ({
        wishId: wishIdOf(slot.stationA, slot.stationB),
        band: slot.band,
        startMs: slot.startMs,
      })),
  });
  return violations.map(({ sentence }) => sentence);
}
