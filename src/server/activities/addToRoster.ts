import type { BandId } from '../../domain/station/bands';
import type { Interval } from '../../domain/time/interval';
import type { Tx } from '../db/transaction';
import { Conflict } from '../errors';
import type { Services } from '../services';
import type { ActivityRow } from './records';

export const MOST_STATIONS = 120;

/** What a coordinator says of a station on putting it on the roster. */
export interface RosterEntry {
  bands?: BandId[] | null;
  hours?: Interval[] | null;
  mostContacts?: number | null;
  note?: string;
}

/** Puts a station at the end of the roster. Throws `Conflict` when it is on it, the roster is full, or the activity over. */
export async function addToRoster(
  tx: Tx,
  services: Pick<Services, 'now'>,
  activity: ActivityRow,
  station: { id: string; callSign: string },
  entry: RosterEntry = {},
): Promise<void> {
  if (activity.end_at <= services.now()) throw new Conflict('This activity is over.');
  const places = await tx
    .selectFrom('activity_station')
    .innerJoin('station', 'station.id', 'activity_station.station_id')
    .select(['activity_station.station_id', 'activity_station.place', 'station.call_sign'])
    .where('activity_id', '=', activity.id)
    .execute();
  if (places.some((one) => one.station_id === station.id || one.call_sign === station.callSign)) {
    throw new Conflict(`${station.callSign} is on the roster already.`);
  }
  if (places.length >= MOST_STATIONS) {
    throw new Conflict(`A roster has at most ${MOST_STATIONS} stations.`);
  }
  await tx
    .insertInto('activity_station')
    .values({
      activity_id: activity.id,
      station_id: station.id,
      place: Math.max(0, ...places.map((one) => one.place)) + 1,
      answer: 'waiting',
      bands_json: entry.bands ? JSON.stringify(entry.bands) : null,
      hours_json: entry.hours
        ? JSON.stringify(entry.hours.map(({ startMs, endMs }) => [startMs, endMs]))
        : null,
      most_contacts: entry.mostContacts ?? null,
      note: entry.note ?? '',
      invited_at: services.now(),
      reminded_at: null,
      answered_at: null,
      answered_by: null,
    })
    .execute();
}
