import type { EquipmentUpdate } from '../../domain/station/schema';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { withNewestRecords } from './noiseRecordRows';
import { changeStation, type Saved } from './changeStation';

/**
 * Replaces the equipment on all bands; a band that is not given is removed. Throws as `changeStation`, and
 * `InvalidInput` where the newest noise record is to be used and the band has none.
 */
export async function updateEquipment(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  input: EquipmentUpdate,
): Promise<Saved> {
  return changeStation(services, viewer, stationId, input.version, async (tx) => {
    const equipment = await withNewestRecords(tx, stationId, input.equipment);
    await tx.deleteFrom('station_band').where('station_id', '=', stationId).execute();
    if (equipment.length > 0) {
      await tx
        .insertInto('station_band')
        .values(
          equipment.map(({ band, setup }) => ({
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
