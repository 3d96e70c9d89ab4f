import { Migrator, type Migration } from 'kysely';
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
  const migrator = new Migrator({
    db,
    provider: { getMigrations: () => Promise.resolve(all) },
  });
  const { error, results } = await migrator.migrateToLatest();
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
