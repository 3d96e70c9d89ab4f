import type { RunView } from '../../domain/activity/run';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { requireEditor } from './access';
import { newestRun, runView } from './planRuns';

/** The newest run of an activity as its coordinator sees it, or null. Throws `NotFound` or `Forbidden`. */
export async function planRunOf(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
): Promise<RunView | null> {
  const activity = await requireEditor(services.db, viewer, slug);
  const row = await newestRun(services.db, activity.id);
  return row ? runView(services.db, row) : null;
}
