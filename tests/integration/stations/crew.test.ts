import { sql } from 'kysely';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { newStationSchema } from '../../../src/domain/station/schema';
import { DAY_MS } from '../../../src/domain/time/interval';
import type { Viewer } from '../../../src/server/auth/viewer';
import { Conflict, Forbidden, NotFound } from '../../../src/server/errors';
import { changeCrewRole } from '../../../src/server/stations/changeCrewRole';
import { createStation } from '../../../src/server/stations/createStation';
import { getCrewStation } from '../../../src/server/stations/getStation';
import { inviteCrew } from '../../../src/server/stations/inviteCrew';
import { joinCrew, readInvitation } from '../../../src/server/stations/joinCrew';
import { listCrew } from '../../../src/server/stations/listCrew';
import { removeCrew } from '../../../src/server/stations/removeCrew';
import { withdrawInvitation } from '../../../src/server/stations/withdrawInvitation';
import { openHouse, type TestHouse } from './support';

let house: TestHouse;
let keeper: Viewer;
let guest: Viewer;
let other: Viewer;
let id: string;

beforeEach(async () => {
  house = await openHouse();
  [keeper, guest, other] = [
    await house.person('Ylva'),
    await house.person('Oren'),
    await house.person('Edda'),
  ];
  const station = await createStation(
    house.services,
    keeper,
    newStationSchema.parse({
      callSign: 'QA1LUN',
      name: 'Baltic coast',
      locator: 'JO97ee',
      heightM: 0,
      timeZone: 'UTC',
      publicLocatorLength: 6,
    }),
  );
  id = station.id;
});
afterEach(() => house.close());

const invite = (crewRole: 'keeper' | 'operator' = 'operator', viewer: Viewer = keeper) =>
  inviteCrew(house.services, viewer, id, { email: guest.email, crewRole });

/** The secret out of the newest mail in the outbox. */
async function mailedSecret(): Promise<string> {
  const mail = await house.services.db
    .selectFrom('outbox')
    .selectAll()
    .orderBy(sql`rowid`, 'desc')
    .executeTakeFirstOrThrow();
  expect(mail.recipient).toBe(guest.email);
  expect(mail.html_body).toContain('http://echotide.example/join/');
  return /echotide\.example\/join\/(\S+)/.exec(mail.text_body)![1]!;
}

describe('inviting', () => {
  it('sends one mail whose link lets the person join once', async () => {
    await invite();
    const secret = await mailedSecret();
    expect(await readInvitation(house.services, secret)).toMatchObject({
      state: 'open',
      callSign: 'QA1LUN',
      crewRole: 'operator',
    });
    await joinCrew(house.services, guest, secret);
    expect((await getCrewStation(house.services, guest, id)).crewRole).toBe('operator');
    await expect(joinCrew(house.services, other, secret)).rejects.toThrow(Conflict);
    await expect(getCrewStation(house.services, other, id)).rejects.toThrow(Forbidden);
    expect((await readInvitation(house.services, secret)).state).toBe('accepted');
    await expect(invite()).rejects.toThrow(/already in the crew/);
  });

  it('stores no secret in the clear', async () => {
    await invite();
    const secret = await mailedSecret();
    const rows = await house.services.db.selectFrom('crew_invitation').selectAll().execute();
    expect(rows).toHaveLength(1);
    expect(JSON.stringify(rows)).not.toContain(secret);
  });

  it('lets one of two people with the same link in', async () => {
    await invite();
    const secret = await mailedSecret();
    const both = await Promise.allSettled([
      joinCrew(house.services, guest, secret),
      joinCrew(house.services, other, secret),
    ]);
    expect(both.map((one) => one.status).sort()).toEqual(['fulfilled', 'rejected']);
    expect((await listCrew(house.services, keeper, id)).members).toHaveLength(2);
  });

  it('expires, is replaced and can be withdrawn', async () => {
    const start = house.services.now();
    await invite();
    const first = await mailedSecret();
    const { id: second } = await invite('keeper');
    await expect(joinCrew(house.services, guest, first)).rejects.toThrow(NotFound);
    expect((await listCrew(house.services, keeper, id)).invitations).toMatchObject([
      { id: second, crewRole: 'keeper' },
    ]);
    const newest = await mailedSecret();
    house.setNow(start + 14 * DAY_MS);
    await expect(joinCrew(house.services, guest, newest)).rejects.toThrow(/expired/);
    house.setNow(start);
    await withdrawInvitation(house.services, keeper, id, second);
    await expect(joinCrew(house.services, guest, newest)).rejects.toThrow(NotFound);
  });

  it('is for keepers only, and sends nothing otherwise', async () => {
    await expect(invite('operator', other)).rejects.toThrow(Forbidden);
    await changeTo(other, 'operator');
    await expect(invite('operator', other)).rejects.toThrow(Forbidden);
    await expect(changeCrewRole(house.services, other, id, other.id, 'keeper')).rejects.toThrow(
      Forbidden,
    );
    const mails = await house.services.db.selectFrom('outbox').selectAll().execute();
    expect(mails).toEqual([]);
  });
});

async function changeTo(person: Viewer, crewRole: 'keeper' | 'operator') {
  await house.services.db
    .insertInto('station_crew')
    .values({ station_id: id, person_id: person.id, crew_role: crewRole, added_at: 0 })
    .execute();
}

describe('the crew', () => {
  it('keeps its last keeper', async () => {
    await changeTo(guest, 'operator');
    await expect(removeCrew(house.services, keeper, id, keeper.id)).rejects.toThrow(/last one/);
    await expect(changeCrewRole(house.services, keeper, id, keeper.id, 'operator')).rejects.toThrow(
      Conflict,
    );
    await changeCrewRole(house.services, keeper, id, guest.id, 'keeper');
    await removeCrew(house.services, keeper, id, keeper.id);
    expect((await listCrew(house.services, guest, id)).members).toMatchObject([
      { name: 'Oren', crewRole: 'keeper', isViewer: true },
    ]);
  });

  it('two keepers who leave at once cannot both go', async () => {
    await changeTo(guest, 'keeper');
    const both = await Promise.allSettled([
      removeCrew(house.services, keeper, id, keeper.id),
      removeCrew(house.services, guest, id, guest.id),
    ]);
    expect(both.map((one) => one.status).sort()).toEqual(['fulfilled', 'rejected']);
  });

  it('an operator may leave but not remove, and sees no addresses', async () => {
    await changeTo(guest, 'operator');
    const seen = await listCrew(house.services, guest, id);
    expect(JSON.stringify(seen)).not.toContain('@');
    await expect(removeCrew(house.services, guest, id, keeper.id)).rejects.toThrow(Forbidden);
    await removeCrew(house.services, guest, id, guest.id);
    await expect(listCrew(house.services, guest, id)).rejects.toThrow(Forbidden);
  });
});
