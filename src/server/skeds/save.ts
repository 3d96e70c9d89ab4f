import type { Decision } from '../../domain/sked/machine';
import { holdsBooking, stillIn } from '../../domain/sked/standing';
import type { SkedPartyRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { newId } from '../ids';
import { SlotTaken } from './refusals';

type Taken = Extract<Decision, { ok: true }>;

/**
 * Writes a decision about an existing sked: state, answers, history and the bookings that follow from it.
 * Throws `SlotTaken` when the database refuses a booking because the station has another agreed sked then.
 */
export async function saveDecision(
  tx: Tx,
  skedId: string,
  decision: Taken,
  by: { personId: string | null; words: string; atMs: number },
): Promise<void> {
  const { sked } = decision;
  await tx
    .updateTable('sked')
    .set({
      state: sked.state,
      version: sked.version,
      sequence: sked.sequence,
      offered_by: sked.offeredBy,
      start_at: sked.startMs,
      end_at: sked.endMs,
      updated_at: by.atMs,
      ...agreedVersion(decision),
    })
    .where('id', '=', skedId)
    .execute();
  for (const party of stillIn(sked.parties)) {
    await setParty(tx, skedId, party.stationId, { answer: party.answer });
  }
  for (const happening of decision.happenings) {
    if (happening.kind === 'droppedOut' && happening.by) {
      await setParty(tx, skedId, happening.by, { left_at: by.atMs });
    }
  }
  await saveHappenings(tx, skedId, decision, by);
  await saveBookings(tx, skedId, decision);
}

/** Set when the slot becomes agreed, kept while it stands (a party that drops out changes nothing for the rest). */
function agreedVersion({ sked, happenings }: Taken): { agreed_version?: number | null } {
  if (happenings.some((happening) => happening.kind === 'agreed')) {
    return { agreed_version: sked.version };
  }
  return holdsBooking(sked) ? {} : { agreed_version: null };
}

async function setParty(
  tx: Tx,
  skedId: string,
  stationId: string,
  set: Partial<Pick<SkedPartyRow, 'answer' | 'left_at'>>,
): Promise<void> {
  await tx
    .updateTable('sked_party')
    .set(set)
    .where('sked_id', '=', skedId)
    .where('station_id', '=', stationId)
    .execute();
}

/** The history: one row for each thing that happened. The words belong to the first. */
export async function saveHappenings(
  tx: Tx,
  skedId: string,
  { sked, happenings }: Taken,
  by: { personId: string | null; words: string; atMs: number },
): Promise<void> {
  await tx
    .insertInto('sked_event')
    .values(
      happenings.map((event, index) => ({
        id: newId(),
        sked_id: skedId,
        sked_version: sked.version,
        kind: event.kind,
        station_id: event.by,
        person_id: event.by ? by.personId : null,
        start_at: event.startMs,
        end_at: event.endMs,
        words: index === 0 ? by.words : '',
        at: by.atMs,
        sequence: sked.sequence,
      })),
    )
    .execute();
}

async function saveBookings(tx: Tx, skedId: string, { sked }: Taken): Promise<void> {
  if (sked.state === 'reported') return;
  await tx.deleteFrom('booking').where('sked_id', '=', skedId).execute();
  if (!holdsBooking(sked)) return;
  for (const party of stillIn(sked.parties)) {
    try {
      await tx
        .insertInto('booking')
        .values({
          station_id: party.stationId,
          sked_id: skedId,
          start_at: sked.startMs,
          end_at: sked.endMs,
        })
        .execute();
    } catch (error) {
      if (error instanceof Error && error.message.includes('doubleBooking')) {
        throw new SlotTaken(`${party.callSign} has another agreed sked in that time.`);
      }
      throw error;
    }
  }
}
