import type { ExpressionBuilder } from 'kysely';
import type { Tables } from '../db/tables';
import type { Tx } from '../db/transaction';
import { noMoreUrl } from '../guests/noMore';
import { guestContent } from '../mail/templates/guestMail';
import type { MailContent } from '../mail/shell';
import type { SkedMailFacts } from '../mail/templates/skedFacts';
import type { Services } from '../services';
import { linkForRecipient } from './linkForRecipient';
import type { SkedLetter } from './sendSkedMail';

/** Where `person` and `station` are joined: a guest station whose keeper has not asked for no more mail. */
export function guestReached(or: ExpressionBuilder<Tables, 'person' | 'station'>) {
  return or.and([
    or('station.guest', '=', 1),
    or('person.email', 'not in', (blocked) => blocked.selectFrom('mail_block').select('email')),
  ]);
}

/**
 * What is different in a letter to somebody without an account: the link needs none, and it says who gave the address
 * and how to end all mail.
 */
export async function letterForGuest(
  tx: Tx,
  services: Services,
  { sked, facts, recipient, content }: SkedLetter,
): Promise<{ facts: SkedMailFacts; content: MailContent; unsubscribeUrl: string }> {
  const url = await linkForRecipient(
    tx,
    services,
    { personId: recipient.personId, account: false },
    { id: sked.id, end_at: facts.endMs },
  );
  const unsubscribeUrl = noMoreUrl(services.config, recipient.personId);
  return {
    facts: { ...facts, url },
    content: guestContent(content, {
      url,
      noMoreUrl: unsubscribeUrl,
      askedBy: await askedBy(tx, sked.id),
    }),
    unsubscribeUrl,
  };
}

/** Who offered the sked first: "Ylva, QA1LUN". */
async function askedBy(tx: Tx, skedId: string): Promise<string> {
  const row = await tx
    .selectFrom('sked_event')
    .innerJoin('person', 'person.id', 'sked_event.person_id')
    .innerJoin('station', 'station.id', 'sked_event.station_id')
    .select(['person.name', 'station.call_sign'])
    .where('sked_event.sked_id', '=', skedId)
    .where('sked_event.kind', '=', 'offered')
    .orderBy('sked_event.sked_version')
    .executeTakeFirst();
  return row ? `${row.name}, ${row.call_sign},` : 'Somebody';
}
