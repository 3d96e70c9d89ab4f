import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { partyStation, type PartyStation } from './load';

/** The stations to whose crew the viewer belongs, by call sign. */
export async function myStations({ db }: Services, viewer: Viewer): Promise<PartyStation[]> {
  const rows = await db
    .selectFrom('station')
    .innerJoin('station_crew', 'station_crew.station_id', 'station.id')
    .selectAll('station')
    .where('station_crew.person_id', '=', viewer.id)
    .orderBy('station.call_sign')
    .execute();
  return rows.map(partyStation);
}
