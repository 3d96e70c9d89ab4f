import Database from 'better-sqlite3';
import { CompiledQuery, Kysely, SqliteAdapter, SqliteDialect, SqliteDriver } from 'kysely';
import type { DatabaseConnection } from 'kysely';
import { PatientConnection } from './patience';
import type { Tables } from './tables';

export type Db = Kysely<Tables>;

/**
 * Opens the database file with the settings every process must share.
 * Throws `DatabaseBroken` when the file is not a usable SQLite database.
 */
export function openDatabase(file: string): Db {
  const sqlite = openSqlite(file);
  // From here on `PatientConnection` waits.
  sqlite.pragma('busy_timeout = 0');
  return new Kysely<Tables>({ dialect: new Dialect(sqlite) });
}

export function openSqlite(file: string): Database.Database {
  try {
    const sqlite = new Database(file);
    // Before journal_mode: switching to WAL needs a lock that another process may hold for a moment.
    sqlite.pragma('busy_timeout = 5000');
    sqlite.pragma('journal_mode = WAL');
    sqlite.pragma('synchronous = FULL');
    sqlite.pragma('foreign_keys = ON');
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

class Dialect extends SqliteDialect {
  readonly #database: Database.Database;

  constructor(database: Database.Database) {
    super({ database });
    this.#database = database;
  }

  override createAdapter(): SqliteAdapter {
    return new Adapter();
  }

  override createDriver(): SqliteDriver {
    return new Driver({ database: this.#database });
  }
}

/** Kysely migrates SQLite outside of a transaction unless told that SQLite can do better. */
class Adapter extends SqliteAdapter {
  override get supportsTransactionalDdl(): boolean {
    return true;
  }
}

/** Takes the write lock at the start: a transaction that reads first and writes later would fail. */
class Driver extends SqliteDriver {
  #patient: PatientConnection | undefined;

  override async acquireConnection(): Promise<DatabaseConnection> {
    const connection = await super.acquireConnection();
    return (this.#patient ??= new PatientConnection(connection));
  }

  override async beginTransaction(connection: DatabaseConnection): Promise<void> {
    await connection.executeQuery(CompiledQuery.raw('begin immediate'));
  }
}
