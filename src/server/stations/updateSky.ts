import type { SkyUpdate } from '../../domain/station/schema';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { changeStation, type Saved } from './changeStation';

/** Saves what the dish can see; throws as `changeStation`. */
export async function updateSky(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  input: SkyUpdate,
): Promise<Saved> {
  return changeStation(services, viewer, stationId, input.version, () =>
    Promise.resolve({ sky_json: JSON.stringify(input.sky) }),
  );
}
