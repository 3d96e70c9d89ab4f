import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { NotFound } from '../errors';
import type { Services } from '../services';
import { requireEditor } from './access';
import { addToRoster } from './addToRoster';
import { mailRoster } from './mailRoster';

/**
 * Puts a listed station, or one of the coordinator's own, on the roster and writes to its crew. Throws `NotFound`,
 * `Forbidden` or `Conflict`.
 */
export async function inviteStation(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
  stationId: string,
): Promise<{ callSign: string }> {
  return inTransaction(services.db, async (tx) => {
    const activity = await requireEditor(tx, viewer, slug);
    const station = await tx
      .selectFrom('station')
      .select(['id', 'call_sign'])
      .where('id', '=', stationId)
      .where((eb) =>
        eb.or([
          eb('listed', '=', 1),
          eb.exists(
            eb
              .selectFrom('station_crew')
              .select('station_crew.person_id')
              .whereRef('station_crew.station_id', '=', 'station.id')
              .where('station_crew.person_id', '=', viewer.id),
          ),
        ]),
      )
      .executeTakeFirst();
    if (!station) throw new NotFound('There is no such station, or it is not listed.');
    await addToRoster(tx, services, activity, { id: station.id, callSign: station.call_sign });
    await mailRoster(tx, services, activity, 'invitation', [station.id]);
    return { callSign: station.call_sign };
  });
}
