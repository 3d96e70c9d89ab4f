import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { DEFAULT_MAIL_PREFERENCE, type MailPreference } from '~/domain/people/mailPreference';
import { formatUtcRange } from '~/domain/time/format';
import { DAY_MS, HOUR_MS, MINUTE_MS, type Interval } from '~/domain/time/interval';
import type { OutboxRow } from '~/server/db/tables';
import { deliverDue } from '~/server/mail/deliver';
import { saveMailPreference, switchTopic } from '~/server/people/saveMailPreference';
import { keepReminders } from '~/server/reminders/keepReminders';
import { queueReminders } from '~/server/reminders/queueReminders';
import { acceptSked } from '~/server/skeds/acceptSked';
import { cancelSked } from '~/server/skeds/cancelSked';
import { moveSked } from '~/server/skeds/moveSked';
import { reportSked } from '~/server/skeds/reportSked';
import { agreedSked } from './agreedSked';
import { wrongWithReminders } from './remindersDue';
import { addPerson, commonWindows, joinCrew, newWorld, NOW_MS, slotIn, type World } from './world';

const A = 'QA1LUN';
const B = 'QB7TID';
const C = 'QC2FAR';

let world: World;
let sent: OutboxRow[];
beforeEach(async () => {
  world = await newWorld();
  sent = [];
});
afterEach(() => world.close());

const START_MS = NOW_MS + 3 * DAY_MS;
const SLOT: Interval = { startMs: START_MS, endMs: START_MS + 45 * MINUTE_MS };

/** What the worker does at an instant; `down` leaves the mail server away. */
async function work(atMs: number, { deliver = true } = {}): Promise<OutboxRow[]> {
  world.clock.nowMs = atMs;
  await keepReminders(world.services);
  expect(await wrongWithReminders(world.services)).toEqual([]);
  await queueReminders(world.services);
  expect(await wrongWithReminders(world.services)).toEqual([]);
  return deliver ? deliverAll() : [];
}

async function deliverAll(): Promise<OutboxRow[]> {
  const now: OutboxRow[] = [];
  const send = (mail: OutboxRow) => {
    now.push(mail);
    return Promise.resolve();
  };
  while ((await deliverDue(world.services, { send, leaseMs: 60_000, atOnce: 10 })) > 0);
  sent.push(...now);
  // Ylva of QA1LUN first.
  return now
    .filter((mail) => mail.topic === 'reminder')
    .sort((a, b) => b.recipient.localeCompare(a.recipient));
}

const to = (mails: readonly OutboxRow[]) => mails.map((mail) => mail.recipient).sort();
const crew = (...callSigns: string[]) => callSigns.map((one) => world.people[one]!.email).sort();
const wish = (callSign: string, change: Partial<MailPreference>) =>
  saveMailPreference(world.services, world.people[callSign]!, {
    ...DEFAULT_MAIL_PREFERENCE,
    ...change,
  });
const rows = () => world.services.db.selectFrom('reminder').selectAll().orderBy('due_at').execute();

describe('before the start', () => {
  it('reminds every crew a day and an hour before, each once, and not after the start', async () => {
    await agreedSked(world, [A, B], SLOT);
    expect(await work(START_MS - DAY_MS - 1)).toEqual([]);
    const first = await work(START_MS - DAY_MS);
    expect(to(first)).toEqual(crew(A, B));
    expect(first[0]!.subject).toBe(
      'In 1 d: sked with QB7TID, Thu 21 Jan 18:42–19:27 UTC, 1296 MHz',
    );
    expect(await work(START_MS - DAY_MS + MINUTE_MS)).toEqual([]);
    const second = await work(START_MS - HOUR_MS + 3000);
    expect(to(second)).toEqual(crew(A, B));
    expect(second[0]!.subject).toMatch(/^In 1 h: /);
    expect(await work(START_MS + MINUTE_MS)).toEqual([]);
  });

  it('says both local times, band, frequency, where the sheet and the live view are, and the cautions', async () => {
    const id = await agreedSked(world, [A, B], SLOT);
    const [mail] = await work(START_MS - HOUR_MS);
    expect(mail).toMatchObject({ topic: 'reminder', sked_id: id, person_id: 'person-ylva' });
    expect(mail!.text_body).toContain('QA1LUN:');
    expect(mail!.text_body).toMatch(/QA1LUN: +Thu 21 Jan 19:42–20:27 CET/);
    expect(mail!.text_body).toMatch(/QB7TID: +Thu 21 Jan 13:42–14:27 EST/);
    expect(mail!.text_body).toContain('1296 MHz');
    expect(mail!.text_body).toContain('1296.065 MHz, Q65-60C');
    expect(mail!.text_body).toContain(`http://127.0.0.1:4999/skeds/${id}/sheet`);
    expect(mail!.text_body).toContain('http://127.0.0.1:4999/live');
    expect(mail!.text_body).toContain('Before you transmit: people out of the beam');
    expect(mail!.text_body).toContain('counted from 17:42 UTC');
    expect(mail!.unsubscribe_url).toMatch(/\/unsubscribe\/person-ylva\.reminder\.[\w-]{43}$/);
    expect(mail!.text_body).toContain(mail!.unsubscribe_url);
  });

  it('leaves out what would have been due before the sked was agreed', async () => {
    world.clock.nowMs = START_MS - 90 * MINUTE_MS;
    await agreedSked(world, [A, B], SLOT);
    expect(await work(START_MS - 89 * MINUTE_MS)).toEqual([]);
    expect(await work(START_MS - HOUR_MS)).toHaveLength(2);
    expect((await rows()).filter((row) => row.kind === 'before')).toHaveLength(2);
  });

  it('is late when the worker was down, with the true time left, one mail for what was missed, never after the start', async () => {
    await agreedSked(world, [A, B], SLOT);
    await agreedSked(world, [A, C], {
      startMs: START_MS - 5 * HOUR_MS,
      endMs: START_MS - 4 * HOUR_MS,
    });
    await keepReminders(world.services);
    const late = await work(START_MS - 40 * MINUTE_MS);
    expect(to(late)).toEqual([...crew(A, B), ...crew(A, C)].sort());
    const before = late.filter((mail) => mail.subject.startsWith('In '));
    expect(to(before)).toEqual(crew(A, B));
    expect(before[0]!.subject).toMatch(/^In 40 min: /);
    // The other sked is over for 3 h 20 min: nothing but the report is asked for.
    expect(late.filter((mail) => mail.subject.startsWith('How did it go?'))).toHaveLength(2);
  });

  it('follows a move: nothing for the old time, everything for the new', async () => {
    const window = commonWindows([A, B]).find(({ startMs }) => startMs > NOW_MS + 3 * DAY_MS)!;
    const old = slotIn(window, 5);
    const later = slotIn(window, 65);
    const id = await agreedSked(world, [A, B], old);
    await work(NOW_MS + HOUR_MS);
    // Queued, and not yet sent when the sked is moved.
    await work(old.startMs - DAY_MS, { deliver: false });
    const moved = await moveSked(world.services, world.people[A]!, id, {
      version: 2,
      words: '',
      start: later.startMs,
      end: later.endMs,
    });
    expect(await deliverAll()).toEqual([]);
    const dropped = (await rows()).filter((row) => row.dropped_at !== null);
    expect(dropped).toHaveLength(2);
    expect(await work(old.startMs - DAY_MS + MINUTE_MS)).toEqual([]);
    await acceptSked(world.services, world.people[B]!, id, { version: moved.version, words: '' });
    expect(to(await work(later.startMs - DAY_MS))).toEqual(crew(A, B));
    expect(await work(old.startMs - HOUR_MS)).toEqual([]);
    const mails = await work(later.startMs - HOUR_MS);
    expect(to(mails)).toEqual(crew(A, B));
    expect(mails[0]!.subject).toContain(formatUtcRange(later));
  });

  it('is dropped at the door when the sked is cancelled between queueing and sending, and recorded so', async () => {
    const id = await agreedSked(world, [A, B], SLOT);
    await work(START_MS - HOUR_MS, { deliver: false });
    await cancelSked(world.services, world.people[A]!, id, { version: 2, words: '' });
    expect(await deliverAll()).toEqual([]);
    const mails = (await world.mails()).filter((mail) => mail.topic === 'reminder');
    expect(mails).toHaveLength(2);
    for (const mail of mails) {
      expect(mail).toMatchObject({ sent_at: null, set_aside_at: world.clock.nowMs });
      expect(mail.last_error).toBe('Dropped: the sked is no longer agreed at that time.');
    }
    const recorded = (await rows()).filter((row) => row.dropped_at !== null);
    expect(recorded.map((row) => row.minutes).sort()).toEqual([1440, 1440, 60, 60].sort());
    expect(await work(START_MS - 30 * MINUTE_MS)).toEqual([]);
  });

  it('is dropped at the door when the start passes before the mail server takes it', async () => {
    await agreedSked(world, [A, B], SLOT);
    await work(START_MS - HOUR_MS, { deliver: false });
    world.clock.nowMs = START_MS + 1;
    expect(await deliverAll()).toEqual([]);
    expect((await world.mails()).find((mail) => mail.topic === 'reminder')!.last_error).toBe(
      'Dropped: its start has passed.',
    );
  });

  it('follows the crew: a new member is reminded, one who left is not, queued or waiting', async () => {
    await agreedSked(world, [A, B], SLOT);
    await work(NOW_MS + HOUR_MS);
    const gerd = await addPerson(world.services, 'Gerd', 'Europe/Berlin');
    await joinCrew(world.services, world.stationIds[A]!, gerd);
    await work(START_MS - DAY_MS, { deliver: false });
    await world.services.db
      .deleteFrom('station_crew')
      .where('person_id', '=', world.people[A]!.id)
      .execute();
    expect(to(await deliverAll())).toEqual([gerd.email, ...crew(B)].sort());
    expect(to(await work(START_MS - HOUR_MS))).toEqual([gerd.email, ...crew(B)].sort());
  });

  it('reminds nobody of a party that dropped out', async () => {
    const id = await agreedSked(world, [A, B, C], SLOT);
    await work(NOW_MS + HOUR_MS);
    await world.services.db
      .updateTable('sked_party')
      .set({ left_at: NOW_MS })
      .where('sked_id', '=', id)
      .where('station_id', '=', world.stationIds[C]!)
      .execute();
    expect(to(await work(START_MS - HOUR_MS))).toEqual(crew(A, B));
  });

  it('writes to a keeper without an account with a link of their own, and not to a blocked address', async () => {
    const { db } = world.services;
    await db
      .updateTable('person')
      .set({ confirmed_at: null })
      .where('id', '=', 'person-edda')
      .execute();
    await db
      .updateTable('station')
      .set({ guest: 1, listed: 0 })
      .where('id', '=', world.stationIds[B]!)
      .execute();
    await db.updateTable('station_crew').set({ crew_role: 'keeper' }).execute();
    const id = await agreedSked(world, [A, B], SLOT);
    const guests = (await work(START_MS - DAY_MS)).filter(
      (mail) => mail.recipient === 'person-edda@people.example',
    );
    expect(guests).toHaveLength(1);
    expect(guests[0]!.text_body).toMatch(/http:\/\/127\.0\.0\.1:4999\/answer\/[\w-]{43}/);
    expect(guests[0]!.text_body).not.toContain('/sheet');
    const link = await db.selectFrom('guest_link').selectAll().executeTakeFirstOrThrow();
    expect(link).toMatchObject({
      sked_id: id,
      person_id: 'person-edda',
      expires_at: SLOT.endMs + 14 * DAY_MS,
    });
    await db
      .insertInto('mail_block')
      .values({ email: 'person-edda@people.example', at: 0 })
      .execute();
    expect(to(await work(START_MS - HOUR_MS))).toEqual(crew(A));
  });
});

describe('wishes', () => {
  it('come as often as chosen, and not at all when switched off', async () => {
    await wish(A, { reminderMinutes: [10_080, 720, 15] });
    await switchTopic(world.services, world.people[B]!.id, 'reminder', false);
    await agreedSked(world, [A, B], SLOT);
    expect(await work(START_MS - DAY_MS)).toEqual([]);
    expect(to(await work(START_MS - 12 * HOUR_MS))).toEqual(crew(A));
    expect(await work(START_MS - HOUR_MS)).toEqual([]);
    expect(to(await work(START_MS - 15 * MINUTE_MS))).toEqual(crew(A));
  });

  it('neither lose nor double one when they change around the moment it is due', async () => {
    await agreedSked(world, [A, B], SLOT);
    await work(NOW_MS + HOUR_MS);
    // Due, the worker has not seen it yet, and something else is changed.
    world.clock.nowMs = START_MS - DAY_MS + MINUTE_MS;
    await wish(A, { digest: { rhythm: 'daily', hour: 8, weekday: 1 } });
    expect(to(await work(world.clock.nowMs))).toEqual(crew(A, B));
    // Away and back again after it was sent.
    await wish(A, { reminderMinutes: [60] });
    await work(world.clock.nowMs + MINUTE_MS);
    await wish(A, { reminderMinutes: [1440, 60] });
    expect(await work(world.clock.nowMs + MINUTE_MS)).toEqual([]);
    expect(to(await work(START_MS - HOUR_MS))).toEqual(crew(A, B));
  });

  it('hold even when the sked was agreed and the wish changed before the worker ever looked', async () => {
    await agreedSked(world, [A, B], SLOT);
    world.clock.nowMs = START_MS - HOUR_MS + 1;
    await wish(A, { reminderMinutes: [1440, 60, 15] });
    expect(to(await work(START_MS - HOUR_MS + 2))).toEqual(crew(A, B));
    expect(to(await work(START_MS - 15 * MINUTE_MS))).toEqual(crew(A));
  });

  it('do not send at once what a new wish would have sent earlier', async () => {
    await wish(A, { reminderMinutes: [60] });
    await agreedSked(world, [A, B], SLOT);
    await work(START_MS - 12 * HOUR_MS);
    await wish(A, { reminderMinutes: [1440, 720, 60] });
    expect(await work(START_MS - 12 * HOUR_MS + MINUTE_MS)).toEqual([]);
    expect(to(await work(START_MS - HOUR_MS))).toEqual(crew(A, B));
  });

  it('count when the mail leaves', async () => {
    await agreedSked(world, [A, B], SLOT);
    await work(START_MS - HOUR_MS, { deliver: false });
    await switchTopic(world.services, world.people[A]!.id, 'reminder', false);
    expect(to(await deliverAll())).toEqual(crew(B));
  });
});

describe('reports', () => {
  it('are asked for after two hours and two days, of those who have not reported', async () => {
    const id = await agreedSked(world, [A, B], SLOT);
    await work(NOW_MS + HOUR_MS);
    await work(SLOT.startMs - HOUR_MS);
    expect(await work(SLOT.endMs + HOUR_MS)).toEqual([]);
    const first = await work(SLOT.endMs + 2 * HOUR_MS);
    expect(to(first)).toEqual(crew(A, B));
    expect(first[0]!.subject).toMatch(/^How did it go\? Sked with QB7TID/);
    expect(first[0]!.text_body).toContain(`/skeds/${id}#report`);
    await reportSked(world.services, world.people[B]!, id, {
      version: 2,
      result: 'completed',
      words: '',
    });
    const second = await work(SLOT.endMs + 2 * DAY_MS);
    expect(to(second)).toEqual(crew(A));
    expect(second[0]!.text_body).toContain('QB7TID says completed.');
    expect(await work(SLOT.endMs + 9 * DAY_MS)).toEqual([]);
  });

  it('are not asked for when the report comes between queueing and sending', async () => {
    const id = await agreedSked(world, [A, B], SLOT);
    await work(SLOT.endMs + 2 * HOUR_MS, { deliver: false });
    await reportSked(world.services, world.people[A]!, id, {
      version: 2,
      result: 'notHeard',
      words: '',
    });
    expect(to(await deliverAll())).toEqual(crew(B));
  });
});

describe('a clock that jumps', () => {
  it('sends none twice', async () => {
    await agreedSked(world, [A, B], SLOT);
    const jumps = [
      START_MS - DAY_MS,
      START_MS - 2 * DAY_MS,
      START_MS - DAY_MS + 5,
      START_MS - HOUR_MS,
      START_MS - DAY_MS,
      START_MS + 40 * DAY_MS,
      START_MS - HOUR_MS,
      START_MS + 3 * HOUR_MS,
      START_MS - 10 * MINUTE_MS,
      SLOT.endMs + 2 * DAY_MS,
      START_MS - HOUR_MS,
      SLOT.endMs + 2 * DAY_MS,
    ];
    for (const atMs of jumps) await work(atMs);
    const mails = sent.filter((mail) => mail.topic === 'reminder');
    expect(new Set(mails.map((mail) => mail.reminder_id)).size).toBe(mails.length);
    // A day, an hour, after two hours, after two days.
    expect(mails.filter((mail) => mail.recipient === world.people[A]!.email)).toHaveLength(4);
  });

  it('keeps one whose time the clock had passed too early', async () => {
    await agreedSked(world, [A, B], SLOT);
    await work(START_MS + 40 * DAY_MS);
    expect(to(await work(START_MS - HOUR_MS))).toEqual(crew(A, B));
  });
});
