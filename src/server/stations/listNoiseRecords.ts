import type { NoiseRecord } from '../../domain/station/noiseRecord';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { requireKeeper } from './access';
import { noiseRecordsOf } from './noiseRecordRows';

/** Noise records of all bands, newest first, for a keeper. Throws `NotFound` or `Forbidden`. */
export async function listNoiseRecords(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
): Promise<NoiseRecord[]> {
  await requireKeeper(services.db, viewer, stationId);
  return noiseRecordsOf(services.db, stationId);
}
