import { paths } from '../../paths';
import type { Viewer } from '../auth/viewer';
import type { Db } from '../db/connection';
import type { PersonRow } from '../db/tables';
import { inTransaction, type Tx } from '../db/transaction';
import { Conflict, Forbidden, NotFound } from '../errors';
import { hashSecret } from '../ids';
import { findPerson } from '../people/findPerson';
import type { Services } from '../services';
import { linkForRecipient } from '../skeds/linkForRecipient';

/** What a link to a sked is good for now. `used` and `expired` still tell where the sked stands. */
export type GuestLinkState = 'usable' | 'used' | 'expired';

export interface GuestLink {
  state: GuestLinkState;
  person: PersonRow;
  skedId: string;
}

/** Looks at a secret without using it up; null when it is not one of ours, or for something else than a sked. */
export async function findGuestLink(
  { db, now }: { db: Db | Tx; now: () => number },
  secret: string,
): Promise<GuestLink | null> {
  const row = await db
    .selectFrom('guest_link')
    .select(['person_id', 'sked_id', 'expires_at', 'used_at'])
    .where('token_hash', '=', hashSecret(secret))
    .executeTakeFirst();
  if (!row || row.sked_id === null) return null;
  const person = await findPerson(db, row.person_id);
  if (!person) return null;
  const state = row.used_at !== null ? 'used' : row.expires_at <= now() ? 'expired' : 'usable';
  return { state, person, skedId: row.sked_id };
}

/** The person as use cases take somebody who acts. */
export function viewerOf({ id, email, name, role, time_zone }: PersonRow): Viewer {
  return { id, email, name, role, timeZone: time_zone };
}

/** Throws `NotFound`, `Conflict` for a link that was used or is too old, `Forbidden` for somebody who is locked out. */
export async function requireUsableLink(
  from: { db: Db | Tx; now: () => number },
  secret: string,
): Promise<GuestLink> {
  const link = await findGuestLink(from, secret);
  if (!link) throw new NotFound('This link is not one of ours, or a part of it is missing.');
  if (link.person.locked_at !== null) {
    throw new Forbidden('This address is locked here, so nothing can be answered with it.');
  }
  if (link.state === 'used') {
    throw new Conflict('This link was used already; a newer one is in your mail. Nothing changed.');
  }
  if (link.state === 'expired') {
    throw new Conflict('This link is too old to answer with. Nothing changed.');
  }
  return link;
}

/** Uses the link up, as the first thing in the transaction of what is done with it. Throws as `requireUsableLink`. */
export async function useLink(
  tx: Tx,
  { now }: Pick<Services, 'now'>,
  secret: string,
): Promise<GuestLink> {
  const link = await requireUsableLink({ db: tx, now }, secret);
  await tx
    .updateTable('guest_link')
    .set({ used_at: now() })
    .where('token_hash', '=', hashSecret(secret))
    .execute();
  return link;
}

/** Path of a new link of the same person to the same sked; the one from the mail has just been used. */
export function freshLink(
  services: Services,
  { person, skedId }: Pick<GuestLink, 'person' | 'skedId'>,
): Promise<string> {
  return inTransaction(services.db, async (tx) => {
    const sked = await tx
      .selectFrom('sked')
      .select(['id', 'end_at'])
      .where('id', '=', skedId)
      .executeTakeFirstOrThrow();
    const url = await linkForRecipient(tx, services, { personId: person.id, account: false }, sked);
    return url.slice(services.config.publicUrl.length);
  });
}

/** The secret in the path of a link. */
export function secretIn(path: string): string {
  return path.slice(paths.answer('').length);
}
