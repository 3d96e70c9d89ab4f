import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import type { Services } from '../services';
import { getPerson } from './findPerson';
import { requireAnotherAdministrator } from './lastAdministrator';
import { recordAct } from './recordAct';
import { voidTokens } from './tokens';

/**
 * Locks a person out: sessions end at once and no link signs in. Throws `NotFound`, or `Conflict` for
 * the last administrator.
 */
export async function lockPerson(
  services: Services,
  viewer: Viewer,
  personId: string,
): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    const person = await getPerson(tx, personId);
    if (person.locked_at !== null) return;
    await requireAnotherAdministrator(tx, person);
    const now = services.now();
    await tx
      .updateTable('person')
      .set({ locked_at: now, sessions_valid_from: now })
      .where('id', '=', personId)
      .execute();
    await voidTokens(tx, services, personId, ['signIn', 'resetPassword']);
    await recordAct(tx, services, viewer, 'person.lock', personId);
  });
}
