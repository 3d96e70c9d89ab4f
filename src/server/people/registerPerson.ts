import { z } from 'zod';
import { inTransaction } from '../db/transaction';
import { newId } from '../ids';
import { enqueueMail } from '../mail/outbox';
import { alreadyRegisteredMail } from '../mail/templates/people';
import type { Services } from '../services';
import { emailField, nameField, timeZoneField } from './fields';
import { findPersonByEmail } from './findPerson';
import { sendConfirmMail } from './sendConfirmMail';

export const registrationSchema = z.object({
  name: nameField,
  email: emailField,
  timeZone: timeZoneField,
});

export type Registration = z.output<typeof registrationSchema>;

/**
 * Registers a person and mails the link that confirms the address. The password is chosen behind that
 * link, so that only who reads the mail has it. An address that is registered already gets a mail that
 * says so; whoever fills the form in sees the same answer in every case.
 */
export async function registerPerson(services: Services, given: Registration): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    const known = await findPersonByEmail(tx, given.email);
    if (known && known.confirmed_at !== null) {
      await enqueueMail(tx, services, alreadyRegisteredMail(services.config.publicUrl, known));
      return;
    }
    const now = services.now();
    const written = { name: given.name, time_zone: given.timeZone };
    const id = known?.id ?? newId();
    // Somebody known already may have skeds without an account: what is typed here counts once it is confirmed.
    if (!known) {
      await tx
        .insertInto('person')
        .values({
          ...written,
          id,
          email: given.email,
          password_hash: null,
          role: 'operator',
          confirmed_at: null,
          locked_at: null,
          sessions_valid_from: now,
          created_at: now,
        })
        .execute();
    }
    await sendConfirmMail(
      tx,
      services,
      { ...written, id, email: given.email },
      {
        name: given.name,
        timeZone: given.timeZone,
      },
    );
  });
}
