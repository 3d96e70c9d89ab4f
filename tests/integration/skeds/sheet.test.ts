import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { Conflict, InvalidInput, NotFound } from '~/server/errors';
import { acceptSked } from '~/server/skeds/acceptSked';
import { declineSked } from '~/server/skeds/declineSked';
import { dropOutSked } from '~/server/skeds/dropOutSked';
import { setSheet } from '~/server/skeds/setSheet';
import { sheetOf } from '~/server/skeds/sheetOf';
import { skedTrack } from '~/server/skeds/skedTrack';
import { commonWindows, newWorld, offerFrom, slotIn, type World } from './world';

const A = 'QA1LUN';
const B = 'QB7TID';
const C = 'QC2FAR';

let world: World;
let skedId: string;
beforeEach(async () => {
  world = await newWorld();
  skedId = (await offerFrom(world, A, [B], slotIn(commonWindows([A, B])[0]!, 5))).id;
});
afterEach(() => world.close());

const seenBy = (who: string, id = skedId) => sheetOf(world.services, world.people[who]!, id);
const set = (who: string, eastFirst: boolean, convention = 'receiveOnly' as const, id = skedId) =>
  setSheet(world.services, world.people[who]!, id, { eastFirst, convention });

describe('what all parties see alike', () => {
  it('is east first and constant at the Moon until somebody sets it', async () => {
    for (const who of [A, B]) {
      const { sked, own, stations } = await seenBy(who);
      expect(sked).toMatchObject({ eastFirst: true, convention: 'constantAtMoon' });
      expect(own.callSign).toBe(who);
      expect(stations.map(({ callSign }) => callSign)).toEqual([A, B]);
    }
  });

  it('is set by either side, without a step of the sked and without a mail', async () => {
    const before = await world.services.db.selectFrom('sked').selectAll().executeTakeFirstOrThrow();
    const mails = (await world.mails()).length;
    await set(B, false);
    for (const who of [A, B]) {
      expect((await seenBy(who)).sked).toMatchObject({
        eastFirst: false,
        convention: 'receiveOnly',
      });
    }
    await set(A, true);
    const after = await world.services.db.selectFrom('sked').selectAll().executeTakeFirstOrThrow();
    expect(after).toEqual({ ...before, doppler_convention: 'receiveOnly' });
    expect((await world.mails()).length).toBe(mails);
    expect((await seenBy(A)).view.events.map(({ kind }) => kind)).toEqual(['offered']);
  });

  it('stays as it is for strangers and when the sked is over', async () => {
    await expect(set('stranger', false)).rejects.toThrow(NotFound);
    await expect(set(C, false)).rejects.toThrow(NotFound);
    await expect(seenBy('stranger')).rejects.toThrow(NotFound);
    await declineSked(world.services, world.people[B]!, skedId, { version: 1, words: '' });
    await expect(set(A, false)).rejects.toThrow(Conflict);
    expect((await seenBy(A)).sked.eastFirst).toBe(true);
  });

  it('is closed for an offer whose time has come, open for an agreed sked', async () => {
    await acceptSked(world.services, world.people[B]!, skedId, { version: 1, words: '' });
    world.clock.nowMs = (await seenBy(A)).view.startMs + 60_000;
    await set(A, false);
    const other = await offerFrom(world, A, [B], slotIn(commonWindows([A, B]).at(-1)!, 5));
    world.clock.nowMs = (await seenBy(A, other.id)).view.startMs;
    await expect(set(A, false, 'receiveOnly', other.id)).rejects.toThrow(Conflict);
  });

  it('knows no first and second among three', async () => {
    const three = await offerFrom(world, A, [B, C], slotIn(commonWindows([A, B, C]).at(-1)!, 5));
    const refused = setSheet(world.services, world.people[A]!, three.id, {
      eastFirst: true,
      convention: 'firstCorrectsAll',
    });
    await expect(refused).rejects.toThrow(InvalidInput);
    await set(C, false, 'receiveOnly', three.id);
    expect((await seenBy(B, three.id)).sked.convention).toBe('receiveOnly');
  });

  it('is set by those who are still in it, as two when one of three has dropped out', async () => {
    const three = await offerFrom(world, A, [B, C], slotIn(commonWindows([A, B, C]).at(-1)!, 5));
    await dropOutSked(world.services, world.people[C]!, three.id, { version: 1, words: '' });
    await expect(set(C, false, 'receiveOnly', three.id)).rejects.toThrow(NotFound);
    const settings = { eastFirst: false, convention: 'firstCorrectsAll' as const };
    await setSheet(world.services, world.people[A]!, three.id, settings);
    expect((await seenBy(B, three.id)).sked).toMatchObject(settings);
  });
});

describe('the track for a rotator', () => {
  const ask = (who: string, station: string | null, step: string | null) =>
    skedTrack(world.services, world.people[who]!, skedId, { station, step });

  it('is that of the own station, or of another party', async () => {
    const mine = await ask(A, null, null);
    expect(mine.fileName).toMatch(/^moon-qa1lun-\d{8}T\d{4}z\.csv$/);
    expect(mine.csv.split('\r\n')).toHaveLength(1 + 61 + 1);
    const theirs = await ask(A, world.stationIds[B]!, '10');
    expect(theirs.csv).toBe((await ask(B, null, '10')).csv);
    expect(theirs.csv.split('\r\n')).toHaveLength(1 + 181 + 1);
  });

  it('is refused in sentences', async () => {
    await expect(ask(A, world.stationIds[C]!, null)).rejects.toThrow('no part in this sked');
    await expect(ask(A, null, '7')).rejects.toThrow('10, 30 or 60 seconds');
    await expect(ask('stranger', null, null)).rejects.toThrow(NotFound);
  });
});
