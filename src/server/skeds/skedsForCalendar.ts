import type { SkedSummary } from '../../domain/sked/view';
import type { Interval } from '../../domain/time/interval';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { stationIdsOf } from './load';
import { summariesOf } from './summaries';

/** The offered, agreed and reported skeds of the viewer's stations that touch the span, by their start. */
export async function skedsForCalendar(
  { db, now }: Services,
  viewer: Viewer,
  span: Interval,
): Promise<SkedSummary[]> {
  const mine = await stationIdsOf(db, viewer.id);
  if (mine.size === 0) return [];
  const rows = await db
    .selectFrom('sked')
    .selectAll()
    .where('id', 'in', (parties) =>
      parties
        .selectFrom('sked_party')
        .select('sked_id')
        .where('station_id', 'in', [...mine])
        .where('left_at', 'is', null),
    )
    .where('state', 'in', ['offered', 'agreed', 'reported'])
    .where('start_at', '<', span.endMs)
    .where('end_at', '>', span.startMs)
    .orderBy('start_at')
    .orderBy('id')
    .execute();
  const skeds = await summariesOf(db, rows, mine, now());
  return skeds.filter((sked) => sked.state !== 'lapsed');
}
