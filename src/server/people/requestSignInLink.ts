import { inTransaction } from '../db/transaction';
import { enqueueMail } from '../mail/outbox';
import { signInLinkMail } from '../mail/templates/people';
import type { Services } from '../services';
import { findPersonByEmail } from './findPerson';
import { sendConfirmMail } from './sendConfirmMail';
import { issueToken } from './tokens';

/**
 * Mails a link that signs in once. An address not confirmed yet gets the link to confirm it instead;
 * unknown addresses and locked accounts get nothing, and nobody is told which it was.
 */
export async function requestSignInLink(services: Services, email: string): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    const person = await findPersonByEmail(tx, email);
    if (!person || person.locked_at !== null) return;
    if (person.confirmed_at === null) return sendConfirmMail(tx, services, person);
    const link = await issueToken(tx, services, person.id, 'signIn');
    await enqueueMail(tx, services, signInLinkMail(services.config.publicUrl, person, link));
  });
}
