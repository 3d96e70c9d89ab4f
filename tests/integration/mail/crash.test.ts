import { afterEach, beforeEach, expect, it } from 'vitest';
import { startChild, typescript } from '../platform/children';
import { openGround, type Ground } from '../platform/ground';
import { ENTRY_UID, post, rowOf } from './letters';
import { startSmtpFake, type SmtpFake } from './smtpFake';

let ground: Ground | undefined;
let fake: SmtpFake | undefined;
const children: ReturnType<typeof startChild>[] = [];

beforeEach(() => {
  ground = undefined;
});
afterEach(async () => {
  for (const { child } of children.splice(0)) child.kill('SIGKILL');
  await fake?.stop();
  await ground?.end();
});

function startWorker(env: Record<string, string>) {
  const worker = startChild(typescript('src/worker/main.ts'), env);
  children.push(worker);
  return worker;
}

async function until(holds: () => boolean | Promise<boolean>): Promise<void> {
  while (!(await holds())) await new Promise((resolve) => setTimeout(resolve, 50));
}

it('sends a mail again, the same one, when the worker is killed between sending and noting it', async () => {
  // The server has the whole mail; the worker dies before it can hear so.
  fake = await startSmtpFake((connection) =>
    connection === 1 ? { taken: () => children[0]?.child.kill('SIGKILL'), message: 'hang' } : {},
  );
  ground = await openGround({ SMTP_PORT: String(fake.port), MAIL_LEASE_SECONDS: '2' });
  const started = ground;
  // The worker runs on the real clock.
  started.passMs(Date.now() - started.now());
  const id = await post(started);
  const first = startWorker(started.env);
  await first.ended;
  expect(fake.received).toHaveLength(1);
  expect(await rowOf(started, id)).toMatchObject({ sent_at: null, attempts: 1 });

  const second = startWorker(started.env);
  await until(async () => (await rowOf(started, id)).sent_at !== null);
  expect(fake.received).toHaveLength(2);
  const [before, after] = fake.received.map(essence);
  expect(before).toEqual(after);
  expect(before?.messageId).toBe((await rowOf(started, id)).message_id);
  expect(before?.uid).toBe(ENTRY_UID);

  second.child.kill('SIGTERM');
  expect((await second.ended).code).toBe(0);
  expect(fake.received).toHaveLength(2);
}, 120_000);

it('finishes the mail under way when asked to stop, and leaves the next', async () => {
  const script = { taken: () => children[0]?.child.kill('SIGTERM') };
  fake = await startSmtpFake(() => script);
  ground = await openGround({ SMTP_PORT: String(fake.port) });
  const started = ground;
  started.passMs(Date.now() - started.now());
  const id = await post(started);
  const worker = startWorker(started.env);
  expect((await worker.ended).code).toBe(0);
  expect((await rowOf(started, id)).sent_at).not.toBeNull();
  const later = await post(started);
  await new Promise((resolve) => setTimeout(resolve, 300));
  expect((await rowOf(started, later)).attempts).toBe(0);
}, 120_000);

/** What makes two copies one mail for those who get them. */
function essence(source: string) {
  const base64 = /application\/ics[\s\S]*?\r\n\r\n([A-Za-z0-9+/=\r\n]+)/.exec(source)?.[1] ?? '';
  const entry = Buffer.from(base64, 'base64').toString('utf8');
  return {
    messageId: /^Message-ID: (.+?)\r?$/m.exec(source)?.[1],
    date: /^Date: (.+?)\r?$/m.exec(source)?.[1],
    uid: /^UID:(.+?)\r?$/m.exec(entry)?.[1],
    sequence: /^SEQUENCE:(.+?)\r?$/m.exec(entry)?.[1],
  };
}
