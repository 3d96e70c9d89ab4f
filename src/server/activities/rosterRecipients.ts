import type { Tx } from '../db/transaction';

/** Somebody who is written to for a station of the roster. */
export interface RosterRecipient {
  personId: string;
  email: string;
  name: string;
  timeZone: string;
  /** Without an account they answer by a link. */
  guest: boolean;
  stationId: string;
  callSign: string;
}

/** The crews of the stations: everybody confirmed, and who keeps a guest station. Each person once a station. */
export async function rosterRecipients(
  tx: Tx,
  stationIds: readonly string[],
): Promise<RosterRecipient[]> {
  if (stationIds.length === 0) return [];
  const rows = await tx
    .selectFrom('station_crew')
    .innerJoin('person', 'person.id', 'station_crew.person_id')
    .innerJoin('station', 'station.id', 'station_crew.station_id')
    .select([
      'person.id',
      'person.email',
      'person.name',
      'person.time_zone',
      'person.confirmed_at',
      'station_crew.station_id',
      'station.call_sign',
      'station.guest',
    ])
    .where('station_crew.station_id', 'in', [...stationIds])
    .where('person.locked_at', 'is', null)
    .where('person.email', 'not in', (from) => from.selectFrom('mail_block').select('email'))
    .where((eb) =>
      eb.or([
        eb('person.confirmed_at', 'is not', null),
        eb.and([eb('station.guest', '=', 1), eb('station_crew.crew_role', '=', 'keeper')]),
      ]),
    )
    .orderBy('person.email')
    .execute();
  return rows.map((row) => ({
    personId: row.id,
    email: row.email,
    name: row.name,
    timeZone: row.time_zone,
    guest: row.confirmed_at === null,
    stationId: row.station_id,
    callSign: row.call_sign,
  }));
}
