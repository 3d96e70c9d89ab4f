import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import type { Services } from '../services';
import { getPerson } from './findPerson';
import { recordAct } from './recordAct';

/** Lets a locked person sign in again. Throws `NotFound`. */
export async function unlockPerson(
  services: Services,
  viewer: Viewer,
  personId: string,
): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    const person = await getPerson(tx, personId);
    if (person.locked_at === null) return;
    await tx.updateTable('person').set({ locked_at: null }).where('id', '=', personId).execute();
    await recordAct(tx, services, viewer, 'person.unlock', personId);
  });
}
