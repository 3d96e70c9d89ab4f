import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { newStationSchema, placeUpdateSchema } from '../../../src/domain/station/schema';
import type { BandSetup } from '../../../src/domain/station/setup';
import { Conflict, Forbidden, InvalidInput, NotFound } from '../../../src/server/errors';
import { checked } from '../../../src/server/http/respond';
import { newId } from '../../../src/server/ids';
import type { Viewer } from '../../../src/server/auth/viewer';
import { createStation } from '../../../src/server/stations/createStation';
import { stationsForSearch } from '../../../src/server/stations/forSearch';
import { getCrewStation, getPublicStation } from '../../../src/server/stations/getStation';
import { listMyStations } from '../../../src/server/stations/listMyStations';
import {
  listPublicStations,
  PAGE_SIZE,
  stationSearchSchema,
} from '../../../src/server/stations/listPublicStations';
import { updateEquipment } from '../../../src/server/stations/updateEquipment';
import { updateHours } from '../../../src/server/stations/updateHours';
import { updatePlace } from '../../../src/server/stations/updatePlace';
import { updateProfile } from '../../../src/server/stations/updateProfile';
import { updateSky } from '../../../src/server/stations/updateSky';
import { openHouse, type TestHouse } from './support';

const PLACE = {
  name: 'Baltic coast',
  locator: 'JO97ee12ab',
  heightM: 23,
  timeZone: 'Europe/Stockholm',
  publicLocatorLength: 6,
};
const SETUP: BandSetup = {
  antenna: { kind: 'dish', diameterM: 2.4, apertureEfficiency: 0.55 },
  polarization: 'horizontal',
  powerAtFeedW: 200,
  receive: { kind: 'measured', systemTemperatureK: 80 },
};
const DAY = { startMs: Date.parse('2027-01-20T00:00Z'), endMs: Date.parse('2027-01-21T00:00Z') };

let house: TestHouse;
let keeper: Viewer;
let operator: Viewer;
let stranger: Viewer;
let id: string;

const register = (viewer: Viewer, callSign: string, more: object = {}) =>
  createStation(house.services, viewer, checked(newStationSchema, { ...PLACE, callSign, ...more }));

const search = (query: object = {}) =>
  listPublicStations(house.services, stationSearchSchema.parse(query));

beforeEach(async () => {
  house = await openHouse();
  [keeper, operator, stranger] = [
    await house.person('Ylva'),
    await house.person('Oren'),
    await house.person('Edda'),
  ];
  id = (await register(keeper, 'qa1lun')).id;
  await house.services.db
    .insertInto('station_crew')
    .values({ station_id: id, person_id: operator.id, crew_role: 'operator', added_at: 0 })
    .execute();
});
afterEach(() => house.close());

describe('registering', () => {
  it('makes the person keeper and fills the coordinates in', async () => {
    const station = await getCrewStation(house.services, keeper, id);
    expect(station).toMatchObject({
      callSign: 'QA1LUN',
      version: 1,
      crewRole: 'keeper',
      locator: 'JO97ee12ab',
    });
    expect(station.latitudeDeg).toBeCloseTo(57.175, 2);
    expect(await listMyStations(house.services, keeper)).toMatchObject([
      { callSign: 'QA1LUN', crewCount: 2, missing: ['sky', 'equipment', 'hours'] },
    ]);
  });

  it('refuses a call sign that is taken, and keeps nothing', async () => {
    await expect(register(stranger, 'QA1LUN')).rejects.toThrow(Conflict);
    expect(await listMyStations(house.services, stranger)).toEqual([]);
  });

  it.each([
    ['locator', { locator: 'ZZ99' }, /two letters A to R/],
    ['latitudeDeg', { locator: undefined, latitudeDeg: 91, longitudeDeg: 0 }, /at most 90°/],
    ['callSign', { callSign: '🌙1AB' }, /“🌙” does not belong/],
    ['timeZone', { timeZone: 'Europe/Atlantis' }, /not a known time zone/],
    ['heightM', { heightM: 9001 }, /at most 9\u00a0000 m/],
    ['locator', { latitudeDeg: 10, longitudeDeg: 10 }, /not in JO97ee12ab/],
    ['longitudeDeg', { latitudeDeg: 10 }, /Longitude is missing/],
    ['', { colour: 'red' }, /no field “colour”/],
  ])('refuses a bad %s with a sentence', (path, more, sentence) => {
    let refused: unknown;
    try {
      checked(newStationSchema, { ...PLACE, callSign: 'QB7TID', ...more });
    } catch (error) {
      refused = error;
    }
    expect(refused).toBeInstanceOf(InvalidInput);
    const [first] = (refused as InvalidInput).fields;
    expect(first?.path).toBe(path);
    expect(first?.message).toMatch(sentence);
  });
});

describe('who may change a station', () => {
  const changes = (viewer: Viewer): [string, () => Promise<unknown>][] => [
    [
      'place',
      () =>
        updatePlace(
          house.services,
          viewer,
          id,
          checked(placeUpdateSchema, { ...PLACE, callSign: 'QA1LUN', version: 1 }),
        ),
    ],
    ['sky', () => updateSky(house.services, viewer, id, { version: 1, sky: {} })],
    ['equipment', () => updateEquipment(house.services, viewer, id, { version: 1, equipment: [] })],
    [
      'hours',
      () =>
        updateHours(house.services, viewer, id, {
          version: 1,
          hours: { weekly: null, daysOff: [] },
        }),
    ],
    [
      'profile',
      () => updateProfile(house.services, viewer, id, { version: 1, note: 'x', listed: true }),
    ],
  ];

  it('an operator of the crew may read but not change', async () => {
    expect((await getCrewStation(house.services, operator, id)).crewRole).toBe('operator');
    for (const [part, change] of changes(operator)) {
      await expect(change(), part).rejects.toThrow(Forbidden);
    }
    expect((await getCrewStation(house.services, keeper, id)).version).toBe(1);
  });

  it('a stranger gets Forbidden for a listed station and NotFound for another', async () => {
    for (const [part, change] of changes(stranger)) {
      await expect(change(), part).rejects.toThrow(Forbidden);
    }
    await expect(getCrewStation(house.services, stranger, id)).rejects.toThrow(Forbidden);
    await updateProfile(house.services, keeper, id, { version: 1, note: '', listed: false });
    for (const [part, change] of changes(stranger)) {
      await expect(change(), part).rejects.toThrow(NotFound);
    }
    await expect(getPublicStation(house.services, null, id)).rejects.toThrow(NotFound);
    await expect(getPublicStation(house.services, stranger, id)).rejects.toThrow(NotFound);
    expect((await getPublicStation(house.services, operator, id)).listed).toBe(false);
    expect((await search()).stations).toEqual([]);
    await expect(
      stationsForSearch(house.services.db, stranger, [id], DAY, 'server'),
    ).rejects.toThrow(NotFound);
    await expect(getCrewStation(house.services, keeper, newId())).rejects.toThrow(NotFound);
  });
});

describe('a stale version', () => {
  it('is refused with 409 and loses nothing', async () => {
    const sky = { elevationFromDeg: 8 };
    expect(await updateSky(house.services, keeper, id, { version: 1, sky })).toEqual({
      version: 2,
    });
    const stale = updateEquipment(house.services, keeper, id, {
      version: 1,
      equipment: [{ band: '1296', setup: SETUP }],
    });
    await expect(stale).rejects.toMatchObject({ status: 409, details: { version: 2 } });
    const station = await getCrewStation(house.services, keeper, id);
    expect(station).toMatchObject({ version: 2, sky, equipment: [] });
  });

  it('lets exactly one of two saves at the same moment through', async () => {
    const saves = await Promise.allSettled(
      [5, 6, 7].map((elevationFromDeg) =>
        updateSky(house.services, keeper, id, { version: 1, sky: { elevationFromDeg } }),
      ),
    );
    expect(saves.filter((save) => save.status === 'fulfilled')).toHaveLength(1);
    expect((await getCrewStation(house.services, keeper, id)).version).toBe(2);
  });
});

describe('what others see', () => {
  beforeEach(async () => {
    await updateSky(house.services, keeper, id, {
      version: 1,
      sky: {
        elevationFromDeg: 8,
        blocked: [
          {
            azimuthFromDeg: 263.2,
            azimuthToDeg: 281.4,
            elevationFromDeg: 0,
            elevationToDeg: 17.3,
            name: 'barn',
          },
        ],
        horizon: [
          { azimuthDeg: 0, elevationDeg: 1.2 },
          { azimuthDeg: 123.4, elevationDeg: 6.7 },
        ],
      },
    });
    await updateEquipment(house.services, keeper, id, {
      version: 2,
      equipment: [{ band: '1296', setup: SETUP }],
    });
  });

  it('no coordinates, no height, a cut locator, a coarse sky', async () => {
    const { station } = await getPublicStation(house.services, stranger, id);
    expect(station.locator).toBe('JO97ee');
    const text = JSON.stringify(station);
    for (const secret of ['JO97ee12', 'latitudeDeg', 'heightM', 'barn', '263.2', '123.4', '17.3']) {
      expect(text).not.toContain(secret);
    }
    expect(station.sky.blocked).toEqual([
      { azimuthFromDeg: 260, azimuthToDeg: 285, elevationFromDeg: 0, elevationToDeg: 20 },
    ]);
    expect(station.sky.horizon).toHaveLength(36);
  });

  it('the search does not tell the hidden part of the locator by trying', async () => {
    const found = async (text: string) =>
      (await search({ search: text })).stations.map((station) => station.callSign);
    expect(await found('jo97')).toEqual(['QA1LUN']);
    expect(await found('JO97EE')).toEqual(['QA1LUN']);
    expect(await found('JO97ee1')).toEqual([]);
    expect(await found('lun')).toEqual(['QA1LUN']);
    expect(await found('baltic')).toEqual(['QA1LUN']);
    expect(await found('%')).toEqual([]);
    expect(await found('Q_1LUN')).toEqual([]);
  });

  it('is filtered by band', async () => {
    await register(stranger, 'QB7TID');
    const onBand = await search({ band: '1296' });
    expect(onBand.stations).toMatchObject([{ callSign: 'QA1LUN', bands: ['1296'] }]);
    expect((await search({ band: '10368' })).stations).toEqual([]);
  });

  it('comes in pages without a gap or a repeat', async () => {
    for (let number = 0; number < PAGE_SIZE + 5; number += 1) {
      await register(stranger, `QZ${number}AB`);
    }
    const first = await search();
    const second = await search({ after: first.next ?? '' });
    expect(first.stations).toHaveLength(PAGE_SIZE);
    expect(second.next).toBeNull();
    const all = [...first.stations, ...second.stations].map((station) => station.callSign);
    expect(new Set(all).size).toBe(PAGE_SIZE + 6);
    expect([...all].sort()).toEqual(all);
  });

  it('the place for a search is exact in the server, and the cell’s centre in a stranger’s browser', async () => {
    const [inServer] = await stationsForSearch(house.services.db, null, [id], DAY, 'server');
    const [forStranger] = await stationsForSearch(house.services.db, stranger, [id], DAY, 'viewer');
    const [forCrew] = await stationsForSearch(house.services.db, operator, [id], DAY, 'viewer');
    expect(inServer?.site.heightM).toBe(23);
    expect(forCrew?.site).toEqual(inServer?.site);
    expect(forStranger).toMatchObject({ own: false, locator: 'JO97ee', site: { heightM: 0 } });
    expect(forStranger?.site.latitudeDeg).toBeCloseTo(57 + 4.5 / 24, 9);
    expect(forStranger?.usable).toBeUndefined();
    expect(forStranger?.equipment).toHaveLength(1);
  });

  it('usable hours are expanded in the station’s zone', async () => {
    await updateHours(house.services, keeper, id, {
      version: 3,
      hours: { weekly: [{ weekday: 3, from: '18:00', to: '23:00' }], daysOff: [] },
    });
    const [station] = await stationsForSearch(house.services.db, null, [id], DAY, 'server');
    expect(station?.usable).toEqual([
      { startMs: Date.parse('2027-01-20T17:00Z'), endMs: Date.parse('2027-01-20T22:00Z') },
    ]);
  });
});
