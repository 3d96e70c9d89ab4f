import type { ProfileUpdate } from '../../domain/station/schema';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { requireFreeCallSign } from './callSignTaken';
import { changeStation, type Saved } from './changeStation';

/** Saves the keeper's note and whether the station is listed; throws as `changeStation`, and `Conflict`
 * when a station that others described is to be listed under a call sign that is taken. */
export async function updateProfile(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  input: ProfileUpdate,
): Promise<Saved> {
  return changeStation(services, viewer, stationId, input.version, async (tx, station) => {
    const listed = input.listed ? 1 : 0;
    if (station.guest === 0 || listed === 0) return { note: input.note, listed };
    // Described by others so far: who lists it claims its call sign.
    await requireFreeCallSign(tx, station.call_sign, stationId);
    return { note: input.note, listed, guest: 0 };
  });
}
