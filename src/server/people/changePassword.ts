import { hashPassword, passwordMatches } from '../auth/password';
import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { InvalidInput } from '../errors';
import type { Services } from '../services';
import { getPerson } from './findPerson';
import { setPassword } from './setPassword';

/**
 * Changes the viewer's own password; every session ends, the caller signs the viewer in again.
 * Throws `InvalidInput` when the current password is wrong.
 */
export async function changePassword(
  services: Services,
  viewer: Viewer,
  { currentPassword, newPassword }: { currentPassword: string; newPassword: string },
): Promise<void> {
  const before = await getPerson(services.db, viewer.id);
  if (!(await passwordMatches(currentPassword, before.password_hash))) {
    const message = 'That is not your current password.';
    throw new InvalidInput(message, [{ path: 'currentPassword', message }]);
  }
  const passwordHash = await hashPassword(newPassword);
  await inTransaction(services.db, async (tx) => {
    const person = await getPerson(tx, viewer.id);
    if (person.password_hash !== before.password_hash) {
      throw new InvalidInput('Your password was changed a moment ago from another place.');
    }
    await setPassword(tx, services, person, passwordHash);
  });
}
