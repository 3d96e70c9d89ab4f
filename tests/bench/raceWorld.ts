import { findCommonWindows } from '../../src/domain/window';
import { DAY_MS, HOUR_MS, MINUTE_MS, type Interval } from '../../src/domain/time/interval';
import type { Viewer } from '../../src/server/auth/viewer';
import { inTransaction } from '../../src/server/db/transaction';
import { acceptSked } from '../../src/server/skeds/acceptSked';
import { offerSked } from '../../src/server/skeds/offerSked';
import { pick } from '../integration/mail/faultMoods';
import { addPerson, joinCrew, newWorld, NOW_MS, type World } from '../integration/skeds/world';
import { manyStations } from './manyStations';
import { copySked, patternOf, removeSked, type Pattern } from './skedPattern';

/** One acceptance to be made. */
export interface Acceptance {
  skedId: string;
  version: number;
  viewer: Viewer;
}

export interface RaceWorld extends World {
  /** In the order of the slots, so that neighbours want the same time. */
  acceptances: Acceptance[];
}

const STATIONS = 12;
const DAYS = 60;
const PARTIES = 40;
/** Every so manyth party has three stations, every so manyth sked is answered twice. */
const TRIPLES = 5;
const TWICE = 8;

interface RaceStation {
  id: string;
  site: { latitudeDeg: number; longitudeDeg: number; heightM: number };
  crew: Viewer[];
}

/** Stations that have skeds with each other, and one true offer among them of which all others are copies. */
interface Party {
  windows: Interval[];
  pattern: Pattern;
  viewers: Viewer[];
}

/** A database with offers that want the same times of the same stations, all waiting for the last answer. */
export async function newRaceWorld(count: number, random: () => number): Promise<RaceWorld> {
  const world = await newWorld();
  const { db } = world.services;
  const stations: RaceStation[] = [];
  for (const [index, { site }] of manyStations(STATIONS).entries()) {
    stations.push(await addStation(world, index, { ...site, latitudeDeg: site.latitudeDeg / 2 }));
  }
  const parties: Party[] = [];
  while (parties.length < PARTIES) {
    const party = await newParty(world, choose(stations, parties.length % TRIPLES ? 2 : 3, random));
    if (party) parties.push(party);
  }
  const prepared: { atMs: number; acceptance: Acceptance }[] = [];
  await inTransaction(db, async (tx) => {
    while (prepared.length < count) {
      const { windows, pattern, viewers } = pick(random, parties);
      const slot = slotWithin(pick(random, windows), random);
      const skedId = `race-${prepared.length}`;
      await copySked(tx, pattern, skedId, slot);
      const version = pattern.sked.version;
      const prepare = () =>
        prepared.push({
          atMs: slot.startMs,
          acceptance: { skedId, version, viewer: pick(random, viewers) },
        });
      prepare();
      // The same answer from two people, or twice from one, at the same moment.
      if (prepared.length % TWICE === 0 && prepared.length < count) prepare();
    }
  });
  for (const { pattern } of parties) await removeSked(db, pattern.sked.id);
  prepared.sort((a, b) => a.atMs - b.atMs);
  return { ...world, acceptances: prepared.map(({ acceptance }) => acceptance) };
}

async function newParty(world: World, stations: readonly RaceStation[]): Promise<Party | null> {
  const windows = windowsOf(stations);
  if (windows.length === 0) return null;
  const skedId = await offer(
    world,
    stations,
    slotWithin(windows[0]!, () => 0),
  );
  return {
    windows,
    pattern: await patternOf(world.services.db, skedId),
    viewers: stations.at(-1)!.crew,
  };
}

async function addStation(
  { services }: World,
  index: number,
  site: RaceStation['site'],
): Promise<RaceStation> {
  const letter = String.fromCharCode(97 + index);
  const id = `station-race-${letter}`;
  await services.db
    .insertInto('station')
    .values({
      id,
      call_sign: `QR${index}${letter.toUpperCase()}`,
      name: id,
      latitude_deg: site.latitudeDeg,
      longitude_deg: site.longitudeDeg,
      height_m: site.heightM,
      locator: 'JO97ee',
      public_locator_length: 4,
      time_zone: 'UTC',
      sky_json: '{}',
      hours_json: JSON.stringify({ timeZone: 'UTC', weekly: null, daysOff: [] }),
      created_at: NOW_MS,
      updated_at: NOW_MS,
    })
    .execute();
  const crew = [
    await addPerson(services, `Keeper ${letter}`, 'UTC'),
    await addPerson(services, `Second ${letter}`, 'Europe/Berlin'),
  ];
  for (const person of crew) await joinCrew(services, id, person);
  return { id, site, crew };
}

function windowsOf(parties: readonly RaceStation[]): Interval[] {
  return findCommonWindows({
    startMs: NOW_MS + HOUR_MS,
    endMs: NOW_MS + DAYS * DAY_MS,
    stations: parties.map(({ id, site }) => ({ callSign: id, site, sky: {} })),
    minimumMinutes: 70,
  }).windows;
}

/** 15 to 60 minutes on whole minutes, well inside the window. */
function slotWithin(window: Interval, random: () => number): Interval {
  const lengthMs = 15 * MINUTE_MS * (1 + Math.floor(random() * 4));
  const roomMs = window.endMs - window.startMs - lengthMs - 4 * MINUTE_MS;
  const atMs = window.startMs + 2 * MINUTE_MS + random() * roomMs;
  const startMs = Math.ceil(atMs / MINUTE_MS) * MINUTE_MS;
  return { startMs, endMs: startMs + lengthMs };
}

/** Offers through the use case; of three parties the second has accepted already. */
async function offer(
  { services }: World,
  parties: readonly RaceStation[],
  slot: Interval,
): Promise<string> {
  const [first, ...others] = parties as [RaceStation, ...RaceStation[]];
  const { id, version } = await offerSked(services, first.crew[0]!, {
    station: first.id,
    with: others.map((other) => other.id),
    band: '1296',
    mode: 'q65-60c',
    start: slot.startMs,
    end: slot.endMs,
    words: '',
  });
  if (others.length > 1) {
    await acceptSked(services, others[0]!.crew[0]!, id, { version, words: '' });
  }
  return id;
}

function choose<T>(from: readonly T[], count: number, random: () => number): T[] {
  const rest = [...from];
  return Array.from(
    { length: count },
    () => rest.splice(Math.floor(random() * rest.length), 1)[0]!,
  );
}
