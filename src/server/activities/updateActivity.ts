import type { ActivitySettings } from '../../domain/activity/settings';
import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { Conflict, InvalidInput } from '../errors';
import type { Services } from '../services';
import { requireEditor } from './access';
import { refuseProblems, saveBands, settingsColumns } from './createActivity';

/**
 * Changes the settings of an activity. Hours that stations named are cut to new dates. Dates and bands stand still
 * once a plan is published, because its skeds lie in them. Throws `NotFound`, `Forbidden`, `Conflict` for a version
 * that somebody else has changed, or `InvalidInput`.
 */
export async function updateActivity(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
  version: number,
  settings: ActivitySettings,
): Promise<{ version: number }> {
  return inTransaction(services.db, async (tx) => {
    const row = await requireEditor(tx, viewer, slug);
    if (row.version !== version) {
      throw new Conflict('Somebody else has changed this activity since. Reload the page.');
    }
    const moved = row.start_at !== settings.startMs || row.end_at !== settings.endMs;
    if (row.state === 'published' && moved) {
      const message = 'The dates stand still once a plan is published.';
      throw new InvalidInput(message, [{ path: 'start', message }]);
    }
    if (row.state !== 'published') refuseProblems(settings, services.now());
    await tx
      .updateTable('activity')
      .set({
        ...settingsColumns(settings),
        version: version + 1,
        updated_at: services.now(),
      })
      .where('id', '=', row.id)
      .execute();
    await saveBands(tx, row.id, settings);
    return { version: version + 1 };
  });
}
