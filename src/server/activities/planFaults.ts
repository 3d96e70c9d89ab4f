import { checkPlan } from '../../domain/activity/plan/check';
import type { PlanInput } from '../../domain/activity/plan/input';
import type { RevisionSlot } from '../../domain/activity/revision';
import { formatUtcRange } from '../../domain/time/format';
import { MINUTE_MS } from '../../domain/time/interval';
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
  const wishes = new Set(input.wishes.map(({ id }) => id));
  const coming = slots.filter(({ startMs }) => startMs > nowMs);
  const wished = coming.filter((slot) => wishes.has(wishIdOf(slot.stationA, slot.stationB)));
  const unwished = coming.filter((slot) => !wished.includes(slot));
  const { violations } = checkPlan(input, {
    slots: wished.map((slot) => ({
      wishId: wishIdOf(slot.stationA, slot.stationB),
      band: slot.band,
      startMs: slot.startMs,
    })),
  });
  const slotMs = input.rules.slotMinutes * MINUTE_MS;
  const other = coming.find(({ startMs, endMs }) => endMs - startMs !== slotMs);
  return [
    ...(other
      ? [
          `The slots of this plan are ${(other.endMs - other.startMs) / MINUTE_MS} minutes long, the settings now say ${input.rules.slotMinutes}. Plan anew.`,
        ]
      : []),
    ...(await unwishedWords(services, input, unwished)),
    ...violations.map(({ sentence }) => sentence),
  ];
}

/** Of slots whose pair has no wish any more: because one of the two does not come, or because neither wants it. */
async function unwishedWords(
  { db }: Services,
  { stations }: PlanInput,
  slots: readonly RevisionSlot[],
): Promise<string[]> {
  if (slots.length === 0) return [];
  const ids = [...new Set(slots.flatMap(({ stationA, stationB }) => [stationA, stationB]))];
  const rows = await db
    .selectFrom('station')
    .select(['id', 'call_sign'])
    .where('id', 'in', ids)
    .execute();
  const callSigns = new Map(rows.map((row) => [row.id, row.call_sign]));
  const coming = new Set(stations.map(({ id }) => id));
  return slots.map((slot) => {
    const [a, b] = [slot.stationA, slot.stationB].map((id) => callSigns.get(id) ?? '');
    const away = [slot.stationA, slot.stationB].find((id) => !coming.has(id));
    const why = away
      ? `${callSigns.get(away) ?? ''} is not coming any more.`
      : 'this contact is not wished any more.';
    return `${a} and ${b}, ${formatUtcRange(slot)}: ${why}`;
  });
}
