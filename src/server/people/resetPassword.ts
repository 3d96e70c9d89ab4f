import { hashPassword } from '../auth/password';
import { inTransaction } from '../db/transaction';
import { Forbidden } from '../errors';
import type { Services } from '../services';
import { getPerson, isActive } from './findPerson';
import { setPassword } from './setPassword';
import { consumeToken } from './tokens';

/**
 * Sets a new password behind a reset link; every session ends. Throws `NotFound`, `Conflict` (used or
 * too old) or `Forbidden` (locked).
 */
export async function resetPassword(
  services: Services,
  { secret, password }: { secret: string; password: string },
): Promise<void> {
  const passwordHash = await hashPassword(password);
  await inTransaction(services.db, async (tx) => {
    const person = await getPerson(tx, await consumeToken(tx, services, secret, 'resetPassword'));
    if (!isActive(person)) throw new Forbidden('This account is locked.');
    await setPassword(tx, services, person, passwordHash);
  });
}
