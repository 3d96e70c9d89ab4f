import { paths } from '../../paths';
import type { Tx } from '../db/transaction';
import { enqueueMail } from '../mail/outbox';
import { switchableMail } from '../mail/switchable';
import { activityMail, type ActivityMailKind } from '../mail/templates/activityMail';
import { mailPreferencesOf } from '../people/mailPreferences';
import type { Services } from '../services';
import { makeAnswerLink } from './answerLink';
import { activityView, type ActivityRow } from './records';
import { rosterRecipients, type RosterRecipient } from './rosterRecipients';

/**
 * Writes to the crews of the stations, one mail to each person for all of theirs, within the caller's transaction;
 * whoever switched mails about activities off gets none. Guests get a link of their own. Returns how many mails.
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
  const wishes = await mailPreferencesOf(tx, [...byPerson.keys()]);
  let written = 0;
  for (const [personId, entries] of byPerson) {
    const first = entries[0]!;
    // A fresh link was asked for by whoever gets it.
    if (kind !== 'freshLink' && !wishes.of(personId).topics.activity) continue;
    const address = first.guest
      ? paths.rosterAnswer(await makeAnswerLink(tx, services, personId, row))
      : paths.activityAnswer(row.slug);
    await enqueueMail(tx, services, {
      ...switchableMail(
        services.config,
        first,
        'activity',
        activityMail({
          kind,
          activity,
          to: first,
          callSigns: entries.map(({ callSign }) => callSign),
          url: services.config.publicUrl + address,
          guest: first.guest,
        }),
      ),
      activityId: row.id,
      ...(coordinator ? { replyTo: coordinator.email } : {}),
    });
    written += 1;
  }
  return written;
}
