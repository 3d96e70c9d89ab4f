import type { SheetSked, SheetStation } from '../../domain/sked/hourSheet';
import { isForPairsOnly } from '../../domain/sked/dial';
import type { SkedView } from '../../domain/sked/view';
import type { BandSetup } from '../../domain/station/setup';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { getSked } from './getSked';
import type { PartyStation } from './load';
import { noSuchSked } from './refusals';

/** A party with its place and equipment, as the sheet and the live view compute with it. */
export type SheetParty = PartyStation & SheetStation & { setup: BandSetup | null };

/**
 * The sked as a party's crew needs it for the hour itself. `stations` in the order of the offer, the same for
 * everybody; `own` is the viewer's station. Throws `NotFound` for people without a part in it.
 */
export async function sheetOf(
  services: Services,
  viewer: Viewer,
  skedId: string,
): Promise<{ view: SkedView; stations: SheetParty[]; own: SheetParty; sked: SheetSked }> {
  const { view, stations, judged } = await getSked(services, viewer, skedId);
  const settings = await services.db
    .selectFrom('sked')
    .select(['east_first', 'doppler_convention'])
    .where('id', '=', skedId)
    .executeTakeFirstOrThrow();
  const places = await services.db
    .selectFrom('sked_party')
    .select('station_id')
    .where('sked_id', '=', skedId)
    .orderBy('place')
    .execute();
  const parties = stations.map((station, index) => ({
    ...station,
    // What is stored is a `BandSetup`.
    setup: judged[index]!.setup as BandSetup | null,
  }));
  const ordered = places.flatMap(
    ({ station_id }) => parties.find(({ id }) => id === station_id) ?? [],
  );
  const ownId = view.parties.find(({ mine }) => mine)?.stationId;
  const own = ordered.find(({ id }) => id === ownId);
  // Who has dropped out may read the sked's page, but has no hour to come.
  if (!own) throw noSuchSked();
  return {
    view,
    stations: ordered,
    own,
    sked: {
      startMs: view.startMs,
      endMs: view.endMs,
      frequencyMhz: view.frequencyMhz,
      mode: view.mode,
      eastFirst: settings.east_first === 1,
      convention:
        ordered.length > 2 && isForPairsOnly(settings.doppler_convention)
          ? 'constantAtMoon'
          : settings.doppler_convention,
    },
  };
}
