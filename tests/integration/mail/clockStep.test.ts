import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { jobsOf } from '~/server/jobs';
import { startJobs } from '~/server/jobs/runner';
import { NotTaken } from '~/server/mail/transport';
import { deliverDue } from '~/server/mail/deliver';
import { limitWaits } from '~/server/mail/limitWaits';
import { openGround, type Ground } from '../platform/ground';
import { post, rowOf } from './letters';
import { startSmtpFake, type SmtpFake } from './smtpFake';

const HOUR_MS = 3_600_000;
let ground: Ground;
let fake: SmtpFake | undefined;
let stop: (() => Promise<void>) | undefined;
beforeEach(async () => {
  fake = await startSmtpFake(() => ({}));
  ground = await openGround({ SMTP_PORT: String(fake.port), MAIL_LEASE_SECONDS: '2' });
});
afterEach(async () => {
  await stop?.();
  stop = undefined;
  await fake?.stop();
  await ground.end();
});

/** The worker in this process, on a clock that runs and can be set. Returns how to set it. */
function runWorker(): (byMs: number) => void {
  const begunMs = Date.now();
  stop = startJobs(jobsOf({ ...ground, now: () => ground.now() + Date.now() - begunMs }));
  return ground.passMs;
}

async function secondsUntilSent(id: string, atMostS: number): Promise<number> {
  const begunMs = performance.now();
  for (;;) {
    const seconds = (performance.now() - begunMs) / 1000;
    if ((await rowOf(ground, id)).sent_at !== null || seconds > atMostS) return seconds;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}

/** As a worker leaves a mail that dies while it sends. */
async function leaveLeased(id: string) {
  await ground.db
    .updateTable('outbox')
    .set({ leased_until: ground.now() + ground.config.mailLeaseMs, attempts: 1 })
    .where('id', '=', id)
    .execute();
}

describe('the clock of the worker', () => {
  it.each([
    ['back', -HOUR_MS],
    ['forth', HOUR_MS],
  ])(
    'goes an hour %s: the mail of a dead worker waits no longer than its lease',
    async (_, step) => {
      const id = await post(ground);
      await leaveLeased(id);
      ground.passMs(step);
      runWorker();
      expect(await secondsUntilSent(id, 8)).toBeLessThan(2 + 3);
      expect(fake!.received).toHaveLength(1);
    },
  );

  it('goes back and forth again while mails come: each is sent once, none waits', async () => {
    const setClock = runWorker();
    const ids: string[] = [];
    for (const step of [0, -HOUR_MS, 0, HOUR_MS, HOUR_MS, -HOUR_MS, -24 * HOUR_MS, 24 * HOUR_MS]) {
      // Written before the step with the clock as it was, found by the worker after it.
      ids.push(await post(ground));
      setClock(step);
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
    for (const id of ids) expect(await secondsUntilSent(id, 8)).toBeLessThan(4);
    expect(fake!.received).toHaveLength(ids.length);
  });

  it('goes back: a mail to be tried again waits no longer than its backoff allows', async () => {
    const id = await post(ground);
    const refuse = () => Promise.reject(new NotTaken('not now', false));
    await deliverDue(ground, { send: refuse, leaseMs: 2000, atOnce: 1 });
    ground.passMs(-HOUR_MS);
    await limitWaits(ground);
    expect((await rowOf(ground, id)).next_attempt_at).toBe(ground.now() + 15_000);
  });

  it('stays: no wait is touched', async () => {
    const refused = await post(ground);
    const refuse = () => Promise.reject(new NotTaken('not now', false));
    await deliverDue(ground, { send: refuse, leaseMs: 2000, atOnce: 1 });
    const leased = await post(ground);
    await leaveLeased(leased);
    const before = await Promise.all([rowOf(ground, refused), rowOf(ground, leased)]);
    await limitWaits(ground);
    expect(await Promise.all([rowOf(ground, refused), rowOf(ground, leased)])).toEqual(before);
  });

  it('goes forth while a mail is under way: the attempt that ends late does not undo the next', async () => {
    const id = await post(ground);
    let endFirst: (error: Error) => void = () => undefined;
    const slow = () => new Promise<void>((_, reject) => (endFirst = reject));
    const first = deliverDue(ground, { send: slow, leaseMs: 60_000, atOnce: 1 });
    while ((await rowOf(ground, id)).attempts === 0) await Promise.resolve();
    ground.passMs(HOUR_MS);
    let endSecond: () => void = () => undefined;
    const taken = () => new Promise<void>((resolve) => (endSecond = resolve));
    const second = deliverDue(ground, { send: taken, leaseMs: 60_000, atOnce: 1 });
    while ((await rowOf(ground, id)).attempts === 1) await Promise.resolve();
    const underWay = await rowOf(ground, id);
    endFirst(new NotTaken('550 no such person', true));
    await first;
    expect(await rowOf(ground, id)).toEqual(underWay);
    endSecond();
    await second;
    expect(await rowOf(ground, id)).toMatchObject({ sent_at: ground.now(), set_aside_at: null });
  });
});
