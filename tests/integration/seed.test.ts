import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { moonSampleDirect } from '~/domain/ephemeris';
import { SKED_STATES } from '~/domain/sked/types';
import { azimuthWithin, type SkyLimits } from '~/domain/sky';
import { DAY_MS, MINUTE_MS, overlaps, subtractIntervals } from '~/domain/time/interval';
import { expandUsableHours, type WeeklyHours } from '~/domain/time/weeklyHours';
import { passwordMatches } from '~/server/auth/password';
import { readConfig } from '~/server/config';
import { openDatabase } from '~/server/db/connection';
import { migrateToLatest } from '~/server/db/migrate';
import type { Services } from '~/server/services';
import { loadDemo } from '../../db/seed/load';
import { planSkeds } from '../../db/seed/plan';
import { DEMO_SIGN_INS } from '../../db/seed/signIns';
import { DEMO_STATIONS } from '../../db/seed/stations';
import { SKED_STORIES } from '../../db/seed/stories';

const NOW_MS = Date.UTC(2027, 0, 18, 18, 42);

async function emptyHouse(): Promise<Services & { end: () => Promise<void> }> {
  const folder = mkdtempSync(path.join(tmpdir(), 'echotide-seed-'));
  const config = readConfig({
    PUBLIC_URL: 'http://127.0.0.1:4999',
    DATA_DIR: folder,
    SMTP_HOST: '127.0.0.1',
    MAIL_FROM: 'Echotide <echotide@echotide.example>',
  });
  const db = openDatabase(config.databaseFile);
  await migrateToLatest(db);
  const end = async () => {
    await db.destroy();
    rmSync(folder, { recursive: true, force: true });
  };
  return { db, config, now: () => NOW_MS, end };
}

let house: Awaited<ReturnType<typeof emptyHouse>>;
beforeAll(async () => {
  house = await emptyHouse();
  await loadDemo(house);
});
afterAll(() => house.end());

const open = () =>
  house.db
    .selectFrom('sked')
    .innerJoin('sked_party', 'sked_party.sked_id', 'sked.id')
    .innerJoin('station', 'station.id', 'sked_party.station_id')
    .selectAll('station')
    .select(['sked.id as sked_id', 'sked.start_at', 'sked.end_at', 'sked.state'])
    .where('sked.state', 'in', ['offered', 'agreed'])
    .execute();

/** Written here a second time, without the code that found the windows. */
function allowed(sky: SkyLimits, azimuthDeg: number, elevationDeg: number): boolean {
  const within = (from: number, to: number) => azimuthWithin(azimuthDeg, from, to);
  const { azimuthFromDeg: from, azimuthToDeg: to, horizon = [] } = sky;
  if (elevationDeg < Math.max(sky.elevationFromDeg ?? 0, sky.transmitElevationFromDeg ?? 0)) {
    return false;
  }
  if (elevationDeg > (sky.elevationToDeg ?? 90)) return false;
  if (from !== undefined && to !== undefined && !within(from, to)) return false;
  if (horizon.length > 0 && elevationDeg < profileAt(horizon, azimuthDeg)) return false;
  return !(sky.blocked ?? []).some(
    (sector) =>
      within(sector.azimuthFromDeg, sector.azimuthToDeg) &&
      elevationDeg > sector.elevationFromDeg &&
      elevationDeg < sector.elevationToDeg,
  );
}

function profileAt(points: NonNullable<SkyLimits['horizon']>, azimuthDeg: number): number {
  const after = points.findIndex((point) => point.azimuthDeg > azimuthDeg);
  const right = points[after] ?? points[0]!;
  const left = points.at(after === -1 ? -1 : after - 1)!;
  const width = (right.azimuthDeg - left.azimuthDeg + 360) % 360 || 360;
  const share = ((azimuthDeg - left.azimuthDeg + 360) % 360) / width;
  return left.elevationDeg + share * (right.elevationDeg - left.elevationDeg);
}

describe('the demo', () => {
  it('has offers and agreed skeds only while the Moon stands inside every limit and everybody is awake', async () => {
    const parties = await open();
    expect(parties.length).toBeGreaterThan(20);
    for (const party of parties) {
      const site = {
        latitudeDeg: party.latitude_deg,
        longitudeDeg: party.longitude_deg,
        heightM: party.height_m,
      };
      const sky = JSON.parse(party.sky_json) as SkyLimits;
      for (let atMs = party.start_at; atMs <= party.end_at; atMs += 5 * MINUTE_MS) {
        const { azimuthDeg, elevationDeg } = moonSampleDirect(site, atMs);
        const where = `${party.call_sign} ${new Date(atMs).toISOString()} ${azimuthDeg} ${elevationDeg}`;
        expect(allowed(sky, azimuthDeg, elevationDeg), where).toBe(true);
      }
      const slot = { startMs: party.start_at, endMs: party.end_at };
      const hours = JSON.parse(party.hours_json) as WeeklyHours;
      const usable = expandUsableHours({ ...hours, timeZone: party.time_zone }, slot);
      expect(subtractIntervals([slot], usable), party.call_sign).toEqual([]);
    }
  });

  it('never has one station in two places', async () => {
    const parties = await open();
    for (const one of parties) {
      const clashes = parties.filter(
        (other) =>
          other.id === one.id &&
          other.sked_id !== one.sked_id &&
          overlaps(
            { startMs: one.start_at, endMs: one.end_at },
            { startMs: other.start_at, endMs: other.end_at },
          ),
      );
      expect(clashes, one.call_sign).toEqual([]);
    }
  });

  it('shows every state, in the past what is over and in the future what is open', async () => {
    const skeds = await house.db.selectFrom('sked').selectAll().execute();
    expect(new Set(skeds.map((sked) => sked.state))).toEqual(new Set(SKED_STATES));
    for (const { state, start_at } of skeds) {
      if (state === 'offered' || state === 'agreed') expect(start_at).toBeGreaterThan(NOW_MS);
      if (state === 'reported' || state === 'lapsed') expect(start_at).toBeLessThan(NOW_MS);
    }
    const events = await house.db.selectFrom('sked_event').select('at').execute();
    expect(Math.max(...events.map(({ at }) => at))).toBeLessThanOrEqual(NOW_MS);
  });

  it('gives the operator of the demo something to answer, to wait for, to prepare and to report', async () => {
    const mine = await house.db
      .selectFrom('sked')
      .innerJoin('sked_party', 'sked_party.sked_id', 'sked.id')
      .innerJoin('station', 'station.id', 'sked_party.station_id')
      .select(['sked.state', 'sked_party.answer'])
      .where('station.call_sign', '=', 'QA1LUN')
      .execute();
    const count = (state: string, answer?: string) =>
      mine.filter((sked) => sked.state === state && (!answer || sked.answer === answer)).length;
    expect(count('offered', 'waiting')).toBeGreaterThanOrEqual(2);
    expect(count('offered', 'accepted')).toBeGreaterThanOrEqual(1);
    expect(count('agreed')).toBeGreaterThanOrEqual(2);
    expect(count('reported')).toBeGreaterThanOrEqual(1);
  });

  it('is invented: call signs begin with Q, mail ends in .example', async () => {
    const stations = await house.db.selectFrom('station').select('call_sign').execute();
    expect(stations.length).toBeGreaterThanOrEqual(24);
    for (const { call_sign } of stations) expect(call_sign).toMatch(/^Q/);
    const people = await house.db.selectFrom('person').select('email').execute();
    const mails = await house.db.selectFrom('outbox').select('recipient').execute();
    for (const { email } of people) expect(email).toMatch(/\.example$/);
    for (const { recipient } of mails) expect(recipient).toMatch(/\.example$/);
  });

  it('lets everybody in whom it names, with the role it says', async () => {
    for (const signIn of DEMO_SIGN_INS) {
      const person = await house.db
        .selectFrom('person')
        .selectAll()
        .where('email', '=', signIn.email)
        .executeTakeFirstOrThrow();
      expect(person).toMatchObject({ role: signIn.role, name: signIn.name, locked_at: null });
      expect(await passwordMatches(signIn.password, person.password_hash)).toBe(true);
    }
  });

  it('leaves only a few mails to be sent', async () => {
    const waiting = await house.db
      .selectFrom('outbox')
      .select('id')
      .where('sent_at', 'is', null)
      .execute();
    expect(waiting).toHaveLength(3);
  });
});

describe('loading', () => {
  it('begins again where an earlier load was cut off', async () => {
    await house.db.insertInto('installation').values({ name: 'demoLoading', value: '0' }).execute();
    await house.db.deleteFrom('installation').where('name', '=', 'demo').execute();
    await loadDemo(house);
    const { count } = await house.db
      .selectFrom('station')
      .select((select) => select.fn.countAll<number>().as('count'))
      .where('guest', '=', 0)
      .executeTakeFirstOrThrow();
    expect(count).toBe(DEMO_STATIONS.length);
    const activities = await house.db.selectFrom('activity').select('slug').execute();
    expect(activities).toEqual([{ slug: 'two-tides-weekend' }]);
  });

  it('leaves a database alone that has people of its own', async () => {
    const before = await house.db.selectFrom('sked').select('id').execute();
    await loadDemo(house);
    expect(await house.db.selectFrom('sked').select('id').execute()).toEqual(before);
  });

  it('finds a slot for every story on any day of the year', () => {
    for (let day = 0; day < 366; day += 11) {
      const nowMs = NOW_MS + day * DAY_MS;
      const planned = planSkeds(SKED_STORIES, nowMs);
      expect(planned.length, new Date(nowMs).toISOString()).toBe(SKED_STORIES.length);
      for (const { steps } of planned) {
        for (const { atMs } of steps) expect(atMs).toBeLessThan(nowMs);
      }
    }
  });
});
