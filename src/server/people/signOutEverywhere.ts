import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import type { Services } from '../services';
import { voidTokens } from './tokens';

/** Ends every session of the viewer, this one too, and every link that could start another. */
export async function signOutEverywhere(services: Services, viewer: Viewer): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    await tx
      .updateTable('person')
      .set({ sessions_valid_from: services.now() })
      .where('id', '=', viewer.id)
      .execute();
    await voidTokens(tx, services, viewer.id, ['signIn', 'resetPassword']);
  });
}
