import type { Viewer } from '../auth/viewer';
import { publishedCalendar } from '../mail/templates/skedCalendar';
import type { Services } from '../services';
import { loadSked, stationIdsOf } from '../skeds/load';
import { noSuchSked } from '../skeds/refusals';
import { publishedSked } from './publishedSkeds';

/** One sked as a calendar file, for the crews of its parties. Throws `NotFound` for everybody else. */
export async function skedFile(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  skedId: string,
): Promise<{ fileName: string; body: string }> {
  const loaded = await loadSked(services.db, skedId);
  const mine = await stationIdsOf(services.db, viewer.id);
  const own = (loaded?.sked.parties ?? [])
    .map((party) => party.stationId)
    .filter((id) => mine.has(id));
  if (!loaded || own.length === 0) throw noSuchSked();
  const callSigns = loaded.stations.map((station) => station.callSign);
  return {
    fileName: `sked-${callSigns.join('-').replace(/[^\w-]+/g, '_')}.ics`,
    body: publishedCalendar(`Sked ${callSigns.join(' – ')}`, [
      publishedSked(services, viewer.id, own, loaded),
    ]),
  };
}
