import { bandsInActivity } from '../../domain/activity/bands';
import type { PlanPriority } from '../../domain/activity/plan/types';
import type { RosterStation, RosterWish } from '../../domain/activity/views';
import { cutLocator } from '../../domain/locator/locator';
import type { BandId } from '../../domain/station/bands';
import { intersectIntervals, unionIntervals, type Interval } from '../../domain/time/interval';
import { expandUsableHours } from '../../domain/time/weeklyHours';
import type { Db } from '../db/connection';
import type { StationRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { bandsOf, hoursOf } from '../stations/records';
import type { ActivityRow } from './records';

export interface LoadedRoster {
  stations: RosterStation[];
  wishes: RosterWish[];
  /** The stations' own rows, by id, for who computes with them. */
  rows: Map<string, StationRow>;
}

/** Everything on the roster of an activity, in the order of its numbers. */
export async function loadRoster(db: Db | Tx, activity: ActivityRow): Promise<LoadedRoster> {
  const entries = await db
    .selectFrom('activity_station')
    .selectAll()
    .where('activity_id', '=', activity.id)
    .orderBy('place')
    .execute();
  const ids = entries.map((entry) => entry.station_id);
  const offered = await offeredBands(db, activity.id);
  const equipped = await bandsOf(db, ids);
  const rows = new Map(
    ids.length === 0
      ? []
      : (await db.selectFrom('station').selectAll().where('id', 'in', ids).execute()).map(
          (row) => [row.id, row] as const,
        ),
  );
  const mails = await guestMails(db, ids);
  const span = { startMs: activity.start_at, endMs: activity.end_at };
  const stations = entries.map((entry): RosterStation => {
    const row = rows.get(entry.station_id)!;
    const named = entry.bands_json === null ? null : (JSON.parse(entry.bands_json) as BandId[]);
    const own = equipped.get(row.id) ?? [];
    const bands = bandsInActivity(offered, named, own);
    return {
      stationId: row.id,
      place: entry.place,
      callSign: row.call_sign,
      name: row.name === row.call_sign ? '' : row.name,
      locator: cutLocator(row.locator, row.public_locator_length),
      timeZone: row.time_zone,
      guest: row.guest === 1,
      mail: mails.get(row.id) ?? null,
      answer: entry.answer,
      bands,
      assumed: bands.filter((band) => !own.includes(band)),
      bandsNamed: named !== null,
      usable: usableIn(row, entry.hours_json, span),
      hoursNamed: entry.hours_json !== null,
      mostContacts: entry.most_contacts,
      wants: entry.wants,
      priority: entry.priority as PlanPriority,
      note: entry.note,
      invitedAtMs: entry.invited_at,
      remindedAtMs: entry.reminded_at,
      answeredAtMs: entry.answered_at,
    };
  });
  return { stations, rows, wishes: await wishesOf(db, activity.id) };
}

/** Bands of the activity, from low to high. */
export async function offeredBands(db: Db | Tx, activityId: string): Promise<BandId[]> {
  const rows = await db
    .selectFrom('activity_band')
    .select('band')
    .where('activity_id', '=', activityId)
    .orderBy('frequency_mhz')
    .execute();
  return rows.map((row) => row.band);
}

/** When the station is there: the hours it named for the activity, else its usable hours. */
export function usableIn(
  row: Pick<StationRow, 'hours_json' | 'time_zone'>,
  named: string | null,
  span: Interval,
): Interval[] {
  if (named === null) {
    return expandUsableHours({ ...hoursOf(row), timeZone: row.time_zone }, span);
  }
  const stretches = (JSON.parse(named) as [number, number][]).map(([startMs, endMs]) => ({
    startMs,
    endMs,
  }));
  return intersectIntervals(unionIntervals(stretches), [span]);
}

async function wishesOf(db: Db | Tx, activityId: string): Promise<RosterWish[]> {
  const rows = await db
    .selectFrom('activity_wish')
    .selectAll()
    .where('activity_id', '=', activityId)
    .execute();
  return rows.map((row) => ({
    stationId: row.station_id,
    partnerId: row.partner_id,
    kind: row.kind,
    priority: row.priority as PlanPriority,
  }));
}

/** Addresses of guest stations' keepers, whom somebody entered here. */
async function guestMails(db: Db | Tx, ids: readonly string[]): Promise<Map<string, string>> {
  if (ids.length === 0) return new Map();
  const rows = await db
    .selectFrom('station_crew')
    .innerJoin('station', 'station.id', 'station_crew.station_id')
    .innerJoin('person', 'person.id', 'station_crew.person_id')
    .select(['station.id', 'person.email'])
    .where('station.id', 'in', [...ids])
    .where('station.guest', '=', 1)
    .execute();
  return new Map(rows.map((row) => [row.id, row.email]));
}
