import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { DEFAULT_MAIL_PREFERENCE, type MailPreference } from '~/domain/people/mailPreference';
import { DAY_MS, HOUR_MS, MINUTE_MS } from '~/domain/time/interval';
import { sendDigests } from '~/server/digest/sendDigests';
import { saveMailPreference, switchTopic } from '~/server/people/saveMailPreference';
import { agreedSked } from './agreedSked';
import { commonWindows, newWorld, offerFrom, slotIn, type World } from './world';

const A = 'QA1LUN';
const B = 'QB7TID';

let world: World;
beforeEach(async () => {
  world = await newWorld();
});
afterEach(() => world.close());

const digests = async () => (await world.mails()).filter((mail) => mail.topic === 'digest');
const wish = (digest: MailPreference['digest'], callSign = B) =>
  saveMailPreference(world.services, world.people[callSign]!, {
    ...DEFAULT_MAIL_PREFERENCE,
    digest,
  });
async function at(nowMs: number): Promise<number> {
  world.clock.nowMs = nowMs;
  return sendDigests(world.services);
}

describe('the digest', () => {
  it('comes at the hour of the person, with what waits, once, and not while nothing does', async () => {
    await wish({ rhythm: 'daily', hour: 7, weekday: 1 });
    // 07:00 EST on Tue 19 Jan: nothing waits yet.
    const turn = Date.UTC(2027, 0, 19, 12);
    expect(await at(turn)).toBe(0);
    const window = commonWindows([A, B]).find(({ startMs }) => startMs > turn + 2 * DAY_MS)!;
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    // What came after the turn waits for the next one.
    expect(await at(turn + HOUR_MS)).toBe(0);
    expect(await at(turn + DAY_MS - 1)).toBe(0);
    expect(await at(turn + DAY_MS)).toBe(1);
    expect(await at(turn + DAY_MS + MINUTE_MS)).toBe(0);
    const [mail, ...more] = await digests();
    expect(more).toEqual([]);
    expect(mail).toMatchObject({
      recipient: world.people[B]!.email,
      subject: 'Waits for you: 1 offer to answer',
      person_id: world.people[B]!.id,
      sked_id: null,
    });
    expect(mail!.text_body).toMatch(/Answer: QA1LUN, 1296 MHz, .* UTC, .* EST\. Lapses in /);
    expect(mail!.text_body).toContain('http://127.0.0.1:4999/account/mail');
    expect(mail!.unsubscribe_url).toMatch(/\/unsubscribe\/person-edda\.digest\./);
    expect(id).toBeTruthy();
  });

  it('asks for results for two weeks', async () => {
    await wish({ rhythm: 'daily', hour: 7, weekday: 1 });
    const startMs = world.clock.nowMs + HOUR_MS;
    await agreedSked(world, [A, B], { startMs, endMs: startMs + HOUR_MS });
    expect(await at(Date.UTC(2027, 0, 19, 12))).toBe(1);
    expect((await digests())[0]!.subject).toBe('Waits for you: 1 sked to report');
    expect(await at(Date.UTC(2027, 0, 31, 12))).toBe(1);
    expect(await at(Date.UTC(2027, 1, 3, 12))).toBe(0);
  });

  it('is weekly on the chosen day, and off when switched off', async () => {
    await wish({ rhythm: 'weekly', hour: 7, weekday: 3 });
    const startMs = world.clock.nowMs + HOUR_MS;
    await agreedSked(world, [A, B], { startMs, endMs: startMs + HOUR_MS });
    await switchTopic(world.services, world.people[A]!.id, 'digest', false);
    expect(await at(Date.UTC(2027, 0, 19, 12))).toBe(0);
    expect(await at(Date.UTC(2027, 0, 20, 12))).toBe(1);
    expect(await at(Date.UTC(2027, 0, 21, 12))).toBe(0);
    expect(await at(Date.UTC(2027, 0, 27, 11, 59))).toBe(0);
    expect(await at(Date.UTC(2027, 0, 27, 12))).toBe(1);
    expect(new Set((await digests()).map((mail) => mail.recipient))).toEqual(
      new Set([world.people[B]!.email]),
    );
  });

  it('comes once a day over a night in which the clocks change, whatever the server clock does', async () => {
    world.clock.nowMs = Date.UTC(2027, 2, 10);
    await wish({ rhythm: 'daily', hour: 2, weekday: 1 });
    await wish({ rhythm: 'daily', hour: 2, weekday: 1 }, A);
    await agreedSked(world, [A, B], {
      startMs: Date.UTC(2027, 2, 11),
      endMs: Date.UTC(2027, 2, 11, 1),
    });
    // New York puts its clocks forward at 02:00 on Sun 14 March; Stockholm on the 28th.
    const found: string[] = [];
    for (
      let nowMs = Date.UTC(2027, 2, 13);
      nowMs < Date.UTC(2027, 2, 16);
      nowMs += 20 * MINUTE_MS
    ) {
      for (const jump of [0, -3 * HOUR_MS, 0]) {
        if ((await at(nowMs + jump)) > 0) found.push(new Date(nowMs + jump).toISOString());
      }
    }
    const mine = (await digests()).filter((mail) => mail.recipient === world.people[B]!.email);
    expect(mine.map((mail) => new Date(mail.created_at).toISOString()).sort()).toEqual([
      '2027-03-13T07:00:00.000Z',
      '2027-03-14T07:00:00.000Z',
      '2027-03-15T06:00:00.000Z',
    ]);
    expect((await digests()).length).toBe(6);
    expect(found).toHaveLength(6);
  }, 60_000);

  it('is not sent to the locked or to guests', async () => {
    const { db } = world.services;
    const startMs = world.clock.nowMs + HOUR_MS;
    await agreedSked(world, [A, B], { startMs, endMs: startMs + HOUR_MS });
    await db.updateTable('person').set({ locked_at: 1 }).where('id', '=', 'person-ylva').execute();
    await db
      .updateTable('person')
      .set({ confirmed_at: null })
      .where('id', '=', 'person-edda')
      .execute();
    expect(await at(Date.UTC(2027, 0, 25, 13))).toBe(0);
  });
});
