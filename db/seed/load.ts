import { log } from '../../src/server/log';
import type { Tables } from '../../src/server/db/tables';
import { inTransaction, type Tx } from '../../src/server/db/transaction';
import type { Services } from '../../src/server/services';
import { loadActivity } from './activity';
import { planSkeds } from './plan';
import { playSkeds } from './play';
import { loadRoster } from './roster';
import { SKED_STORIES } from './stories';

/** Mails about what happened last, left for the worker so that the mail catcher is not empty. */
const MAILS_LEFT_TO_SEND = 3;
const LOADING = 'demoLoading';

/** Referring tables before those they refer to. */
const FILLED: (keyof Tables)[] = [
  'booking',
  'sked_report',
  'sked_event',
  'sked_party',
  'activity_slot',
  'activity_revision',
  'plan_run',
  'activity_wish',
  'activity_station',
  'activity_band',
  'guest_link',
  'sked',
  'activity',
  'crew_invitation',
  'station_crew',
  'noise_record',
  'station_band',
  'station',
  'person_token',
  'person',
  'outbox',
  'audit',
];

/**
 * Loads the demo scenario, with every date counted from `services.now()`, into an empty database, and marks
 * it there as the demo. A load that was cut off is begun again. A database that already has people of its
 * own stays as it is.
 */
export async function loadDemo(services: Services): Promise<void> {
  if (!(await begin(services))) {
    log.warn('the data folder has people in it already, so the demo was not loaded');
    return;
  }
  const roster = await loadRoster(services);
  await playSkeds(services, planSkeds(SKED_STORIES, services.now()), roster);
  await loadActivity(services, roster);
  await finish(services);
}

/** False when the database is somebody's own. */
function begin({ db, now }: Services): Promise<boolean> {
  return inTransaction(db, async (tx) => {
    const cutOff = await tx
      .selectFrom('installation')
      .select('value')
      .where('name', '=', LOADING)
      .executeTakeFirst();
    if (cutOff) {
      for (const table of FILLED) await tx.deleteFrom(table).execute();
      return true;
    }
    if (await tx.selectFrom('person').select('id').limit(1).executeTakeFirst()) return false;
    await tx
      .insertInto('installation')
      .values({ name: LOADING, value: String(now()) })
      .execute();
    return true;
  });
}

function finish({ db, now }: Services): Promise<void> {
  return inTransaction(db, async (tx) => {
    await markOldMailsSent(tx);
    await tx.deleteFrom('installation').where('name', '=', LOADING).execute();
    await tx
      .insertInto('installation')
      .values({ name: 'demo', value: String(now()) })
      .execute();
  });
}

/** What the history would have sent counts as sent, each when it was written. */
async function markOldMailsSent(tx: Tx): Promise<void> {
  await tx
    .updateTable('outbox')
    .set((outbox) => ({ sent_at: outbox.ref('created_at'), attempts: 1 }))
    .where('id', 'not in', (from) =>
      from
        .selectFrom('outbox')
        .select('id')
        .orderBy('created_at', 'desc')
        .limit(MAILS_LEFT_TO_SEND),
    )
    .execute();
}
