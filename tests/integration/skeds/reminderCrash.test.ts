import { afterEach, beforeEach, expect, it } from 'vitest';
import { HOUR_MS, MINUTE_MS } from '~/domain/time/interval';
import { cancelSked } from '~/server/skeds/cancelSked';
import { startSmtpFake, type SmtpFake } from '../mail/smtpFake';
import { startChild, typescript } from '../platform/children';
import { agreedSked } from './agreedSked';
import { wrongWithReminders } from './remindersDue';
import { newWorld, type World } from './world';

const A = 'QA1LUN';
const B = 'QB7TID';

let world: World;
let fake: SmtpFake | undefined;
const children: ReturnType<typeof startChild>[] = [];

beforeEach(async () => {
  world = await newWorld();
  // The worker runs on the real clock.
  world.clock.nowMs = Date.now();
});
afterEach(async () => {
  for (const { child } of children.splice(0)) child.kill('SIGKILL');
  await fake?.stop();
  fake = undefined;
  await world.close();
});

function startWorker(port: number) {
  const worker = startChild(typescript('src/worker/main.ts'), {
    PUBLIC_URL: 'https://echotide.example',
    DATA_DIR: world.folder,
    SMTP_HOST: '127.0.0.1',
    SMTP_PORT: String(port),
    SMTP_TLS: 'none',
    MAIL_FROM: 'Echotide <echotide@echotide.example>',
    MAIL_LEASE_SECONDS: '2',
    LOG_LEVEL: 'silent',
  });
  children.push(worker);
  return worker;
}

async function until(holds: () => boolean | Promise<boolean>): Promise<void> {
  const endMs = Date.now() + 40_000;
  while (!(await holds())) {
    if (Date.now() > endMs) throw new Error('It did not come about within 40 s.');
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}

const reminders = () => world.services.db.selectFrom('reminder').selectAll().execute();
const messageIds = (sources: readonly string[]) =>
  sources.map((source) => /^Message-ID: (.+?)\r?$/m.exec(source)?.[1]);

/** A sked whose one-hour reminder is due after so many milliseconds. */
async function dueIn(ms: number): Promise<string> {
  const startMs = Date.now() + HOUR_MS + ms;
  world.clock.nowMs = Date.now() - 3 * HOUR_MS;
  const id = await agreedSked(world, [A, B], { startMs, endMs: startMs + 30 * MINUTE_MS });
  world.clock.nowMs = Date.now();
  return id;
}

it('sends once what was queued before the worker was killed', async () => {
  // The mail server takes nothing while the first worker lives; it is killed with its mails queued.
  fake = await startSmtpFake((connection) => (connection === 1 ? { greeting: 'hang' } : {}));
  await dueIn(0);
  const first = startWorker(fake.port);
  await until(async () => (await reminders()).some((row) => row.queued_at !== null));
  first.child.kill('SIGKILL');
  await first.ended;
  const second = startWorker(fake.port);
  await until(async () => (await world.mails()).filter((mail) => mail.sent_at).length === 2);
  second.child.kill('SIGTERM');
  await second.ended;
  const mails = (await world.mails()).filter((mail) => mail.topic === 'reminder');
  expect(mails).toHaveLength(2);
  // Each of the two was queued once; a copy after a kill has the same Message-ID.
  expect(new Set(messageIds(fake.received))).toEqual(new Set(mails.map((mail) => mail.message_id)));
  expect(fake.received[0]).toContain('List-Unsubscribe-Post: List-Unsubscribe=One-Click');
  world.clock.nowMs = Date.now();
  expect(await wrongWithReminders(world.services)).toEqual([]);
}, 120_000);

it('sends none when the sked is cancelled while the worker lies killed with its mails queued', async () => {
  fake = await startSmtpFake((connection) => (connection <= 2 ? { greeting: 'hang' } : {}));
  const id = await dueIn(0);
  const first = startWorker(fake.port);
  await until(async () => (await reminders()).filter((row) => row.queued_at !== null).length === 2);
  await until(() => fake!.connections() === 2);
  first.child.kill('SIGKILL');
  await first.ended;
  world.clock.nowMs = Date.now();
  await cancelSked(world.services, world.people[A]!, id, { version: 2, words: '' });
  const second = startWorker(fake.port);
  const isReminder = (mail: { topic: string }) => mail.topic === 'reminder';
  await until(async () =>
    (await world.mails()).filter(isReminder).every((mail) => mail.set_aside_at !== null),
  );
  await until(async () =>
    (await world.mails())
      .filter((mail) => !isReminder(mail))
      .every((mail) => mail.sent_at !== null),
  );
  second.child.kill('SIGTERM');
  await second.ended;
  const ids = messageIds(fake.received);
  for (const mail of (await world.mails()).filter(isReminder)) {
    expect(mail).toMatchObject({ sent_at: null, last_error: expect.stringMatching(/^Dropped: /) });
    expect(ids).not.toContain(mail.message_id);
  }
  expect((await reminders()).filter((row) => row.queued_at && !row.dropped_at)).toEqual([]);
}, 120_000);

it('loses and doubles none, whenever it is killed', async () => {
  fake = await startSmtpFake(() => ({}));
  const skeds = 24;
  for (let n = 0; n < skeds; n += 1) {
    const startMs = Date.now() + HOUR_MS + n * 250 + n;
    world.clock.nowMs = Date.now() - 3 * HOUR_MS;
    // Each pair has its slots one after the other, so that the bookings do not overlap.
    await world.services.db.deleteFrom('booking').execute();
    await agreedSked(world, [A, B], { startMs, endMs: startMs + 1000 });
  }
  for (const afterMs of [700, 1100, 900, 1500, 1300, 1800]) {
    const worker = startWorker(fake.port);
    await worker.ready;
    await new Promise((resolve) => setTimeout(resolve, afterMs));
    worker.child.kill('SIGKILL');
    await worker.ended;
  }
  const last = startWorker(fake.port);
  const sent = async () => (await world.mails()).filter((mail) => mail.sent_at !== null).length;
  await until(async () => (await sent()) === skeds * 2);
  last.child.kill('SIGTERM');
  await last.ended;
  const mails = (await world.mails()).filter((mail) => mail.topic === 'reminder');
  expect(mails).toHaveLength(skeds * 2);
  expect(new Set(mails.map((mail) => mail.reminder_id)).size).toBe(skeds * 2);
  expect(new Set(messageIds(fake.received))).toEqual(new Set(mails.map((mail) => mail.message_id)));
  world.clock.nowMs = Date.now();
  expect(await wrongWithReminders(world.services)).toEqual([]);
}, 180_000);
