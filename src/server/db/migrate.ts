import { Migrator, sql, type Kysely, type Migration } from 'kysely';
import { migrations } from '../../../db/migrations';
import type { Db } from './connection';

/** The schema could not be brought to the newest version; nothing of it was changed. */
export class MigrationFailed extends Error {
  constructor(sentence: string, cause: unknown) {
    super(sentence, { cause });
    this.name = 'MigrationFailed';
  }
}

/**
 * Brings the schema to the newest version, all pending migrations in one transaction, so that a failure
 * changes nothing. Two processes may call it at the same time: the second waits. Returns the names that ran.
 */
export async function migrateToLatest(
  db: Db,
  all: Record<string, Migration> = migrations,
): Promise<string[]> {
  const checked = Object.fromEntries(
    Object.entries(all).map(([name, migration]) => [name, withReferencesChecked(migration)]),
  );
  const migrator = new Migrator({
    db,
    provider: { getMigrations: () => Promise.resolve(checked) },
  });
  // A table can only be rebuilt while they are off, and the switch does nothing inside a transaction.
  await sql`pragma foreign_keys = off`.execute(db);
  const { error, results } = await migrator
    .migrateToLatest()
    .finally(() => sql`pragma foreign_keys = on`.execute(db));
  if (error) {
    const failed = results?.find((result) => result.status === 'Error')?.migrationName;
    const why = error instanceof Error ? error.message : 'unknown reason';
    throw new MigrationFailed(
      `The database could not be brought up to date and stays as it was: ${
        failed ? `migration ${failed}: ` : ''
      }${why}.`,
      error,
    );
  }
  return (results ?? []).map((result) => result.migrationName);
}

function withReferencesChecked(migration: Migration): Migration {
  return {
    async up(db: Kysely<unknown>): Promise<void> {
      await migration.up(db);
      const { rows } = await sql<{
        table: string;
        parent: string;
      }>`pragma foreign_key_check`.execute(db);
      const [broken] = rows;
      if (broken) throw new Error(`a row of ${broken.table} points to no ${broken.parent}`);
    },
  };
}
