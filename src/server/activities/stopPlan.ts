import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { Conflict } from '../errors';
import type { Services } from '../services';
import { requireEditor } from './access';
import { newestRun } from './planRuns';

/**
 * Asks the run under way to stop and keep its best plan so far. One that nobody has begun yet ends without a plan.
 * Throws `NotFound`, `Forbidden`, or `Conflict` when none is under way.
 */
export async function stopPlan(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
): Promise<void> {
  const nowMs = services.now();
  await inTransaction(services.db, async (tx) => {
    const activity = await requireEditor(tx, viewer, slug);
    const run = await newestRun(tx, activity.id);
    if (!run || run.ended_at !== null) throw new Conflict('No plan is being computed.');
    await tx
      .updateTable('plan_run')
      .set(
        run.state === 'queued'
          ? { state: 'stopped', stop_asked_at: nowMs, ended_at: nowMs }
          : { stop_asked_at: nowMs },
      )
      .where('id', '=', run.id)
      .execute();
  });
}
