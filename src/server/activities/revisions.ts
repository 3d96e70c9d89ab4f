import type { RevisionSlot } from '../../domain/activity/revision';
import type { Db } from '../db/connection';
import type { ActivityRevisionRow, ActivitySlotRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { newId } from '../ids';

/** A slot as it is stored: with its own id, and the sked it became when it was published. */
export interface StoredSlot extends RevisionSlot {
  id: string;
  skedId: string | null;
}

export interface LoadedRevision {
  row: ActivityRevisionRow;
  slots: StoredSlot[];
}

/** The draft, the published or a numbered revision with its slots in order of time, or null. */
export async function loadRevision(
  db: Db | Tx,
  activityId: string,
  which: 'draft' | 'published' | number,
): Promise<LoadedRevision | null> {
  let query = db.selectFrom('activity_revision').selectAll().where('activity_id', '=', activityId);
  query =
    typeof which === 'number'
      ? query.where('number', '=', which)
      : query.where('state', '=', which);
  const row = await query.executeTakeFirst();
  if (!row) return null;
  const slots = await db
    .selectFrom('activity_slot')
    .selectAll()
    .where('revision_id', '=', row.id)
    .orderBy('start_at')
    .orderBy('id')
    .execute();
  return { row, slots: slots.map(storedSlot) };
}

/** The slots of the published revision that were not given back; none while nothing is published. */
export async function slotsInForce(db: Db | Tx, activityId: string): Promise<StoredSlot[]> {
  const published = await loadRevision(db, activityId, 'published');
  if (!published) return [];
  const rows = await db
    .selectFrom('sked')
    .select('id')
    .where('activity_id', '=', activityId)
    .where('state', 'in', ['agreed', 'reported'])
    .execute();
  const inForce = new Set(rows.map(({ id }) => id));
  return published.slots.filter(({ skedId }) => skedId !== null && inForce.has(skedId));
}

/** Every revision that was published at some time, newest first. */
export async function publishedRevisions(
  db: Db | Tx,
  activityId: string,
): Promise<Pick<ActivityRevisionRow, 'number' | 'state' | 'published_at' | 'note'>[]> {
  return db
    .selectFrom('activity_revision')
    .select(['number', 'state', 'published_at', 'note'])
    .where('activity_id', '=', activityId)
    .where('published_at', 'is not', null)
    .orderBy('number', 'desc')
    .execute();
}

/**
 * Puts these slots in place of whatever the draft of the activity holds; without a draft one is begun, numbered after
 * the last revision. Returns the draft's id and version.
 */
export async function saveDraft(
  tx: Tx,
  activityId: string,
  draft: {
    slots: readonly (RevisionSlot & { skedId?: string | null })[];
    leftOutJson: string;
    runId: string | null;
    atMs: number;
  },
): Promise<{ id: string; version: number }> {
  const present = await tx
    .selectFrom('activity_revision')
    .select(['id', 'version'])
    .where('activity_id', '=', activityId)
    .where('state', '=', 'draft')
    .executeTakeFirst();
  const id = present?.id ?? newId();
  const version = (present?.version ?? 0) + 1;
  const set = { run_id: draft.runId, left_out_json: draft.leftOutJson, version };
  if (present) {
    await tx.updateTable('activity_revision').set(set).where('id', '=', id).execute();
    await tx.deleteFrom('activity_slot').where('revision_id', '=', id).execute();
  } else {
    const { last } = await tx
      .selectFrom('activity_revision')
      .select((of) => of.fn.max<number | null>('number').as('last'))
      .where('activity_id', '=', activityId)
      .executeTakeFirstOrThrow();
    await tx
      .insertInto('activity_revision')
      .values({
        ...set,
        id,
        activity_id: activityId,
        number: (last ?? 0) + 1,
        state: 'draft',
        created_at: draft.atMs,
        published_at: null,
      })
      .execute();
  }
  for (const slot of draft.slots) await insertSlot(tx, id, slot);
  return { id, version };
}

export async function insertSlot(
  tx: Tx,
  revisionId: string,
  slot: RevisionSlot & { skedId?: string | null },
): Promise<string> {
  const id = newId();
  await tx
    .insertInto('activity_slot')
    .values({
      id,
      revision_id: revisionId,
      station_a: slot.stationA,
      station_b: slot.stationB,
      band: slot.band,
      start_at: slot.startMs,
      end_at: slot.endMs,
      pinned: slot.pinned ? 1 : 0,
      priority: slot.priority,
      chance: slot.chance,
      margin_db: slot.marginDb,
      sked_id: slot.skedId ?? null,
    })
    .execute();
  return id;
}

function storedSlot(row: ActivitySlotRow): StoredSlot {
  return {
    id: row.id,
    stationA: row.station_a,
    stationB: row.station_b,
    band: row.band,
    startMs: row.start_at,
    endMs: row.end_at,
    pinned: row.pinned === 1,
    priority: row.priority as 1 | 2 | 3,
    chance: row.chance,
    marginDb: row.margin_db,
    skedId: row.sked_id,
  };
}
