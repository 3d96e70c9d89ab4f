import { answerSchema, type StationAnswer } from '../../domain/activity/answer';
import { nestedFields } from '../../domain/activity/settings';
import type { Viewer } from '../auth/viewer';
import { inTransaction, type Tx } from '../db/transaction';
import { Conflict, Forbidden, NotFound } from '../errors';
import { checked } from '../http/respond';
import type { Services } from '../services';
import { activityAccess } from './access';
import { offeredBands } from './loadRoster';
import type { ActivityRow } from './records';

/** The fields of the form, as they were sent. */
export type AnswerForm = Readonly<Record<string, string>>;

/**
 * Takes the answer of a station, from its crew or from the coordinator. Throws `NotFound`, `Forbidden`,
 * `InvalidInput`, or `Conflict` when the activity is over.
 */
export async function saveAnswer(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
  stationId: string,
  form: AnswerForm,
): Promise<{ callSign: string; answer: StationAnswer['answer'] }> {
  return inTransaction(services.db, async (tx) => {
    const { row, editor, own } = await activityAccess(tx, viewer, slug);
    if (!editor && !own.some((one) => one.stationId === stationId)) {
      throw new Forbidden('You answer only for a station to whose crew you belong.');
    }
    return writeAnswer(tx, services, row, stationId, viewer.id, form);
  });
}

/** The answer into the caller's transaction; who may give it is checked by then. */
export async function writeAnswer(
  tx: Tx,
  services: Pick<Services, 'now'>,
  activity: ActivityRow,
  stationId: string,
  personId: string,
  form: AnswerForm,
): Promise<{ callSign: string; answer: StationAnswer['answer'] }> {
  if (activity.end_at <= services.now()) throw new Conflict('This activity is over.');
  const roster = await tx
    .selectFrom('activity_station')
    .innerJoin('station', 'station.id', 'activity_station.station_id')
    .select(['station.id', 'station.call_sign'])
    .where('activity_id', '=', activity.id)
    .execute();
  const station = roster.find(({ id }) => id === stationId);
  if (!station) throw new NotFound('This station is not on the roster.');
  const span = { startMs: activity.start_at, endMs: activity.end_at };
  const offered = await offeredBands(tx, activity.id);
  const answer = checked(answerSchema(span, offered), nestedFields(form));
  await tx
    .updateTable('activity_station')
    .set({
      answer: answer.answer,
      bands_json: JSON.stringify(answer.bands),
      hours_json: answer.hours
        ? JSON.stringify(answer.hours.map(({ startMs, endMs }) => [startMs, endMs]))
        : null,
      most_contacts: answer.mostContacts,
      wants: answer.wants,
      priority: answer.priority,
      note: answer.note,
      answered_at: services.now(),
      answered_by: personId,
    })
    .where('activity_id', '=', activity.id)
    .where('station_id', '=', stationId)
    .execute();
  await tx
    .deleteFrom('activity_wish')
    .where('activity_id', '=', activity.id)
    .where('station_id', '=', stationId)
    .execute();
  const partners = new Set(roster.map(({ id }) => id).filter((id) => id !== stationId));
  const wishes = answer.wishes.filter(({ partnerId }) => partners.has(partnerId));
  if (wishes.length > 0) {
    await tx
      .insertInto('activity_wish')
      .values(
        wishes.map(({ partnerId, kind, priority }) => ({
          activity_id: activity.id,
          station_id: stationId,
          partner_id: partnerId,
          kind,
          priority,
        })),
      )
      .execute();
  }
  return { callSign: station.call_sign, answer: answer.answer };
}
