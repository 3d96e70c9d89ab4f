import type { HoursUpdate } from '../../domain/station/schema';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { changeStation, type Saved } from './changeStation';

/** Saves usable hours and days off; throws as `changeStation`. */
export async function updateHours(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  input: HoursUpdate,
): Promise<Saved> {
  return changeStation(services, viewer, stationId, input.version, () =>
    Promise.resolve({ hours_json: JSON.stringify(input.hours) }),
  );
}
