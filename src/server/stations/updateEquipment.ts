import type { EquipmentUpdate } from '../../domain/station/schema';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { changeStation, type Saved } from './changeStation';

/** Replaces the equipment on all bands; a band that is not given is removed. Throws as `changeStation`. */
export async function updateEquipment(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  input: EquipmentUpdate,
): Promise<Saved> {
  return changeStation(services, viewer, stationId, input.version, async (tx) => {
    await tx.deleteFrom('station_band').where('station_id', '=', stationId).execute();
    if (input.equipment.length > 0) {
      await tx
        .insertInto('station_band')
        .values(
          input.equipment.map(({ band, setup }) => ({
            station_id: stationId,
            band,
            setup_json: JSON.stringify(setup),
          })),
        )
        .execute();
    }
    return {};
  });
}
