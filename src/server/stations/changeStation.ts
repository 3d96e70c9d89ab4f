import { formatUtc } from '../../domain/time/format';
import type { Viewer } from '../auth/viewer';
import type { StationRow } from '../db/tables';
import { inTransaction, type Tx } from '../db/transaction';
import { Conflict } from '../errors';
import type { Services } from '../services';
import { requireKeeper } from './access';

type Changes = Partial<Omit<StationRow, 'id' | 'version' | 'created_at' | 'updated_at'>>;

export interface Saved {
  version: number;
}

/**
 * Changes a station in one transaction, for a keeper who has seen its newest version. `change` may write
 * to other tables and returns the new columns. Throws `NotFound`, `Forbidden`, or `Conflict` when somebody
 * has saved in between.
 */
export async function changeStation(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  version: number,
  change: (tx: Tx, station: StationRow) => Promise<Changes>,
): Promise<Saved> {
  return inTransaction(services.db, async (tx) => {
    const station = await requireKeeper(tx, viewer, stationId);
    if (station.version !== version) {
      throw new Conflict(
        `${station.call_sign} was changed by another page or person on ${formatUtc(station.updated_at)}. Nothing was saved. Open the page again to see the present values.`,
        { version: station.version },
      );
    }
    const changes = await change(tx, station);
    await tx
      .updateTable('station')
      .set({ ...changes, version: version + 1, updated_at: services.now() })
      .where('id', '=', stationId)
      .execute();
    return { version: version + 1 };
  });
}
