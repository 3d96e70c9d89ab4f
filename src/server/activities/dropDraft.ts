import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { Conflict } from '../errors';
import type { Services } from '../services';
import { requireEditor } from './access';
import { loadRevision } from './revisions';

/** Throws a draft away; the published plan stands as it is. Without one the activity collects answers again. */
export async function dropDraft(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    const activity = await requireEditor(tx, viewer, slug);
    const draft = await loadRevision(tx, activity.id, 'draft');
    if (!draft) throw new Conflict('There is no draft to throw away.');
    await tx.deleteFrom('activity_revision').where('id', '=', draft.row.id).execute();
    if (activity.state === 'planned') {
      await tx
        .updateTable('activity')
        .set({
          state: 'collecting',
          version: activity.version + 1,
          updated_at: services.now(),
        })
        .where('id', '=', activity.id)
        .execute();
    }
  });
}
