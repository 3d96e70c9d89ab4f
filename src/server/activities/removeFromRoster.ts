import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { Conflict, NotFound } from '../errors';
import type { Services } from '../services';
import { requireEditor } from './access';

/**
 * Takes a station off the roster, with its answer and every wish about it; those after it move up. Its slots in a
 * draft go too. Throws `Conflict` while it has slots in the published plan.
 */
export async function removeFromRoster(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
  stationId: string,
): Promise<{ callSign: string }> {
  return inTransaction(services.db, async (tx) => {
    const activity = await requireEditor(tx, viewer, slug);
    const entry = await tx
      .selectFrom('activity_station')
      .innerJoin('station', 'station.id', 'activity_station.station_id')
      .select(['activity_station.place', 'station.call_sign'])
      .where('activity_id', '=', activity.id)
      .where('station_id', '=', stationId)
      .executeTakeFirst();
    if (!entry) throw new NotFound('This station is not on the roster.');
    const slots = await tx
      .selectFrom('activity_slot')
      .innerJoin('activity_revision', 'activity_revision.id', 'activity_slot.revision_id')
      .select(['activity_slot.id', 'activity_revision.state'])
      .where('activity_revision.activity_id', '=', activity.id)
      .where((eb) => eb.or([eb('station_a', '=', stationId), eb('station_b', '=', stationId)]))
      .execute();
    if (slots.some(({ state }) => state === 'published')) {
      throw new Conflict(
        `${entry.call_sign} has slots in the published plan. Answer “not coming” for it and plan again.`,
      );
    }
    const drafted = slots.filter(({ state }) => state === 'draft').map(({ id }) => id);
    if (drafted.length > 0) {
      await tx.deleteFrom('activity_slot').where('id', 'in', drafted).execute();
    }
    await tx
      .deleteFrom('activity_wish')
      .where('activity_id', '=', activity.id)
      .where('partner_id', '=', stationId)
      .execute();
    await tx
      .deleteFrom('activity_station')
      .where('activity_id', '=', activity.id)
      .where('station_id', '=', stationId)
      .execute();
    await tx
      .updateTable('activity_station')
      .set((eb) => ({ place: eb('place', '-', 1) }))
      .where('activity_id', '=', activity.id)
      .where('place', '>', entry.place)
      .execute();
    return { callSign: entry.call_sign };
  });
}
