import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { Forbidden, NotFound } from '../errors';
import type { Services } from '../services';
import { withdrawEntries } from '../skeds/crewEntries';
import { crewRoleOf, requireCrew } from './access';
import { requireAnotherKeeper } from './lastKeeper';

/**
 * Takes a person out of the crew: keepers anybody, everybody themselves. Throws `NotFound`, `Forbidden`, or
 * `Conflict` for the last keeper. The station's skeds vanish from the person's calendar.
 */
export async function removeCrew(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  personId: string,
): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    const { station, crewRole } = await requireCrew(tx, viewer, stationId);
    if (crewRole !== 'keeper' && personId !== viewer.id) {
      throw new Forbidden(`Only a keeper of ${station.call_sign} can remove somebody else.`);
    }
    const removed = await crewRoleOf(tx, stationId, personId);
    if (!removed) throw new NotFound(`That person is not in the crew of ${station.call_sign}.`);
    if (removed === 'keeper') {
      await requireAnotherKeeper(tx, stationId, station.call_sign, personId);
    }
    await tx
      .deleteFrom('station_crew')
      .where('station_id', '=', stationId)
      .where('person_id', '=', personId)
      .execute();
    await withdrawEntries(tx, services, stationId, personId);
  });
}
