import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { findCommonWindows } from '../../../src/domain/window';
import type { SkyLimits } from '../../../src/domain/sky';
import { DAY_MS, HOUR_MS, MINUTE_MS, type Interval } from '../../../src/domain/time/interval';
import type { BandSetup } from '../../../src/domain/station/setup';
import type { Viewer } from '../../../src/server/auth/viewer';
import { readConfig } from '../../../src/server/config';
import { openDatabase } from '../../../src/server/db/connection';
import { migrateToLatest } from '../../../src/server/db/migrate';
import type { OutboxRow } from '../../../src/server/db/tables';
import { offerSked } from '../../../src/server/skeds/offerSked';
import type { Services } from '../../../src/server/services';

/** Mon 18 Jan 2027 18:42 UTC. */
export const NOW_MS = Date.UTC(2027, 0, 18, 18, 42);

const STATIONS: Record<string, { site: [number, number]; zone: string; sky: SkyLimits }> = {
  QA1LUN: { site: [57.19, 18.38], zone: 'Europe/Stockholm', sky: {} },
  QB7TID: { site: [42.1, -76.3], zone: 'America/New_York', sky: {} },
  QC2FAR: { site: [50.2, 8.6], zone: 'Europe/Berlin', sky: {} },
};

export interface World {
  services: Services;
  folder: string;
  file: string;
  clock: { nowMs: number };
  /** Keeper of each station, by call sign; "stranger" belongs to none. */
  people: Record<string, Viewer>;
  stationIds: Record<string, string>;
  mails: () => Promise<OutboxRow[]>;
  close: () => Promise<void>;
}

/** A small station on 1296 MHz. */
export const SETUP: BandSetup = {
  antenna: { kind: 'dish', diameterM: 2.4, apertureEfficiency: 0.55 },
  polarization: 'rightCircular',
  powerAtFeedW: 150,
  receive: { kind: 'measured', systemTemperatureK: 60 },
};

/** Gives a station equipment on 1296 MHz. */
export async function giveBand(world: World, callSign: string, setup: BandSetup): Promise<void> {
  await world.services.db
    .insertInto('station_band')
    .values({
      station_id: world.stationIds[callSign]!,
      band: '1296',
      setup_json: JSON.stringify(setup),
    })
    .execute();
}

/** A new database file with three stations of a keeper each; further settings as in the environment. */
export async function newWorld(settings: Record<string, string> = {}): Promise<World> {
  const folder = mkdtempSync(path.join(tmpdir(), 'echotide-skeds-'));
  const config = readConfig({
    PUBLIC_URL: 'http://127.0.0.1:4999',
    DATA_DIR: folder,
    SMTP_HOST: '127.0.0.1',
    MAIL_FROM: 'Echotide <mail@echotide.example>',
    ...settings,
  });
  const clock = { nowMs: NOW_MS };
  const db = openDatabase(config.databaseFile);
  await migrateToLatest(db);
  const services: Services = { db, config, now: () => clock.nowMs };
  const people: Record<string, Viewer> = {};
  const stationIds: Record<string, string> = {};
  const names = { QA1LUN: 'Ylva', QB7TID: 'Edda', QC2FAR: 'Bo "Kurz"; Müller' };
  for (const [callSign, { site, zone, sky }] of Object.entries(STATIONS)) {
    const person = await addPerson(services, names[callSign as keyof typeof names], zone);
    const id = `station-${callSign.toLowerCase()}`;
    await db
      .insertInto('station')
      .values({
        id,
        call_sign: callSign,
        name: callSign,
        latitude_deg: site[0],
        longitude_deg: site[1],
        height_m: 20,
        locator: 'JO97ee',
        public_locator_length: 4,
        time_zone: zone,
        sky_json: JSON.stringify(sky),
        hours_json: JSON.stringify({ timeZone: zone, weekly: null, daysOff: [] }),
        created_at: NOW_MS,
        updated_at: NOW_MS,
      })
      .execute();
    await joinCrew(services, id, person);
    people[callSign] = person;
    stationIds[callSign] = id;
  }
  people['stranger'] = await addPerson(services, 'Nobody', 'UTC');
  return {
    services,
    folder,
    file: config.databaseFile,
    clock,
    people,
    stationIds,
    mails: () => db.selectFrom('outbox').selectAll().orderBy('recipient').execute(),
    close: async () => {
      await db.destroy();
      rmSync(folder, { recursive: true });
    },
  };
}

export async function addPerson({ db }: Services, name: string, timeZone: string): Promise<Viewer> {
  const id = `person-${name.toLowerCase().replace(/[^a-z]/g, '')}`;
  const email = `${id}@people.example`;
  await db
    .insertInto('person')
    .values({
      id,
      email,
      name,
      password_hash: null,
      role: 'operator',
      time_zone: timeZone,
      confirmed_at: NOW_MS,
      locked_at: null,
      sessions_valid_from: 0,
      created_at: NOW_MS,
    })
    .execute();
  return { id, email, name, role: 'operator', timeZone };
}

export async function joinCrew({ db }: Services, stationId: string, person: Viewer): Promise<void> {
  await db
    .insertInto('station_crew')
    .values({ station_id: stationId, person_id: person.id, crew_role: 'operator', added_at: 0 })
    .execute();
}

export async function setSky({ db }: Services, stationId: string, sky: SkyLimits): Promise<void> {
  await db
    .updateTable('station')
    .set({ sky_json: JSON.stringify(sky) })
    .where('id', '=', stationId)
    .execute();
}

/** Common windows of the stations under clear sky in the ten days after `NOW_MS`, at least two hours long. */
export function commonWindows(callSigns: string[]): Interval[] {
  return findCommonWindows({
    startMs: NOW_MS + HOUR_MS,
    endMs: NOW_MS + 10 * DAY_MS,
    stations: callSigns.map((callSign) => {
      const [latitudeDeg, longitudeDeg] = STATIONS[callSign]!.site;
      return { callSign, site: { latitudeDeg, longitudeDeg, heightM: 20 }, sky: {} };
    }),
    minimumMinutes: 120,
  }).windows;
}

/** A slot that begins so many whole minutes after the first whole minute of a window. */
export function slotIn(window: Interval, afterMinutes: number, minutes = 30): Interval {
  const firstMs = Math.ceil(window.startMs / MINUTE_MS) * MINUTE_MS;
  const startMs = firstMs + afterMinutes * MINUTE_MS;
  return { startMs, endMs: startMs + minutes * MINUTE_MS };
}

export function offerFrom(world: World, from: string, to: string[], slot: Interval, words = '') {
  return offerSked(world.services, world.people[from]!, {
    station: world.stationIds[from]!,
    with: to.map((callSign) => world.stationIds[callSign]!),
    band: '1296',
    mode: 'q65-60c',
    start: slot.startMs,
    end: slot.endMs,
    words,
  });
}
