import type { Viewer } from '../auth/viewer';
import type { Db } from '../db/connection';
import type { Tx } from '../db/transaction';
import { Forbidden, NotFound } from '../errors';
import type { ActivityRow } from './records';

/** For an activity that is not there, and for one that must not be known to be there. */
export function activityNotFound(): NotFound {
  return new NotFound('There is no such activity, or it is not published.');
}

export async function findActivity(db: Db | Tx, slug: string): Promise<ActivityRow | null> {
  const row = await db
    .selectFrom('activity')
    .selectAll()
    .where('slug', '=', slug)
    .executeTakeFirst();
  return row ?? null;
}

/** Whether the person may edit the activity: its coordinator, and every administrator. */
export function mayEdit(
  row: Pick<ActivityRow, 'coordinator_id'>,
  viewer: Pick<Viewer, 'id' | 'role'> | null,
): boolean {
  if (!viewer) return false;
  if (viewer.role === 'administrator') return true;
  return viewer.role === 'coordinator' && viewer.id === row.coordinator_id;
}

/** Stations of the roster to whose crew the person belongs, by their number. */
export async function ownRosterStations(
  db: Db | Tx,
  activityId: string,
  personId: string,
): Promise<{ stationId: string; callSign: string }[]> {
  const rows = await db
    .selectFrom('activity_station')
    .innerJoin('station_crew', 'station_crew.station_id', 'activity_station.station_id')
    .innerJoin('station', 'station.id', 'activity_station.station_id')
    .select(['station.id', 'station.call_sign'])
    .where('activity_station.activity_id', '=', activityId)
    .where('station_crew.person_id', '=', personId)
    .orderBy('activity_station.place')
    .execute();
  return rows.map((row) => ({ stationId: row.id, callSign: row.call_sign }));
}

/**
 * The activity, for who may edit it. Throws `Forbidden` for who may see it otherwise, and `NotFound` for everybody
 * else.
 */
export async function requireEditor(
  db: Db | Tx,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
): Promise<ActivityRow> {
  const row = await findActivity(db, slug);
  if (!row) throw activityNotFound();
  if (mayEdit(row, viewer)) return row;
  const invited = await ownRosterStations(db, row.id, viewer.id);
  if (row.state !== 'published' && invited.length === 0) throw activityNotFound();
  throw new Forbidden('Only the coordinator of this activity can change it.');
}

/** What the viewer may do with the activity. Throws `NotFound` for who may not know of it. */
export async function activityAccess(
  db: Db | Tx,
  viewer: Pick<Viewer, 'id' | 'role'> | null,
  slug: string,
): Promise<{
  row: ActivityRow;
  editor: boolean;
  own: { stationId: string; callSign: string }[];
}> {
  const row = await findActivity(db, slug);
  if (!row) throw activityNotFound();
  const editor = mayEdit(row, viewer);
  const own = viewer ? await ownRosterStations(db, row.id, viewer.id) : [];
  if (!editor && own.length === 0 && row.state !== 'published') throw activityNotFound();
  return { row, editor, own };
}
