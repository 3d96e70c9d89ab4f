import { calendarOf, hasLapsed } from '../../domain/sked/standing';
import { DAY_MS } from '../../domain/time/interval';
import { paths } from '../../paths';
import type { Db } from '../db/connection';
import type { PublishedSked } from '../mail/templates/skedCalendar';
import { skedFacts } from '../mail/templates/skedFacts';
import type { Services } from '../services';
import { loadSked, type LoadedSked } from '../skeds/load';
import { personalEntry } from '../skeds/notify';
import { replyAddress } from '../skeds/replyAddress';

const PAST_DAYS = 90;
const CANCELLED_DAYS = 30;
const MOST = 500;

/**
 * The skeds of the stations as a calendar shows them to a person: those of the last 90 days and all ahead. What came to
 * nothing stays for 30 days as cancelled, so that a calendar program that reads late still takes it out.
 */
export async function publishedSkeds(
  services: Services,
  personId: string,
  stationIds: readonly string[],
): Promise<PublishedSked[]> {
  const skeds: PublishedSked[] = [];
  for (const id of await skedIds(services, stationIds)) {
    const loaded = await loadSked(services.db, id);
    if (loaded) skeds.push(publishedSked(services, personId, stationIds, loaded));
  }
  return skeds;
}

/** One sked as it stands for the crews of these stations. */
export function publishedSked(
  { config, now }: Services,
  personId: string,
  stationIds: readonly string[],
  { row, sked, stations }: LoadedSked,
): PublishedSked {
  const standing = hasLapsed(sked, now()) ? { ...sked, state: 'lapsed' as const } : sked;
  return {
    facts: skedFacts(row, stations, sked, config.publicUrl + paths.sked(row.id)),
    entry: {
      ...personalEntry(standing, calendarOf(standing), stationIds, row.updated_at),
      asked: false,
    },
    organizer: replyAddress(config, row.uid, personId) ?? config.smtp.from,
  };
}

async function skedIds({ db, now }: Services, stationIds: readonly string[]): Promise<string[]> {
  if (stationIds.length === 0) return [];
  const recentlyMs = now() - CANCELLED_DAYS * DAY_MS;
  const rows = await ofStations(db, stationIds)
    .where('sked.end_at', '>', now() - PAST_DAYS * DAY_MS)
    .where((or) =>
      or.or([
        or.and([
          or('sked_party.left_at', 'is', null),
          or('sked.state', 'in', ['offered', 'agreed', 'reported']),
        ]),
        or.and([
          or('sked.state', 'not in', ['offered', 'agreed', 'reported']),
          or('sked.updated_at', '>', recentlyMs),
        ]),
        or('sked_party.left_at', '>', recentlyMs),
      ]),
    )
    .orderBy('sked.start_at', 'desc')
    .limit(MOST)
    .execute();
  return rows.map((row) => row.id).reverse();
}

function ofStations(db: Db, stationIds: readonly string[]) {
  return db
    .selectFrom('sked')
    .innerJoin('sked_party', 'sked_party.sked_id', 'sked.id')
    .select('sked.id')
    .distinct()
    .where('sked_party.station_id', 'in', [...stationIds]);
}
