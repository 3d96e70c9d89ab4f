import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { readConfig } from '~/server/config';
import { openDatabase } from '~/server/db/connection';
import { migrateToLatest } from '~/server/db/migrate';
import type { Services } from '~/server/services';

/** Services on a database file of their own, with a clock that tests move. */
export interface Ground extends Services {
  folder: string;
  /** The environment that gives a process of ours the same services. */
  env: Record<string, string>;
  passMs: (ms: number) => void;
  end: () => Promise<void>;
}

export async function openGround(settings: Record<string, string> = {}): Promise<Ground> {
  const folder = mkdtempSync(path.join(tmpdir(), 'echotide-ground-'));
  const env = {
    PUBLIC_URL: 'https://echotide.example',
    DATA_DIR: folder,
    SMTP_HOST: '127.0.0.1',
    SMTP_PORT: '1',
    SMTP_TLS: 'none',
    MAIL_FROM: 'Echotide <echotide@echotide.example>',
    LOG_LEVEL: 'silent',
    ...settings,
  };
  const config = readConfig(env);
  const db = openDatabase(config.databaseFile);
  await migrateToLatest(db);
  let nowMs = Date.UTC(2027, 0, 18, 18, 42);
  return {
    folder,
    env,
    db,
    config,
    now: () => nowMs,
    passMs: (ms) => {
      nowMs += ms;
    },
    end: async () => {
      await db.destroy();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}
