import type { PersonRow } from '../db/tables';
import { inTransaction } from '../db/transaction';
import { Forbidden } from '../errors';
import type { Services } from '../services';
import { getPerson, isActive } from './findPerson';
import { consumeToken } from './tokens';

/**
 * Uses a sign-in link up and returns whom it signs in. Throws `NotFound`, `Conflict` (used or too old)
 * or `Forbidden` (locked), and then leaves the link as it was.
 */
export async function useSignInLink(services: Services, secret: string): Promise<PersonRow> {
  return inTransaction(services.db, async (tx) => {
    const person = await getPerson(tx, await consumeToken(tx, services, secret, 'signIn'));
    if (!isActive(person)) throw new Forbidden('This account is locked.');
    return person;
  });
}
