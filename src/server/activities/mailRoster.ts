import { paths } from '../../paths';
import type { Tx } from '../db/transaction';
import { enqueueMail } from '../mail/outbox';
import { activityMail, type ActivityMailKind } from '../mail/templates/activityMail';
import type { Services } from '../services';
import { makeAnswerLink } from './answerLink';
import { activityView, type ActivityRow } from './records';
import { rosterRecipients, type RosterRecipient } from './rosterRecipients';

/**
 * Writes to the crews of the stations, one mail to each person for all of theirs, within the caller's transaction.
 * Guests get a link of their own. Returns how many mails that are.
 */
export async function mailRoster(
  tx: Tx,
  services: Services,
  row: ActivityRow,
  kind: ActivityMailKind,
  stationIds: readonly string[],
  only?: (recipient: RosterRecipient) => boolean,
): Promise<number> {
  const activity = await activityView(tx, row, services.now());
  const coordinator = await tx
    .selectFrom('person')
    .select('email')
    .where('id', '=', row.coordinator_id)
    .executeTakeFirst();
  const byPerson = new Map<string, RosterRecipient[]>();
  for (const recipient of await rosterRecipients(tx, stationIds)) {
    if (only && !only(recipient)) continue;
    byPerson.set(recipient.personId, [...(byPerson.get(recipient.personId) ?? []), recipient]);
  }
  for (const [personId, entries] of byPerson) {
    const first = entries[0]!;
    const address = first.guest
      ? paths.rosterAnswer(await makeAnswerLink(tx, services, personId, row))
      : paths.activityAnswer(row.slug);
    await enqueueMail(
      tx,
      services,
      activityMail({
        kind,
        activity,
        to: first,
        callSigns: entries.map(({ callSign }) => callSign),
        url: services.config.publicUrl + address,
        guest: first.guest,
        replyTo: coordinator?.email,
      }),
    );
  }
  return byPerson.size;
}
