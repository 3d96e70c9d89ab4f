import { cutLocator } from '../../domain/locator/locator';
import type { SkedStation } from '../../domain/sked/obstacle';
import type { Sked } from '../../domain/sked/machine';
import type { WeeklyHours } from '../../domain/time/weeklyHours';
import type { Db } from '../db/connection';
import type { SkedRow, StationRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { hoursOf, skyOf } from '../stations/records';

/** A station as skeds need it. */
export interface PartyStation extends SkedStation {
  id: string;
  timeZone: string;
  /** As far as the public may know it. */
  locator: string;
  hours: WeeklyHours;
  listed: boolean;
}

export interface LoadedSked {
  row: SkedRow;
  sked: Sked;
  /** Those still in it, in the order of the parties: the station that offered first comes first. */
  stations: PartyStation[];
}

export function partyStation(row: StationRow): PartyStation {
  return {
    id: row.id,
    callSign: row.call_sign,
    timeZone: row.time_zone,
    locator: cutLocator(row.locator, row.public_locator_length),
    site: {
      latitudeDeg: row.latitude_deg,
      longitudeDeg: row.longitude_deg,
      heightM: row.height_m,
    },
    sky: skyOf(row),
    hours: { ...hoursOf(row), timeZone: row.time_zone },
    listed: row.listed === 1,
  };
}

/** The sked with its stations, or null. */
export async function loadSked(db: Db | Tx, id: string): Promise<LoadedSked | null> {
  const row = await db.selectFrom('sked').selectAll().where('id', '=', id).executeTakeFirst();
  if (!row) return null;
  const parties = await db
    .selectFrom('sked_party')
    .innerJoin('station', 'station.id', 'sked_party.station_id')
    .selectAll('station')
    .select(['sked_party.answer', 'sked_party.left_at'])
    .where('sked_party.sked_id', '=', id)
    .orderBy('sked_party.place')
    .execute();
  const stations = parties.filter((party) => party.left_at === null).map(partyStation);
  return {
    row,
    stations,
    sked: {
      state: row.state,
      version: row.version,
      sequence: row.sequence,
      offeredBy: row.offered_by,
      startMs: row.start_at,
      endMs: row.end_at,
      parties: parties.map((party) => ({
        stationId: party.id,
        callSign: party.call_sign,
        answer: party.answer,
        left: party.left_at !== null,
      })),
    },
  };
}

/** Ids of the stations to whose crew the person belongs. */
export async function stationIdsOf(db: Db | Tx, personId: string): Promise<Set<string>> {
  const rows = await db
    .selectFrom('station_crew')
    .select('station_id')
    .where('person_id', '=', personId)
    .execute();
  return new Set(rows.map((row) => row.station_id));
}
