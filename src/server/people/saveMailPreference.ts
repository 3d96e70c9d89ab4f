import type { MailPreference, SwitchableTopic } from '../../domain/people/mailPreference';
import type { Viewer } from '../auth/viewer';
import { inTransaction, type Tx } from '../db/transaction';
import type { Services } from '../services';
import { keepRemindersOfPerson } from '../reminders/keepReminders';
import { findPerson } from './findPerson';
import { mailPreferenceOf } from './mailPreferences';

/** Changes which mail the viewer wants. */
export function saveMailPreference(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  preference: MailPreference,
): Promise<void> {
  return inTransaction(services.db, (tx) => save(tx, services, viewer.id, preference));
}

/** Switches mails of one topic off or on again, as a link in a mail does. False when the person is gone. */
export function switchTopic(
  services: Services,
  personId: string,
  topic: SwitchableTopic,
  on: boolean,
): Promise<boolean> {
  return inTransaction(services.db, async (tx) => {
    if (!(await findPerson(tx, personId))) return false;
    const { sinceMs: _since, ...held } = await mailPreferenceOf(tx, personId);
    if (held.topics[topic] === on) return true;
    await save(tx, services, personId, { ...held, topics: { ...held.topics, [topic]: on } });
    return true;
  });
}

/** Reminders that follow from the wishes until now are made first, so that none of them falls between. */
async function save(
  tx: Tx,
  services: Services,
  personId: string,
  preference: MailPreference,
): Promise<void> {
  await keepRemindersOfPerson(tx, services, personId);
  const row = { preference_json: JSON.stringify(preference), updated_at: services.now() };
  await tx
    .insertInto('mail_preference')
    .values({ person_id: personId, ...row })
    .onConflict((conflict) => conflict.column('person_id').doUpdateSet(row))
    .execute();
}
