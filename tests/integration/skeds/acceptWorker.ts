/** A process of its own with its own connection: accepts what it is told and answers with the outcome. */
import { readConfig } from '../../../src/server/config';
import { openDatabase } from '../../../src/server/db/connection';
import { Conflict } from '../../../src/server/errors';
import { acceptSked } from '../../../src/server/skeds/acceptSked';
import type { Viewer } from '../../../src/server/auth/viewer';

export interface Order {
  skedId: string;
  version: number;
  viewer: Viewer;
  nowMs: number;
  /** When to begin, by the wall clock of the machine. */
  beginAtMs: number;
}

const config = readConfig(process.env);
const db = openDatabase(config.databaseFile);

process.on('message', (order: Order | 'end') => {
  if (order === 'end') {
    void db.destroy().then(() => process.disconnect());
    return;
  }
  void run(order).then((outcome) => process.send!(outcome));
});
process.send!('ready');

async function run({ skedId, version, viewer, nowMs, beginAtMs }: Order): Promise<string> {
  await new Promise((resolve) => setTimeout(resolve, beginAtMs - Date.now() - 3));
  while (Date.now() < beginAtMs);
  try {
    await acceptSked({ db, config, now: () => nowMs }, viewer, skedId, { version, words: '' });
    return 'accepted';
  } catch (error) {
    return error instanceof Conflict ? `conflict: ${error.message}` : `broken: ${String(error)}`;
  }
}
