import Database from 'better-sqlite3';
import { Kysely, SqliteDialect } from 'kysely';
import type { Tables } from './tables';

export type Db = Kysely<Tables>;

/**
 * Opens the database file with the settings every process must share.
 * Throws `DatabaseBroken` when the file is not a usable SQLite database.
 */
export function openDatabase(file: string): Db {
  const sqlite = openSqlite(file);
  return new Kysely<Tables>({ dialect: new SqliteDialect({ database: sqlite }) });
}

export function openSqlite(file: string): Database.Database {
  try {
    const sqlite = new Database(file);
    sqlite.pragma('journal_mode = WAL');
    sqlite.pragma('synchronous = FULL');
    sqlite.pragma('foreign_keys = ON');
    sqlite.pragma('busy_timeout = 5000');
    return sqlite;
  } catch (cause) {
    throw new DatabaseBroken(file, cause);
  }
}

export class DatabaseBroken extends Error {
  constructor(file: string, cause: unknown) {
    const why = cause instanceof Error ? cause.message : String(cause);
    super(`The database ${file} cannot be opened: ${why}.`, { cause });
    this.name = 'DatabaseBroken';
  }
}
