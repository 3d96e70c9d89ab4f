import type { ProfileUpdate } from '../../domain/station/schema';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { changeStation, type Saved } from './changeStation';

/** Saves the keeper's note and whether the station is listed; throws as `changeStation`. */
export async function updateProfile(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  input: ProfileUpdate,
): Promise<Saved> {
  return changeStation(services, viewer, stationId, input.version, () =>
    Promise.resolve({ note: input.note, listed: input.listed ? 1 : 0 }),
  );
}
