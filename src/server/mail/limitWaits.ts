import { sql } from 'kysely';
import type { Services } from '../services';
import { MOST_DOUBLINGS } from './backoff';

/**
 * Shortens waits in the outbox that no attempt can have meant: a clock that was set back leaves leases and
 * next attempts that far ahead. A lease ends at most one lease from now, a mail never tried or taken was due
 * already, any other waits at most its longest backoff. An attempt under way keeps its lease, so nothing is
 * sent twice for this.
 */
export async function limitWaits({ db, config, now }: Services): Promise<void> {
  const at = now();
  const { firstMs, longestMs } = config.mailRetry;
  const leaseEnd = at + config.mailLeaseMs;
  await db
    .updateTable('outbox')
    .set({ leased_until: leaseEnd })
    .where('sent_at', 'is', null)
    .where('set_aside_at', 'is', null)
    .where('leased_until', '>', leaseEnd)
    .execute();
  const latest = sql<number>`${at} + iif(attempts = 0 OR leased_until IS NOT NULL, 0,
    min(${longestMs}, ${firstMs} * (1 << min(attempts - 1, ${MOST_DOUBLINGS}))))`;
  await db
    .updateTable('outbox')
    .set({ next_attempt_at: latest })
    .where('sent_at', 'is', null)
    .where('set_aside_at', 'is', null)
    .where('next_attempt_at', '>', at)
    .where('next_attempt_at', '>', latest)
    .execute();
}
