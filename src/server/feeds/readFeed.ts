import { createHash } from 'node:crypto';
import { NotFound } from '../errors';
import { hashSecret } from '../ids';
import { publishedCalendar } from '../mail/templates/skedCalendar';
import type { Services } from '../services';
import { stationIdsOf } from '../skeds/load';
import { publishedSkeds } from './publishedSkeds';

/** How exactly "last read" is kept, so that a program that reads often does not write often. */
const READ_STEP_MS = 3_600_000;

export interface ReadFeed {
  body: string;
  /** Names this very content, quoted as in ETag. */
  etag: string;
  lastModifiedMs: number;
}

/** What a calendar program reads behind a secret address. Throws `NotFound` for one that is unknown or has ended. */
export async function readFeed(services: Services, secret: string): Promise<ReadFeed> {
  const feed = await services.db
    .selectFrom('calendar_feed')
    .innerJoin('person', 'person.id', 'calendar_feed.person_id')
    .leftJoin('station', 'station.id', 'calendar_feed.station_id')
    .select([
      'calendar_feed.id',
      'calendar_feed.person_id',
      'calendar_feed.station_id',
      'calendar_feed.created_at',
      'calendar_feed.last_read_at',
      'station.call_sign',
    ])
    .where('token_hash', '=', hashSecret(secret))
    .where('person.confirmed_at', 'is not', null)
    .where('person.locked_at', 'is', null)
    .executeTakeFirst();
  const crews = feed ? await stationIdsOf(services.db, feed.person_id) : new Set<string>();
  const lost = feed && feed.station_id !== null && !crews.has(feed.station_id);
  if (!feed || lost) throw new NotFound('There is no calendar at this address.');
  await noteReading(services, feed);
  const stationIds = feed.station_id === null ? [...crews] : [feed.station_id];
  const skeds = await publishedSkeds(services, feed.person_id, stationIds);
  const name = feed.call_sign === null ? 'Skeds' : `Skeds of ${feed.call_sign}`;
  const body = publishedCalendar(name, skeds);
  return {
    body,
    etag: `"${createHash('sha256').update(body).digest('base64url')}"`,
    lastModifiedMs: Math.max(feed.created_at, ...skeds.map(({ entry }) => entry.stampMs)),
  };
}

async function noteReading(
  { db, now }: Services,
  feed: { id: string; last_read_at: number | null },
): Promise<void> {
  if (feed.last_read_at !== null && now() - feed.last_read_at < READ_STEP_MS) return;
  await db
    .updateTable('calendar_feed')
    .set({ last_read_at: now() })
    .where('id', '=', feed.id)
    .execute();
}

/** Whether one of the names in an If-None-Match is this content's (RFC 9110, 13.1.2). */
export function isUnchanged(ifNoneMatch: string | null, etag: string): boolean {
  if (ifNoneMatch === null) return false;
  const names = ifNoneMatch.split(',').map((name) => name.trim().replace(/^W\//, ''));
  return names.includes('*') || names.includes(etag);
}
