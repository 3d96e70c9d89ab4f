import {
  equipmentUpdateSchema,
  hoursUpdateSchema,
  newStationSchema,
  profileUpdateSchema,
  skyUpdateSchema,
} from '../../src/domain/station/schema';
import { DAY_MS, HOUR_MS } from '../../src/domain/time/interval';
import { hashPassword } from '../../src/server/auth/password';
import type { Viewer } from '../../src/server/auth/viewer';
import { inTransaction } from '../../src/server/db/transaction';
import { newId } from '../../src/server/ids';
import type { Services } from '../../src/server/services';
import { noiseRecordSchema } from '../../src/domain/station/noiseRecord';
import { addNoiseRecord } from '../../src/server/stations/addNoiseRecord';
import { createStation } from '../../src/server/stations/createStation';
import { updateEquipment } from '../../src/server/stations/updateEquipment';
import { updateHours } from '../../src/server/stations/updateHours';
import { updateProfile } from '../../src/server/stations/updateProfile';
import { updateSky } from '../../src/server/stations/updateSky';
import { DEMO_PEOPLE, demoMail, type DemoPerson } from './people';
import { demoHours } from './plan';
import { DEMO_PASSWORD } from './signIns';
import { DEMO_STATIONS, type DemoStation } from './stations';

/** People by their key and stations' ids by call sign, as they are in the database. */
export interface Roster {
  people: ReadonlyMap<string, Viewer>;
  stationIds: ReadonlyMap<string, string>;
}

/** When people and stations of the demo came, before everything that happened since. */
const FIRST_CAME_MS = 200 * DAY_MS;

/** Registers the demo's people and stations. The password is hashed once for all of them. */
export async function loadRoster(services: Services): Promise<Roster> {
  const nowMs = services.now();
  const people = await loadPeople(services, nowMs - FIRST_CAME_MS);
  const stationIds = new Map<string, string>();
  for (const [index, station] of DEMO_STATIONS.entries()) {
    const cameMs = nowMs - FIRST_CAME_MS + (index + 1) * 5 * DAY_MS;
    const id = await loadStation({ ...services, now: () => cameMs }, station, people, nowMs);
    stationIds.set(station.callSign, id);
  }
  return { people, stationIds };
}

/** The keeper who stands first in the list of people. */
export function keeperOf(callSign: string): DemoPerson {
  const keeper = DEMO_PEOPLE.find((person) => person.crews[callSign] === 'keeper');
  if (!keeper) throw new Error(`Nobody in the demo keeps ${callSign}.`);
  return keeper;
}

async function loadPeople({ db }: Services, cameMs: number): Promise<Map<string, Viewer>> {
  const passwordHash = await hashPassword(DEMO_PASSWORD);
  const people = new Map<string, Viewer>();
  await inTransaction(db, async (tx) => {
    for (const person of DEMO_PEOPLE) {
      const { name, role, timeZone } = person;
      const viewer: Viewer = { id: newId(), email: demoMail(person), name, role, timeZone };
      people.set(person.key, viewer);
      await tx
        .insertInto('person')
        .values({
          id: viewer.id,
          email: viewer.email,
          name,
          role,
          time_zone: timeZone,
          password_hash: passwordHash,
          confirmed_at: cameMs + HOUR_MS,
          locked_at: null,
          sessions_valid_from: cameMs,
          created_at: cameMs,
        })
        .execute();
    }
  });
  return people;
}

/** Through the same schemas and use cases as the pages, so that the demo cannot hold what they would refuse. */
async function loadStation(
  services: Services,
  station: DemoStation,
  people: ReadonlyMap<string, Viewer>,
  nowMs: number,
): Promise<string> {
  const { callSign, name, latitudeDeg, longitudeDeg, heightM, timeZone } = station;
  const keeper = people.get(keeperOf(callSign).key)!;
  const { id, version } = await createStation(
    services,
    keeper,
    newStationSchema.parse({
      callSign,
      name,
      latitudeDeg,
      longitudeDeg,
      heightM,
      timeZone,
      publicLocatorLength: station.publicLocatorLength,
    }),
  );
  let seen = { version };
  const sky = skyUpdateSchema.parse({ ...seen, sky: station.sky });
  seen = await updateSky(services, keeper, id, sky);
  const equipment = Object.entries(station.bands).map(([band, setup]) => ({ band, setup }));
  const equipped = equipmentUpdateSchema.parse({ ...seen, equipment });
  seen = await updateEquipment(services, keeper, id, equipped);
  const { weekly, daysOff } = demoHours(station, nowMs);
  const hours = hoursUpdateSchema.parse({ ...seen, hours: { weekly, daysOff } });
  seen = await updateHours(services, keeper, id, hours);
  if (station.note || !station.listed) {
    const { note, listed } = station;
    const profile = profileUpdateSchema.parse({ ...seen, note, listed });
    await updateProfile(services, keeper, id, profile);
  }
  for (const { daysAgo, ...measured } of station.noise ?? []) {
    const measuredOn = new Date(nowMs - daysAgo * DAY_MS).toISOString().slice(0, 10);
    const record = noiseRecordSchema.parse({ ...measured, measuredOn });
    await addNoiseRecord({ ...services, now: () => nowMs }, keeper, id, record);
  }
  await addCrew(services, id, callSign, people);
  return id;
}

async function addCrew(
  { db, now }: Services,
  stationId: string,
  callSign: string,
  people: ReadonlyMap<string, Viewer>,
): Promise<void> {
  const others = DEMO_PEOPLE.filter(
    (person) => person.crews[callSign] && person !== keeperOf(callSign),
  );
  if (others.length === 0) return;
  await db
    .insertInto('station_crew')
    .values(
      others.map((person) => ({
        station_id: stationId,
        person_id: people.get(person.key)!.id,
        crew_role: person.crews[callSign]!,
        added_at: now() + DAY_MS,
      })),
    )
    .execute();
}
