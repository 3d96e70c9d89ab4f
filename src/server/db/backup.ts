import { existsSync, renameSync, rmSync } from 'node:fs';
import Database from 'better-sqlite3';
import { openSqlite } from './connection';

/**
 * Copies the database to `target` while others go on using it, and checks the copy. The copy appears under
 * its name only when it is whole. Throws when `target` exists or the copy is damaged.
 */
export async function backUp(databaseFile: string, target: string): Promise<void> {
  if (!existsSync(databaseFile)) throw new Error(`There is no database at ${databaseFile}.`);
  if (existsSync(target)) throw new Error(`${target} is already there; choose another name.`);
  const draft = `${target}.part`;
  rmSync(draft, { force: true });
  const source = openSqlite(databaseFile);
  try {
    await source.backup(draft);
    requireIntact(draft);
    renameSync(draft, target);
  } finally {
    source.close();
    for (const suffix of ['', '-wal', '-shm']) rmSync(`${draft}${suffix}`, { force: true });
  }
}

/** Throws when SQLite finds anything wrong with the file. */
export function requireIntact(file: string): void {
  const copy = new Database(file);
  try {
    // A copy that stands alone: without this, opening it would need a -wal file beside it.
    copy.pragma('journal_mode = DELETE');
    const found = copy.pragma('integrity_check', { simple: true });
    if (found !== 'ok') throw new Error(`The copy ${file} is damaged: ${String(found)}.`);
    const broken = copy.pragma('foreign_key_check') as unknown[];
    if (broken.length > 0)
      throw new Error(`The copy ${file} has ${broken.length} broken references.`);
  } finally {
    copy.close();
  }
}
