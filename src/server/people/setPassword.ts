import type { PersonRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { enqueueMail } from '../mail/outbox';
import { passwordChangedMail } from '../mail/templates/people';
import type { Services } from '../services';
import { voidTokens } from './tokens';

/** Stores the password, ends every session and open link of the person, and mails that it happened. */
export async function setPassword(
  tx: Tx,
  services: Services,
  person: PersonRow,
  passwordHash: string,
): Promise<void> {
  const now = services.now();
  await tx
    .updateTable('person')
    .set({ password_hash: passwordHash, sessions_valid_from: now })
    .where('id', '=', person.id)
    .execute();
  await voidTokens(tx, services, person.id, ['signIn', 'resetPassword']);
  await enqueueMail(tx, services, passwordChangedMail(services.config.publicUrl, person, now));
}
