import { createHash } from 'node:crypto';
import Database from 'better-sqlite3';
import type { RunningServer } from './server';

/** What the worker writes by itself while nobody does anything. */
const BY_ITSELF = ['outbox', 'installation'];

/** Number of rows and a fingerprint of every table that people can change, to compare before and after. */
export function databaseState(server: RunningServer): Record<string, string> {
  const sqlite = new Database(server.databaseFile, { readonly: true });
  try {
    const tables = sqlite
      .prepare<[], { name: string }>(
        `SELECT name FROM sqlite_master WHERE type = 'table' AND name NOT LIKE 'sqlite_%' ORDER BY name`,
      )
      .all()
      .filter(({ name }) => !BY_ITSELF.includes(name));
    return Object.fromEntries(
      tables.map(({ name }) => {
        const rows = sqlite.prepare(`SELECT * FROM ${name}`).all();
        const print = createHash('sha256').update(JSON.stringify(rows)).digest('hex').slice(0, 12);
        return [name, `${rows.length} rows, ${print}`];
      }),
    );
  } finally {
    sqlite.close();
  }
}
