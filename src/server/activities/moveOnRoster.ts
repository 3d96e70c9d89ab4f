import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { NotFound } from '../errors';
import type { Services } from '../services';
import { requireEditor } from './access';

/** Gives a station another number on the roster; those between move by one. */
export async function moveOnRoster(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
  stationId: string,
  place: number,
): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    const activity = await requireEditor(tx, viewer, slug);
    const entries = await tx
      .selectFrom('activity_station')
      .select('station_id')
      .where('activity_id', '=', activity.id)
      .orderBy('place')
      .execute();
    const order = entries.map((entry) => entry.station_id);
    const from = order.indexOf(stationId);
    if (from < 0) throw new NotFound('This station is not on the roster.');
    order.splice(from, 1);
    order.splice(Math.min(Math.max(place - 1, 0), order.length), 0, stationId);
    for (const [index, id] of order.entries()) {
      await tx
        .updateTable('activity_station')
        .set({ place: index + 1 })
        .where('activity_id', '=', activity.id)
        .where('station_id', '=', id)
        .execute();
    }
  });
}
