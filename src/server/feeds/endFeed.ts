import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { NotFound } from '../errors';
import type { Services } from '../services';

/** Ends one of the viewer's feeds: its address leads nowhere from now on. Throws `NotFound`. */
export async function endFeed(
  { db }: Services,
  viewer: Pick<Viewer, 'id'>,
  feedId: string,
): Promise<void> {
  const { numDeletedRows } = await inTransaction(db, (tx) =>
    tx
      .deleteFrom('calendar_feed')
      .where('id', '=', feedId)
      .where('person_id', '=', viewer.id)
      .executeTakeFirst(),
  );
  if (numDeletedRows === 0n) throw new NotFound('There is no such feed among yours.');
}
