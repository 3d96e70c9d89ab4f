import { sql } from 'kysely';
import type { PlanView, PlanViewSlot, PlanViewStation } from '../../domain/activity/planView';
import { locatorToPosition } from '../../domain/locator/locator';
import type { SkedResult } from '../../domain/sked/types';
import type { Db } from '../db/connection';
import type { SkedRow } from '../db/tables';
import { NotFound } from '../errors';
import type { Services } from '../services';
import { shownLocator } from '../stations/shownLocator';
import { loadRevision, publishedRevisions, type StoredSlot } from './revisions';

/**
 * A published plan: the one in force, or an older revision by its number, which tells what it said then. Drafts are
 * not found. Null while nothing is published.
 */
export async function publicPlan(
  services: Services,
  activityId: string,
  number?: number,
): Promise<PlanView | null> {
  const { db } = services;
  const revisions = await publishedRevisions(db, activityId);
  const revision = await loadRevision(db, activityId, number ?? 'published');
  if (!revision || revision.row.published_at === null) {
    if (number === undefined) return null;
    throw new NotFound('There is no such published revision of this plan.');
  }
  const stations = await stationsOf(db, activityId, revision.slots);
  const skeds = await skedsOf(db, revision.slots);
  const reports = await reportsOf(db, [...skeds.keys()]);
  const nowMs = services.now();
  const indexOf = new Map(stations.map(({ id }, index) => [id, index]));
  const onAir = await onAirOf(db, activityId);
  return {
    number: revision.row.number,
    publishedMs: revision.row.published_at,
    current: revision.row.state === 'published',
    note: revision.row.note,
    stations,
    slots: revision.slots.map((slot): PlanViewSlot => {
      const sked = skeds.get(slot.skedId ?? '');
      const result = (stationId: string) => reports.get(`${slot.skedId} ${stationId}`) ?? null;
      return {
        skedId: slot.skedId ?? '',
        first: indexOf.get(slot.stationA)!,
        second: indexOf.get(slot.stationB)!,
        band: slot.band,
        frequencyMhz: sked?.frequency_mhz ?? onAir.get(slot.band)!.frequency_mhz,
        mode: sked?.mode ?? onAir.get(slot.band)!.mode,
        startMs: slot.startMs,
        endMs: slot.endMs,
        marginDb: slot.marginDb,
        state: stateOf(sked, slot, revision.row.state === 'published', nowMs),
        results: [result(slot.stationA), result(slot.stationB)],
      };
    }),
    revisions: revisions.map(({ number: one, published_at, state }) => ({
      number: one,
      publishedMs: published_at!,
      current: state === 'published',
    })),
  };
}

/** A slot whose sked was cancelled while its plan is in force was given back by a station. */
function stateOf(
  sked: SkedRow | undefined,
  slot: StoredSlot,
  current: boolean,
  nowMs: number,
): PlanViewSlot['state'] {
  if (current && sked?.state === 'cancelled') return 'givenBack';
  return slot.endMs <= nowMs ? 'over' : 'agreed';
}

async function stationsOf(
  db: Db,
  activityId: string,
  slots: readonly StoredSlot[],
): Promise<PlanViewStation[]> {
  const inPlan = [...new Set(slots.flatMap(({ stationA, stationB }) => [stationA, stationB]))];
  const rows = await db
    .selectFrom('station')
    .leftJoin('activity_station', (join) =>
      join
        .onRef('activity_station.station_id', '=', 'station.id')
        .on('activity_station.activity_id', '=', activityId),
    )
    .select([
      'station.id',
      'station.call_sign',
      'station.name',
      'station.locator',
      'station.public_locator_length',
      'station.guest',
      'station.time_zone',
      'activity_station.place',
    ])
    .where((or) =>
      or.or([
        or('activity_station.answer', '=', 'coming'),
        ...(inPlan.length > 0 ? [or('station.id', 'in', inPlan)] : []),
      ]),
    )
    // A station of an older revision that is no longer on the roster comes last.
    .orderBy(sql`activity_station.place IS NULL`)
    .orderBy('activity_station.place')
    .execute();
  return rows.map((row, index) => {
    const locator = shownLocator(row);
    const { latitudeDeg, longitudeDeg } = locatorToPosition(locator);
    return {
      id: row.id,
      place: row.place ?? index + 1,
      callSign: row.call_sign,
      name: row.name,
      locator,
      latitudeDeg,
      longitudeDeg,
      timeZone: row.time_zone,
    };
  });
}

async function skedsOf(db: Db, slots: readonly StoredSlot[]): Promise<Map<string, SkedRow>> {
  const ids = slots.flatMap(({ skedId }) => (skedId === null ? [] : [skedId]));
  if (ids.length === 0) return new Map();
  const rows = await db.selectFrom('sked').selectAll().where('id', 'in', ids).execute();
  return new Map(rows.map((row) => [row.id, row]));
}

async function reportsOf(db: Db, skedIds: string[]): Promise<Map<string, SkedResult>> {
  if (skedIds.length === 0) return new Map();
  const rows = await db
    .selectFrom('sked_report')
    .select(['sked_id', 'station_id', 'result'])
    .where('sked_id', 'in', skedIds)
    .execute();
  return new Map(rows.map((row) => [`${row.sked_id} ${row.station_id}`, row.result]));
}

async function onAirOf(db: Db, activityId: string) {
  const rows = await db
    .selectFrom('activity_band')
    .selectAll()
    .where('activity_id', '=', activityId)
    .execute();
  return new Map(rows.map((row) => [row.band, row]));
}

/** The plan in force and the place of a station in it. Throws `NotFound`. */
export async function stationInPlan(
  services: Services,
  activityId: string,
  callSign: string,
): Promise<{ plan: PlanView; index: number }> {
  const plan = await publicPlan(services, activityId);
  const index = plan?.stations.findIndex((one) => one.callSign === callSign.toUpperCase()) ?? -1;
  if (!plan || index < 0) throw new NotFound('There is no such station in a published plan.');
  return { plan, index };
}
