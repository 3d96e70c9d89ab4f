import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { backoffMs } from '~/server/mail/backoff';
import { deliverDue } from '~/server/mail/deliver';
import { smtpTransport } from '~/server/mail/transport';
import { openGround, type Ground } from '../platform/ground';
import { post, rowOf } from './letters';
import { startSmtpFake, type Script, type SmtpFake } from './smtpFake';

let ground: Ground;
let fake: SmtpFake | undefined;
beforeEach(async () => {
  ground = await openGround();
});
afterEach(async () => {
  await fake?.stop();
  fake = undefined;
  await ground.end();
});

async function serve(scriptFor: (connection: number) => Script): Promise<SmtpFake> {
  fake = await startSmtpFake(scriptFor);
  return fake;
}

function deliver(leaseMs = 60_000, atOnce = 4): Promise<number> {
  const { config } = ground;
  const smtp = { ...config.smtp, port: fake?.port ?? config.smtp.port };
  return deliverDue(ground, { send: smtpTransport({ ...config, smtp }), leaseMs, atOnce });
}

describe('deliverDue', () => {
  it('sends what is due, once', async () => {
    const { received } = await serve(() => ({}));
    const id = await post(ground);
    const row = await rowOf(ground, id);
    expect(await deliver()).toBe(1);
    expect(await deliver()).toBe(0);
    expect(received).toHaveLength(1);
    expect(received[0]).toContain(`Message-ID: ${row.message_id}`);
    expect(await rowOf(ground, id)).toMatchObject({
      sent_at: ground.now(),
      leased_until: null,
      attempts: 1,
    });
  });

  it.each<[string, Script, RegExp]>([
    ['450 to the recipient', { rcpt: '450 4.2.1 mailbox busy' }, /450 4\.2\.1 mailbox busy/],
    ['451 to the message', { message: '451 4.3.0 try later' }, /451 4\.3\.0 try later/],
    ['421 as a greeting', { greeting: '421 4.3.2 closing down' }, /421/],
    ['554 as a greeting, which is about us', { greeting: '554 5.7.1 not you' }, /554/],
    ['a line cut after the message', { message: 'drop' }, /closed|ECONN|ESOCKET/i],
    ['a line cut at the greeting', { greeting: 'drop' }, /closed|ECONN|ESOCKET/i],
  ])('tries again later after %s', async (_name, script, reason) => {
    const { received } = await serve((connection) => (connection === 1 ? script : {}));
    const id = await post(ground);
    expect(await deliver()).toBe(1);
    const failed = await rowOf(ground, id);
    expect(failed).toMatchObject({ sent_at: null, set_aside_at: null, leased_until: null });
    expect(failed.last_error).toMatch(reason);
    const waitMs = failed.next_attempt_at - ground.now();
    expect(waitMs).toBeGreaterThanOrEqual(7500);
    expect(waitMs).toBeLessThanOrEqual(15_000);

    expect(await deliver()).toBe(0);
    ground.passMs(15_000);
    expect(await deliver()).toBe(1);
    expect(await rowOf(ground, id)).toMatchObject({ sent_at: ground.now(), last_error: null });
    expect(received.at(-1)).toContain(failed.message_id);
  });

  it('tries again when nobody answers at the address', async () => {
    const id = await post(ground);
    await deliver();
    expect((await rowOf(ground, id)).last_error).toMatch(/ECONNREFUSED|ESOCKET/);
  });

  it.each<[string, Script]>([
    ['sender', { mail: '550 5.1.8 no such sender' }],
    ['recipient', { rcpt: '550 5.1.1 no such person' }],
    ['message', { message: '554 5.6.0 not this' }],
  ])('sets a mail aside after a 5xx to its %s', async (_name, script) => {
    const { connections } = await serve(() => script);
    const id = await post(ground);
    await deliver();
    const row = await rowOf(ground, id);
    expect(row).toMatchObject({ set_aside_at: ground.now(), sent_at: null, leased_until: null });
    expect(row.last_error).toMatch(/55[04] 5\.\d\.\d (no such|not this)/);
    ground.passMs(7 * 86_400_000);
    expect(await deliver()).toBe(0);
    expect(connections()).toBe(1);
  });

  it('gives up on a silent server before the lease ends, and does not hold up other mails', async () => {
    const { received } = await serve((connection) => (connection === 1 ? { rcpt: 'hang' } : {}));
    const slow = await post(ground);
    ground.passMs(1);
    const startedAt = performance.now();
    const first = deliver(2000, 1);
    const quick = await post(ground, { to: 'edda@qb7tid.example' });
    await deliver(2000, 1);
    expect((await rowOf(ground, quick)).sent_at).not.toBeNull();
    await first;
    expect(performance.now() - startedAt).toBeLessThan(2000);
    expect(await rowOf(ground, slow)).toMatchObject({ sent_at: null, set_aside_at: null });
    expect(received).toHaveLength(1);
  });

  it('never gives one mail to two workers at the same time', async () => {
    const { received } = await serve(() => ({}));
    for (let n = 0; n < 20; n += 1) await post(ground);
    const tried = await Promise.all(Array.from({ length: 8 }, () => deliver(60_000, 5)));
    expect(tried.reduce((sum, count) => sum + count)).toBe(20);
    const ids = received.map((source) => /Message-ID: (\S+)/.exec(source)?.[1]);
    expect(new Set(ids).size).toBe(20);
  });

  it('takes over the mail of a worker that died, when its lease is over', async () => {
    await serve(() => ({}));
    const id = await post(ground);
    await ground.db
      .updateTable('outbox')
      .set({ leased_until: ground.now() + 60_000, attempts: 1 })
      .execute();
    expect(await deliver()).toBe(0);
    ground.passMs(60_000);
    expect(await deliver()).toBe(1);
    expect(await rowOf(ground, id)).toMatchObject({ sent_at: ground.now(), attempts: 2 });
  });
});

describe('backoffMs', () => {
  it('doubles from 15 s up to one hour, less a random part of at most a half', () => {
    const usual = { firstMs: 15_000, longestMs: 3_600_000 };
    const longest = [1, 2, 3, 9, 50].map((attempts) => backoffMs(attempts, 0.999_999_9, usual));
    expect(longest).toEqual([15_000, 30_000, 60_000, 3_600_000, 3_600_000]);
    expect([1, 9].map((attempts) => backoffMs(attempts, 0, usual))).toEqual([7500, 1_800_000]);
  });
});
