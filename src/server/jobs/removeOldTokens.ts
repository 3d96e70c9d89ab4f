import { inTransaction } from '../db/transaction';
import type { Services } from '../services';

const KEEP_AFTER_EXPIRY_MS = 7 * 86_400_000;

/**
 * Forgets secrets of mail links a week after they expired (until then a second visit can still be told
 * what became of the link). Returns how many were removed.
 */
export async function removeOldTokens({ db, now }: Services): Promise<number> {
  const before = now() - KEEP_AFTER_EXPIRY_MS;
  return inTransaction(db, async (tx) => {
    const tokens = await tx
      .deleteFrom('person_token')
      .where('expires_at', '<', before)
      .executeTakeFirst();
    const invitations = await tx
      .deleteFrom('crew_invitation')
      .where('expires_at', '<', before)
      .executeTakeFirst();
    const links = await tx
      .deleteFrom('guest_link')
      .where('expires_at', '<', before)
      .executeTakeFirst();
    return Number(tokens.numDeletedRows + invitations.numDeletedRows + links.numDeletedRows);
  });
}
