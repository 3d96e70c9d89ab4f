import { fork, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import path from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { overlaps } from '~/domain/time/interval';
import type { Order } from './acceptWorker';
import { commonWindows, newWorld, NOW_MS, offerFrom, slotIn, type World } from './world';

const ROUNDS = 60;
let world: World;
let processes: ChildProcess[] = [];

beforeAll(async () => {
  world = await newWorld();
  processes = await Promise.all([startProcess(), startProcess()]);
});
afterAll(async () => {
  for (const child of processes) {
    const ended = once(child, 'exit');
    child.send('end');
    await ended;
  }
  await world.close();
});

async function startProcess(): Promise<ChildProcess> {
  const child = fork(path.join(import.meta.dirname, 'acceptWorker.ts'), {
    execArgv: ['--import', 'tsx'],
    env: {
      ...process.env,
      PUBLIC_URL: 'http://127.0.0.1:4999',
      DATA_DIR: world.folder,
      SMTP_HOST: '127.0.0.1',
      MAIL_FROM: 'mail@echotide.example',
      LOG_LEVEL: 'silent',
    },
  });
  await once(child, 'message');
  return child;
}

async function give(child: ChildProcess, order: Order): Promise<string> {
  const answered = once(child, 'message');
  child.send(order);
  return ((await answered) as [string])[0];
}

it('lets exactly one of two processes agree overlapping skeds of one station, in every round', async () => {
  const windows = commonWindows(['QA1LUN', 'QB7TID', 'QC2FAR']);
  const winners = [0, 0];
  for (let round = 0; round < ROUNDS; round += 1) {
    const window = windows[round % windows.length]!;
    const startMinute = 2 * round;
    const slots = [
      slotIn(window, startMinute % 60, 30),
      slotIn(window, (startMinute % 60) + 15, 30),
    ];
    const fromB = await offerFrom(world, 'QB7TID', ['QA1LUN'], slots[0]!);
    const fromC = await offerFrom(world, 'QC2FAR', ['QA1LUN'], slots[1]!);
    const order = (skedId: string): Order => ({
      skedId,
      version: 1,
      viewer: world.people['QA1LUN']!,
      nowMs: NOW_MS,
      beginAtMs: Date.now() + 15,
    });
    const outcomes = await Promise.all([
      give(processes[0]!, order(fromB.id)),
      give(processes[1]!, order(fromC.id)),
    ]);
    const won = outcomes.map((outcome) => outcome === 'accepted');
    expect(won.filter(Boolean), outcomes.join(' | ')).toHaveLength(1);
    expect(outcomes.find((outcome) => outcome !== 'accepted')).toMatch(
      /^conflict: QA1LUN has another agreed sked/,
    );
    winners[won.indexOf(true)]! += 1;
    const agreed = await world.services.db
      .selectFrom('sked')
      .select('id')
      .where('id', 'in', [fromB.id, fromC.id])
      .where('state', '=', 'agreed')
      .execute();
    expect(agreed).toHaveLength(1);
    await expectNoOverlap();
    // The next round wants the station free again.
    await world.services.db.deleteFrom('booking').execute();
  }
  expect(winners[0]! + winners[1]!).toBe(ROUNDS);
  const entries = (await world.mails()).filter((mail) =>
    mail.calendar_body?.includes('STATUS:CONFIRMED'),
  );
  expect(entries).toHaveLength(2 * ROUNDS);
}, 120_000);

async function expectNoOverlap() {
  const bookings = await world.services.db.selectFrom('booking').selectAll().execute();
  for (const one of bookings) {
    for (const other of bookings) {
      if (one.station_id !== other.station_id || one.sked_id === other.sked_id) continue;
      const [a, b] = [one, other].map((row) => ({ startMs: row.start_at, endMs: row.end_at }));
      expect(overlaps(a!, b!)).toBe(false);
    }
  }
}

it('is refused by the database itself when code forgets to look', async () => {
  const { db } = world.services;
  const slot = slotIn(commonWindows(['QA1LUN', 'QB7TID'])[0]!, 10);
  const one = await offerFrom(world, 'QA1LUN', ['QB7TID'], slot);
  const two = await offerFrom(world, 'QA1LUN', ['QB7TID'], slot);
  const row = {
    station_id: world.stationIds['QA1LUN']!,
    start_at: slot.startMs,
    end_at: slot.endMs,
  };
  await db
    .insertInto('booking')
    .values({ ...row, sked_id: one.id })
    .execute();
  await expect(
    db
      .insertInto('booking')
      .values({ ...row, sked_id: two.id })
      .execute(),
  ).rejects.toThrow('doubleBooking');
});
