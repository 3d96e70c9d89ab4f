import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { MINUTE_MS } from '~/domain/time/interval';
import { askForPlan } from '~/server/activities/askForPlan';
import { beginDraft } from '~/server/activities/beginDraft';
import { changeDraft } from '~/server/activities/changeDraft';
import { draftPage } from '~/server/activities/draftPage';
import { dropDraft } from '~/server/activities/dropDraft';
import { getActivity } from '~/server/activities/getActivity';
import { moveOnRoster } from '~/server/activities/moveOnRoster';
import { planRunOf } from '~/server/activities/planRunOf';
import { publicPlan } from '~/server/activities/publicPlan';
import { publishRevision } from '~/server/activities/publishRevision';
import { loadRevision } from '~/server/activities/revisions';
import { stopPlan } from '~/server/activities/stopPlan';
import { timetableData } from '~/server/activities/timetableData';
import { workPlanRuns } from '~/server/activities/workPlanRuns';
import type { Viewer } from '~/server/auth/viewer';
import { Conflict, Forbidden, NotFound } from '~/server/errors';
import {
  crowd,
  draftOf,
  GUEST_MAIL,
  mailMark,
  newPlanWorld,
  plan,
  type PlanWorld,
} from './planWorld';

let world: PlanWorld;
beforeEach(async () => {
  world = await newPlanWorld();
}, 60_000);
afterEach(() => world.close());

const ask = () => askForPlan(world.services, world.marit, world.slug, { how: 'anew' });
const run = () => planRunOf(world.services, world.marit, world.slug);

describe('a run of the computation', () => {
  it('belongs to the worker that took it, until its lease is over', async () => {
    await ask();
    await expect(ask()).rejects.toThrow('A plan is being computed already.');
    // A worker takes it and is killed.
    const { nowMs } = world.clock;
    await world.services.db
      .updateTable('plan_run')
      .set({ state: 'running', leased_until: nowMs + 30_000 })
      .execute();
    expect(await workPlanRuns(world.services)).toBe(false);
    expect(await run()).toMatchObject({ state: 'running', endedMs: null });
    world.clock.nowMs = nowMs + 30_001;
    expect(await workPlanRuns(world.services)).toBe(true);
    expect(await run()).toMatchObject({ state: 'done', error: null });
    expect((await draftOf(world)).slots.length).toBeGreaterThan(5);
    expect(await workPlanRuns(world.services)).toBe(false);
  });

  it('ends without a plan when it is stopped before anybody began it', async () => {
    await ask();
    await stopPlan(world.services, world.marit, world.slug);
    expect(await workPlanRuns(world.services)).toBe(false);
    expect(await run()).toMatchObject({ state: 'stopped' });
    expect(await loadRevision(world.services.db, world.activityId, 'draft')).toBeNull();
    await expect(stopPlan(world.services, world.marit, world.slug)).rejects.toThrow(
      'No plan is being computed.',
    );
  });

  it('keeps its best plan when it is stopped, and holds changes by hand up meanwhile', async () => {
    await plan(world);
    const { row } = await draftOf(world);
    await crowd(world, 24);
    await ask();
    await expect(
      changeDraft(world.services, world.marit, world.slug, {
        version: row.version,
        change: { kind: 'remove', wishId: 'any wish' },
      }),
    ).rejects.toThrow('A plan is being computed.');
    // A worker has it and is killed; the next one takes it over and finds that it should stop.
    await world.services.db
      .updateTable('plan_run')
      .set({ state: 'running', leased_until: world.clock.nowMs - 1 })
      .where('ended_at', 'is', null)
      .execute();
    await stopPlan(world.services, world.marit, world.slug);
    expect(await workPlanRuns(world.services)).toBe(true);
    expect(await run()).toMatchObject({ state: 'stopped', error: null });
    expect((await draftOf(world)).slots.length).toBeGreaterThan(20);
  }, 90_000);

  it('is not asked for when there is nothing to plan', async () => {
    await world.services.db.updateTable('activity_station').set({ answer: 'notComing' }).execute();
    await expect(ask()).rejects.toThrow('no two stations that are coming wish a contact');
  });
});

describe('the plan and who may do what', () => {
  it('is for its coordinator and administrators alone, until it is published', async () => {
    await plan(world);
    const { services, slug, activityId } = world;
    const guest: Viewer = {
      ...world.people['stranger']!,
      ...(await services.db
        .selectFrom('person')
        .select(['id', 'email', 'name'])
        .where('email', '=', GUEST_MAIL)
        .executeTakeFirstOrThrow()),
    };
    const { version } = (await draftOf(world)).row;
    const [slot] = (await draftOf(world)).slots;
    const wishId = [slot!.stationA, slot!.stationB].sort().join(' ');
    const everything: Record<string, (viewer: Viewer) => Promise<unknown>> = {
      askForPlan: (viewer) => askForPlan(services, viewer, slug, { how: 'anew' }),
      stopPlan: (viewer) => stopPlan(services, viewer, slug),
      planRunOf: (viewer) => planRunOf(services, viewer, slug),
      timetableData: (viewer) => timetableData(services, viewer, slug),
      draftPage: (viewer) => draftPage(services, viewer, slug),
      changeDraft: (viewer) =>
        changeDraft(services, viewer, slug, { version, change: { kind: 'remove', wishId } }),
      dropDraft: (viewer) => dropDraft(services, viewer, slug),
      publishRevision: (viewer) => publishRevision(services, viewer, slug, { version, note: '' }),
      beginDraft: (viewer) => beginDraft(services, viewer, slug),
    };
    const snapshot = async () => [
      await draftOf(world),
      await services.db.selectFrom('activity').selectAll().execute(),
      await services.db.selectFrom('plan_run').select(['id', 'state']).execute(),
      await services.db.selectFrom('outbox').select('id').execute(),
    ];
    const before = await snapshot();
    for (const [name, use] of Object.entries(everything)) {
      for (const viewer of [world.otherCoordinator, world.people['stranger']!]) {
        await expect(use(viewer), `${name} by ${viewer.name}`).rejects.toBeInstanceOf(NotFound);
      }
      for (const viewer of [world.people['QA1LUN']!, guest]) {
        await expect(use(viewer), `${name} by ${viewer.name}`).rejects.toBeInstanceOf(Forbidden);
      }
    }
    expect(await snapshot()).toEqual(before);
    await expect(getActivity(services, null, slug)).rejects.toBeInstanceOf(NotFound);
    expect(await publicPlan(services, activityId)).toBeNull();
    await expect(publicPlan(services, activityId, 1)).rejects.toBeInstanceOf(NotFound);

    const { administrator } = world;
    await everything['changeDraft']!(administrator);
    expect(await timetableData(services, administrator, slug)).toMatchObject({ number: 1 });
    await publishRevision(services, administrator, slug, { version: version + 1, note: '' });
    for (const [name, use] of Object.entries(everything)) {
      for (const viewer of [world.otherCoordinator, world.people['stranger']!, guest]) {
        await expect(use(viewer), `${name} by ${viewer.name}`).rejects.toBeInstanceOf(Forbidden);
      }
    }
    expect(await getActivity(services, null, slug)).toMatchObject({ editor: false, own: [] });
  });

  it('is not published with slots of another length than the settings now say', async () => {
    await plan(world);
    const { row, slots } = await draftOf(world);
    const minutes = (slots[0]!.endMs - slots[0]!.startMs) / 60_000;
    await world.services.db
      .updateTable('activity')
      .set({ slot_minutes: 2 * minutes })
      .execute();
    await expect(
      publishRevision(world.services, world.marit, world.slug, { version: row.version, note: '' }),
    ).rejects.toThrow(
      `The slots of this plan are ${minutes} minutes long, the settings now say ${2 * minutes}. Plan anew.`,
    );
    expect((await loadRevision(world.services.db, world.activityId, 'draft'))?.row).toEqual(row);
  });

  it('stands when the roster is numbered anew', async () => {
    await plan(world);
    const { services, marit, slug } = world;
    const { version } = (await draftOf(world)).row;
    await publishRevision(services, marit, slug, { version, note: '' });
    await moveOnRoster(services, marit, slug, world.stationIds['QE5SUD']!, 1);
    await beginDraft(services, marit, slug);
    const since = await mailMark(world);
    const draft = await draftOf(world);
    expect(
      await publishRevision(services, marit, slug, { version: draft.row.version, note: '' }),
    ).toEqual({ number: 2, told: 0 });
    expect(await since()).toEqual([]);
    const rows = await services.db.selectFrom('sked').select(['state', 'sequence']).execute();
    expect(rows.every(({ state, sequence }) => state === 'agreed' && sequence === 0)).toBe(true);
  });

  it('can be thrown away before anybody hears of it', async () => {
    await plan(world);
    const { services, marit, slug } = world;
    await dropDraft(services, marit, slug);
    expect((await draftPage(services, marit, slug)).activity.state).toBe('collecting');
    await expect(dropDraft(services, marit, slug)).rejects.toBeInstanceOf(Conflict);
    await expect(timetableData(services, marit, slug)).rejects.toThrow('no draft of a plan');
    world.clock.nowMs += MINUTE_MS;
    expect((await plan(world)).row.number).toBe(1);
  });
});
