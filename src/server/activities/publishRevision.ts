import { z } from 'zod';
import type { Viewer } from '../auth/viewer';
import type { ActivityRow } from '../db/tables';
import { inTransaction, type Tx } from '../db/transaction';
import { Conflict } from '../errors';
import { recordAct } from '../people/recordAct';
import type { Services } from '../services';
import { requireEditor } from './access';
import { planFaults } from './planFaults';
import { placeSkeds } from './placeSkeds';
import { loadRevision } from './revisions';
import { tellAffected } from './tellAffected';

export const publishSchema = z.object({
  version: z.coerce
    .number('Say which version of the draft you saw.')
    .int('Say which version of the draft you saw.')
    .min(1, 'Say which version of the draft you saw.'),
  note: z
    .string('The note must be text.')
    .max(1000, 'Keep the note under 1000 characters.')
    .transform((text) => text.trim())
    .default(''),
});

/**
 * Publishes the draft as the plan in force. Its slots become agreed skeds, those of the revision before follow it, and
 * only the crews of stations for which something changes get a mail: their whole itinerary, what changed, and the
 * calendar entries. The revision before stays readable.
 *
 * Throws `NotFound` for people who do not coordinate the activity, `Conflict` when there is no draft, it changed since it
 * was seen, an independent check finds a fault in it, or its slots cannot become skeds.
 */
export async function publishRevision(
  services: Services,
  viewer: Viewer,
  slug: string,
  input: z.output<typeof publishSchema>,
): Promise<{ number: number; told: number }> {
  const activity = await requireEditor(services.db, viewer, slug);
  const seen = await loadRevision(services.db, activity.id, 'draft');
  if (!seen) throw new Conflict('There is no draft to publish. Compute a plan first.');
  // Recomputes every slot from the sky, outside the transaction: nothing in it may take long.
  const faults = await planFaults(services, activity, seen.slots);
  if (faults.length > 0) {
    throw new Conflict(
      `The plan cannot be published as it stands. ${faults.slice(0, 3).join(' ')}`,
      { reasons: faults },
    );
  }
  return inTransaction(services.db, async (tx) => {
    const draft = await loadRevision(tx, activity.id, 'draft');
    if (!draft || draft.row.version !== input.version || draft.row.version !== seen.row.version) {
      throw new Conflict('The draft changed since you opened it. Look at it again, then publish.');
    }
    const published = await loadRevision(tx, activity.id, 'published');
    const placed = await placeSkeds(tx, services, {
      activity,
      onAir: await onAirOf(tx, activity.id),
      callSigns: await callSignsOf(tx, [...draft.slots, ...(published?.slots ?? [])]),
      before: published?.slots ?? [],
      after: draft.slots,
      actorId: viewer.id,
    });
    await putInForce(tx, services, activity, draft.row.id, input.note);
    const told = await tellAffected(tx, services, {
      activity,
      number: draft.row.number,
      note: input.note,
      first: published === null,
      placed,
    });
    await recordAct(tx, services, viewer, 'publishPlan', activity.id, {
      revision: draft.row.number,
      slots: draft.slots.length,
      told,
    });
    return { number: draft.row.number, told };
  });
}

async function putInForce(
  tx: Tx,
  services: Services,
  activity: ActivityRow,
  draftId: string,
  note: string,
): Promise<void> {
  const nowMs = services.now();
  await tx
    .updateTable('activity_revision')
    .set({ state: 'replaced' })
    .where('activity_id', '=', activity.id)
    .where('state', '=', 'published')
    .execute();
  await tx
    .updateTable('activity_revision')
    .set({ state: 'published', published_at: nowMs, note })
    .where('id', '=', draftId)
    .execute();
  await tx
    .updateTable('activity')
    .set({ state: 'published', version: activity.version + 1, updated_at: nowMs })
    .where('id', '=', activity.id)
    .execute();
}

async function onAirOf(tx: Tx, activityId: string) {
  const rows = await tx
    .selectFrom('activity_band')
    .selectAll()
    .where('activity_id', '=', activityId)
    .execute();
  return new Map(
    rows.map((row) => [row.band, { frequencyMhz: row.frequency_mhz, mode: row.mode }] as const),
  );
}

async function callSignsOf(
  tx: Tx,
  slots: readonly { stationA: string; stationB: string }[],
): Promise<Map<string, string>> {
  const ids = [...new Set(slots.flatMap(({ stationA, stationB }) => [stationA, stationB]))];
  if (ids.length === 0) return new Map();
  const rows = await tx
    .selectFrom('station')
    .select(['id', 'call_sign'])
    .where('id', 'in', ids)
    .execute();
  return new Map(rows.map((row) => [row.id, row.call_sign]));
}
