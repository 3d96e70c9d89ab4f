import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { Conflict } from '../errors';
import type { Services } from '../services';
import { requireEditor } from './access';
import { loadRevision, saveDraft, slotsInForce } from './revisions';

/**
 * Begins a new revision as a copy of the published one, without the slots that were given back. What stands in it is
 * pinned only where it was. Throws `NotFound`, `Forbidden`, or `Conflict` when there is nothing to copy or a draft is
 * there already.
 */
export async function beginDraft(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
): Promise<{ number: number }> {
  return inTransaction(services.db, async (tx) => {
    const activity = await requireEditor(tx, viewer, slug);
    const draft = await loadRevision(tx, activity.id, 'draft');
    if (draft) {
      throw new Conflict(`Revision ${draft.row.number} is being edited already. Go on with it.`);
    }
    const published = await loadRevision(tx, activity.id, 'published');
    if (!published) throw new Conflict('No plan is published yet, so there is nothing to revise.');
    await saveDraft(tx, activity.id, {
      slots: (await slotsInForce(tx, activity.id)).map(({ skedId: _, ...slot }) => slot),
      leftOutJson: published.row.left_out_json,
      runId: published.row.run_id,
      atMs: services.now(),
    });
    return { number: (await loadRevision(tx, activity.id, 'draft'))!.row.number };
  });
}
