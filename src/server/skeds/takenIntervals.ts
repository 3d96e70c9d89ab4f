import { unionIntervals, type Interval } from '../../domain/time/interval';
import type { Db } from '../db/connection';
import type { Tx } from '../db/transaction';

/**
 * When any of the stations has an agreed sked within the span, sorted and joined. The booked times are
 * given whole, even where they reach beyond the span.
 */
export async function takenIntervals(
  db: Db | Tx,
  stationIds: readonly string[],
  span: Interval,
  except: string | ReadonlySet<string> = new Set(),
): Promise<Interval[]> {
  if (stationIds.length === 0) return [];
  let query = db
    .selectFrom('booking')
    .select(['start_at', 'end_at'])
    .where('station_id', 'in', [...stationIds])
    .where('start_at', '<', span.endMs)
    .where('end_at', '>', span.startMs);
  const left = typeof except === 'string' ? [except] : [...except];
  if (left.length > 0) query = query.where('sked_id', 'not in', left);
  const rows = await query.execute();
  return unionIntervals(rows.map((row) => ({ startMs: row.start_at, endMs: row.end_at })));
}
