import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { sql } from 'kysely';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { openDatabase, type Db } from '~/server/db/connection';
import { migrateToLatest } from '~/server/db/migrate';
import { migrations } from '../../../db/migrations';

const BEFORE = Object.fromEntries(Object.entries(migrations).slice(0, 2));

let folder: string;
let db: Db;

beforeEach(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'echotide-sked-migration-'));
  db = openDatabase(path.join(folder, 'echotide.sqlite'));
  await migrateToLatest(db, BEFORE);
  const station = (id: string, callSign: string) =>
    `INSERT INTO station (id, call_sign, name, latitude_deg, longitude_deg, height_m, locator,
      public_locator_length, time_zone, sky_json, hours_json, listed, created_at, updated_at)
      VALUES ('${id}', '${callSign}', 'Coast', 57, 18, 23, 'JO97ee', 6, 'UTC', '{}', '{}', 1, 1, 2)`;
  for (const statement of [
    `INSERT INTO person (id, email, name, role, time_zone, sessions_valid_from, created_at)
      VALUES ('p', 'ylva@people.example', 'Ylva', 'operator', 'UTC', 0, 0)`,
    station('a', 'QA1LUN'),
    station('b', 'QB7TID'),
    `INSERT INTO station_crew VALUES ('a', 'p', 'keeper', 3)`,
    `INSERT INTO station_band VALUES ('a', '1296', '{}')`,
    `INSERT INTO sked (id, uid, band, frequency_mhz, mode, state, version, offered_by, start_at, end_at,
      created_at, updated_at) VALUES ('k', 'u', '1296', 1296.065, 'cw', 'agreed', 2, 'a', 10, 20, 1, 2)`,
    `INSERT INTO sked_party VALUES ('k', 'a', 0, 'accepted'), ('k', 'b', 1, 'accepted')`,
    `INSERT INTO sked_event (id, sked_id, sked_version, kind, station_id, start_at, end_at, at)
      VALUES ('e', 'k', 1, 'offered', 'a', 10, 20, 1)`,
    `INSERT INTO booking VALUES ('a', 'k', 10, 20), ('b', 'k', 10, 20)`,
  ]) {
    await sql.raw(statement).execute(db);
  }
});
afterEach(async () => {
  await db.destroy();
  rmSync(folder, { recursive: true, force: true });
});

const TABLES = [
  'station',
  'station_crew',
  'station_band',
  'sked',
  'sked_party',
  'sked_event',
  'booking',
] as const;

async function everything() {
  const rows: Record<string, unknown[]> = {};
  for (const table of TABLES) rows[table] = await db.selectFrom(table).selectAll().execute();
  return rows;
}

describe('0003_skeds_for_everyone and 0004_activities', () => {
  it('rebuild tables in use and keep every row, those that refer to them too', async () => {
    const before = await everything();
    expect(before['booking']).toHaveLength(2);
    await migrateToLatest(db);
    expect(await everything()).toMatchObject(before);
    const sked = await db.selectFrom('sked').selectAll().executeTakeFirstOrThrow();
    expect(sked).toMatchObject({ agreed_version: 2, east_first: 1, activity_id: null });
  });

  it('leave the references in force', async () => {
    await migrateToLatest(db);
    await expect(
      sql`INSERT INTO station_crew VALUES ('nowhere', 'p', 'keeper', 1)`.execute(db),
    ).rejects.toThrow(/FOREIGN KEY/);
    await expect(sql`DELETE FROM station WHERE id = 'a'`.execute(db)).rejects.toThrow(
      /FOREIGN KEY/,
    );
  });

  it('let stations described by others share a call sign, but none of the registered', async () => {
    await migrateToLatest(db);
    const add = (id: string, guest: 0 | 1) =>
      sql`INSERT INTO station (id, call_sign, name, latitude_deg, longitude_deg, height_m, locator,
        public_locator_length, time_zone, sky_json, hours_json, listed, guest, created_at, updated_at)
        VALUES (${id}, 'QA1LUN', 'x', 1, 1, 0, 'JJ00', 4, 'UTC', '{}', '{}', 0, ${guest}, 1, 1)`.execute(
        db,
      );
    await add('g1', 1);
    await add('g2', 1);
    await expect(add('again', 0)).rejects.toThrow(/UNIQUE/);
  });

  it('refuse a state in which a row points to nothing, and change nothing then', async () => {
    await sql`pragma foreign_keys = off`.execute(db);
    await sql`INSERT INTO station_crew VALUES ('nowhere', 'p', 'keeper', 1)`.execute(db);
    await sql`pragma foreign_keys = on`.execute(db);
    await expect(migrateToLatest(db)).rejects.toThrow(
      /0003_skeds_for_everyone: a row of station_crew points to no station/,
    );
    await expect(sql`SELECT guest FROM station`.execute(db)).rejects.toThrow(/no such column/);
  });
});
