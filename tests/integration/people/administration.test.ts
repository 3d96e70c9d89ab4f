import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { Viewer } from '~/server/auth/viewer';
import { listPeople } from '~/server/people/listPeople';
import { lockPerson } from '~/server/people/lockPerson';
import { setRole } from '~/server/people/setRole';
import { unlockPerson } from '~/server/people/unlockPerson';
import { openHouse, personOf, settle, type House } from './support';

let house: House;
let osvin: Viewer;
let ylva: Viewer;
beforeEach(async () => {
  house = await openHouse();
  osvin = await settle(house, 'Osvin', 'administrator');
  ylva = await settle(house, 'Ylva');
});
afterEach(() => house.end());

const audit = () => house.db.selectFrom('audit').selectAll().orderBy('id').execute();

describe('roles', () => {
  it('are given, and the act is recorded', async () => {
    await setRole(house, osvin, { personId: ylva.id, role: 'coordinator' });
    expect((await personOf(house, ylva.email)).role).toBe('coordinator');
    expect(await audit()).toMatchObject([
      {
        at: house.now(),
        person_id: osvin.id,
        action: 'person.role',
        subject: ylva.id,
        details_json: '{"from":"operator","to":"coordinator"}',
      },
    ]);
  });

  it('leave no trace when nothing changes', async () => {
    await setRole(house, osvin, { personId: ylva.id, role: 'operator' });
    expect(await audit()).toEqual([]);
  });

  it('always leave one administrator who can sign in', async () => {
    const demote = () => setRole(house, osvin, { personId: osvin.id, role: 'operator' });
    await expect(demote()).rejects.toMatchObject({ status: 409 });
    await setRole(house, osvin, { personId: ylva.id, role: 'administrator' });
    await house.db.updateTable('person').set({ locked_at: 1 }).where('id', '=', ylva.id).execute();
    await expect(demote()).rejects.toMatchObject({ status: 409 });
    await unlockPerson(house, osvin, ylva.id);
    await demote();
    expect((await personOf(house, osvin.email)).role).toBe('operator');
  });

  it('are not given to nobody', async () => {
    const nobody = setRole(house, osvin, { personId: 'nobody', role: 'operator' });
    await expect(nobody).rejects.toMatchObject({ status: 404 });
  });
});

describe('locking', () => {
  it('is recorded, and undone', async () => {
    await lockPerson(house, osvin, ylva.id);
    expect((await personOf(house, ylva.email)).locked_at).toBe(house.now());
    await lockPerson(house, osvin, ylva.id);
    await unlockPerson(house, osvin, ylva.id);
    expect((await personOf(house, ylva.email)).locked_at).toBeNull();
    expect((await audit()).map(({ action }) => action)).toEqual(['person.lock', 'person.unlock']);
  });

  it('does not lock the last administrator out', async () => {
    await expect(lockPerson(house, osvin, osvin.id)).rejects.toMatchObject({ status: 409 });
    expect((await personOf(house, osvin.email)).locked_at).toBeNull();
    expect(await audit()).toEqual([]);
  });
});

describe('the list of people', () => {
  it('is paged by address without gap or repetition', async () => {
    for (const name of ['Aldo', 'Brask', 'Cedra']) await settle(house, name);
    const seen: string[] = [];
    let after: string | undefined;
    do {
      const page = await listPeople(house, { after }, 2);
      expect(page.total).toBe(5);
      seen.push(...page.people.map(({ name }) => name));
      after = page.next;
    } while (after !== undefined);
    expect(seen).toEqual(['Aldo', 'Brask', 'Cedra', 'Osvin', 'Ylva']);
  });

  it('is searched by name and address; signs of the pattern language are taken as they are', async () => {
    const found = async (search: string) =>
      (await listPeople(house, { search })).people.map(({ name }) => name);
    expect(await found('YLV')).toEqual(['Ylva']);
    expect(await found('osvin@')).toEqual(['Osvin']);
    expect(await found('%')).toEqual([]);
    expect(await found('_')).toEqual([]);
    expect(await found('\\')).toEqual([]);
  });

  it('counts stations and names the state', async () => {
    await house.db
      .insertInto('station')
      .values({
        id: 'barn',
        call_sign: 'QA1LUN',
        name: 'Barn',
        latitude_deg: 57,
        longitude_deg: 18,
        height_m: 0,
        locator: 'JO97ee',
        public_locator_length: 6,
        time_zone: 'UTC',
        sky_json: '{}',
        hours_json: '{}',
        created_at: 0,
        updated_at: 0,
      })
      .execute();
    await house.db
      .insertInto('station_crew')
      .values({ station_id: 'barn', person_id: ylva.id, crew_role: 'keeper', added_at: 0 })
      .execute();
    await lockPerson(house, osvin, ylva.id);
    const { people } = await listPeople(house, {});
    expect(people).toMatchObject([
      { name: 'Osvin', stationCount: 0, state: 'confirmed' },
      { name: 'Ylva', stationCount: 1, state: 'locked' },
    ]);
  });
});
