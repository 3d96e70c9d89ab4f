import type { CrewRole } from '../../domain/station/views';
import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { NotFound } from '../errors';
import type { Services } from '../services';
import { crewRoleOf, requireKeeper } from './access';
import { requireAnotherKeeper } from './lastKeeper';

/** Makes a crew member a keeper or an operator, for a keeper. Throws `Conflict` for the last keeper. */
export async function changeCrewRole(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  personId: string,
  crewRole: CrewRole,
): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    const station = await requireKeeper(tx, viewer, stationId);
    const present = await crewRoleOf(tx, stationId, personId);
    if (!present) throw new NotFound(`That person is not in the crew of ${station.call_sign}.`);
    if (present === 'keeper' && crewRole === 'operator') {
      await requireAnotherKeeper(tx, stationId, station.call_sign, personId);
    }
    await tx
      .updateTable('station_crew')
      .set({ crew_role: crewRole })
      .where('station_id', '=', stationId)
      .where('person_id', '=', personId)
      .execute();
  });
}
