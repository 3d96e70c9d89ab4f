import type { SkedSummary } from '../../domain/sked/view';
import type { Interval } from '../../domain/time/interval';
import type { Viewer } from '../auth/viewer';
import type { Db } from '../db/connection';
import type { Tx } from '../db/transaction';
import type { Services } from '../services';
import { stationIdsOf } from './load';
import { summariesOf } from './summaries';

/** An offer with how it came about. */
export interface WaitingOffer extends SkedSummary {
  offeredByCallSign: string;
  /** Slot before the last move; null for a first offer. */
  before: Interval | null;
  /** Whether the move changed an offer of one of the viewer's stations. */
  movedYours: boolean;
}

export interface Waiting {
  /** Offers that one of the viewer's stations has to answer, soonest first. */
  offers: WaitingOffer[];
  /** Worked skeds that one of the viewer's stations has not reported yet, latest first. */
  reports: SkedSummary[];
}

/** What waits for the viewer. */
export async function waitsForViewer(
  { db, now }: Pick<Services, 'now'> & { db: Db | Tx },
  viewer: Pick<Viewer, 'id'>,
): Promise<Waiting> {
  const mine = await stationIdsOf(db, viewer.id);
  if (mine.size === 0) return { offers: [], reports: [] };
  const nowMs = now();
  const own = [...mine];
  const offers = await db
    .selectFrom('sked')
    .selectAll()
    .where('state', '=', 'offered')
    .where('start_at', '>', nowMs)
    .where('id', 'in', (parties) =>
      parties
        .selectFrom('sked_party')
        .select('sked_id')
        .where('station_id', 'in', own)
        .where('left_at', 'is', null)
        .where('answer', '=', 'waiting'),
    )
    .orderBy('start_at')
    .execute();
  const worked = await db
    .selectFrom('sked')
    .selectAll()
    .where('state', 'in', ['agreed', 'reported'])
    .where('end_at', '<=', nowMs)
    .where('id', 'in', (parties) =>
      parties
        .selectFrom('sked_party')
        .leftJoin('sked_report', (join) =>
          join
            .onRef('sked_report.sked_id', '=', 'sked_party.sked_id')
            .onRef('sked_report.station_id', '=', 'sked_party.station_id'),
        )
        .select('sked_party.sked_id')
        .where('sked_party.station_id', 'in', own)
        .where('sked_party.left_at', 'is', null)
        .where('sked_report.station_id', 'is', null),
    )
    .orderBy('start_at', 'desc')
    .limit(20)
    .execute();
  return {
    offers: await Promise.all(
      (await summariesOf(db, offers, mine, nowMs)).map((sked) => withOrigin(db, sked)),
    ),
    reports: await summariesOf(db, worked, mine, nowMs),
  };
}

async function withOrigin(db: Db | Tx, sked: SkedSummary): Promise<WaitingOffer> {
  const [last, before] = await db
    .selectFrom('sked_event')
    .select(['kind', 'station_id', 'start_at', 'end_at'])
    .where('sked_id', '=', sked.id)
    .where('kind', 'in', ['offered', 'moved'])
    .orderBy('sked_version', 'desc')
    .limit(2)
    .execute();
  const offeredBy = sked.parties.find((party) => party.stationId === sked.offeredBy);
  const moved = last?.kind === 'moved' && before !== undefined;
  return {
    ...sked,
    offeredByCallSign: offeredBy?.callSign ?? '',
    before: moved ? { startMs: before.start_at, endMs: before.end_at } : null,
    movedYours:
      moved && sked.parties.some((party) => party.mine && party.stationId === before.station_id),
  };
}

/** How many offers wait for the viewer: the counter in the masthead. */
export async function countWaiting({ db, now }: Services, viewer: Viewer): Promise<number> {
  const row = await db
    .selectFrom('sked_party')
    .innerJoin('sked', 'sked.id', 'sked_party.sked_id')
    .innerJoin('station_crew', 'station_crew.station_id', 'sked_party.station_id')
    .select((count) => count.fn.count<number>('sked.id').distinct().as('waiting'))
    .where('station_crew.person_id', '=', viewer.id)
    .where('sked.state', '=', 'offered')
    .where('sked.start_at', '>', now())
    .where('sked_party.left_at', 'is', null)
    .where('sked_party.answer', '=', 'waiting')
    .executeTakeFirst();
  return row?.waiting ?? 0;
}
