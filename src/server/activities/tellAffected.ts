import { changesOf, itineraryOf } from '../../domain/activity/itinerary';
import { changesAnything, diffOfStation } from '../../domain/activity/revision';
import { calendarOf } from '../../domain/sked/standing';
import { paths } from '../../paths';
import type { ActivityRow, SkedRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { enqueueMail } from '../mail/outbox';
import { renderMail } from '../mail/shell';
import { planMail } from '../mail/templates/planMail';
import { publishedCalendar } from '../mail/templates/skedCalendar';
import { skedFacts } from '../mail/templates/skedFacts';
import type { Services } from '../services';
import { replyAddress } from '../skeds/replyAddress';
import { partyStation, type PartyStation } from '../skeds/load';
import { makeAnswerLink } from './answerLink';
import type { PlacedDiff } from './placeSkeds';
import type { StoredSlot } from './revisions';
import { rosterRecipients, type RosterRecipient } from './rosterRecipients';

interface Published {
  activity: ActivityRow;
  number: number;
  note: string;
  /** Whether it is the first plan of the activity. */
  first: boolean;
  placed: PlacedDiff;
}

/**
 * Mails everybody in the crews of stations for which the revision changes something, one mail a person: the itinerary,
 * what changed, and the calendar entries of what changed. Returns how many mails.
 */
export async function tellAffected(
  tx: Tx,
  services: Services,
  { activity, number, note, first, placed }: Published,
): Promise<number> {
  const { diff, skeds } = placed;
  const changed = [...diff.added, ...diff.removed, ...diff.moved.map(({ after }) => after)];
  const current = [...diff.kept, ...diff.added, ...diff.moved.map(({ after }) => after)];
  const stations = await stationsOf(tx, [...changed, ...current]);
  const callSigns = new Map([...stations].map(([id, { callSign }]) => [id, callSign]));
  const coordinator = await tx
    .selectFrom('person')
    .select('name')
    .where('id', '=', activity.coordinator_id)
    .executeTakeFirstOrThrow();
  const touched = [...stations.keys()].filter((id) => changesAnything(diffOfStation(diff, id)));
  const readers = new Map<string, RosterRecipient[]>();
  for (const one of await rosterRecipients(tx, touched)) {
    readers.set(one.personId, [...(readers.get(one.personId) ?? []), one]);
  }
  for (const own of readers.values()) {
    const reader = own[0]!;
    const ids = own.map(({ stationId }) => stationId);
    const { subject, content } = planMail({
      title: activity.title,
      first,
      number,
      coordinatorName: coordinator.name,
      note,
      url: await linkOf(tx, services, activity, reader),
      stations: own.map(({ stationId, callSign }) => ({
        callSign,
        itinerary: itineraryOf(current, stationId, callSigns, reader.timeZone),
        changes: changesOf(diffOfStation(diff, stationId), stationId, callSigns),
      })),
    });
    const entries = changed
      .filter((slot) => ids.includes(slot.stationA) || ids.includes(slot.stationB))
      .map((slot) => entryOf(services, skeds.get(slot)!, slot, stations, reader));
    await enqueueMail(tx, services, {
      to: reader.email,
      subject,
      ...renderMail(content),
      topic: 'sked',
      personId: reader.personId,
      activityId: activity.id,
      calendar: {
        method: 'PUBLISH',
        body: publishedCalendar(activity.title, entries),
      },
    });
  }
  return readers.size;
}

/** People without an account open their itinerary by a link of their own. */
async function linkOf(
  tx: Tx,
  services: Services,
  activity: ActivityRow,
  reader: RosterRecipient,
): Promise<string> {
  const path = reader.guest
    ? paths.rosterAnswer(await makeAnswerLink(tx, services, reader.personId, activity))
    : paths.activityStation(activity.slug, reader.callSign);
  return services.config.publicUrl + path;
}

function entryOf(
  { config, now }: Services,
  sked: SkedRow,
  slot: StoredSlot,
  stations: ReadonlyMap<string, PartyStation>,
  reader: RosterRecipient,
) {
  const interval = { startMs: sked.start_at, endMs: sked.end_at };
  return {
    facts: skedFacts(
      sked,
      [slot.stationA, slot.stationB].map((id) => stations.get(id)!),
      interval,
      config.publicUrl + paths.sked(sked.id),
    ),
    organizer: replyAddress(config, sked.uid, reader.personId) ?? config.smtp.from,
    entry: {
      ...calendarOf({ state: sked.state, sequence: sked.sequence, ...interval }),
      asked: false,
      stampMs: now(),
    },
  };
}

async function stationsOf(
  tx: Tx,
  slots: readonly StoredSlot[],
): Promise<Map<string, PartyStation>> {
  const ids = [...new Set(slots.flatMap(({ stationA, stationB }) => [stationA, stationB]))];
  if (ids.length === 0) return new Map();
  const rows = await tx.selectFrom('station').selectAll().where('id', 'in', ids).execute();
  return new Map(rows.map((row) => [row.id, partyStation(row)]));
}
