import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { readConfig } from '../../../src/server/config';
import { openDatabase } from '../../../src/server/db/connection';
import { migrateToLatest } from '../../../src/server/db/migrate';
import { newId } from '../../../src/server/ids';
import type { Services } from '../../../src/server/services';
import type { Viewer } from '../../../src/server/auth/viewer';

export interface TestHouse {
  services: Services;
  /** Moves the clock. */
  setNow: (atMs: number) => void;
  person: (name: string) => Promise<Viewer>;
  close: () => Promise<void>;
}

/** A migrated database of its own in a temporary folder, with a clock that stands still. */
export async function openHouse(): Promise<TestHouse> {
  const dataDir = mkdtempSync(path.join(tmpdir(), 'echotide-stations-'));
  const config = readConfig({
    PUBLIC_URL: 'http://echotide.example',
    DATA_DIR: dataDir,
    SMTP_HOST: '127.0.0.1',
    MAIL_FROM: 'echotide@echotide.example',
  });
  const db = openDatabase(config.databaseFile);
  await migrateToLatest(db);
  let nowMs = Date.parse('2027-01-18T18:42:00Z');
  return {
    services: { db, config, now: () => nowMs },
    setNow: (atMs) => {
      nowMs = atMs;
    },
    async person(name) {
      const viewer: Viewer = {
        id: newId(),
        email: `${name.toLowerCase()}@people.example`,
        name,
        role: 'operator',
        timeZone: 'UTC',
      };
      await db
        .insertInto('person')
        .values({
          id: viewer.id,
          email: viewer.email,
          name,
          password_hash: null,
          role: 'operator',
          time_zone: 'UTC',
          confirmed_at: nowMs,
          locked_at: null,
          sessions_valid_from: 0,
          created_at: nowMs,
        })
        .execute();
      return viewer;
    },
    async close() {
      await db.destroy();
      rmSync(dataDir, { recursive: true, force: true });
    },
  };
}
