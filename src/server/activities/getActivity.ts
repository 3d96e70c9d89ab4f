import type { ActivityView } from '../../domain/activity/views';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { activityAccess } from './access';
import { activityView } from './records';

/** The activity and the viewer's part in it. Throws `NotFound` for who may not know of it. */
export async function getActivity(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'> | null,
  slug: string,
): Promise<{
  activity: ActivityView;
  /** May edit it. */
  editor: boolean;
  /** Stations of the viewer on the roster. */
  own: { stationId: string; callSign: string }[];
}> {
  const { row, editor, own } = await activityAccess(services.db, viewer, slug);
  return { activity: await activityView(services.db, row, services.now()), editor, own };
}
