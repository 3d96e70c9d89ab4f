import type { Tx } from '../db/transaction';
import type { Services } from '../services';

/** What became of a mail that came in. */
export type InboundOutcome =
  | 'answered'
  | 'message'
  /** It says nothing that changes anything, such as "perhaps". */
  | 'noted'
  /** It says what is so already. */
  | 'unchanged'
  /** The offer it answers has been replaced since. */
  | 'stale'
  | 'refused'
  | 'duplicate'
  /** Not to one of our reply addresses, or written by a program. */
  | 'ignored';

/** Thrown when the mail has been counted already; ends the transaction without a change. */
export class Duplicate extends Error {}

/** Counts the mail, so that it has its effect once however often it is delivered. Throws `Duplicate`. */
export async function claimMail(
  tx: Tx,
  { now }: Pick<Services, 'now'>,
  messageId: string,
  outcome: InboundOutcome,
): Promise<void> {
  const { numInsertedOrUpdatedRows } = await tx
    .insertInto('inbound_mail')
    .values({ message_id: messageId, received_at: now(), outcome })
    .onConflict((conflict) => conflict.column('message_id').doNothing())
    .executeTakeFirstOrThrow();
  if (numInsertedOrUpdatedRows !== 1n) throw new Duplicate('This mail was counted already.');
}
