import type { CrewStation } from '../../domain/station/views';
import type { Viewer } from '../auth/viewer';
import { Forbidden } from '../errors';
import type { Services } from '../services';
import { getCrewStation } from './getStation';

/** Everything about a station, for the pages on which its keepers change it. */
export async function getKeptStation(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
): Promise<CrewStation> {
  const station = await getCrewStation(services, viewer, stationId);
  if (station.crewRole !== 'keeper') {
    throw new Forbidden(`Only a keeper of ${station.callSign} can change this.`);
  }
  return station;
}
