import { readDataFiles } from '../server/config';
import { openDatabase } from '../server/db/connection';
import { migrateToLatest } from '../server/db/migrate';
import { failToStart } from '../server/process/lifecycle';
import { loadDotEnv } from './lib/dotEnv.mjs';

/** `npm run migrate`: brings the database in DATA_DIR to the newest version and says what ran. */
async function main(): Promise<void> {
  loadDotEnv();
  const db = openDatabase(readDataFiles(process.env).databaseFile);
  const ran = await migrateToLatest(db);
  await db.destroy();
  console.log(ran.length > 0 ? `Ran ${ran.join(', ')}.` : 'The schema is up to date.');
}

main().catch(failToStart);
