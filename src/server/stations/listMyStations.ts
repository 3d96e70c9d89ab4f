import type { MyStationCard } from '../../domain/station/views';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { bandsOf, missingParts } from './records';

/** The stations to whose crew the person belongs, by call sign. */
export async function listMyStations(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
): Promise<MyStationCard[]> {
  const rows = await services.db
    .selectFrom('station_crew')
    .innerJoin('station', 'station.id', 'station_crew.station_id')
    .selectAll('station')
    .select('station_crew.crew_role')
    .select((eb) =>
      eb
        .selectFrom('station_crew as all_crew')
        .select((inner) => inner.fn.countAll<number>().as('count'))
        .whereRef('all_crew.station_id', '=', 'station.id')
        .as('crew_count'),
    )
    .where('station_crew.person_id', '=', viewer.id)
    .orderBy('station.call_sign')
    .execute();
  const bands = await bandsOf(
    services.db,
    rows.map((row) => row.id),
  );
  return rows.map((row) => ({
    id: row.id,
    callSign: row.call_sign,
    name: row.name,
    locator: row.locator,
    timeZone: row.time_zone,
    bands: bands.get(row.id) ?? [],
    crewRole: row.crew_role,
    crewCount: row.crew_count ?? 0,
    listed: row.listed === 1,
    missing: missingParts(row, bands.get(row.id) ?? []),
  }));
}
