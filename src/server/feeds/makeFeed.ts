import { z } from 'zod';
import { paths } from '../../paths';
import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { newId, newSecret } from '../ids';
import type { Services } from '../services';
import { crewRoleOf, stationNotFound } from '../stations/access';

/** `station` "" or absent: all skeds of the person. */
export const feedSchema = z.object({ station: z.string().max(64).default('') });

export interface MadeFeed {
  url: string;
  stationId: string | null;
  /** Whether an older address for the same skeds ended by it. */
  replaced: boolean;
}

/**
 * Makes the secret address of a calendar feed; one that was there before ends. Returns the address, which cannot be
 * shown again. Throws `NotFound` for a station to whose crew the viewer does not belong.
 */
export async function makeFeed(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  { station }: z.output<typeof feedSchema>,
): Promise<MadeFeed> {
  const stationId = station === '' ? null : station;
  const { secret, hash } = newSecret();
  const replaced = await inTransaction(services.db, async (tx) => {
    if (stationId !== null && !(await crewRoleOf(tx, stationId, viewer.id))) {
      throw stationNotFound();
    }
    const { numDeletedRows } = await tx
      .deleteFrom('calendar_feed')
      .where('person_id', '=', viewer.id)
      .where('station_id', stationId === null ? 'is' : '=', stationId)
      .executeTakeFirst();
    await tx
      .insertInto('calendar_feed')
      .values({
        id: newId(),
        person_id: viewer.id,
        station_id: stationId,
        token_hash: hash,
        created_at: services.now(),
        last_read_at: null,
      })
      .execute();
    return numDeletedRows > 0n;
  });
  return { url: services.config.publicUrl + paths.feed(secret), stationId, replaced };
}
