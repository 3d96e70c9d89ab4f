import { sql } from 'kysely';
import { z } from 'zod';
import { BAND_IDS } from '../../domain/station/bands';
import { words } from '../../domain/station/fields';
import type { PublicStationPage } from '../../domain/station/views';
import type { Services } from '../services';
import { bandsOf } from './records';

export const PAGE_SIZE = 50;

export const stationSearchSchema = z.object({
  search: words('The search', 60).default(''),
  band: z.enum(BAND_IDS, { error: 'That is not a band on which moonbounce is worked.' }).optional(),
  /** Call sign of the last station of the page before. */
  after: words('The place to go on from', 12).optional(),
});

export type StationSearch = z.output<typeof stationSearchSchema>;

/**
 * Listed stations by call sign, a page at a time. The search looks in call sign, name and the part of
 * the locator that the station shows: matching more would tell the rest by trying.
 */
export async function listPublicStations(
  services: Services,
  { search, band, after }: StationSearch,
): Promise<PublicStationPage> {
  let query = services.db
    .selectFrom('station')
    .select(['id', 'call_sign', 'name', 'time_zone'])
    .select(shownLocator.as('locator'))
    .where('listed', '=', 1)
    .orderBy('call_sign')
    .limit(PAGE_SIZE + 1);
  if (search !== '') {
    const pattern = search.replace(/[\\%_]/g, (sign) => `\\${sign}`);
    query = query.where((eb) =>
      eb.or([
        sql<boolean>`call_sign LIKE ${`%${pattern}%`} ESCAPE '\\'`,
        sql<boolean>`name LIKE ${`%${pattern}%`} ESCAPE '\\'`,
        sql<boolean>`${shownLocator} LIKE ${`${pattern}%`} ESCAPE '\\'`,
      ]),
    );
  }
  if (band) {
    query = query.where((eb) =>
      eb.exists(
        eb
          .selectFrom('station_band')
          .select('station_band.band')
          .whereRef('station_band.station_id', '=', 'station.id')
          .where('station_band.band', '=', band),
      ),
    );
  }
  if (after) query = query.where('call_sign', '>', after);
  const rows = await query.execute();
  const shown = rows.slice(0, PAGE_SIZE);
  const bands = await bandsOf(
    services.db,
    shown.map((row) => row.id),
  );
  return {
    stations: shown.map((row) => ({
      id: row.id,
      callSign: row.call_sign,
      name: row.name,
      locator: row.locator,
      timeZone: row.time_zone,
      bands: bands.get(row.id) ?? [],
    })),
    next: rows.length > PAGE_SIZE ? (shown.at(-1)?.call_sign ?? null) : null,
  };
}

const shownLocator = sql<string>`substr(station.locator, 1, station.public_locator_length)`;
