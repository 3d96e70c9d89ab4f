import { z } from 'zod';
import { formatUtcRange } from '../../domain/time/format';
import { Conflict, NotFound } from '../errors';
import type { Services } from '../services';
import { cancelSked } from '../skeds/cancelSked';
import { wordsSchema } from '../skeds/schemas';
import { consumeAnswerLink, makeAnswerLink, readAnswerLink } from './answerLink';

export const giveBackSchema = z.object({
  skedId: z.string('Name the slot.').min(1, 'Name the slot.').max(64, 'That is not a slot.'),
  /** When the slot began on the page, in milliseconds: one that was moved since is not given back unseen. */
  startMs: z.coerce.number('Say which slot you saw.').int('Say which slot you saw.'),
  words: wordsSchema,
});

/**
 * Gives a slot of the plan back by the link in the mail of somebody without an account, through the same use case as
 * everybody. Uses the link up in the same transaction and returns the secret of a fresh one. Throws `NotFound` or
 * `Conflict`.
 */
export async function giveBackByLink(
  services: Services,
  secret: string,
  { skedId, startMs, words }: z.output<typeof giveBackSchema>,
): Promise<{ secret: string }> {
  const { activity, person } = await readAnswerLink(services.db, services, secret);
  const sked = await services.db
    .selectFrom('sked')
    .select(['version', 'start_at', 'end_at'])
    .where('id', '=', skedId)
    .where('activity_id', '=', activity.id)
    .executeTakeFirst();
  if (!sked) throw new NotFound('There is no such slot in this plan.');
  if (sked.start_at !== startMs) {
    const now = formatUtcRange({ startMs: sked.start_at, endMs: sked.end_at });
    throw new Conflict(`The slot was moved since: it is ${now} now. Nothing was changed.`);
  }
  let fresh = '';
  await cancelSked(services, person, skedId, {
    version: sked.version,
    words,
    first: async (tx) => {
      await consumeAnswerLink(tx, services, secret);
      fresh = await makeAnswerLink(tx, services, person.id, activity);
    },
  });
  return { secret: fresh };
}
