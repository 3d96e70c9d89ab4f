import type { Db } from '../db/connection';
import type { StationRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import type { BandId } from '../../domain/station/bands';
import type { StationHours } from '../../domain/station/hoursSchema';
import type { PublicLocatorLength } from '../../domain/station/schema';
import type { BandSetup } from '../../domain/station/setup';
import type { BandEquipment, CrewRole, CrewStation, MissingPart } from '../../domain/station/views';
import type { SkyLimits } from '../../domain/sky/limits';
import { fillFromNewestRecords } from './noiseRecordRows';

/** Sky as saved; an empty object is a sky nobody has described yet. */
export function skyOf(row: Pick<StationRow, 'sky_json'>): SkyLimits {
  return JSON.parse(row.sky_json) as SkyLimits;
}

export function hoursOf(row: Pick<StationRow, 'hours_json'>): StationHours {
  return JSON.parse(row.hours_json) as StationHours;
}

/** Equipment of the stations, by station, bands from low to high; measured noise as of the newest record. */
export async function equipmentOf(
  db: Db | Tx,
  stationIds: readonly string[],
): Promise<Map<string, BandEquipment[]>> {
  const found = new Map<string, BandEquipment[]>(stationIds.map((id) => [id, []]));
  if (stationIds.length === 0) return found;
  const rows = await db
    .selectFrom('station_band')
    .selectAll()
    .where('station_id', 'in', stationIds)
    .execute();
  rows.sort((a, b) => Number(a.band) - Number(b.band));
  for (const row of rows) {
    found
      .get(row.station_id)
      ?.push({ band: row.band, setup: JSON.parse(row.setup_json) as BandSetup });
  }
  await fillFromNewestRecords(db, found);
  return found;
}

/** Bands of the stations without their equipment. */
export async function bandsOf(
  db: Db | Tx,
  stationIds: readonly string[],
): Promise<Map<string, BandId[]>> {
  const found = new Map<string, BandId[]>(stationIds.map((id) => [id, []]));
  if (stationIds.length === 0) return found;
  const rows = await db
    .selectFrom('station_band')
    .select(['station_id', 'band'])
    .where('station_id', 'in', stationIds)
    .execute();
  rows.sort((a, b) => Number(a.band) - Number(b.band));
  for (const row of rows) found.get(row.station_id)?.push(row.band);
  return found;
}

export function crewStation(
  row: StationRow,
  equipment: BandEquipment[],
  crewRole: CrewRole,
): CrewStation {
  return {
    id: row.id,
    version: row.version,
    callSign: row.call_sign,
    name: row.name,
    latitudeDeg: row.latitude_deg,
    longitudeDeg: row.longitude_deg,
    heightM: row.height_m,
    locator: row.locator,
    publicLocatorLength: row.public_locator_length as PublicLocatorLength,
    timeZone: row.time_zone,
    sky: skyOf(row),
    hours: hoursOf(row),
    equipment,
    listed: row.listed === 1,
    note: row.note,
    crewRole,
  };
}

/** What the station still lacks, in the order of the steps. */
export function missingParts(
  row: Pick<StationRow, 'sky_json' | 'hours_json'>,
  bands: readonly BandId[],
): MissingPart[] {
  const missing: MissingPart[] = [];
  if (Object.keys(skyOf(row)).length === 0) missing.push('sky');
  if (bands.length === 0) missing.push('equipment');
  if (hoursOf(row).weekly === null) missing.push('hours');
  return missing;
}
