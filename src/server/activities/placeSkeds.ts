import { diffRevisions, slotKey, type RevisionDiff } from '../../domain/activity/revision';
import { holdsBooking } from '../../domain/sked/machine';
import { formatUtcRange } from '../../domain/time/format';
import type { BandId } from '../../domain/station/bands';
import type { ModeId } from '../../domain/station/modes';
import type { ActivityRow, SkedRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { Conflict } from '../errors';
import { newId } from '../ids';
import type { Services } from '../services';
import { takenIntervals } from '../skeds/takenIntervals';
import type { StoredSlot } from './revisions';

export interface Placing {
  activity: Pick<ActivityRow, 'id' | 'title'>;
  /** Frequency and mode of each band of the activity. */
  onAir: ReadonlyMap<BandId, { frequencyMhz: number; mode: ModeId }>;
  callSigns: ReadonlyMap<string, string>;
  before: readonly StoredSlot[];
  after: readonly StoredSlot[];
  actorId: string;
}

export interface PlacedDiff {
  diff: RevisionDiff<StoredSlot>;
  /** The sked of each slot of the draft, and of each removed one of the revision before, as it stands now. */
  skeds: Map<StoredSlot, SkedRow>;
}

/**
 * Makes the skeds of an activity what its new revision says, within the caller's transaction: those that are gone are
 * cancelled, those at another time are moved and stay agreed, new ones are agreed at once, because their stations said
 * when they come. A published slot keeps its sked, and with it the UID of its calendar entry.
 *
 * Throws `Conflict` with every reason when a slot has begun already, was given back by a station at that very time, or
 * a station has another agreed sked then; the database itself refuses an overlap as the last word.
 */
export async function placeSkeds(
  tx: Tx,
  services: Services,
  placing: Placing,
): Promise<PlacedDiff> {
  const nowMs = services.now();
  const standing = await skedsOf(tx, placing.before);
  const inForce = placing.before.filter((slot) => {
    const sked = standing.get(slot.skedId ?? '');
    return sked !== undefined && holdsBooking(sked);
  });
  const diff = diffRevisions(inForce, placing.after);
  await refuseWhatCannotBe(tx, placing, diff, inForce, nowMs);

  const skeds = new Map<StoredSlot, SkedRow>();
  const skedOf = (slot: StoredSlot) => standing.get(slot.skedId!)!;
  const freed = [...diff.removed, ...diff.moved.map(({ before }) => before)];
  for (const slot of freed) {
    await tx.deleteFrom('booking').where('sked_id', '=', slot.skedId).execute();
  }
  for (const slot of diff.removed) {
    skeds.set(slot, await cancelSlot(tx, placing, skedOf(slot), nowMs));
  }
  for (const { before, after } of diff.moved) {
    skeds.set(after, await moveSlot(tx, placing, after, skedOf(before), nowMs));
  }
  for (const slot of diff.added) skeds.set(slot, await agreeSlot(tx, services, placing, slot));
  const bySlotKey = new Map(inForce.map((slot) => [slotKey(slot), slot]));
  for (const slot of diff.kept) skeds.set(slot, skedOf(bySlotKey.get(slotKey(slot))!));
  for (const slot of placing.after) {
    await tx
      .updateTable('activity_slot')
      .set({ sked_id: skeds.get(slot)!.id })
      .where('id', '=', slot.id)
      .execute();
  }
  return { diff, skeds };
}

async function skedsOf(tx: Tx, slots: readonly StoredSlot[]): Promise<Map<string, SkedRow>> {
  const ids = slots.flatMap(({ skedId }) => (skedId === null ? [] : [skedId]));
  if (ids.length === 0) return new Map();
  const rows = await tx.selectFrom('sked').selectAll().where('id', 'in', ids).execute();
  return new Map(rows.map((row) => [row.id, row]));
}

async function refuseWhatCannotBe(
  tx: Tx,
  { callSigns, before, after }: Placing,
  diff: RevisionDiff<StoredSlot>,
  inForce: readonly StoredSlot[],
  nowMs: number,
): Promise<void> {
  const pair = (slot: StoredSlot) =>
    `${callSigns.get(slot.stationA)} and ${callSigns.get(slot.stationB)}, ${formatUtcRange(slot)}`;
  const reasons: string[] = [];
  for (const slot of [...diff.removed, ...diff.moved.map((one) => one.before)]) {
    if (slot.startMs <= nowMs) reasons.push(`${pair(slot)}, has begun and must stay as it is.`);
  }
  for (const slot of [...diff.added, ...diff.moved.map((one) => one.after)]) {
    if (slot.startMs <= nowMs) reasons.push(`${pair(slot)}, lies in the past.`);
    const returned = before.find((old) => slotKey(old) === slotKey(slot) && !inForce.includes(old));
    if (returned?.startMs === slot.startMs) {
      reasons.push(`${pair(slot)}, was given back. Choose another time or leave it out.`);
    }
  }
  const ownIds = new Set(inForce.map((slot) => slot.skedId!));
  for (const slot of [...diff.added, ...diff.moved.map((one) => one.after)]) {
    for (const stationId of [slot.stationA, slot.stationB]) {
      for (const taken of await takenIntervals(tx, [stationId], slot, ownIds)) {
        reasons.push(
          `${callSigns.get(stationId)} has another agreed sked ${formatUtcRange(taken)}: ${pair(slot)}, cannot be.`,
        );
      }
    }
  }
  if (reasons.length === 0) return;
  const count = reasons.length === 1 ? 'One thing stands' : `${reasons.length} things stand`;
  throw new Conflict(
    `${count} in the way, and nothing was published. ${reasons.slice(0, 3).join(' ')}`,
    { reasons, slots: after.length },
  );
}

async function cancelSlot(
  tx: Tx,
  placing: Placing,
  sked: SkedRow,
  nowMs: number,
): Promise<SkedRow> {
  const changed = {
    state: 'cancelled' as const,
    agreed_version: null,
    version: sked.version + 1,
    sequence: sked.sequence + 1,
    updated_at: nowMs,
  };
  await tx.updateTable('sked').set(changed).where('id', '=', sked.id).execute();
  await addEvent(tx, placing, { ...sked, ...changed }, 'cancelled', nowMs);
  return { ...sked, ...changed };
}

async function moveSlot(
  tx: Tx,
  placing: Placing,
  slot: StoredSlot,
  sked: SkedRow,
  nowMs: number,
): Promise<SkedRow> {
  const changed = {
    start_at: slot.startMs,
    end_at: slot.endMs,
    version: sked.version + 1,
    agreed_version: sked.version + 1,
    sequence: sked.sequence + 1,
    updated_at: nowMs,
  };
  await tx.updateTable('sked').set(changed).where('id', '=', sked.id).execute();
  const moved = { ...sked, ...changed };
  await addEvent(tx, placing, moved, 'moved', nowMs);
  await addEvent(tx, placing, moved, 'agreed', nowMs);
  await book(tx, slot, sked.id);
  return moved;
}

async function agreeSlot(
  tx: Tx,
  services: Services,
  placing: Placing,
  slot: StoredSlot,
): Promise<SkedRow> {
  const id = newId();
  const nowMs = services.now();
  const onAir = placing.onAir.get(slot.band);
  if (!onAir) throw new Error(`The activity has no band ${slot.band}.`);
  const sked = await tx
    .insertInto('sked')
    .values({
      id,
      uid: `${id}@${new URL(services.config.publicUrl).hostname}`,
      band: slot.band,
      frequency_mhz: onAir.frequencyMhz,
      mode: onAir.mode,
      state: 'agreed',
      version: 1,
      agreed_version: 1,
      offered_by: slot.stationA,
      start_at: slot.startMs,
      end_at: slot.endMs,
      activity_id: placing.activity.id,
      created_at: nowMs,
      updated_at: nowMs,
    })
    .returningAll()
    .executeTakeFirstOrThrow();
  await tx
    .insertInto('sked_party')
    .values(
      [slot.stationA, slot.stationB].map((stationId, place) => ({
        sked_id: id,
        station_id: stationId,
        place,
        answer: 'accepted' as const,
      })),
    )
    .execute();
  await addEvent(tx, placing, sked, 'offered', nowMs);
  await addEvent(tx, placing, sked, 'agreed', nowMs);
  await book(tx, slot, id);
  return sked;
}

async function book(tx: Tx, slot: StoredSlot, skedId: string): Promise<void> {
  for (const stationId of [slot.stationA, slot.stationB]) {
    await tx
      .insertInto('booking')
      .values({
        station_id: stationId,
        sked_id: skedId,
        start_at: slot.startMs,
        end_at: slot.endMs,
      })
      .execute();
  }
}

async function addEvent(
  tx: Tx,
  { activity, actorId }: Placing,
  sked: SkedRow,
  kind: 'offered' | 'moved' | 'agreed' | 'cancelled',
  atMs: number,
): Promise<void> {
  await tx
    .insertInto('sked_event')
    .values({
      id: newId(),
      sked_id: sked.id,
      sked_version: sked.version,
      kind,
      station_id: null,
      person_id: kind === 'agreed' ? null : actorId,
      start_at: sked.start_at,
      end_at: sked.end_at,
      words: kind === 'agreed' ? '' : `Plan of “${activity.title}”.`,
      at: atMs,
      sequence: sked.sequence,
    })
    .execute();
}
