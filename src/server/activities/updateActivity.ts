import type { ActivitySettings } from '../../domain/activity/settings';
import type { Viewer } from '../auth/viewer';
import type { ActivityBandTable } from '../db/tables';
import { inTransaction, type Tx } from '../db/transaction';
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
    if (row.state === 'published' && !sameBands(await bandsIn(tx, row.id), settings.bands)) {
      const message = 'The bands stand still once a plan is published.';
      throw new InvalidInput(message, [{ path: 'bands', message }]);
    }
    // The dates of a published one cannot be wrong any more, but may have passed.
    refuseProblems(settings, row.state === 'published' ? row.start_at : services.now());
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

type Band = Pick<ActivityBandTable, 'band' | 'mode'> & { frequencyMhz: number };

async function bandsIn(tx: Tx, activityId: string): Promise<Band[]> {
  const rows = await tx
    .selectFrom('activity_band')
    .selectAll()
    .where('activity_id', '=', activityId)
    .execute();
  return rows.map(({ band, mode, frequency_mhz: frequencyMhz }) => ({ band, mode, frequencyMhz }));
}

function sameBands(a: readonly Band[], b: readonly Band[]): boolean {
  const text = (bands: readonly Band[]) =>
    bands
      .map(({ band, mode, frequencyMhz }) => `${band} ${mode} ${frequencyMhz}`)
      .sort()
      .join();
  return text(a) === text(b);
}
