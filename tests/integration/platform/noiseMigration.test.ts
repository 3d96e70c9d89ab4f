import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { sql } from 'kysely';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { openDatabase, type Db } from '~/server/db/connection';
import { migrateToLatest } from '~/server/db/migrate';
import { migrations } from '../../../db/migrations';

const GROUND = { '0001_ground': migrations['0001_ground']! };
const SETUP = JSON.stringify({ receive: { kind: 'measured', systemTemperatureK: 80 } });

let folder: string;
let db: Db;

beforeEach(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'echotide-noise-migration-'));
  db = openDatabase(path.join(folder, 'echotide.sqlite'));
  await migrateToLatest(db, GROUND);
  for (const statement of [
    `INSERT INTO person (id, email, name, role, time_zone, sessions_valid_from, created_at)
      VALUES ('p', 'ylva@people.example', 'Ylva', 'operator', 'UTC', 0, 0)`,
    `INSERT INTO station (id, call_sign, name, latitude_deg, longitude_deg, height_m, locator,
      public_locator_length, time_zone, sky_json, hours_json, created_at, updated_at)
      VALUES ('s', 'QA1LUN', 'Coast', 57, 18, 23, 'JO97ee', 6, 'UTC', '{}', '{}', 1, 2)`,
    `INSERT INTO station_crew VALUES ('s', 'p', 'keeper', 3)`,
    `INSERT INTO station_band VALUES ('s', '1296', '${SETUP}')`,
  ]) {
    await sql.raw(statement).execute(db);
  }
});
afterEach(async () => {
  await db.destroy();
  rmSync(folder, { recursive: true, force: true });
});

const TABLES = ['person', 'station', 'station_crew', 'station_band'] as const;

async function everything(): Promise<unknown[]> {
  const rows: unknown[] = [];
  for (const table of TABLES) rows.push(await db.selectFrom(table).selectAll().execute());
  return rows;
}

describe('0002_noise_records', () => {
  it('adds its table to a database in use and keeps every row', async () => {
    const before = await everything();
    expect(before.map((rows) => (rows as unknown[]).length)).toEqual([1, 1, 1, 1]);
    const upToIt = { ...GROUND, '0002_noise_records': migrations['0002_noise_records']! };
    expect(await migrateToLatest(db, upToIt)).toEqual(['0002_noise_records']);
    expect(await everything()).toEqual(before);
    expect(await db.selectFrom('noise_record').selectAll().execute()).toEqual([]);
  });

  it('lets records go with their station, and outlive who entered them', async () => {
    await migrateToLatest(db);
    await db
      .insertInto('noise_record')
      .values({
        id: 'r',
        station_id: 's',
        band: '1296',
        measured_on: '2027-01-18',
        method: 'hotCold',
        y_db: 7.19,
        hot_k: 290,
        cold_k: 15,
        flux_sfu: null,
        flux_at: null,
        gain_dbi: null,
        beamwidth_deg: null,
        recorded_by: 'p',
        created_at: 4,
      })
      .execute();
    await db.deleteFrom('person').execute();
    expect(await db.selectFrom('noise_record').select('recorded_by').execute()).toEqual([
      { recorded_by: null },
    ]);
    await db.deleteFrom('station').execute();
    expect(await db.selectFrom('noise_record').selectAll().execute()).toEqual([]);
  });
});
