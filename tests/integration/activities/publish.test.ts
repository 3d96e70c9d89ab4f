import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { overlapsOf } from '~/domain/activity/revision';
import { placesOf } from '~/domain/activity/timetable';
import { leftOutNow, type TimetableView } from '~/domain/activity/timetableView';
import { totalsOf } from '~/domain/activity/planView';
import { HOUR_MS, MINUTE_MS } from '~/domain/time/interval';
import { beginDraft } from '~/server/activities/beginDraft';
import { changeDraft } from '~/server/activities/changeDraft';
import { planCalendar } from '~/server/activities/planCalendar';
import { publicPlan } from '~/server/activities/publicPlan';
import { publishRevision } from '~/server/activities/publishRevision';
import { loadRevision, type StoredSlot } from '~/server/activities/revisions';
import { saveAnswer } from '~/server/activities/saveAnswer';
import { findActivity } from '~/server/activities/access';
import { Conflict } from '~/server/errors';
import { cancelSked } from '~/server/skeds/cancelSked';
import { moveSked } from '~/server/skeds/moveSked';
import { reportSked } from '~/server/skeds/reportSked';
import { answerForm, END_MS } from './world';
import {
  bookElsewhere,
  draftOf,
  GUEST_MAIL,
  mailMark,
  newPlanWorld,
  plan,
  readCalendar,
  REGISTERED,
  timetable,
  type PlanWorld,
} from './planWorld';

let world: PlanWorld;
beforeAll(async () => {
  world = await newPlanWorld();
}, 60_000);
afterAll(() => world.close());

const wishOf = (slot: Pick<StoredSlot, 'stationA' | 'stationB'>) =>
  [slot.stationA, slot.stationB].sort().join(' ');
const change = async (given: Parameters<typeof changeDraft>[3]['change'], version?: number) =>
  changeDraft(world.services, world.marit, world.slug, {
    version: version ?? (await draftOf(world)).row.version,
    change: given,
  });
const publish = async (note = '') =>
  publishRevision(world.services, world.marit, world.slug, {
    version: (await draftOf(world)).row.version,
    note,
  });
const freeStarts = (view: TimetableView, wishId: string) =>
  placesOf(view.problem, view.slots, wishId).filter(({ obstacles }) => obstacles.length === 0);
const callSignOf = (stationId: string) =>
  Object.entries(world.stationIds).find(([, id]) => id === stationId)![0];
const stateOfDatabase = async () => {
  const { db } = world.services;
  return Promise.all([
    db.selectFrom('sked').selectAll().execute(),
    db.selectFrom('booking').selectAll().execute(),
    db.selectFrom('activity_revision').selectAll().execute(),
    db.selectFrom('activity_slot').selectAll().execute(),
    db.selectFrom('outbox').select('id').execute(),
  ]);
};
const skeds = () =>
  world.services.db
    .selectFrom('sked')
    .selectAll()
    .where('activity_id', '=', world.activityId)
    .execute();

/** What publishing twice leaves behind, for the steps that come after. */
let firstPlan: StoredSlot[] = [];

describe('a plan from its first draft to its results', () => {
  it('becomes a draft without double bookings, with a reason for each wish left out', async () => {
    const draft = await plan(world);
    const view = await timetable(world);
    expect(draft.row).toMatchObject({ number: 1, state: 'draft' });
    expect(draft.slots.length).toBeGreaterThan(5);
    expect(overlapsOf(draft.slots)).toEqual([]);
    expect(view.problem.wishes).toHaveLength(15);
    for (const { why } of leftOutNow(view)) expect(why?.sentence).toMatch(/\w.*\.$/);
    expect(draft.slots.length + leftOutNow(view).length).toBe(15);
    for (const slot of draft.slots) {
      expect(slot.chance).toBeGreaterThan(0);
      expect(slot.marginDb).not.toBeNull();
    }
    const activity = await findActivity(world.services.db, world.slug);
    expect(activity!.state).toBe('planned');
  });

  it('is changed by hand, and what cannot be is refused in words', async () => {
    const before = await draftOf(world);
    const slot = before.slots[0]!;
    const wishId = wishOf(slot);
    const [target] = freeStarts(await timetable(world), wishId).filter(
      ({ startMs }) => startMs !== slot.startMs,
    );
    const placed = await change({
      kind: 'place',
      wishId,
      band: target!.band as '1296',
      start: target!.startMs,
    });
    expect(placed.version).toBe(before.row.version + 1);
    expect(placed.slot!.chance).toBeCloseTo(target!.chance, 6);
    await change({ kind: 'pin', wishId, pinned: true });
    const other = before.slots.at(-1)!;
    await change({ kind: 'remove', wishId: wishOf(other) });
    const now = await draftOf(world);
    expect(now.slots).toHaveLength(before.slots.length - 1);
    expect(now.slots.find((one) => wishOf(one) === wishId)).toMatchObject({
      startMs: target!.startMs,
      pinned: true,
    });

    await expect(
      change({ kind: 'remove', wishId: wishOf(other) }, before.row.version),
    ).rejects.toThrow('The draft changed since you opened it.');
    await expect(change({ kind: 'remove', wishId: wishOf(other) })).rejects.toThrow(
      'This wish has no slot in the plan.',
    );
    await expect(change({ kind: 'remove', wishId: 'nobody nowhere' })).rejects.toThrow(
      'no such wish',
    );
    const view = await timetable(world);
    const taken = placesOf(view.problem, view.slots, wishOf(other)).find(({ obstacles }) =>
      obstacles.some(({ kind }) => kind === 'taken'),
    );
    expect(taken).toBeDefined();
    await expect(
      change({
        kind: 'place',
        wishId: wishOf(other),
        band: taken!.band as '1296',
        start: taken!.startMs,
      }),
    ).rejects.toThrow(/Q\w+ has Q\w+ then, .* UTC\./);
    await expect(
      change({ kind: 'place', wishId, band: '1296', start: target!.startMs + MINUTE_MS }),
    ).rejects.toThrow('No slot can begin');
    expect(await draftOf(world)).toEqual(now);
  });

  it('keeps what is fixed when it is planned around', async () => {
    const before = await draftOf(world);
    const fixed = before.slots.find(({ pinned }) => pinned)!;
    const after = await plan(world, 'around');
    expect(after.row.number).toBe(1);
    expect(after.row.version).toBeGreaterThan(before.row.version);
    expect(after.slots.find((slot) => wishOf(slot) === wishOf(fixed))).toMatchObject({
      startMs: fixed.startMs,
      pinned: true,
    });
    const same = after.slots.filter((slot) =>
      before.slots.some((old) => wishOf(old) === wishOf(slot) && old.startMs === slot.startMs),
    );
    expect(same.length).toBeGreaterThanOrEqual(before.slots.length - 2);
  });

  it('is not published over a sked from elsewhere, and says which', async () => {
    const [slot] = (await draftOf(world)).slots;
    const callSign = callSignOf(slot!.stationA);
    await bookElsewhere(world, [callSign], slot!);
    const before = await stateOfDatabase();
    const refused = await publish().catch((error: unknown) => error);
    expect(refused).toBeInstanceOf(Conflict);
    expect((refused as Conflict).message).toContain(callSign);
    expect((refused as Conflict).details['reasons']).not.toEqual([]);
    expect(await stateOfDatabase()).toEqual(before);
    await world.services.db
      .deleteFrom('sked')
      .where('uid', 'like', '%@elsewhere.example')
      .execute();
  });

  it('is not published by somebody who saw an older draft', async () => {
    const before = await stateOfDatabase();
    await expect(
      publishRevision(world.services, world.marit, world.slug, { version: 1, note: '' }),
    ).rejects.toThrow('The draft changed');
    expect(await stateOfDatabase()).toEqual(before);
  });

  it('makes agreed skeds, and one mail a person with all entries', async () => {
    firstPlan = (await draftOf(world)).slots;
    const since = await mailMark(world);
    expect(await publish('Listen <between> the slots.')).toEqual({ number: 1, told: 6 });
    const rows = await skeds();
    expect(rows).toHaveLength(firstPlan.length);
    expect(rows.every(({ state, sequence }) => state === 'agreed' && sequence === 0)).toBe(true);
    const bookings = await world.services.db.selectFrom('booking').selectAll().execute();
    expect(bookings).toHaveLength(2 * firstPlan.length);

    const mails = await since();
    expect(mails.map(({ recipient }) => recipient).sort()).toEqual(
      [GUEST_MAIL, ...REGISTERED.map((callSign) => world.people[callSign]!.email)].sort(),
    );
    const seen: Record<string, number> = {};
    for (const mail of mails) {
      const callSign = /for (Q\w+)/.exec(mail.subject)![1]!;
      const own = firstPlan.filter((slot) =>
        [slot.stationA, slot.stationB].includes(world.stationIds[callSign]!),
      );
      const { method, entries } = readCalendar(mail.calendar_body!);
      expect(method).toBe('PUBLISH');
      expect(entries.map(({ startMs }) => startMs).sort()).toEqual(
        own.map(({ startMs }) => startMs).sort(),
      );
      for (const entry of entries) {
        expect(entry).toMatchObject({
          sequence: 0,
          status: 'CONFIRMED',
          attendees: 0,
          minutes: 30,
        });
        seen[entry.uid] = (seen[entry.uid] ?? 0) + 1;
      }
      expect(mail.text_body).toContain('Listen <between> the slots.');
      expect(mail.html_body).toContain('Listen &lt;between&gt; the slots.');
    }
    expect(Object.keys(seen).sort()).toEqual(rows.map(({ uid }) => uid).sort());
    expect(Object.values(seen).every((times) => times === 2)).toBe(true);

    const page = (await publicPlan(world.services, world.activityId))!;
    expect(page).toMatchObject({ number: 1, current: true });
    expect(page.slots).toHaveLength(firstPlan.length);
    expect(JSON.stringify(page)).not.toMatch(/@|57\.19|18\.38/);
    const activity = (await findActivity(world.services.db, world.slug))!;
    const feed = readCalendar((await planCalendar(world.services, activity)).body);
    expect(feed.entries.map(({ uid }) => uid).sort()).toEqual(Object.keys(seen).sort());
  });

  it('cannot be moved by its parties', async () => {
    const [sked] = await skeds();
    const offered = callSignOf(sked!.offered_by);
    const move = moveSked(
      world.services,
      world.people[offered] ?? world.people['QA1LUN']!,
      sked!.id,
      {
        version: sked!.version,
        words: '',
        start: sked!.start_at + HOUR_MS,
        end: sked!.end_at + HOUR_MS,
      },
    );
    await expect(move).rejects.toThrow('belongs to the plan of an activity');
    await expect(move).rejects.toBeInstanceOf(Conflict);
  });

  it('is revised, and only those hear of it for whom something changes', async () => {
    world.clock.nowMs += HOUR_MS;
    expect(await beginDraft(world.services, world.marit, world.slug)).toEqual({ number: 2 });
    await expect(beginDraft(world.services, world.marit, world.slug)).rejects.toThrow(
      'Revision 2 is being edited already.',
    );
    const begun = await draftOf(world);
    expect(begun.slots.map(wishOf).sort()).toEqual(firstPlan.map(wishOf).sort());

    // One moved and one taken out, both of the same station, so that somebody is left who hears nothing.
    const hub = world.stationIds['QX7ARN']!;
    const [moving, leaving] = begun.slots.filter(
      ({ stationA, stationB, pinned }) => [stationA, stationB].includes(hub) && !pinned,
    );
    const view = await timetable(world);
    const target = freeStarts(view, wishOf(moving!)).find(
      ({ startMs }) => startMs !== moving!.startMs,
    )!;
    await change({
      kind: 'place',
      wishId: wishOf(moving!),
      band: target.band as '1296',
      start: target.startMs,
    });
    await change({ kind: 'remove', wishId: wishOf(leaving!) });

    const touched = new Set([moving!, leaving!].flatMap((slot) => [slot.stationA, slot.stationB]));
    const before = await skeds();
    const skedOf = (slot: StoredSlot) =>
      before.find(
        ({ id }) => id === firstPlan2.find((one) => wishOf(one) === wishOf(slot))!.skedId,
      )!;
    const firstPlan2 = (await loadRevision(world.services.db, world.activityId, 1))!.slots;
    const since = await mailMark(world);
    expect(await publish()).toEqual({ number: 2, told: touched.size });
    const mails = await since();
    expect(mails).toHaveLength(touched.size);
    const told = mails.map(({ subject }) => /for (Q\w+)$/.exec(subject)![1]!);
    expect(new Set(told)).toEqual(new Set([...touched].map(callSignOf)));
    expect(touched.size).toBeLessThan(6);

    const own = mails.find(({ recipient }) => recipient === GUEST_MAIL)!;
    expect(own.text_body).toContain('Moved: ');
    expect(own.text_body).toContain('Taken out: ');
    expect(own.text_body).not.toContain('New: ');
    const { entries } = readCalendar(own.calendar_body!);
    expect(entries).toHaveLength(2);
    expect(entries.find(({ uid }) => uid === skedOf(moving!).uid)).toMatchObject({
      sequence: 1,
      status: 'CONFIRMED',
      startMs: target.startMs,
    });
    expect(entries.find(({ uid }) => uid === skedOf(leaving!).uid)).toMatchObject({
      sequence: 1,
      status: 'CANCELLED',
    });
    expect((await skeds()).filter(({ sequence }) => sequence === 0)).toHaveLength(
      firstPlan.length - 2,
    );

    const old = (await publicPlan(world.services, world.activityId, 1))!;
    expect(old.current).toBe(false);
    expect(old.slots.map(({ startMs }) => startMs)).toEqual(
      firstPlan.map(({ startMs }) => startMs),
    );
    expect(old.revisions.map(({ number }) => number)).toEqual([2, 1]);
    await expect(publicPlan(world.services, world.activityId, 3)).rejects.toThrow('no such');
  });

  it('takes a new contact in with the next revision', async () => {
    await beginDraft(world.services, world.marit, world.slug);
    await plan(world, 'around');
    const { slots } = await draftOf(world);
    const published = (await loadRevision(world.services.db, world.activityId, 'published'))!;
    const added = slots.filter(
      (slot) => !published.slots.some((old) => wishOf(old) === wishOf(slot)),
    );
    expect(added.length).toBeGreaterThan(0);
    const since = await mailMark(world);
    await publish();
    const words = (await since()).map(({ text_body }) => text_body).join('\n');
    expect(words.split('New: ').length - 1).toBeGreaterThanOrEqual(2 * added.length);
  });

  it('gives back one slot: partner and coordinator hear of it, and the next draft leaves it out', async () => {
    const page = (await publicPlan(world.services, world.activityId))!;
    const given = page.slots.find(({ first, second }) =>
      [first, second].every((one) => page.stations[one]!.callSign !== 'QX7ARN'),
    )!;
    const [giver, partner] = [given.first, given.second].map((one) => page.stations[one]!.callSign);
    const since = await mailMark(world);
    const sked = (await skeds()).find(({ id }) => id === given.skedId)!;
    await cancelSked(world.services, world.people[giver!]!, given.skedId, {
      version: sked.version,
      words: 'The rotator is stuck.',
    });
    const mails = await since();
    const toMarit = mails.filter(({ recipient }) => recipient === world.marit.email);
    expect(toMarit.map(({ subject }) => subject)).toEqual([
      expect.stringContaining(`${giver} gave a slot back`),
    ]);
    expect(toMarit[0]!.text_body).toContain('The rotator is stuck.');
    expect(mails.map(({ recipient }) => recipient)).toContain(world.people[partner!]!.email);

    const after = (await publicPlan(world.services, world.activityId))!;
    expect(after.slots.find(({ skedId }) => skedId === given.skedId)!.state).toBe('givenBack');
    expect(totalsOf(after)).toMatchObject({ givenBack: 1, slots: page.slots.length - 1 });
    const activity = (await findActivity(world.services.db, world.slug))!;
    const feed = readCalendar((await planCalendar(world.services, activity, giver)).body);
    expect(feed.entries.find(({ uid }) => uid === sked.uid)!.status).toBe('CANCELLED');

    await beginDraft(world.services, world.marit, world.slug);
    const draft = await draftOf(world);
    const wishId = [world.stationIds[giver!]!, world.stationIds[partner!]!].sort().join(' ');
    expect(draft.slots.map(wishOf)).not.toContain(wishId);
    // Planned again, the two may meet at another time, but not at the one that was given back.
    const again = (await plan(world, 'around')).slots.find((slot) => wishOf(slot) === wishId);
    expect(again?.startMs).not.toBe(given.startMs);
    // By hand, it can be put back there only until it is published.
    if (again) await change({ kind: 'remove', wishId });
  });

  it('is not published when a station has dropped out, until it is planned again', async () => {
    const callSign = 'QE5SUD';
    const stationId = world.stationIds[callSign]!;
    expect(
      (await draftOf(world)).slots.flatMap((slot) => [slot.stationA, slot.stationB]),
    ).toContain(stationId);
    await saveAnswer(
      world.services,
      world.people[callSign]!,
      world.slug,
      stationId,
      answerForm({ answer: 'notComing' }),
    );
    const before = await stateOfDatabase();
    const refused = (await publish().catch((error: unknown) => error)) as Conflict;
    expect(refused).toBeInstanceOf(Conflict);
    expect(refused.message).toMatch(/^The plan cannot be published as it stands\. \S.*\.$/);
    expect(refused.message).toContain(`${callSign} is not coming any more.`);
    expect(await stateOfDatabase()).toEqual(before);

    const draft = await plan(world, 'around');
    expect(draft.slots.flatMap((slot) => [slot.stationA, slot.stationB])).not.toContain(stationId);
    const since = await mailMark(world);
    await publish();
    const mail = (await since()).find(
      ({ recipient }) => recipient === world.people[callSign]!.email,
    )!;
    expect(mail.text_body).toContain(`There is no slot left for ${callSign}.`);
    const { entries } = readCalendar(mail.calendar_body!);
    expect(new Set(entries.map(({ status }) => status))).toEqual(new Set(['CANCELLED']));
  });

  it('keeps what has begun when somebody drops out in the middle', async () => {
    const published = (await loadRevision(world.services.db, world.activityId, 'published'))!;
    const [first] = published.slots;
    world.clock.nowMs = first!.startMs + MINUTE_MS;
    const callSign = callSignOf(first!.stationA);
    await saveAnswer(
      world.services,
      world.marit,
      world.slug,
      first!.stationA,
      answerForm({ answer: 'notComing' }),
    );
    const draft = await plan(world, 'around');
    const own = draft.slots.filter((slot) =>
      [slot.stationA, slot.stationB].includes(first!.stationA),
    );
    expect(own.map(({ startMs }) => startMs)).toEqual([first!.startMs]);
    expect((await timetable(world)).stations.map((one) => one.callSign)).not.toContain(callSign);
    await publish();
    const page = (await publicPlan(world.services, world.activityId))!;
    expect(page.slots.filter(({ startMs }) => startMs === first!.startMs)).not.toEqual([]);
  });

  it('tells who worked whom when it is over', async () => {
    world.clock.nowMs = END_MS + HOUR_MS;
    const page = (await publicPlan(world.services, world.activityId))!;
    const held = page.slots.filter(({ first, second }) =>
      [first, second].every((one) => page.stations[one]!.callSign !== 'QX7ARN'),
    );
    expect(held.length).toBeGreaterThan(1);
    const report = async (
      slot: (typeof held)[number],
      which: 'first' | 'second',
      result: 'completed' | 'notHeard',
    ) => {
      const callSign = page.stations[slot[which]]!.callSign;
      const { version } = (await skeds()).find(({ id }) => id === slot.skedId)!;
      await reportSked(world.services, world.people[callSign]!, slot.skedId, {
        version,
        words: '',
        result,
      });
    };
    await report(held[0]!, 'first', 'completed');
    await report(held[0]!, 'second', 'completed');
    await report(held[1]!, 'first', 'completed');
    await report(held[1]!, 'second', 'notHeard');
    const after = (await publicPlan(world.services, world.activityId))!;
    expect(totalsOf(after)).toEqual({
      slots: page.slots.length,
      givenBack: 0,
      over: page.slots.length,
      worked: 1,
      disagreed: 1,
      notReported: page.slots.length - 2,
      stationsWorked: 2,
    });
    await expect(plan(world)).rejects.toThrow('The activity is over.');
  });
});
