import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { readDataFiles } from '../server/config';
import { backUp } from '../server/db/backup';
import { loadDotEnv } from './lib/dotEnv.mjs';

/** `npm run backup [-- file]`: a checked copy of the running database, by default in DATA_DIR/backups. */
async function main(): Promise<void> {
  loadDotEnv();
  const { dataDir, databaseFile } = readDataFiles(process.env);
  const stamp = new Date().toISOString().replace(/[-:]|\.\d+/g, '');
  const target = path.resolve(
    process.argv[2] ?? path.join(dataDir, 'backups', `echotide-${stamp}.sqlite`),
  );
  mkdirSync(path.dirname(target), { recursive: true });
  await backUp(databaseFile, target);
  console.log(`Backed up to ${target}; the copy was checked.`);
}

main().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : String(error));
  process.exit(1);
});
