import { coarseSky } from '../../domain/station/coarseSky';
import { cutLocator, locatorToPosition } from '../../domain/locator/locator';
import type { CrewStation, PublicStation } from '../../domain/station/views';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { crewRoleOf, requireCrew, stationNotFound } from './access';
import { crewStation, equipmentOf, hoursOf, skyOf } from './records';

/** Everything about a station, for its crew. Throws `NotFound` or `Forbidden`. */
export async function getCrewStation(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
): Promise<CrewStation> {
  const { station, crewRole } = await requireCrew(services.db, viewer, stationId);
  const equipment = await equipmentOf(services.db, [stationId]);
  return crewStation(station, equipment.get(stationId) ?? [], crewRole);
}

/**
 * What everybody may know of a station; throws `NotFound` for one that is not listed, except to its crew.
 * `crewRole` is the viewer's own, so that the page can lead a crew member on to editing.
 */
export async function getPublicStation(
  services: Services,
  viewer: Pick<Viewer, 'id'> | null,
  stationId: string,
): Promise<{ station: PublicStation; crewRole: CrewStation['crewRole'] | null; listed: boolean }> {
  const row = await services.db
    .selectFrom('station')
    .selectAll()
    .where('id', '=', stationId)
    .executeTakeFirst();
  if (!row) throw stationNotFound();
  const crewRole = viewer ? await crewRoleOf(services.db, stationId, viewer.id) : null;
  if (row.listed === 0 && !crewRole) throw stationNotFound();
  const equipment = await equipmentOf(services.db, [stationId]);
  const locator = cutLocator(row.locator, row.public_locator_length);
  return {
    station: {
      id: row.id,
      callSign: row.call_sign,
      name: row.name,
      locator,
      cell: locatorToPosition(locator).cell,
      timeZone: row.time_zone,
      sky: coarseSky(skyOf(row)),
      equipment: equipment.get(stationId) ?? [],
      note: row.note,
      hoursKnown: hoursOf(row).weekly !== null,
    },
    crewRole,
    listed: row.listed === 1,
  };
}
