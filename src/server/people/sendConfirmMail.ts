import type { PersonRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { enqueueMail } from '../mail/outbox';
import { confirmAddressMail } from '../mail/templates/people';
import type { Services } from '../services';
import { issueToken, type TypedOnRegistering } from './tokens';

/** Mails a new link that confirms the person's address. */
export async function sendConfirmMail(
  tx: Tx,
  services: Services,
  person: Pick<PersonRow, 'id' | 'email' | 'name' | 'time_zone'>,
  registration: TypedOnRegistering | null = null,
): Promise<void> {
  const link = await issueToken(tx, services, person.id, 'confirmMail', registration);
  await enqueueMail(tx, services, confirmAddressMail(services.config.publicUrl, person, link));
}
