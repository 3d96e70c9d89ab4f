import type { Db } from '../db/connection';
import type { TokenPurpose } from '../db/tables';
import type { Tx } from '../db/transaction';
import { Conflict, NotFound } from '../errors';
import { hashSecret, newId, newSecret } from '../ids';
import type { Services } from '../services';

const MINUTE_MS = 60_000;

/** How long a link in a mail works. */
export const TOKEN_LIFETIME_MS: Record<TokenPurpose, number> = {
  confirmMail: 3 * 24 * 60 * MINUTE_MS,
  signIn: 30 * MINUTE_MS,
  resetPassword: 60 * MINUTE_MS,
};

/** What a link in a mail is good for now. */
export type TokenState = 'usable' | 'used' | 'expired' | 'unknown';

/** Counts from when the address is confirmed: until then anybody may have typed it. */
export interface TypedOnRegistering {
  name: string;
  timeZone: string;
}

const REFUSALS: Record<Exclude<TokenState, 'usable' | 'unknown'>, string> = {
  used: 'This link was used already. Each works once.',
  expired: 'This link is too old to work. Ask for a new one.',
};

/** Stores a one-purpose secret for the person, hashed; returns the secret for the link, and until when it works. */
export async function issueToken(
  tx: Tx,
  { now }: Pick<Services, 'now'>,
  personId: string,
  purpose: TokenPurpose,
  registration: TypedOnRegistering | null = null,
): Promise<{ secret: string; expiresAtMs: number }> {
  const { secret, hash } = newSecret();
  const createdAt = now();
  const expiresAtMs = createdAt + TOKEN_LIFETIME_MS[purpose];
  await tx
    .insertInto('person_token')
    .values({
      id: newId(),
      person_id: personId,
      purpose,
      token_hash: hash,
      created_at: createdAt,
      expires_at: expiresAtMs,
      used_at: null,
      registration_json: registration && JSON.stringify(registration),
    })
    .execute();
  return { secret, expiresAtMs };
}

/** What was typed on registering with the secret's link; null where nothing was. */
export async function typedWithToken(tx: Tx, secret: string): Promise<TypedOnRegistering | null> {
  const row = await tx
    .selectFrom('person_token')
    .select('registration_json')
    .where('token_hash', '=', hashSecret(secret))
    .executeTakeFirst();
  return row?.registration_json ? (JSON.parse(row.registration_json) as TypedOnRegistering) : null;
}

/** Looks at a secret without using it up. A secret for another purpose is unknown. */
export async function peekToken(
  { db, now }: { db: Db | Tx; now: () => number },
  secret: string,
  purpose: TokenPurpose,
): Promise<{ state: TokenState; personId?: string; email?: string }> {
  const row = await db
    .selectFrom('person_token')
    .innerJoin('person', 'person.id', 'person_token.person_id')
    .select(['person_id', 'person.email', 'used_at', 'expires_at'])
    .where('token_hash', '=', hashSecret(secret))
    .where('purpose', '=', purpose)
    .executeTakeFirst();
  if (!row) return { state: 'unknown' };
  const known = { personId: row.person_id, email: row.email };
  if (row.used_at !== null) return { state: 'used', ...known };
  if (row.expires_at <= now()) return { state: 'expired', ...known };
  return { state: 'usable', ...known };
}

/** Uses a secret up and returns whose it was. Throws `NotFound` or `Conflict` with the state in words. */
export async function consumeToken(
  tx: Tx,
  { now }: Pick<Services, 'now'>,
  secret: string,
  purpose: TokenPurpose,
): Promise<string> {
  const found = await peekToken({ db: tx, now }, secret, purpose);
  if (found.state === 'unknown' || found.personId === undefined) {
    throw new NotFound('This link is not one of ours, or a part of it is missing.');
  }
  if (found.state !== 'usable') throw new Conflict(REFUSALS[found.state], { state: found.state });
  await tx
    .updateTable('person_token')
    .set({ used_at: now() })
    .where('token_hash', '=', hashSecret(secret))
    .execute();
  return found.personId;
}

/** Ends every link that could still open the person's account. */
export async function voidTokens(
  tx: Tx,
  { now }: Pick<Services, 'now'>,
  personId: string,
  purposes: readonly TokenPurpose[],
): Promise<void> {
  await tx
    .updateTable('person_token')
    .set({ used_at: now() })
    .where('person_id', '=', personId)
    .where('purpose', 'in', purposes)
    .where('used_at', 'is', null)
    .execute();
}
