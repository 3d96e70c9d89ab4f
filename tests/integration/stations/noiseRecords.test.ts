import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { equipmentUpdateSchema, newStationSchema } from '../../../src/domain/station/schema';
import { noiseRecordSchema } from '../../../src/domain/station/noiseRecord';
import type { BandSetup } from '../../../src/domain/station/setup';
import { DAY_MS } from '../../../src/domain/time/interval';
import type { Viewer } from '../../../src/server/auth/viewer';
import { AppError, Conflict, Forbidden, InvalidInput, NotFound } from '../../../src/server/errors';
import { checked } from '../../../src/server/http/respond';
import { addNoiseRecord, MAX_NOISE_RECORDS } from '../../../src/server/stations/addNoiseRecord';
import { createStation } from '../../../src/server/stations/createStation';
import { stationsForSearch } from '../../../src/server/stations/forSearch';
import { getCrewStation } from '../../../src/server/stations/getStation';
import { listNoiseRecords } from '../../../src/server/stations/listNoiseRecords';
import { removeNoiseRecord } from '../../../src/server/stations/removeNoiseRecord';
import { updateEquipment } from '../../../src/server/stations/updateEquipment';
import { openHouse, type TestHouse } from './support';

const SETUP: BandSetup = {
  antenna: { kind: 'dish', diameterM: 3, apertureEfficiency: 0.55 },
  polarization: 'rightCircular',
  powerAtFeedW: 200,
  receive: { kind: 'measured', systemTemperatureK: 80 },
};
const HOT_COLD = {
  method: 'hotCold',
  band: '1296',
  measuredOn: '2027-01-10',
  yDb: 7.19,
  hotK: 290,
  coldK: 15,
};
const SUN = {
  method: 'sun',
  band: '1296',
  measuredOn: '2027-01-12',
  yDb: 11.96,
  fluxSfu: 65,
  fluxAt: 'band',
  note: '  Clear, 40° up. ',
};

let house: TestHouse;
let keeper: Viewer;
let operator: Viewer;
let stranger: Viewer;
let id: string;

const add = (input: object, viewer = keeper) =>
  addNoiseRecord(house.services, viewer, id, checked(noiseRecordSchema, input));
const list = () => listNoiseRecords(house.services, keeper, id);
const stored = async () =>
  (await house.services.db.selectFrom('noise_record').selectAll().execute()).length;

async function equip(receive: object, more: object = {}): Promise<void> {
  const { version } = await getCrewStation(house.services, keeper, id);
  const input = { version, equipment: [{ band: '1296', setup: { ...SETUP, receive, ...more } }] };
  await updateEquipment(house.services, keeper, id, checked(equipmentUpdateSchema, input));
}

async function receiveOf(): Promise<BandSetup['receive']> {
  return (await getCrewStation(house.services, keeper, id)).equipment[0]!.setup.receive;
}

async function refusal(attempt: () => Promise<unknown>): Promise<AppError> {
  try {
    await attempt();
  } catch (error) {
    if (error instanceof AppError) return error;
    throw error;
  }
  throw new Error('It was not refused.');
}

beforeEach(async () => {
  house = await openHouse();
  [keeper, operator, stranger] = [
    await house.person('Ylva'),
    await house.person('Oren'),
    await house.person('Edda'),
  ];
  const station = checked(newStationSchema, {
    callSign: 'QA1LUN',
    name: 'Baltic coast',
    locator: 'JO97ee12ab',
    heightM: 23,
    timeZone: 'Europe/Stockholm',
    publicLocatorLength: 6,
  });
  id = (await createStation(house.services, keeper, station)).id;
  await house.services.db
    .insertInto('station_crew')
    .values({ station_id: id, person_id: operator.id, crew_role: 'operator', added_at: 0 })
    .execute();
  await equip(SETUP.receive);
});
afterEach(() => house.close());

describe('keeping a measurement', () => {
  it('computes what follows from a hot load and the cold sky', async () => {
    const record = await add(HOT_COLD);
    expect(Math.abs(record.figures.systemTemperatureK - 65)).toBeLessThan(0.3);
    expect(await list()).toEqual([record]);
  });

  it('takes gain and beam for the Sun from the equipment, and keeps them as they were', async () => {
    const { figures, measurement, note } = await add(SUN);
    expect(Math.abs(figures.systemTemperatureK - 61.9)).toBeLessThan(0.3);
    expect(Math.abs(figures.gainOverTemperatureDb! - 11.68)).toBeLessThan(0.03);
    expect(note).toBe('Clear, 40° up.');
    await equip(SETUP.receive, {
      antenna: { kind: 'dish', diameterM: 6, apertureEfficiency: 0.6 },
    });
    expect((await list())[0]).toMatchObject({ measurement, figures });
  });

  it('lists the newest first, of one day the one entered last', async () => {
    await add(HOT_COLD);
    await add({ ...HOT_COLD, measuredOn: '2026-12-01' });
    house.setNow(Date.parse('2027-01-19T08:00Z'));
    await add({ ...HOT_COLD, yDb: 7 });
    expect(
      (await list()).map(({ measuredOn, measurement }) => [measuredOn, measurement.yDb]),
    ).toEqual([
      ['2027-01-10', 7],
      ['2027-01-10', 7.19],
      ['2026-12-01', 7.19],
    ]);
  });
});

describe('what is refused with a sentence, and not stored', () => {
  it.each([
    ['yDb', { yDb: 0 }, /The step must be at least 0\.01 dB/],
    ['yDb', { yDb: -2 }, /The step must be at least 0\.01 dB/],
    ['yDb', { yDb: null }, /The step must be a number/],
    ['coldK', { coldK: 290 }, /cold sky must be colder than the hot load/],
    ['coldK', { coldK: 400 }, /cold sky must be colder than the hot load/],
    ['hotK', { hotK: undefined }, /hot load is missing/],
    ['yDb', { yDb: 13 }, /even a receiver without noise shows a step of only 12\.86 dB/],
    ['yDb', { yDb: 0.01, hotK: 290, coldK: 15 }, /system temperature of 119.29. K, outside 3/],
    ['measuredOn', { measuredOn: '2027-02-30' }, /Give the day/],
    ['measuredOn', { measuredOn: '2027-01-20' }, /still to come/],
    ['band', { band: '432' }, /no equipment on 432 MHz yet/],
    ['band', { band: '27' }, /not a band/],
    ['method', { method: 'guess' }, /Say how it was measured/],
    ['note', { note: 'x'.repeat(201) }, /at most 200 characters/],
    ['', { fluxSfu: 65 }, /no field “fluxSfu”/],
  ])('%s: %j', async (path, wrong, sentence) => {
    const refused = await refusal(async () => add({ ...HOT_COLD, ...wrong }));
    expect(refused).toBeInstanceOf(InvalidInput);
    expect(refused.status).toBe(400);
    expect(refused.fields[0]).toMatchObject({ path, message: expect.stringMatching(sentence) });
    expect(await stored()).toBe(0);
  });

  it.each([
    ['fluxSfu', { fluxSfu: 0 }, /at least 1 SFU/],
    ['fluxAt', { fluxAt: 'home' }, /Say where the flux was measured/],
    ['yDb', { yDb: 39 }, /gain of 29\.6 dBi/],
  ])('of the Sun, %s: %j', async (path, wrong, sentence) => {
    const refused = await refusal(async () => add({ ...SUN, ...wrong }));
    expect(refused.fields[0]).toMatchObject({ path, message: expect.stringMatching(sentence) });
    expect(await stored()).toBe(0);
  });

  it('more than are kept', async () => {
    const first = await add(HOT_COLD);
    const row = await house.services.db
      .selectFrom('noise_record')
      .selectAll()
      .where('id', '=', first.id)
      .executeTakeFirstOrThrow();
    for (let count = 1; count < MAX_NOISE_RECORDS; count += 1) {
      await house.services.db
        .insertInto('noise_record')
        .values({ ...row, id: `record-${count}` })
        .execute();
    }
    expect(await refusal(async () => add(HOT_COLD))).toBeInstanceOf(Conflict);
    expect(await stored()).toBe(MAX_NOISE_RECORDS);
  });

  it('by the database itself, should the checks before it fail', async () => {
    const { id: recordId } = await add(HOT_COLD);
    const { db } = house.services;
    for (const wrong of [
      { y_db: 0 },
      { cold_k: 290 },
      { hot_k: null },
      { flux_sfu: 65 },
      { measured_on: '2027-02-30' },
    ]) {
      const change = db.updateTable('noise_record').set(wrong).where('id', '=', recordId);
      await expect(change.execute()).rejects.toThrow(/CHECK constraint failed/);
    }
  });

  it.each([
    [{ powerAtFeedW: -5 }, /power at the feed must be at least 0\.001 W/],
    [
      { antenna: { kind: 'dish', diameterM: 3, apertureEfficiency: 1.1 } },
      /efficiency of the dish must be at most 1/,
    ],
    [{ receive: { kind: 'stages', stages: [] } }, /at least one stage/],
    [
      { receive: { kind: 'stages', stages: [{ kind: 'loss', lossDb: 1, name: 'x'.repeat(31) }] } },
      /name of a stage must be at most 30/,
    ],
  ])('equipment %j', async (wrong, sentence) => {
    const before = await getCrewStation(house.services, keeper, id);
    const refused = await refusal(async () => equip(SETUP.receive, wrong));
    expect(refused.status).toBe(400);
    expect(refused.fields[0]!.message).toMatch(sentence);
    expect(await getCrewStation(house.services, keeper, id)).toEqual(before);
  });
});

describe('who may', () => {
  it.each([
    ['add', (viewer: Viewer) => add(HOT_COLD, viewer)],
    ['list', (viewer: Viewer) => listNoiseRecords(house.services, viewer, id)],
    ['remove', (viewer: Viewer) => removeNoiseRecord(house.services, viewer, id, 'any')],
  ])('%s: a keeper only', async (_name, attempt) => {
    for (const viewer of [operator, stranger]) {
      expect(await refusal(() => attempt(viewer))).toBeInstanceOf(Forbidden);
    }
    await house.services.db.updateTable('station').set({ listed: 0 }).execute();
    expect(await refusal(() => attempt(stranger))).toBeInstanceOf(NotFound);
    expect(await stored()).toBe(0);
  });

  it('removes no record of another station', async () => {
    const { id: recordId } = await add(HOT_COLD);
    const other = checked(newStationSchema, {
      callSign: 'QB7TID',
      name: 'Granite hills',
      locator: 'FN43',
      heightM: 300,
      timeZone: 'America/New_York',
      publicLocatorLength: 4,
    });
    const theirs = (await createStation(house.services, stranger, other)).id;
    const attempt = () => removeNoiseRecord(house.services, stranger, theirs, recordId);
    expect(await refusal(attempt)).toBeInstanceOf(NotFound);
    expect(await stored()).toBe(1);
  });
});

describe('the newest record in the budget', () => {
  const FROM_RECORD = { kind: 'measured', systemTemperatureK: 999, fromNewestRecord: true };

  it('is used wherever the equipment is read, and followed when a newer one comes or goes', async () => {
    const first = await add(HOT_COLD);
    await equip(FROM_RECORD);
    expect(await receiveOf()).toEqual({
      ...FROM_RECORD,
      systemTemperatureK: first.figures.systemTemperatureK,
    });
    const newer = await add({ ...HOT_COLD, measuredOn: '2027-01-15', yDb: 7.6 });
    expect(await receiveOf()).toMatchObject({
      systemTemperatureK: newer.figures.systemTemperatureK,
    });
    const now = house.services.now();
    const [searched] = await stationsForSearch(
      house.services.db,
      stranger,
      [id],
      { startMs: now, endMs: now + DAY_MS },
      'viewer',
    );
    expect(searched!.equipment[0]!.setup.receive).toMatchObject({
      systemTemperatureK: newer.figures.systemTemperatureK,
    });
    await removeNoiseRecord(house.services, keeper, id, newer.id);
    expect(await receiveOf()).toMatchObject({
      systemTemperatureK: first.figures.systemTemperatureK,
    });
  });

  it('does not touch a figure of the keeper’s own', async () => {
    await add(HOT_COLD);
    expect(await receiveOf()).toEqual(SETUP.receive);
  });

  it('cannot be chosen without a record', async () => {
    const refused = await refusal(() => equip(FROM_RECORD));
    expect(refused).toBeInstanceOf(InvalidInput);
    expect(refused.fields[0]).toEqual({
      path: 'equipment.0.setup.receive.kind',
      message: 'There is no noise record for 1296 MHz to take the system temperature from.',
    });
    expect(await receiveOf()).toEqual(SETUP.receive);
  });

  it('is not removed as the last one, until another receiver is chosen', async () => {
    const { id: recordId } = await add(HOT_COLD);
    await equip(FROM_RECORD);
    const remove = () => removeNoiseRecord(house.services, keeper, id, recordId);
    expect(await refusal(remove)).toBeInstanceOf(Conflict);
    expect(await stored()).toBe(1);
    await equip(SETUP.receive);
    await remove();
    expect(await stored()).toBe(0);
  });
});
