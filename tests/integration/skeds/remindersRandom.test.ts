import fc from 'fast-check';
import { expect, it } from 'vitest';
import { DEFAULT_MAIL_PREFERENCE, REMINDER_CHOICES } from '~/domain/people/mailPreference';
import { DAY_MS, HOUR_MS, MINUTE_MS } from '~/domain/time/interval';
import type { OutboxRow } from '~/server/db/tables';
import { deliverDue } from '~/server/mail/deliver';
import { saveMailPreference, switchTopic } from '~/server/people/saveMailPreference';
import { keepReminders } from '~/server/reminders/keepReminders';
import { queueReminders } from '~/server/reminders/queueReminders';
import { agreedSked } from './agreedSked';
import { wrongWithReminders } from './remindersDue';
import { newWorld, NOW_MS, type World } from './world';

const CREWS = ['QA1LUN', 'QB7TID', 'QC2FAR'] as const;
const minutesOf = REMINDER_CHOICES.map(({ minutes }) => minutes);

/** Something that happens to the skeds, their people, the clock or the worker. */
const step = fc.oneof(
  { weight: 5, arbitrary: fc.record({ do: fc.constant('pass'), minutes: fc.nat(1500) }) },
  {
    weight: 1,
    arbitrary: fc.record({
      do: fc.constant('jump'),
      minutes: fc.integer({ min: -4000, max: 4000 }),
    }),
  },
  {
    weight: 3,
    arbitrary: fc.record({
      do: fc.constant('agree'),
      pair: fc.nat(2),
      inMinutes: fc.integer({ min: 5, max: 12_000 }),
    }),
  },
  {
    weight: 2,
    arbitrary: fc.record({
      do: fc.constant('move'),
      which: fc.nat(9),
      byMinutes: fc.integer({ min: -300, max: 3000 }),
    }),
  },
  { weight: 1, arbitrary: fc.record({ do: fc.constant('cancel'), which: fc.nat(9) }) },
  {
    weight: 2,
    arbitrary: fc.record({
      do: fc.constant('wish'),
      who: fc.nat(2),
      minutes: fc.subarray(minutesOf),
      report: fc.boolean(),
    }),
  },
  {
    weight: 1,
    arbitrary: fc.record({ do: fc.constant('switch'), who: fc.nat(2), on: fc.boolean() }),
  },
  {
    weight: 1,
    arbitrary: fc.record({ do: fc.constant('crew'), who: fc.nat(2), station: fc.nat(2) }),
  },
  {
    weight: 1,
    arbitrary: fc.record({ do: fc.constant('report'), which: fc.nat(9), party: fc.nat(1) }),
  },
  { weight: 5, arbitrary: fc.record({ do: fc.constant('keep') }) },
  { weight: 5, arbitrary: fc.record({ do: fc.constant('queue') }) },
  {
    weight: 4,
    arbitrary: fc.record({ do: fc.constant('deliver'), most: fc.integer({ min: 1, max: 20 }) }),
  },
);
type Step = typeof step extends fc.Arbitrary<infer T> ? T : never;

it('are what follows from skeds, crews and wishes, none twice and none of what is no more', async () => {
  await fc.assert(
    fc.asyncProperty(fc.array(step, { minLength: 20, maxLength: 60 }), async (steps) => {
      const world = await newWorld();
      try {
        await live(world, steps);
      } finally {
        await world.close();
      }
    }),
    { numRuns: Number(process.env['REMINDER_RUNS'] ?? 25) },
  );
}, 300_000);

async function live(world: World, steps: readonly Step[]): Promise<void> {
  const skeds: string[] = [];
  const sent: OutboxRow[] = [];
  for (const one of steps) await take(world, one, skeds, sent);
  await keepReminders(world.services);
  expect(await wrongWithReminders(world.services)).toEqual([]);
  expect(await keepReminders(world.services), 'a second look changes nothing').toBe(0);
  expect(new Set(sent.map((mail) => mail.reminder_id)).size).toBe(sent.length);
}

async function take(world: World, one: Step, skeds: string[], sent: OutboxRow[]): Promise<void> {
  const { services, clock, stationIds } = world;
  const { db } = services;
  const person = (n: number) => world.people[CREWS[n]!]!;
  if (one.do === 'pass') clock.nowMs += one.minutes * MINUTE_MS;
  if (one.do === 'jump') clock.nowMs = Math.max(NOW_MS, clock.nowMs + one.minutes * MINUTE_MS);
  if (one.do === 'agree') {
    const startMs = clock.nowMs + one.inMinutes * MINUTE_MS;
    const pair = CREWS.filter((_, n) => n !== one.pair);
    await db.deleteFrom('booking').execute();
    skeds.push(await agreedSked(world, pair, { startMs, endMs: startMs + HOUR_MS }));
  }
  if (one.do === 'move' || one.do === 'cancel') {
    const id = skeds[one.which % Math.max(1, skeds.length)];
    if (id === undefined) return;
    const cancelled = one.do === 'cancel';
    // Moved and agreed anew at once, or gone: what the use cases leave behind, without the Moon.
    const row = await db
      .selectFrom('sked')
      .selectAll()
      .where('id', '=', id)
      .executeTakeFirstOrThrow();
    if (row.state !== 'agreed') return;
    const byMs = cancelled ? 0 : one.byMinutes * MINUTE_MS;
    const version = row.version + 1;
    await db
      .updateTable('sked')
      .set({
        version,
        state: cancelled ? 'cancelled' : 'agreed',
        agreed_version: cancelled ? null : version,
        start_at: row.start_at + byMs,
        end_at: row.end_at + byMs,
      })
      .where('id', '=', id)
      .execute();
    await db
      .insertInto('sked_event')
      .values({
        id: `${id} ${version}`,
        sked_id: id,
        sked_version: version,
        kind: cancelled ? 'cancelled' : 'agreed',
        station_id: null,
        person_id: null,
        start_at: row.start_at + byMs,
        end_at: row.end_at + byMs,
        at: clock.nowMs,
      })
      .execute();
  }
  if (one.do === 'wish') {
    await saveMailPreference(services, person(one.who), {
      ...DEFAULT_MAIL_PREFERENCE,
      reminderMinutes: one.minutes,
      reportReminders: one.report,
    });
  }
  if (one.do === 'switch') await switchTopic(services, person(one.who).id, 'reminder', one.on);
  if (one.do === 'crew') {
    const place = { station_id: stationIds[CREWS[one.station]!]!, person_id: person(one.who).id };
    const gone = await db
      .deleteFrom('station_crew')
      .where('station_id', '=', place.station_id)
      .where('person_id', '=', place.person_id)
      .executeTakeFirst();
    if (gone.numDeletedRows === 0n) {
      await db
        .insertInto('station_crew')
        .values({ ...place, crew_role: 'operator', added_at: clock.nowMs })
        .execute();
    }
  }
  if (one.do === 'report') {
    const id = skeds[one.which % Math.max(1, skeds.length)];
    const row =
      id && (await db.selectFrom('sked').selectAll().where('id', '=', id).executeTakeFirst());
    if (!row || !row.agreed_version || row.start_at > clock.nowMs) return;
    const parties = await db
      .selectFrom('sked_party')
      .selectAll()
      .where('sked_id', '=', row.id)
      .execute();
    await db
      .insertInto('sked_report')
      .values({
        sked_id: row.id,
        station_id: parties[one.party]!.station_id,
        person_id: person(0).id,
        result: 'completed',
        at: clock.nowMs,
      })
      .onConflict((conflict) => conflict.doNothing())
      .execute();
    await db.updateTable('sked').set({ state: 'reported' }).where('id', '=', row.id).execute();
  }
  if (one.do === 'keep') {
    await keepReminders(services);
    expect(await wrongWithReminders(services)).toEqual([]);
  }
  if (one.do === 'queue') await queueReminders(services);
  if (one.do === 'deliver') {
    const send = async (mail: OutboxRow) => {
      sent.push(mail);
      await expectTrue(world, mail);
    };
    await deliverDue(services, { send, leaseMs: HOUR_MS, atOnce: one.most });
  }
}

/** What leaves is about a sked that stands as it says, to somebody in it. */
async function expectTrue({ services, clock }: World, mail: OutboxRow): Promise<void> {
  const row = await services.db
    .selectFrom('reminder')
    .innerJoin('sked', 'sked.id', 'reminder.sked_id')
    .innerJoin('sked_party', 'sked_party.sked_id', 'sked.id')
    .innerJoin('station_crew', 'station_crew.station_id', 'sked_party.station_id')
    .select(['reminder.kind', 'reminder.agreed_version', 'sked.agreed_version as now_agreed'])
    .select(['sked.start_at', 'sked.end_at'])
    .where('reminder.id', '=', mail.reminder_id)
    .whereRef('station_crew.person_id', '=', 'reminder.person_id')
    .executeTakeFirst();
  expect(row, 'to somebody in the crew').toBeDefined();
  expect(row!.now_agreed).toBe(row!.agreed_version);
  if (row!.kind === 'before') expect(row!.start_at).toBeGreaterThan(clock.nowMs);
  else expect(clock.nowMs - row!.end_at).toBeLessThan(5 * DAY_MS);
}
