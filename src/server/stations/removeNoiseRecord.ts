import { bandById } from '../../domain/station/bands';
import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { Conflict, NotFound } from '../errors';
import type { Services } from '../services';
import { requireKeeper } from './access';
import { noiseRecordsOf, usesNewestRecord } from './noiseRecordRows';
import { equipmentOf } from './records';

/**
 * Removes a noise record, for a keeper. Throws `NotFound`, `Forbidden`, or `Conflict` when it is the last one of a
 * band whose budget takes its system temperature from the newest record.
 */
export async function removeNoiseRecord(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  recordId: string,
): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    const station = await requireKeeper(tx, viewer, stationId);
    const records = await noiseRecordsOf(tx, stationId);
    const removed = records.find(({ id }) => id === recordId);
    if (!removed) throw new NotFound(`${station.call_sign} has no such noise record.`);
    const { band } = removed;
    if (records.filter((record) => record.band === band).length === 1) {
      const equipment = (await equipmentOf(tx, [stationId])).get(stationId) ?? [];
      if (equipment.some((entry) => entry.band === band && usesNewestRecord(entry))) {
        throw new Conflict(
          `The equipment on ${bandById(band).label} takes its system temperature from this record, and there is no other. Choose another receiver there and save it first.`,
        );
      }
    }
    await tx.deleteFrom('noise_record').where('id', '=', recordId).execute();
  });
}
