import { digestIsDue } from '../../domain/people/digestTime';
import { DAY_MS } from '../../domain/time/interval';
import { paths } from '../../paths';
import type { Db } from '../db/connection';
import { inTransaction, type Tx } from '../db/transaction';
import { enqueueMail } from '../mail/outbox';
import { switchableMail } from '../mail/switchable';
import { digestMail } from '../mail/templates/digestMail';
import { mailPreferencesOf, type HeldPreference } from '../people/mailPreferences';
import type { Services } from '../services';
import { waitsForViewer } from '../skeds/waitsForViewer';

/** A result that has not come for so long is not asked for any more. */
const RESULT_LATEST_MS = 14 * DAY_MS;

interface Reader {
  id: string;
  email: string;
  name: string;
  time_zone: string;
  confirmed_at: number | null;
  last_at: number | null;
}

/**
 * Looks at everybody whose digest is due, once for each turn: mails what waits when something does, and notes the turn
 * either way, both in one transaction. Returns how many mails.
 */
export async function sendDigests(services: Services): Promise<number> {
  const people = await readers(services.db);
  const wishes = await mailPreferencesOf(
    services.db,
    people.map(({ id }) => id),
  );
  let mails = 0;
  for (const { id } of people.filter((one) => isDue(one, wishes.of(one.id), services.now()))) {
    if (await inTransaction(services.db, (tx) => sendDigest(tx, services, id))) mails += 1;
  }
  return mails;
}

function isDue(reader: Reader, wish: HeldPreference, nowMs: number): boolean {
  return (
    wish.topics.digest &&
    digestIsDue(nowMs, reader.time_zone, wish.digest, {
      lastMs: reader.last_at,
      sinceMs: Math.max(wish.sinceMs, reader.confirmed_at ?? nowMs),
    })
  );
}

async function sendDigest(tx: Tx, services: Services, personId: string): Promise<boolean> {
  const nowMs = services.now();
  const [reader] = await readers(tx, personId);
  if (!reader) return false;
  const wish = (await mailPreferencesOf(tx, [personId])).of(personId);
  if (!isDue(reader, wish, nowMs)) return false;
  await tx
    .insertInto('digest_sent')
    .values({ person_id: personId, at: nowMs })
    .onConflict((conflict) => conflict.column('person_id').doUpdateSet({ at: nowMs }))
    .execute();
  const all = await waitsForViewer({ ...services, db: tx }, { id: personId });
  const waiting = {
    offers: all.offers,
    reports: all.reports.filter((sked) => nowMs - sked.endMs < RESULT_LATEST_MS),
  };
  if (waiting.offers.length + waiting.reports.length === 0) return false;
  const { publicUrl } = services.config;
  const letter = digestMail(
    waiting,
    { name: reader.name, timeZone: reader.time_zone },
    { home: publicUrl + paths.home, preferences: publicUrl + paths.accountMail },
    nowMs,
  );
  const to = { personId, email: reader.email };
  await enqueueMail(tx, services, switchableMail(services.config, to, 'digest', letter));
  return true;
}

/** People with an account, or one of them, with when their digest was last looked at. */
function readers(db: Db | Tx, personId?: string): Promise<Reader[]> {
  return db
    .selectFrom('person')
    .leftJoin('digest_sent', 'digest_sent.person_id', 'person.id')
    .select([
      'person.id',
      'person.email',
      'person.name',
      'person.time_zone',
      'person.confirmed_at',
      'digest_sent.at as last_at',
    ])
    .where('person.confirmed_at', 'is not', null)
    .where('person.locked_at', 'is', null)
    .$if(personId !== undefined, (query) => query.where('person.id', '=', personId!))
    .execute();
}
