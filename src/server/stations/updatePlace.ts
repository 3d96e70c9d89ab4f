import type { PlaceUpdate } from '../../domain/station/schema';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { requireFreeCallSign } from './callSignTaken';
import { changeStation, type Saved } from './changeStation';

/** Saves call sign, name and place; throws as `changeStation`, and `Conflict` for a call sign that is taken. */
export async function updatePlace(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  input: PlaceUpdate,
): Promise<Saved> {
  return changeStation(services, viewer, stationId, input.version, async (tx, station) => {
    // A station that others described may stand beside the registered one of its call sign.
    const described = station.guest === 1 && input.callSign === station.call_sign;
    if (!described) await requireFreeCallSign(tx, input.callSign, stationId);
    return {
      guest: described ? 1 : 0,
      call_sign: input.callSign,
      name: input.name,
      latitude_deg: input.latitudeDeg,
      longitude_deg: input.longitudeDeg,
      height_m: input.heightM,
      locator: input.locator,
      public_locator_length: input.publicLocatorLength,
      time_zone: input.timeZone,
    };
  });
}
