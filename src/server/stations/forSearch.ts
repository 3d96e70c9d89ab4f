import { cutLocator, locatorToPosition } from '../../domain/locator/locator';
import type { BandEquipment } from '../../domain/station/views';
import type { Interval } from '../../domain/time/interval';
import { expandUsableHours } from '../../domain/time/weeklyHours';
import type { WindowStation } from '../../domain/window/types';
import type { Viewer } from '../auth/viewer';
import type { Db } from '../db/connection';
import type { StationRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { stationNotFound } from './access';
import { equipmentOf, hoursOf, skyOf } from './records';

export interface SearchStation extends WindowStation {
  id: string;
  name: string;
  timeZone: string;
  /** As the viewer may know it. */
  locator: string;
  equipment: BandEquipment[];
  /** Whether the viewer belongs to the crew; then the site is exact. */
  own: boolean;
  /** Intervals over the span; absent when no usable hours are given: always. */
  usable?: Interval[] | undefined;
}

/**
 * Stations as a window search takes them, in the order of `stationIds`, with usable hours over `span`.
 *
 * `precision: 'server'` gives every station's exact site, for results that are computed here.
 * `precision: 'viewer'` is for what goes to the browser: exact for stations of the viewer's own crew, else
 * the centre of the locator the station shows at the height of sea level, which moves a rise by seconds at
 * six characters and by some minutes at four. The sky limits stay exact: windows cannot be found without.
 *
 * Throws `NotFound` when a station is not there, or not listed and not the viewer's own.
 */
export async function stationsForSearch(
  db: Db | Tx,
  viewer: Pick<Viewer, 'id'> | null,
  stationIds: readonly string[],
  span: Interval,
  precision: 'server' | 'viewer',
): Promise<SearchStation[]> {
  if (stationIds.length === 0) return [];
  const rows = await db.selectFrom('station').selectAll().where('id', 'in', stationIds).execute();
  const ownIds = await ownStationIds(db, viewer, stationIds);
  const equipment = await equipmentOf(db, stationIds);
  return stationIds.map((id) => {
    const row = rows.find((candidate) => candidate.id === id);
    const own = ownIds.has(id);
    if (!row || (row.listed === 0 && !own)) throw stationNotFound();
    return {
      ...siteFor(row, own, precision),
      id,
      callSign: row.call_sign,
      name: row.name,
      timeZone: row.time_zone,
      sky: skyOf(row),
      usable: usableOver(row, span),
      equipment: equipment.get(id) ?? [],
      own,
    };
  });
}

async function ownStationIds(
  db: Db | Tx,
  viewer: Pick<Viewer, 'id'> | null,
  stationIds: readonly string[],
): Promise<Set<string>> {
  if (!viewer) return new Set();
  const rows = await db
    .selectFrom('station_crew')
    .select('station_id')
    .where('person_id', '=', viewer.id)
    .where('station_id', 'in', stationIds)
    .execute();
  return new Set(rows.map((row) => row.station_id));
}

function siteFor(
  row: StationRow,
  own: boolean,
  precision: 'server' | 'viewer',
): Pick<SearchStation, 'site' | 'locator'> {
  const shown = cutLocator(row.locator, row.public_locator_length);
  const locator = own ? row.locator : shown;
  if (own || precision === 'server') {
    return {
      locator,
      site: {
        latitudeDeg: row.latitude_deg,
        longitudeDeg: row.longitude_deg,
        heightM: row.height_m,
      },
    };
  }
  const { latitudeDeg, longitudeDeg } = locatorToPosition(shown);
  return { locator, site: { latitudeDeg, longitudeDeg, heightM: 0 } };
}

function usableOver(row: StationRow, span: Interval): Interval[] | undefined {
  const hours = hoursOf(row);
  if (hours.weekly === null && hours.daysOff.length === 0) return undefined;
  return expandUsableHours({ ...hours, timeZone: row.time_zone }, span);
}
