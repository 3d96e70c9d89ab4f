import type { MatrixPair } from '../../domain/activity/matrix';
import { wishedPairs, type WishedPair } from '../../domain/activity/wishes';
import type { ActivityView, RosterStation, RosterWish } from '../../domain/activity/views';
import type { BandId } from '../../domain/station/bands';
import type { Viewer } from '../auth/viewer';
import { InvalidInput } from '../errors';
import type { Services } from '../services';
import { requireEditor } from './access';
import { activityMatrix } from './activityMatrix';
import { loadRoster } from './loadRoster';
import { activityView } from './records';

export interface WishesPage {
  activity: ActivityView;
  band: BandId;
  roster: RosterStation[];
  wishes: RosterWish[];
  /** Pairs that can meet on the band. */
  pairs: MatrixPair[];
  /** Pairs for which a contact is wished, with the bands that both have. */
  wished: WishedPair[];
}

/** Who can meet whom on a band, and who wants to. Throws `NotFound`, `Forbidden` or `InvalidInput`. */
export async function getWishesPage(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
  band: string | null,
): Promise<WishesPage> {
  const row = await requireEditor(services.db, viewer, slug);
  const activity = await activityView(services.db, row, services.now());
  const chosen = activity.bands.find((one) => one.band === band)?.band;
  if (band !== null && !chosen) {
    throw new InvalidInput('This band does not belong to the activity.');
  }
  const shown = chosen ?? activity.bands.at(-1)!.band;
  const { stations, wishes } = await loadRoster(services.db, row);
  return {
    activity,
    band: shown,
    roster: stations,
    wishes,
    pairs: await activityMatrix(services, row, shown),
    wished: wishedPairs(
      stations.map(({ stationId, answer, ...station }) => ({
        ...station,
        id: stationId,
        coming: answer === 'coming',
      })),
      wishes,
    ),
  };
}
