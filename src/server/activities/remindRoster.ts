import { DAY_MS } from '../../domain/time/interval';
import type { Viewer } from '../auth/viewer';
import { inTransaction, type Tx } from '../db/transaction';
import { Conflict } from '../errors';
import type { Services } from '../services';
import { requireEditor } from './access';
import { mailRoster } from './mailRoster';
import type { ActivityRow } from './records';

/** So long before answers are due those who have not answered are reminded by themselves. */
export const REMINDED_BEFORE_MS = 3 * DAY_MS;
/** Nobody is reminded by hand more often than this. */
const LEAST_PAUSE_MS = DAY_MS;

/**
 * Writes to every station that has not answered, except those written to within a day. Returns how many stations.
 * Throws `Conflict` when there are none.
 */
export async function remindRoster(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
): Promise<{ reminded: number }> {
  return inTransaction(services.db, async (tx) => {
    const activity = await requireEditor(tx, viewer, slug);
    const now = services.now();
    const waiting = await waitingStations(tx, activity.id);
    const due = waiting.filter(
      ({ invited_at, reminded_at }) =>
        Math.max(invited_at ?? 0, reminded_at ?? 0) <= now - LEAST_PAUSE_MS,
    );
    if (due.length === 0) {
      throw new Conflict(
        waiting.length === 0
          ? 'Every station has answered.'
          : 'Every station without an answer was written to within the last day.',
      );
    }
    await remind(tx, services, activity, due);
    return { reminded: due.length };
  });
}

/** For the worker: reminds once, three days before answers are due. Returns how many stations. */
export async function remindDueRosters(services: Services): Promise<number> {
  const now = services.now();
  const due = await services.db
    .selectFrom('activity')
    .select('id')
    .where('answers_by', '>', now)
    .where('answers_by', '<=', now + REMINDED_BEFORE_MS)
    .where('end_at', '>', now)
    .execute();
  let reminded = 0;
  for (const { id } of due) {
    reminded += await inTransaction(services.db, async (tx) => {
      const activity = await tx
        .selectFrom('activity')
        .selectAll()
        .where('id', '=', id)
        .executeTakeFirstOrThrow();
      const opensMs = (activity.answers_by ?? 0) - REMINDED_BEFORE_MS;
      const stations = (await waitingStations(tx, id)).filter(
        ({ invited_at, reminded_at }) =>
          // Who was invited or reminded within these days knows.
          (invited_at ?? 0) < opensMs && (reminded_at ?? 0) < opensMs,
      );
      await remind(tx, services, activity, stations);
      return stations.length;
    });
  }
  return reminded;
}

async function waitingStations(tx: Tx, activityId: string) {
  return tx
    .selectFrom('activity_station')
    .select(['station_id', 'invited_at', 'reminded_at'])
    .where('activity_id', '=', activityId)
    .where('answer', '=', 'waiting')
    .execute();
}

async function remind(
  tx: Tx,
  services: Services,
  activity: ActivityRow,
  stations: readonly { station_id: string }[],
): Promise<void> {
  const ids = stations.map(({ station_id }) => station_id);
  if (ids.length === 0) return;
  await mailRoster(tx, services, activity, 'reminder', ids);
  await tx
    .updateTable('activity_station')
    .set({ reminded_at: services.now() })
    .where('activity_id', '=', activity.id)
    .where('station_id', 'in', ids)
    .execute();
}
