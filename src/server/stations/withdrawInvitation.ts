import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { NotFound } from '../errors';
import type { Services } from '../services';
import { requireKeeper } from './access';

/** Takes back an open invitation, for a keeper: its link no longer works. */
export async function withdrawInvitation(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  invitationId: string,
): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    await requireKeeper(tx, viewer, stationId);
    const result = await tx
      .deleteFrom('crew_invitation')
      .where('id', '=', invitationId)
      .where('station_id', '=', stationId)
      .where('accepted_at', 'is', null)
      .executeTakeFirst();
    if (result.numDeletedRows === 0n) throw new NotFound('There is no such open invitation.');
  });
}
