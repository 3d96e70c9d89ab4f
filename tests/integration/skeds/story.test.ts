import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { OutboxRow } from '~/server/db/tables';
import { Conflict, Forbidden, InvalidInput, NotFound } from '~/server/errors';
import { acceptSked } from '~/server/skeds/acceptSked';
import { cancelSked } from '~/server/skeds/cancelSked';
import { declineSked } from '~/server/skeds/declineSked';
import { dropOutSked } from '~/server/skeds/dropOutSked';
import { getSked } from '~/server/skeds/getSked';
import { lapseDueSkeds } from '~/server/skeds/lapseDueSkeds';
import { listSkeds, skedFilterSchema } from '~/server/skeds/listSkeds';
import { loadSked } from '~/server/skeds/load';
import { moveSked } from '~/server/skeds/moveSked';
import { reportSked } from '~/server/skeds/reportSked';
import { skedsForCalendar } from '~/server/skeds/skedsForCalendar';
import { takenIntervals } from '~/server/skeds/takenIntervals';
import { countWaiting, waitsForViewer } from '~/server/skeds/waitsForViewer';
import { withdrawSked } from '~/server/skeds/withdrawSked';
import { newId, newSecret } from '~/server/ids';
import { joinCrew as takeInvitation } from '~/server/stations/joinCrew';
import { removeCrew } from '~/server/stations/removeCrew';
import { homeOf } from '~/server/home/homeOf';
import { historyOf, situation } from '~/domain/sked/told';
import { MINUTE_MS, type Interval } from '~/domain/time/interval';
import { calendarsAfter, readEntry } from './calendarProgram';
import {
  addPerson,
  commonWindows,
  joinCrew,
  newWorld,
  offerFrom,
  setSky,
  slotIn,
  type World,
} from './world';

let world: World;
let window: Interval;
const A = 'QA1LUN';
const B = 'QB7TID';
const C = 'QC2FAR';

beforeEach(async () => {
  world = await newWorld();
  window = commonWindows([A, B, C])[0]!;
});
afterEach(() => world.close());

const as = (callSign: string) => world.people[callSign]!;
const accept = (who: string, id: string, version: number) =>
  acceptSked(world.services, as(who), id, { version, words: '' });
const move = (who: string, id: string, version: number, slot: Interval, words = '') =>
  moveSked(world.services, as(who), id, {
    version,
    words,
    start: slot.startMs,
    end: slot.endMs,
  });

async function newMails(before: OutboxRow[]): Promise<OutboxRow[]> {
  const known = new Set(before.map((mail) => mail.id));
  return (await world.mails()).filter((mail) => !known.has(mail.id));
}
const entry = (mail: OutboxRow) => readEntry(mail.calendar_body!);
async function caught(promise: Promise<unknown>): Promise<unknown> {
  return promise.then(
    () => {
      throw new Error('nothing was thrown');
    },
    (error: unknown) => error,
  );
}

describe('offer, move, accept, cancel', () => {
  it('runs the whole story with its mails and calendar entries', async () => {
    const first = slotIn(window, 10);
    const { id } = await offerFrom(world, A, [B], first, 'Clear sky forecast.');
    let mails = await world.mails();
    expect(mails.map((mail) => mail.recipient)).toEqual([as(B).email, as(A).email]);
    expect(mails[1]!.subject).toMatch(/^You offer a sked/);
    expect(mails[0]!.subject).toMatch(/^QA1LUN offers a sked, \w{3} \d+ Jan .* UTC, 1296 MHz$/);
    expect(mails[0]!.text_body).toContain('Clear sky forecast.');
    expect(mails[0]!.text_body).toMatch(/Your time: .*EST/);
    expect(entry(mails[0]!)).toMatchObject({
      method: 'REQUEST',
      sequence: 0,
      status: 'TENTATIVE',
      partstat: 'NEEDS-ACTION',
      rsvp: 'TRUE',
      transparent: true,
      ...first,
    });
    expect(entry(mails[1]!)).toMatchObject({ partstat: 'ACCEPTED', rsvp: 'FALSE' });
    expect(await countWaiting(world.services, as(B))).toBe(1);
    expect(await countWaiting(world.services, as(A))).toBe(0);

    const second = slotIn(window, 25);
    const moved = await move(B, id, 1, second, 'A quarter of an hour later.');
    let fresh = await newMails(mails);
    expect(fresh.map((mail) => mail.subject.split(',')[0])).toEqual([
      'You moved the sked',
      'QB7TID moved your offer',
    ]);
    const toA = fresh.find((mail) => mail.recipient === as(A).email)!;
    expect(toA.text_body).toContain('15 min later than before');
    expect(toA.text_body).not.toContain('given up');
    expect(entry(toA)).toMatchObject({
      method: 'REQUEST',
      sequence: 1,
      status: 'TENTATIVE',
      partstat: 'NEEDS-ACTION',
      ...second,
    });

    mails = await world.mails();
    const agreed = await accept(A, id, moved.version);
    fresh = await newMails(mails);
    expect(fresh.map((mail) => mail.recipient).sort()).toEqual([as(A).email, as(B).email].sort());
    const row = await world.services.db
      .selectFrom('sked')
      .selectAll()
      .where('id', '=', id)
      .executeTakeFirstOrThrow();
    for (const mail of fresh) {
      expect(mail.calendar_method).toBe('REQUEST');
      expect(entry(mail)).toMatchObject({
        method: 'REQUEST',
        uid: row.uid,
        sequence: 2,
        ...second,
        status: 'CONFIRMED',
        partstat: 'ACCEPTED',
        rsvp: 'FALSE',
        transparent: false,
      });
    }
    expect(await takenIntervals(world.services.db, [world.stationIds[B]!], window)).toEqual([
      second,
    ]);

    mails = await world.mails();
    const cancelled = await cancelSked(world.services, as(B), id, {
      version: agreed.version,
      words: 'Wind 18 m/s, dish is stowed.',
    });
    fresh = await newMails(mails);
    expect(fresh).toHaveLength(2);
    for (const mail of fresh) {
      expect(entry(mail)).toMatchObject({ method: 'CANCEL', uid: row.uid, sequence: 3 });
      expect(entry(mail).status).toBe('CANCELLED');
      expect(mail.text_body).toContain('Wind 18 m/s');
    }
    expect(cancelled.version).toBe(4);
    expect(await takenIntervals(world.services.db, [world.stationIds[B]!], window)).toEqual([]);
    const { view } = await getSked(world.services, as(A), id);
    expect(view.events.map((event) => event.kind)).toEqual([
      'offered',
      'moved',
      'accepted',
      'agreed',
      'cancelled',
    ]);
  });

  it('gives an agreed slot up when it is moved: freed booking, tentative entry, then a firm one', async () => {
    const first = slotIn(window, 10);
    const second = slotIn(window, 60);
    const { id } = await offerFrom(world, A, [B], first);
    await accept(B, id, 1);
    let mails = await world.mails();
    const moved = await move(A, id, 2, second);
    let fresh = await newMails(mails);
    expect(fresh).toHaveLength(2);
    for (const mail of fresh) {
      expect(entry(mail)).toMatchObject({
        method: 'REQUEST',
        status: 'TENTATIVE',
        sequence: 2,
        ...second,
      });
      expect(mail.text_body).toContain('is given up');
    }
    expect(fresh.map((mail) => mail.subject.split(',')[0]).sort()).toEqual([
      'QA1LUN moved the sked',
      'You moved the sked',
    ]);
    expect(await takenIntervals(world.services.db, [world.stationIds[A]!], window)).toEqual([]);
    mails = await world.mails();
    await accept(B, id, moved.version);
    fresh = await newMails(mails);
    for (const mail of fresh) {
      expect(entry(mail)).toMatchObject({ status: 'CONFIRMED', sequence: 3, ...second });
    }
  });

  it('writes to each member of each crew once, and never to unconfirmed or locked people', async () => {
    const both = await addPerson(world.services, 'Both', 'Asia/Kathmandu');
    await joinCrew(world.services, world.stationIds[A]!, both);
    await joinCrew(world.services, world.stationIds[B]!, both);
    const locked = await addPerson(world.services, 'Locked', 'UTC');
    await joinCrew(world.services, world.stationIds[B]!, locked);
    await world.services.db
      .updateTable('person')
      .set({ locked_at: 1 })
      .where('id', '=', locked.id)
      .execute();
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    await accept(B, id, 1);
    const requests = (await world.mails()).filter(
      (mail) => mail.calendar_method === 'REQUEST' && entry(mail).status === 'CONFIRMED',
    );
    expect(requests.map((mail) => mail.recipient).sort()).toEqual(
      [as(A).email, as(B).email, both.email].sort(),
    );
    const own = requests.find((mail) => mail.recipient === both.email)!;
    expect(own.text_body).toMatch(/Your time: .*(UTC\+5:45|NPT)/);
    for (const mail of requests) {
      const attendees = mail.calendar_body!.replace(/\r\n /g, '').match(/MAILTO:\S+/g);
      expect(attendees).toEqual([`MAILTO:${mail.recipient}`]);
    }
  });

  it('is agreed by three only when all three accepted', async () => {
    const { id } = await offerFrom(world, A, [B, C], slotIn(window, 10));
    const half = await accept(C, id, 1);
    expect((await getSked(world.services, as(A), id)).view.state).toBe('offered');
    await accept(B, id, half.version);
    expect((await getSked(world.services, as(A), id)).view.state).toBe('agreed');
    const mails = await world.mails();
    // Three for the offer, one for the first answer, three for the agreement.
    expect(mails.map((mail) => entry(mail).status).sort()).toEqual([
      ...['CONFIRMED', 'CONFIRMED', 'CONFIRMED'],
      ...['TENTATIVE', 'TENTATIVE', 'TENTATIVE', 'TENTATIVE'],
    ]);
  });

  it('tells the first of three to accept who is still awaited, and only that crew', async () => {
    const { id } = await offerFrom(world, A, [B, C], slotIn(window, 10));
    const mails = await world.mails();
    await accept(C, id, 1);
    const fresh = await newMails(mails);
    expect(fresh.map((mail) => mail.recipient)).toEqual([as(C).email]);
    expect(fresh[0]!.text_body).toContain('QB7TID has not answered yet');
    expect(entry(fresh[0]!)).toMatchObject({ status: 'TENTATIVE', partstat: 'ACCEPTED' });
    const { view } = await getSked(world.services, as(B), id);
    expect(view.parties.map((party) => [party.callSign, party.answer])).toEqual([
      [B, 'waiting'],
      [A, 'accepted'],
      [C, 'accepted'],
    ]);
  });
});

describe('dropping out', () => {
  const drop = (who: string, id: string, version: number, words = '') =>
    dropOutSked(world.services, as(who), id, { version, words });

  it('frees the one who leaves, keeps the slot for the rest, and tells everybody', async () => {
    const slot = slotIn(window, 10);
    const { id } = await offerFrom(world, A, [B, C], slot);
    await accept(B, id, 1);
    await accept(C, id, 2);
    const mails = await world.mails();
    const { version } = await drop(A, id, 3, 'The feed is under water.');
    const fresh = await newMails(mails);
    const said = fresh.map((mail) => [
      mail.recipient,
      mail.subject.split(',')[0],
      entry(mail).method,
    ]);
    expect(said.sort()).toEqual(
      [
        [as(A).email, 'You dropped out of the sked', 'CANCEL'],
        [as(B).email, 'QA1LUN dropped out of the sked', 'REQUEST'],
        [as(C).email, 'QA1LUN dropped out of the sked', 'REQUEST'],
      ].sort(),
    );
    for (const mail of fresh) {
      expect(entry(mail)).toMatchObject({ sequence: 3, ...slot });
      expect(mail.text_body).toContain('The feed is under water.');
      if (mail.calendar_method === 'REQUEST') expect(mail.calendar_body).not.toContain(A);
    }
    const taken = (who: string) =>
      takenIntervals(world.services.db, [world.stationIds[who]!], window);
    expect(await taken(A)).toEqual([]);
    expect(await taken(B)).toEqual([slot]);
    expect(await taken(C)).toEqual([slot]);

    const { view } = await getSked(world.services, as(A), id);
    expect(view).toMatchObject({ state: 'agreed', droppedOut: true, waitsForViewer: false });
    expect(Object.values(view.choices).every((choice) => choice === null)).toBe(true);
    expect(situation(view)).toBe('You dropped out. QB7TID and QC2FAR keep the slot.');
    expect(historyOf(view).at(-1)).toMatchObject({ who: 'You', did: 'dropped out' });
    expect(await skedsForCalendar(world.services, as(A), window)).toEqual([]);
    expect((await homeOf(world.services, as(A))).next).toBeUndefined();
    const listed = await listSkeds(world.services, as(A), skedFilterSchema.parse({}));
    expect(listed.skeds.map((sked) => sked.droppedOut)).toEqual([true]);

    const other = await getSked(world.services, as(B), id);
    expect(other.view.leftParties.map((party) => party.callSign)).toEqual([A]);
    expect(situation(other.view)).toContain('QA1LUN dropped out.');
    world.clock.nowMs = slot.endMs;
    expect((await waitsForViewer(world.services, as(A))).reports).toEqual([]);
    expect((await waitsForViewer(world.services, as(B))).reports).toHaveLength(1);
    expect(await caught(drop(A, id, version))).toBeInstanceOf(Conflict);
  });

  it('makes the sked agreed when the others have accepted, under the checks of accepting', async () => {
    const slot = slotIn(window, 10);
    const { id } = await offerFrom(world, A, [B, C], slot);
    await accept(B, id, 1);
    expect(await countWaiting(world.services, as(C))).toBe(1);
    const inTheWay = await offerFrom(world, C, [B], slot);
    await accept(B, inTheWay.id, 1);
    expect(await caught(drop(C, id, 2))).toBeInstanceOf(Conflict);
    await cancelSked(world.services, as(B), inTheWay.id, { version: 2, words: '' });
    await drop(C, id, 2);
    const { row, sked } = (await loadSked(world.services.db, id))!;
    expect(row).toMatchObject({ state: 'agreed', agreed_version: 3 });
    expect(sked.parties.map((party) => party.left)).toEqual([false, false, true]);
    expect(await countWaiting(world.services, as(C))).toBe(0);
    const calendars = calendarsAfter(await world.mails());
    expect(calendars.get(as(A).email)!.get(row.uid)).toMatchObject({ status: 'CONFIRMED' });
    expect(calendars.get(as(C).email)!.get(row.uid)).toMatchObject({ status: 'CANCELLED' });
  });

  it('leaves the entry with somebody who is in another party’s crew too', async () => {
    await joinCrew(world.services, world.stationIds[B]!, as(C));
    const { id } = await offerFrom(world, A, [B, C], slotIn(window, 10));
    const sked = (await loadSked(world.services.db, id))!;
    await dropOutSked(world.services, as(C), id, {
      version: 1,
      words: '',
      as: world.stationIds[C]!,
    });
    const own = calendarsAfter(await world.mails())
      .get(as(C).email)!
      .get(sked.row.uid)!;
    expect(own).toMatchObject({ method: 'REQUEST', status: 'TENTATIVE', partstat: 'NEEDS-ACTION' });
    expect((await getSked(world.services, as(C), id)).view.droppedOut).toBe(false);
  });
});

describe('crews', () => {
  async function invitation(callSign: string): Promise<string> {
    const { secret, hash } = newSecret();
    await world.services.db
      .insertInto('crew_invitation')
      .values({
        id: newId(),
        station_id: world.stationIds[callSign]!,
        email: 'whoever@people.example',
        crew_role: 'operator',
        token_hash: hash,
        invited_by: as(callSign).id,
        created_at: world.clock.nowMs,
        expires_at: world.clock.nowMs + MINUTE_MS,
        accepted_at: null,
      })
      .execute();
    return secret;
  }

  it('takes the skeds ahead out of the calendar of somebody who leaves, and gives them to who joins', async () => {
    const anna = await addPerson(world.services, 'Anna', 'UTC');
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    const offered = await offerFrom(world, B, [A], slotIn(window, 60));
    await accept(B, id, 1);
    const uid = (await loadSked(world.services.db, id))!.row.uid;
    const other = (await loadSked(world.services.db, offered.id))!.row.uid;
    await takeInvitation(world.services, anna, await invitation(A));
    const shown = async () => calendarsAfter(await world.mails()).get(anna.email)!;
    expect((await shown()).get(uid)).toMatchObject({ status: 'CONFIRMED', partstat: 'ACCEPTED' });
    expect((await shown()).get(other)).toMatchObject({ status: 'TENTATIVE', rsvp: 'TRUE' });

    await removeCrew(world.services, anna, world.stationIds[A]!, anna.id);
    expect((await shown()).get(uid)).toMatchObject({ method: 'CANCEL', status: 'CANCELLED' });
    expect((await shown()).get(other)).toMatchObject({ method: 'CANCEL', status: 'CANCELLED' });
    const mails = await world.mails();
    await accept(A, offered.id, 1);
    expect((await newMails(mails)).map((mail) => mail.recipient)).not.toContain(anna.email);
    expect((await shown()).get(other)).toMatchObject({ status: 'CANCELLED' });
  });
});

describe('refusals', () => {
  it('tells what came between when the version is stale, and changes nothing', async () => {
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    await move(A, id, 1, slotIn(window, 40));
    const mails = await world.mails();
    const error = await caught(accept(B, id, 1));
    expect(error).toBeInstanceOf(Conflict);
    expect((error as Conflict).message).toContain('QA1LUN moved it to');
    expect((error as Conflict).details).toMatchObject({ version: 2 });
    expect((await getSked(world.services, as(B), id)).view.state).toBe('offered');
    expect(await newMails(mails)).toEqual([]);
  });

  it('does not let a stranger see, answer or list a sked, nor offer for somebody else', async () => {
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    for (const who of ['stranger', C]) {
      expect(await caught(getSked(world.services, as(who), id))).toBeInstanceOf(NotFound);
      expect(await caught(accept(who, id, 1))).toBeInstanceOf(NotFound);
      expect(await caught(move(who, id, 1, slotIn(window, 40)))).toBeInstanceOf(NotFound);
      const { skeds } = await listSkeds(world.services, as(who), skedFilterSchema.parse({}));
      expect(skeds).toEqual([]);
    }
    const forged = acceptSked(world.services, as(A), id, {
      version: 1,
      words: '',
      as: world.stationIds[B]!,
    });
    expect(await caught(forged)).toBeInstanceOf(NotFound);
    expect(await caught(offerAsStranger())).toBeInstanceOf(Forbidden);
  });

  async function offerAsStranger() {
    const { offerSked } = await import('~/server/skeds/offerSked');
    const slot = slotIn(window, 10);
    return offerSked(world.services, as('stranger'), {
      station: world.stationIds[A]!,
      with: [world.stationIds[B]!],
      band: '1296',
      mode: 'cw',
      start: slot.startMs,
      end: slot.endMs,
      words: '',
    });
  }

  it('refuses a second agreed sked at the same time, with three free slots of the same length', async () => {
    const slot = slotIn(window, 20);
    const overlapping = slotIn(window, 40);
    const one = await offerFrom(world, A, [B], slot);
    const two = await offerFrom(world, C, [B], overlapping);
    await accept(B, one.id, 1);
    const error = await caught(accept(B, two.id, 1));
    expect(error).toBeInstanceOf(Conflict);
    expect((error as Conflict).message).toContain('QB7TID has another agreed sked');
    const { alternatives } = (error as Conflict).details as {
      alternatives: { start: string; end: string }[];
    };
    expect(alternatives).toHaveLength(3);
    for (const { start, end } of alternatives) {
      const free = { startMs: Date.parse(start), endMs: Date.parse(end) };
      expect(free.endMs - free.startMs).toBe(30 * MINUTE_MS);
      expect(await takenIntervals(world.services.db, [world.stationIds[B]!], free)).toEqual([]);
      const moved = await move(B, two.id, await versionOf(two.id), free);
      expect(moved.version).toBeGreaterThan(1);
    }
    expect((await getSked(world.services, as(B), one.id)).view.state).toBe('agreed');
  });

  async function versionOf(id: string): Promise<number> {
    return (await getSked(world.services, as(B), id)).view.version;
  }

  it('lets back-to-back skeds stand', async () => {
    const one = await offerFrom(world, A, [B], slotIn(window, 20, 30));
    const two = await offerFrom(world, C, [B], slotIn(window, 50, 30));
    await accept(B, one.id, 1);
    await accept(B, two.id, 1);
    expect(await takenIntervals(world.services.db, [world.stationIds[B]!], window)).toHaveLength(1);
  });

  it('refuses a time at which the Moon is hidden, naming what hides it', async () => {
    const slot = slotIn(window, 10);
    await setSky(world.services, world.stationIds[A]!, {
      blocked: [
        {
          azimuthFromDeg: 0,
          azimuthToDeg: 360,
          elevationFromDeg: 0,
          elevationToDeg: 90,
          name: 'barn',
        },
      ],
    });
    const error = await caught(offerFrom(world, A, [B], slot));
    expect(error).toBeInstanceOf(Conflict);
    expect((error as Conflict).message).toContain('QA1LUN’s barn');
    expect((error as Conflict).details['alternatives']).toEqual([]);
    expect(await world.mails()).toEqual([]);
  });

  it('looks at the sky again when accepting, because a station may have changed', async () => {
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    await setSky(world.services, world.stationIds[B]!, { elevationFromDeg: 89 });
    const error = await caught(accept(B, id, 1));
    expect((error as Conflict).message).toContain('the elevations QB7TID’s dish can reach');
  });

  it('warns about sleep, other skeds and missing equipment, but takes the offer', async () => {
    await world.services.db
      .updateTable('station')
      .set({ hours_json: JSON.stringify({ timeZone: 'UTC', weekly: [], daysOff: [] }) })
      .where('id', '=', world.stationIds[B]!)
      .execute();
    const slot = slotIn(window, 10);
    const { id, warnings } = await offerFrom(world, A, [B], slot);
    expect(warnings.join(' ')).toContain('outside QB7TID’s usable hours');
    expect(warnings.join(' ')).toContain('QA1LUN has entered no equipment');
    await accept(B, id, 1);
    const again = await offerFrom(world, A, [C], slot);
    expect(again.warnings.join(' ')).toContain('QA1LUN has another agreed sked');
  });

  it('refuses wrong slots with the field named', async () => {
    const error = await caught(offerFrom(world, A, [B], slotIn(window, 10, 5)));
    expect(error).toBeInstanceOf(InvalidInput);
    expect((error as InvalidInput).fields[0]).toMatchObject({ path: 'end' });
  });

  it('hides unlisted partners', async () => {
    await world.services.db
      .updateTable('station')
      .set({ listed: 0 })
      .where('id', '=', world.stationIds[B]!)
      .execute();
    expect(await caught(offerFrom(world, A, [B], slotIn(window, 10)))).toBeInstanceOf(NotFound);
  });
});

describe('ends', () => {
  it('declines, withdraws and lapses with a mail to the others', async () => {
    const declined = await offerFrom(world, A, [B], slotIn(window, 10));
    const withdrawn = await offerFrom(world, A, [B], slotIn(window, 50));
    const slot = slotIn(window, 90);
    const lapsing = await offerFrom(world, A, [B], slot);
    let mails = await world.mails();
    await declineSked(world.services, as(B), declined.id, { version: 1, words: 'At work.' });
    let fresh = await newMails(mails);
    expect(fresh.map((mail) => [mail.recipient, mail.subject.split(',')[0]])).toEqual([
      [as(B).email, 'You declined the sked'],
      [as(A).email, 'QB7TID declined the sked'],
    ]);
    expect(fresh.map((mail) => mail.calendar_method)).toEqual(['CANCEL', 'CANCEL']);
    mails = await world.mails();
    await withdrawSked(world.services, as(A), withdrawn.id, { version: 1, words: '' });
    fresh = await newMails(mails);
    expect(fresh.map((mail) => mail.recipient)).toEqual([as(B).email, as(A).email]);
    expect(fresh.map((mail) => mail.calendar_method)).toEqual(['CANCEL', 'CANCEL']);
    mails = await world.mails();
    expect(await lapseDueSkeds(world.services)).toBe(0);
    world.clock.nowMs = slot.startMs;
    expect((await getSked(world.services, as(A), lapsing.id)).view.state).toBe('lapsed');
    expect(await lapseDueSkeds(world.services)).toBe(1);
    expect(await lapseDueSkeds(world.services)).toBe(0);
    fresh = await newMails(mails);
    expect(fresh.map((mail) => mail.recipient).sort()).toEqual([as(A).email, as(B).email].sort());
    expect(fresh.map((mail) => mail.calendar_method)).toEqual(['CANCEL', 'CANCEL']);
    const error = await caught(accept(B, lapsing.id, 2));
    expect((error as Conflict).message).toContain('lapsed');
  });

  it('takes a report of each side and asks the one that is missing', async () => {
    const slot = slotIn(window, 10);
    const { id } = await offerFrom(world, A, [B], slot);
    await accept(B, id, 1);
    const early = reportSked(world.services, as(A), id, {
      version: 2,
      words: '',
      result: 'completed',
    });
    expect(await caught(early)).toBeInstanceOf(Conflict);
    world.clock.nowMs = slot.endMs;
    expect((await waitsForViewer(world.services, as(A))).reports).toHaveLength(1);
    await reportSked(world.services, as(A), id, { version: 2, words: '−22 dB', result: 'partly' });
    expect((await waitsForViewer(world.services, as(A))).reports).toHaveLength(0);
    expect((await waitsForViewer(world.services, as(B))).reports).toHaveLength(1);
    await reportSked(world.services, as(A), id, { version: 3, words: '', result: 'completed' });
    const { view } = await getSked(world.services, as(B), id);
    expect(view.state).toBe('reported');
    expect(view.reports.map((report) => report.result)).toEqual(['completed']);
    expect(view.choices.report).toBe(world.stationIds[B]);
    expect(view.choices.cancel).toBeNull();
  });
});

describe('lists', () => {
  it('pages by key and filters', async () => {
    for (let index = 0; index < 55; index += 1) {
      await offerFrom(world, A, [index % 2 === 0 ? B : C], slotIn(window, index, 10));
    }
    const first = await listSkeds(world.services, as(A), skedFilterSchema.parse({}));
    expect(first.skeds).toHaveLength(50);
    const second = await listSkeds(
      world.services,
      as(A),
      skedFilterSchema.parse({ after: first.next }),
    );
    expect(second.skeds).toHaveLength(5);
    expect(second.next).toBeNull();
    const all = [...first.skeds, ...second.skeds];
    expect(new Set(all.map((sked) => sked.id)).size).toBe(55);
    expect(all.map((sked) => sked.startMs)).toEqual(
      all.map((sked) => sked.startMs).sort((a, b) => a - b),
    );
    const withC = await listSkeds(world.services, as(A), skedFilterSchema.parse({ with: 'qc2' }));
    expect(withC.skeds).toHaveLength(27);
    const agreed = skedFilterSchema.parse({ state: 'agreed' });
    expect((await listSkeds(world.services, as(A), agreed)).skeds).toEqual([]);
    world.clock.nowMs = slotIn(window, 5, 10).endMs;
    const past = await listSkeds(world.services, as(A), skedFilterSchema.parse({ when: 'past' }));
    expect(past.skeds).toHaveLength(6);
    expect(past.skeds[0]!.startMs).toBeGreaterThan(past.skeds[5]!.startMs);
    expect(past.skeds[0]!.state).toBe('lapsed');
    const span = { startMs: window.startMs, endMs: window.endMs };
    expect((await skedsForCalendar(world.services, as(B), span)).length).toBeGreaterThan(10);
  });
});
