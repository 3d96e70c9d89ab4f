import { Migrator } from 'kysely';
import { migrations } from '../../../db/migrations';
import type { Db } from './connection';

/** Brings the schema to the newest version; each migration in its own transaction. Returns the names that ran. */
export async function migrateToLatest(db: Db): Promise<string[]> {
  const migrator = new Migrator({
    db,
    provider: { getMigrations: () => Promise.resolve(migrations) },
  });
  const { error, results } = await migrator.migrateToLatest();
  if (error) {
    const failed = results?.find((result) => result.status === 'Error')?.migrationName;
    throw new Error(`Migration ${failed ?? '(unknown)'} failed; the schema stays as it was.`, {
      cause: error,
    });
  }
  return (results ?? []).map((result) => result.migrationName);
}
