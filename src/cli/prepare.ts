import { authSecret } from '../server/auth/secret';
import { migrateToLatest } from '../server/db/migrate';
import { log } from '../server/log';
import { failToStart, reportReady } from '../server/process/lifecycle';
import { closeServices, services, type Services } from '../server/services';

/** Makes the data folder ready: secret, schema and, with --demo, the demo scenario once. */
async function main(): Promise<void> {
  const shared = services();
  authSecret(shared.config.dataDir);
  const ran = await migrateToLatest(shared.db);
  if (ran.length > 0) log.info({ migrations: ran }, 'schema brought up to date');
  if (process.argv.includes('--demo')) await loadDemoOnce(shared);
  await closeServices();
  reportReady();
  if (process.connected) process.disconnect();
}

async function loadDemoOnce(shared: Services): Promise<void> {
  const { db, now } = shared;
  const loaded = await db
    .selectFrom('installation')
    .select('value')
    .where('name', '=', 'demo')
    .executeTakeFirst();
  if (loaded) return;
  // Only here, because it is much to load and needed once.
  const { loadDemo } = await import('../../db/seed/load');
  await loadDemo(shared);
  await db
    .insertInto('installation')
    .values({ name: 'demo', value: String(now()) })
    .onConflict((conflict) => conflict.doNothing())
    .execute();
}

main().catch(failToStart);
