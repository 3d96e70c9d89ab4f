import { createHash } from 'node:crypto';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import Database from 'better-sqlite3';
import { sql } from 'kysely';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { openDatabase } from '~/server/db/connection';
import { migrateToLatest } from '~/server/db/migrate';
import { migrations } from '../../../db/migrations';
import { startChild, typescript } from './children';

const FROZEN = path.join(import.meta.dirname, 'frozenMigrations.json');

let folder: string;
let file: string;

beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'echotide-migrations-'));
  file = path.join(folder, 'echotide.sqlite');
});
afterEach(() => {
  rmSync(folder, { recursive: true, force: true });
});

describe('migrations', () => {
  // A new migration is recorded with FREEZE_MIGRATIONS=yes; one that has landed never changes again.
  it('are frozen: their files are those recorded in frozenMigrations.json', () => {
    const now = Object.fromEntries(Object.keys(migrations).map((name) => [name, hashOf(name)]));
    if (process.env['FREEZE_MIGRATIONS'] === 'yes') {
      writeFileSync(FROZEN, `${JSON.stringify(now, null, 2)}\n`);
    }
    expect(now).toEqual(JSON.parse(readFileSync(FROZEN, 'utf8')));
  });

  it('are named in order and without gaps', () => {
    const numbers = Object.keys(migrations).map((name) => Number(name.slice(0, 4)));
    expect(numbers).toEqual(numbers.map((_, place) => place + 1));
  });

  it('bring an empty file to the newest version, once', async () => {
    const db = openDatabase(file);
    expect(await migrateToLatest(db)).toEqual(Object.keys(migrations));
    const before = schemaOf(file);
    expect(await migrateToLatest(db)).toEqual([]);
    expect(schemaOf(file)).toEqual(before);
    expect(before.filter((row) => row.startsWith('CREATE TABLE')).length).toBeGreaterThan(10);
    await db.destroy();
  });

  it('bring every earlier version to the newest, with the same schema as from empty', async () => {
    const fresh = openDatabase(file);
    await migrateToLatest(fresh);
    await fresh.destroy();
    const names = Object.keys(migrations);
    for (let version = 1; version <= names.length; version += 1) {
      const older = path.join(folder, `${version}.sqlite`);
      const db = openDatabase(older);
      await migrateToLatest(db, Object.fromEntries(Object.entries(migrations).slice(0, version)));
      expect(await migrateToLatest(db)).toEqual(names.slice(version));
      await db.destroy();
      expect(schemaOf(older)).toEqual(schemaOf(file));
    }
  });

  it('change nothing when one fails half way', async () => {
    const db = openDatabase(file);
    await migrateToLatest(db);
    const before = schemaOf(file);
    const broken = {
      ...migrations,
      '9998_good': {
        up: async (tx: typeof db) => {
          await sql`CREATE TABLE good (id TEXT)`.execute(tx);
        },
      },
      '9999_broken': {
        up: async (tx: typeof db) => {
          await sql`CREATE TABLE half (id TEXT)`.execute(tx);
          await sql`INSERT INTO nowhere VALUES (1)`.execute(tx);
        },
      },
    };
    await expect(migrateToLatest(db, broken)).rejects.toThrow(
      /stays as it was: migration 9999_broken: no such table: nowhere/,
    );
    expect(schemaOf(file)).toEqual(before);
    await db.destroy();
  });

  it('may be started by two processes at once', async () => {
    const env = { DATA_DIR: folder };
    const both = [1, 2].map(() => startChild(typescript('src/cli/migrate.ts'), env).ended);
    const ended = await Promise.all(both);
    expect(ended.map(({ code }) => code)).toEqual([0, 0]);
    const said = ended.map(({ output }) => output.trim()).sort();
    expect(said[0]).toMatch(/^Ran 0001_ground/);
    expect(said[1]).toBe('The schema is up to date.');
  });

  it('say in a sentence when the file is no database', async () => {
    writeFileSync(file, createHash('sha512').update('noise').digest().toString('hex').repeat(50));
    const { ready, ended } = startChild(typescript('src/cli/migrate.ts'), { DATA_DIR: folder });
    await expect(ready).rejects.toThrow(
      `The database ${file} cannot be opened: file is not a database.`,
    );
    expect(await ended).toEqual({ code: 1, output: '' });
  });
});

function hashOf(name: string): string {
  return createHash('sha256')
    .update(readFileSync(`db/migrations/${name}.ts`))
    .digest('hex');
}

function schemaOf(databaseFile: string): string[] {
  const sqlite = new Database(databaseFile, { readonly: true });
  const rows = sqlite
    .prepare("SELECT sql FROM sqlite_schema WHERE sql IS NOT NULL AND name NOT LIKE 'kysely%'")
    .all() as { sql: string }[];
  sqlite.close();
  return rows.map((row) => row.sql).sort();
}
