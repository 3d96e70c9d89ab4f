import { z } from 'zod';
import { messageWordsSchema, type TalkMessage } from '../../domain/sked/talk';
import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import type { Services } from '../services';
import { loadSked } from './load';
import { noSuchSked } from './refusals';
import { stationIdSchema, type WithLink } from './schemas';
import { addMessage, ownPartiesStillIn } from './talk';

export const messageSchema = z.object({
  words: messageWordsSchema,
  as: stationIdSchema.optional(),
});

/** Writes to the other parties of a sked. Throws as `addMessage`. */
export function postMessage(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  skedId: string,
  { words, as, first }: z.output<typeof messageSchema> & WithLink,
): Promise<TalkMessage> {
  return inTransaction(services.db, async (tx) => {
    await first?.(tx);
    const loaded = await loadSked(tx, skedId);
    const stationId = as ?? (loaded && (await ownPartiesStillIn(tx, loaded, viewer.id))[0]);
    if (!stationId) throw noSuchSked();
    return addMessage(tx, services, { skedId, stationId, personId: viewer.id, words });
  });
}
