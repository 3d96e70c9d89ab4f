import type { Viewer } from '../auth/viewer';
import type { Tx } from '../db/transaction';
import type { Services } from '../services';

/** Writes into the audit trail, in the transaction of the act itself. No addresses, no words of people. */
export async function recordAct(
  tx: Tx,
  { now }: Pick<Services, 'now'>,
  viewer: Pick<Viewer, 'id'>,
  action: string,
  subject: string,
  details: Record<string, string | number | boolean | null> = {},
): Promise<void> {
  await tx
    .insertInto('audit')
    .values({
      at: now(),
      person_id: viewer.id,
      action,
      subject,
      details_json: JSON.stringify(details),
    })
    .execute();
}
