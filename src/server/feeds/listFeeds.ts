import type { FeedView } from '../../domain/sked/feedView';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { myStations } from '../skeds/myStations';

/** The feeds the viewer has or could have: all own skeds, and each station's. Their secrets are not known here. */
export async function listFeeds(services: Services, viewer: Viewer): Promise<FeedView[]> {
  const rows = await services.db
    .selectFrom('calendar_feed')
    .select(['id', 'station_id', 'created_at', 'last_read_at'])
    .where('person_id', '=', viewer.id)
    .execute();
  const feedOf = (stationId: string | null): FeedView['feed'] => {
    const row = rows.find((one) => one.station_id === stationId);
    return row ? { id: row.id, createdMs: row.created_at, lastReadMs: row.last_read_at } : null;
  };
  const stations = await myStations(services, viewer);
  return [
    { stationId: null, label: 'All your skeds', feed: feedOf(null) },
    ...stations.map(({ id, callSign }) => ({
      stationId: id,
      label: `Skeds of ${callSign}`,
      feed: feedOf(id),
    })),
  ];
}
