import { TALK_OPEN_MS, type TalkMessage, type TalkView } from '../../domain/sked/talk';
import { DAY_MS } from '../../domain/time/interval';
import { formatUtc } from '../../domain/time/format';
import { paths } from '../../paths';
import type { Viewer } from '../auth/viewer';
import type { Tx } from '../db/transaction';
import { Conflict, TooManyRequests } from '../errors';
import { newId } from '../ids';
import { enqueueMail } from '../mail/outbox';
import { switchableMail } from '../mail/switchable';
import { skedFacts } from '../mail/templates/skedFacts';
import { talkMail } from '../mail/templates/talkMail';
import { mailPreferencesOf } from '../people/mailPreferences';
import type { Services } from '../services';
import { crewsOfSkeds } from './crews';
import { linkForRecipient } from './linkForRecipient';
import { loadSked, stationIdsOf, type LoadedSked } from './load';
import { noSuchSked } from './refusals';
import { replyAddress } from './replyAddress';
import { withReplyHint } from './sendSkedMail';
import { findPerson } from '../people/findPerson';

/** Messages of one person about one sked within a day. */
const MOST_A_DAY = 30;

export interface NewMessage {
  skedId: string;
  /** On behalf of which party. */
  stationId: string;
  personId: string;
  /** As `messageWordsSchema` lets them through. */
  words: string;
}

/**
 * Writes a message down and mails it to the crews of the other parties, within the caller's transaction. Throws
 * `NotFound` when the person does not belong to the crew of a party that is still in the sked, `Conflict` when its time
 * is over, `TooManyRequests` after thirty in a day.
 */
export async function addMessage(
  tx: Tx,
  services: Services,
  message: NewMessage,
): Promise<TalkMessage> {
  const atMs = services.now();
  const loaded = await loadSked(tx, message.skedId);
  const author = await findPerson(tx, message.personId);
  if (!loaded || !author) throw noSuchSked();
  const mine = await ownPartiesStillIn(tx, loaded, author.id);
  if (!mine.includes(message.stationId)) throw noSuchSked();
  requireOpen(loaded, atMs);
  await requireFew(tx, message, atMs);
  const id = newId();
  const { skedId, stationId, personId, words } = message;
  await tx
    .insertInto('sked_message')
    .values({ id, sked_id: skedId, station_id: stationId, person_id: personId, words, at: atMs })
    .execute();
  const callSign = loaded.stations.find((station) => station.id === stationId)!.callSign;
  await mailToOthers(tx, services, loaded, {
    stationId,
    personId,
    callSign,
    personName: author.name,
    words,
  });
  return { id, callSign, personName: author.name, byViewer: true, words, atMs };
}

/** The messages about a sked for a member of a party's crew. Throws `NotFound` for everybody else. */
export async function talkOf(
  { db, now }: Services,
  viewer: Pick<Viewer, 'id'>,
  skedId: string,
): Promise<TalkView> {
  const loaded = await loadSked(db, skedId);
  const stations = await stationIdsOf(db, viewer.id);
  if (!loaded?.sked.parties.some((party) => stations.has(party.stationId))) throw noSuchSked();
  const rows = await db
    .selectFrom('sked_message')
    .innerJoin('station', 'station.id', 'sked_message.station_id')
    .innerJoin('person', 'person.id', 'sked_message.person_id')
    .select([
      'sked_message.id',
      'sked_message.person_id',
      'sked_message.words',
      'sked_message.at',
      'station.call_sign',
      'person.name',
    ])
    .where('sked_message.sked_id', '=', skedId)
    .orderBy('sked_message.at')
    .orderBy('sked_message.id')
    .execute();
  const openUntilMs = loaded.row.end_at + TALK_OPEN_MS;
  const [as = null] = now() <= openUntilMs ? await ownPartiesStillIn(db, loaded, viewer.id) : [];
  return {
    as,
    openUntilMs,
    messages: rows.map((row) => ({
      id: row.id,
      callSign: row.call_sign,
      personName: row.name,
      byViewer: row.person_id === viewer.id,
      words: row.words,
      atMs: row.at,
    })),
  };
}

/** Stations of the person that take part and have not dropped out, in the order of the parties. */
export async function ownPartiesStillIn(
  db: Tx | Services['db'],
  { row }: LoadedSked,
  personId: string,
): Promise<string[]> {
  const rows = await db
    .selectFrom('sked_party')
    .innerJoin('station_crew', 'station_crew.station_id', 'sked_party.station_id')
    .select('sked_party.station_id')
    .where('sked_party.sked_id', '=', row.id)
    .where('sked_party.left_at', 'is', null)
    .where('station_crew.person_id', '=', personId)
    .orderBy('sked_party.place')
    .execute();
  return rows.map((one) => one.station_id);
}

function requireOpen({ row }: LoadedSked, atMs: number): void {
  const untilMs = row.end_at + TALK_OPEN_MS;
  if (atMs <= untilMs) return;
  throw new Conflict(`Messages about this sked could be written until ${formatUtc(untilMs)}.`);
}

async function requireFew(tx: Tx, { skedId, personId }: NewMessage, atMs: number): Promise<void> {
  const { count, first } = await tx
    .selectFrom('sked_message')
    .select((select) => [
      select.fn.countAll<number>().as('count'),
      select.fn.min<number | null>('at').as('first'),
    ])
    .where('sked_id', '=', skedId)
    .where('person_id', '=', personId)
    .where('at', '>', atMs - DAY_MS)
    .executeTakeFirstOrThrow();
  if (count < MOST_A_DAY) return;
  throw new TooManyRequests(
    `That was more than ${MOST_A_DAY} messages about this sked in a day. Nothing was sent.`,
    Math.max(1, Math.ceil(((first ?? atMs) + DAY_MS - atMs) / 1000)),
  );
}

interface Said {
  stationId: string;
  personId: string;
  callSign: string;
  personName: string;
  words: string;
}

async function mailToOthers(
  tx: Tx,
  services: Services,
  { row, stations }: LoadedSked,
  said: Said,
): Promise<void> {
  const crew = ((await crewsOfSkeds(tx, [row.id])).get(row.id) ?? []).filter(
    (member) => member.personId !== said.personId && !member.stationIds.includes(said.stationId),
  );
  const wishes = await mailPreferencesOf(
    tx,
    crew.map((member) => member.personId),
  );
  for (const member of crew) {
    if (!wishes.of(member.personId).topics.talk) continue;
    const url = await linkForRecipient(tx, services, member, row, paths.skedTalk(row.id));
    const callSigns = stations
      .filter((station) => member.stationIds.includes(station.id))
      .map((station) => station.callSign);
    const mail = talkMail(
      skedFacts(row, stations, { startMs: row.start_at, endMs: row.end_at }, url),
      said,
      { timeZone: member.timeZone, callSigns },
    );
    const replyTo = replyAddress(services.config, row.uid, member.personId);
    const content = replyTo === null ? mail.content : withReplyHint(mail.content);
    await enqueueMail(tx, services, {
      ...switchableMail(services.config, member, 'talk', { ...mail, content }),
      skedId: row.id,
      ...(replyTo === null ? {} : { replyTo }),
    });
  }
}
