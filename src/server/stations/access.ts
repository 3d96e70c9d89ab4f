import type { CrewRole } from '../../domain/station/views';
import type { Viewer } from '../auth/viewer';
import type { Db } from '../db/connection';
import type { StationRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { Forbidden, NotFound } from '../errors';

type Person = Pick<Viewer, 'id'>;

export interface CrewAccess {
  station: StationRow;
  crewRole: CrewRole;
}

/** The sentence for a station that is not there, and for one that must not be known to be there. */
export function stationNotFound(): NotFound {
  return new NotFound('There is no such station, or it is not listed.');
}

/** Role of the person in the crew, or null. */
export async function crewRoleOf(
  db: Db | Tx,
  stationId: string,
  personId: string,
): Promise<CrewRole | null> {
  const row = await db
    .selectFrom('station_crew')
    .select('crew_role')
    .where('station_id', '=', stationId)
    .where('person_id', '=', personId)
    .executeTakeFirst();
  return row?.crew_role ?? null;
}

/**
 * The station, for a member of its crew. Throws `NotFound` when it is not there or is not listed and the
 * person is not of its crew, `Forbidden` when it is listed.
 */
export async function requireCrew(
  db: Db | Tx,
  viewer: Person,
  stationId: string,
): Promise<CrewAccess> {
  const station = await db
    .selectFrom('station')
    .selectAll()
    .where('id', '=', stationId)
    .executeTakeFirst();
  const crewRole = station ? await crewRoleOf(db, stationId, viewer.id) : null;
  if (!station || (!crewRole && station.listed === 0)) throw stationNotFound();
  if (!crewRole) throw new Forbidden(`You are not in the crew of ${station.call_sign}.`);
  return { station, crewRole };
}

/** As `requireCrew`, and an operator of the crew gets `Forbidden`. */
export async function requireKeeper(
  db: Db | Tx,
  viewer: Person,
  stationId: string,
): Promise<StationRow> {
  const { station, crewRole } = await requireCrew(db, viewer, stationId);
  if (crewRole !== 'keeper') {
    throw new Forbidden(`Only a keeper of ${station.call_sign} can change this.`);
  }
  return station;
}
