import type { ActivityView, RosterStation, RosterWish } from '../../domain/activity/views';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { requireEditor } from './access';
import { loadRoster } from './loadRoster';
import { activityView } from './records';

export interface Workbench {
  activity: ActivityView;
  roster: RosterStation[];
  wishes: RosterWish[];
}

/** Everything a coordinator works with. Throws `NotFound` or `Forbidden`. */
export async function getWorkbench(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
): Promise<Workbench> {
  const row = await requireEditor(services.db, viewer, slug);
  const { stations, wishes } = await loadRoster(services.db, row);
  return {
    activity: await activityView(services.db, row, services.now()),
    roster: stations,
    wishes,
  };
}
