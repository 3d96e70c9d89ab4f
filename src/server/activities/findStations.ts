import type { PublicStationCard } from '../../domain/station/views';
import type { Services } from '../services';
import { listPublicStations } from '../stations/listPublicStations';

const SHOWN = 12;

/** Listed stations that match and are not on the roster yet, the first dozen. */
export async function findStations(
  services: Services,
  search: string,
  onRoster: ReadonlySet<string>,
): Promise<{ stations: PublicStationCard[]; more: boolean }> {
  const page = await listPublicStations(services, { search });
  const free = page.stations.filter(({ id }) => !onRoster.has(id));
  return { stations: free.slice(0, SHOWN), more: free.length > SHOWN || page.next !== null };
}
