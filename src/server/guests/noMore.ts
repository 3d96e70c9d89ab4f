import { createHmac, timingSafeEqual } from 'node:crypto';
import { paths } from '../../paths';
import { authSecret } from '../auth/secret';
import type { Config } from '../config';
import { inTransaction } from '../db/transaction';
import { NotFound } from '../errors';
import { findPerson } from '../people/findPerson';
import type { Services } from '../services';

type Sealed = Pick<Config, 'dataDir'>;

/** What ends all mail to one person without an account. It can do nothing else, and does not expire. */
export function noMoreToken({ dataDir }: Sealed, personId: string): string {
  return `${personId}.${seal(dataDir, personId)}`;
}

/** The address for the headers of RFC 8058 and for the footer of a mail. */
export function noMoreUrl(config: Pick<Config, 'dataDir' | 'publicUrl'>, personId: string): string {
  return config.publicUrl + paths.noMore(noMoreToken(config, personId));
}

/** Whose address the token ends mail to, or null when it was not made here. */
export function readNoMoreToken({ dataDir }: Sealed, token: string): string | null {
  const [personId = '', given = '', ...more] = token.split('.');
  const right = Buffer.from(seal(dataDir, personId));
  const sent = Buffer.from(given);
  if (more.length > 0 || sent.length !== right.length) return null;
  return timingSafeEqual(sent, right) ? personId : null;
}

/** The address of a token, and whether mail to it has been ended; null for a token that was not made here. */
export async function readNoMore(
  { db, config }: Services,
  token: string,
): Promise<{ email: string; ended: boolean; account: boolean } | null> {
  const personId = readNoMoreToken(config, token);
  const person = personId === null ? undefined : await findPerson(db, personId);
  if (!person) return null;
  const block = await db
    .selectFrom('mail_block')
    .select('at')
    .where('email', '=', person.email)
    .executeTakeFirst();
  return {
    email: person.email,
    ended: block !== undefined,
    account: person.confirmed_at !== null,
  };
}

/** Ends all mail from people whom the person does not know. Twice is as good as once. Throws `NotFound`. */
export async function endMail(services: Services, token: string): Promise<void> {
  const personId = readNoMoreToken(services.config, token);
  await inTransaction(services.db, async (tx) => {
    const person = personId === null ? undefined : await findPerson(tx, personId);
    if (!person) throw new NotFound('This link is not one of ours, or a part of it is missing.');
    await tx
      .insertInto('mail_block')
      .values({ email: person.email, at: services.now() })
      .onConflict((conflict) => conflict.column('email').doNothing())
      .execute();
  });
}

function seal(dataDir: string, personId: string): string {
  return createHmac('sha256', authSecret(dataDir))
    .update(`no more\n${personId}`)
    .digest('base64url');
}
