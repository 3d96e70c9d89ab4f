import { DAY_MS } from '../../domain/time/interval';
import type { Viewer } from '../auth/viewer';
import type { Db } from '../db/connection';
import type { Tx } from '../db/transaction';
import { Conflict, NotFound } from '../errors';
import { hashSecret, newId, newSecret } from '../ids';
import type { Services } from '../services';
import type { ActivityRow } from './records';

/** A link of an activity works until so long after its end. */
const AFTER_END_MS = 14 * DAY_MS;

/** Whose link it is, for which activity, and whether it still acts. */
export interface AnswerLink {
  activity: ActivityRow;
  person: Viewer;
  state: 'open' | 'used' | 'expired';
}

/** A fresh secret by which one person answers for their stations in one activity, without an account. */
export async function makeAnswerLink(
  tx: Tx,
  services: Pick<Services, 'now'>,
  personId: string,
  activity: Pick<ActivityRow, 'id' | 'end_at'>,
): Promise<string> {
  const { secret, hash } = newSecret();
  await tx
    .insertInto('guest_link')
    .values({
      id: newId(),
      token_hash: hash,
      person_id: personId,
      sked_id: null,
      activity_id: activity.id,
      created_at: services.now(),
      expires_at: activity.end_at + AFTER_END_MS,
      used_at: null,
    })
    .execute();
  return secret;
}

/** What a link leads to; writes nothing. Throws `NotFound`. */
export async function readAnswerLink(
  db: Db | Tx,
  services: Pick<Services, 'now'>,
  secret: string,
): Promise<AnswerLink> {
  const link = await db
    .selectFrom('guest_link')
    .selectAll()
    .where('token_hash', '=', hashSecret(secret))
    .where('activity_id', 'is not', null)
    .executeTakeFirst();
  const activity = link
    ? await db
        .selectFrom('activity')
        .selectAll()
        .where('id', '=', link.activity_id)
        .executeTakeFirst()
    : undefined;
  const person = link
    ? await db
        .selectFrom('person')
        .selectAll()
        .where('id', '=', link.person_id)
        .where('locked_at', 'is', null)
        .executeTakeFirst()
    : undefined;
  if (!link || !activity || !person) {
    throw new NotFound('This link leads nowhere. Take the newest one from your mail.');
  }
  const expired = link.expires_at <= services.now();
  return {
    activity,
    person: {
      id: person.id,
      email: person.email,
      name: person.name,
      // A link answers for stations and does nothing else, whoever's it is.
      role: 'operator',
      timeZone: person.time_zone,
    },
    state: expired ? 'expired' : link.used_at === null ? 'open' : 'used',
  };
}

/** Consumes the link within the transaction of what it does. Throws `NotFound` or `Conflict`. */
export async function consumeAnswerLink(
  tx: Tx,
  services: Pick<Services, 'now'>,
  secret: string,
): Promise<AnswerLink> {
  const link = await readAnswerLink(tx, services, secret);
  if (link.state !== 'open') {
    throw new Conflict(
      link.state === 'used'
        ? 'This link was already used. Ask for a fresh one below.'
        : 'This link has expired.',
    );
  }
  await tx
    .updateTable('guest_link')
    .set({ used_at: services.now() })
    .where('token_hash', '=', hashSecret(secret))
    .execute();
  return link;
}
