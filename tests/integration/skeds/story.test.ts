import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import ICAL from 'ical.js';
import type { OutboxRow } from '~/server/db/tables';
import { Conflict, Forbidden, InvalidInput, NotFound } from '~/server/errors';
import { acceptSked } from '~/server/skeds/acceptSked';
import { cancelSked } from '~/server/skeds/cancelSked';
import { declineSked } from '~/server/skeds/declineSked';
import { getSked } from '~/server/skeds/getSked';
import { lapseDueSkeds } from '~/server/skeds/lapseDueSkeds';
import { listSkeds, skedFilterSchema } from '~/server/skeds/listSkeds';
import { moveSked } from '~/server/skeds/moveSked';
import { reportSked } from '~/server/skeds/reportSked';
import { skedsForCalendar } from '~/server/skeds/skedsForCalendar';
import { takenIntervals } from '~/server/skeds/takenIntervals';
import { countWaiting, waitsForViewer } from '~/server/skeds/waitsForViewer';
import { withdrawSked } from '~/server/skeds/withdrawSked';
import { MINUTE_MS, type Interval } from '~/domain/time/interval';
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
function entry(mail: OutboxRow) {
  const calendar = new ICAL.Component(ICAL.parse(mail.calendar_body!) as unknown[]);
  const event = new ICAL.Event(calendar.getFirstSubcomponent('vevent')!);
  return {
    method: calendar.getFirstPropertyValue('method'),
    uid: event.uid,
    sequence: event.sequence,
    startMs: event.startDate.toJSDate().getTime(),
    endMs: event.endDate.toJSDate().getTime(),
    status: event.component.getFirstPropertyValue('status'),
  };
}
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
    expect(mails.map((mail) => mail.recipient)).toEqual([as(B).email]);
    expect(mails[0]!.subject).toMatch(/^QA1LUN offers a sked, \w{3} \d+ Jan .* UTC, 1296 MHz$/);
    expect(mails[0]!.text_body).toContain('Clear sky forecast.');
    expect(mails[0]!.text_body).toMatch(/Your time: .*EST/);
    expect(mails[0]!.calendar_body).toBeNull();
    expect(await countWaiting(world.services, as(B))).toBe(1);
    expect(await countWaiting(world.services, as(A))).toBe(0);

    const second = slotIn(window, 25);
    const moved = await move(B, id, 1, second, 'A quarter of an hour later.');
    let fresh = await newMails(mails);
    expect(fresh.map((mail) => mail.recipient)).toEqual([as(A).email]);
    expect(fresh[0]!.subject).toContain('QB7TID moved your offer');
    expect(fresh[0]!.text_body).toContain('15 min later than before');
    expect(fresh[0]!.text_body).not.toContain('given up');

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
      expect(entry(mail)).toEqual({
        method: 'REQUEST',
        uid: row.uid,
        sequence: 0,
        ...second,
        status: 'CONFIRMED',
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
      expect(entry(mail)).toMatchObject({ method: 'CANCEL', uid: row.uid, sequence: 1 });
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

  it('gives an agreed slot up when it is moved: CANCEL, freed booking, then a higher REQUEST', async () => {
    const first = slotIn(window, 10);
    const second = slotIn(window, 60);
    const { id } = await offerFrom(world, A, [B], first);
    await accept(B, id, 1);
    let mails = await world.mails();
    const moved = await move(A, id, 2, second);
    let fresh = await newMails(mails);
    expect(fresh).toHaveLength(2);
    for (const mail of fresh) {
      expect(entry(mail)).toMatchObject({ method: 'CANCEL', sequence: 1, ...first });
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
      expect(entry(mail)).toMatchObject({ method: 'REQUEST', sequence: 2, ...second });
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
    const requests = (await world.mails()).filter((mail) => mail.calendar_method === 'REQUEST');
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
    const requests = (await world.mails()).filter((mail) => mail.calendar_method === 'REQUEST');
    expect(requests).toHaveLength(3);
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
      [as(A).email, 'QB7TID declined the sked'],
    ]);
    mails = await world.mails();
    await withdrawSked(world.services, as(A), withdrawn.id, { version: 1, words: '' });
    fresh = await newMails(mails);
    expect(fresh.map((mail) => mail.recipient)).toEqual([as(B).email]);
    mails = await world.mails();
    expect(await lapseDueSkeds(world.services)).toBe(0);
    world.clock.nowMs = slot.startMs;
    expect((await getSked(world.services, as(A), lapsing.id)).view.state).toBe('lapsed');
    expect(await lapseDueSkeds(world.services)).toBe(1);
    expect(await lapseDueSkeds(world.services)).toBe(0);
    fresh = await newMails(mails);
    expect(fresh.map((mail) => mail.recipient).sort()).toEqual([as(A).email, as(B).email].sort());
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
