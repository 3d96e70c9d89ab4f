import { createHash } from 'node:crypto';
import { calendarOf } from '../../domain/sked/standing';
import { paths } from '../../paths';
import type { ActivityRow } from './records';
import { NotFound } from '../errors';
import { publishedCalendar } from '../mail/templates/skedCalendar';
import { skedFacts } from '../mail/templates/skedFacts';
import type { Services } from '../services';
import { partyStation } from '../skeds/load';
import { shownLocator } from '../stations/shownLocator';

export interface PlanCalendar {
  body: string;
  etag: string;
  lastModifiedMs: number;
}

/**
 * The skeds of a published activity as a calendar for everybody, or those of one station. What was taken out or given
 * back stays in it as cancelled, so that programs take it away. Throws `NotFound`.
 */
export async function planCalendar(
  { db, config }: Services,
  activity: Pick<ActivityRow, 'id' | 'slug' | 'title' | 'state' | 'updated_at'>,
  callSign?: string,
): Promise<PlanCalendar> {
  if (activity.state !== 'published') throw new NotFound('There is no published plan.');
  const skeds = await db
    .selectFrom('sked')
    .selectAll()
    .where('activity_id', '=', activity.id)
    .orderBy('start_at')
    .orderBy('id')
    .execute();
  const parties =
    skeds.length === 0
      ? []
      : await db
          .selectFrom('sked_party')
          .innerJoin('station', 'station.id', 'sked_party.station_id')
          .selectAll('station')
          .select('sked_party.sked_id')
          .where('sked_party.sked_id', 'in', (of) =>
            of.selectFrom('sked').select('id').where('activity_id', '=', activity.id),
          )
          .orderBy('place')
          .execute();
  const wanted = callSign?.toUpperCase();
  const entries = skeds.flatMap((sked) => {
    const stations = parties
      .filter(({ sked_id: id }) => id === sked.id)
      .map((row) => ({ ...partyStation(row), locator: shownLocator(row) }));
    if (wanted !== undefined && !stations.some((one) => one.callSign === wanted)) return [];
    const interval = { startMs: sked.start_at, endMs: sked.end_at };
    const own = wanted ?? stations[0]?.callSign ?? '';
    return [
      {
        facts: skedFacts(
          sked,
          stations,
          interval,
          config.publicUrl + paths.activityStation(activity.slug, own),
        ),
        entry: {
          ...calendarOf({ state: sked.state, sequence: sked.sequence, ...interval }),
          asked: false,
          stampMs: sked.updated_at,
        },
        organizer: config.smtp.from,
      },
    ];
  });
  if (wanted !== undefined && entries.length === 0) {
    throw new NotFound('There is no such station in a published plan.');
  }
  const body = publishedCalendar(
    wanted === undefined ? activity.title : `${wanted}, ${activity.title}`,
    entries,
  );
  return {
    body,
    etag: `"${createHash('sha256').update(body).digest('base64url')}"`,
    lastModifiedMs: Math.max(activity.updated_at, ...skeds.map((sked) => sked.updated_at)),
  };
}
