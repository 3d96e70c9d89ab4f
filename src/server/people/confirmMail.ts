import { hashPassword } from '../auth/password';
import type { PersonRow } from '../db/tables';
import { inTransaction } from '../db/transaction';
import { Forbidden } from '../errors';
import type { Services } from '../services';
import { getPerson } from './findPerson';
import { takeOverGuestStations } from '../guests/takeOver';
import { consumeToken, typedWithToken, voidTokens } from './tokens';

/**
 * Confirms the address behind the link and sets the first password; stations that others described for the address
 * become the person's own. Returns the person, who may now
 * be signed in. Throws `NotFound`, `Conflict` (used or too old) or `Forbidden` (locked).
 */
export async function confirmMail(
  services: Services,
  { secret, password }: { secret: string; password: string },
): Promise<PersonRow> {
  const passwordHash = await hashPassword(password);
  return inTransaction(services.db, async (tx) => {
    const personId = await consumeToken(tx, services, secret, 'confirmMail');
    const person = await getPerson(tx, personId);
    if (person.locked_at !== null) throw new Forbidden('This account is locked.');
    const typed = await typedWithToken(tx, secret);
    const change = {
      ...(typed ? { name: typed.name, time_zone: typed.timeZone } : {}),
      confirmed_at: services.now(),
      password_hash: passwordHash,
      sessions_valid_from: services.now(),
    };
    await tx.updateTable('person').set(change).where('id', '=', personId).execute();
    await voidTokens(tx, services, personId, ['confirmMail']);
    await takeOverGuestStations(tx, services, { ...person, ...change });
    return { ...person, ...change };
  });
}
