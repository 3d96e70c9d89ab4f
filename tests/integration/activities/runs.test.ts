import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { runSentence } from '~/domain/activity/runWords';
import { askForPlan } from '~/server/activities/askForPlan';
import { getPlanPage } from '~/server/activities/getPlanPage';
import { inviteStation } from '~/server/activities/inviteStation';
import { planRunOf } from '~/server/activities/planRunOf';
import { saveAnswer } from '~/server/activities/saveAnswer';
import { stopPlan } from '~/server/activities/stopPlan';
import { workPlanRuns } from '~/server/activities/workPlanRuns';
import { Conflict, Forbidden, NotFound } from '~/server/errors';
import { giveBand, SETUP } from '../skeds/world';
import { answerForm, begin, newActivityWorld, type ActivityWorld } from './world';

let world: ActivityWorld;
let slug: string;
beforeEach(async () => {
  world = await newActivityWorld();
  ({ slug } = await begin(world));
  for (const callSign of ['QA1LUN', 'QB7TID', 'QC2FAR']) {
    await giveBand(world, callSign, SETUP);
    const stationId = world.stationIds[callSign]!;
    await inviteStation(world.services, world.marit, slug, stationId);
    await saveAnswer(world.services, world.people[callSign]!, slug, stationId, answerForm());
  }
});
afterEach(() => world.close());

const ask = (how: 'anew' | 'around' = 'anew') =>
  askForPlan(world.services, world.marit, slug, { how });
const run = async () => (await planRunOf(world.services, world.marit, slug))!;
const page = () => getPlanPage(world.services, world.marit, slug);

describe('a plan that was asked for', () => {
  it('is computed by the worker and becomes the draft', async () => {
    await ask();
    expect(await run()).toMatchObject({ state: 'queued', wishes: 3 });
    expect(await workPlanRuns(world.services)).toBe(true);
    expect(await run()).toMatchObject({ state: 'done', progress: { placed: 3, gap: 0 } });
    expect(runSentence(await run())).toMatch(/No plan is worth more/);
    expect(await page()).toMatchObject({
      activity: { state: 'planned' },
      draft: { number: 1, slots: 3, leftOut: 0 },
    });
    expect(await workPlanRuns(world.services)).toBe(false);
  }, 60_000);

  it('is asked for once at a time, and again once it has ended', async () => {
    await ask();
    await expect(ask()).rejects.toThrow(Conflict);
    await stopPlan(world.services, world.marit, slug);
    expect(await run()).toMatchObject({ state: 'stopped', progress: null });
    await expect(stopPlan(world.services, world.marit, slug)).rejects.toThrow(Conflict);
    expect(await workPlanRuns(world.services)).toBe(false);
    await ask();
    await workPlanRuns(world.services);
    await ask('around');
    await workPlanRuns(world.services);
    expect(await page()).toMatchObject({ draft: { number: 1, slots: 3 } });
  }, 60_000);

  it('is taken up again when the worker that had it has died', async () => {
    await ask();
    const lease = world.clock.nowMs + 30_000;
    await world.services.db
      .updateTable('plan_run')
      .set({ state: 'running', leased_until: lease })
      .execute();
    expect(await workPlanRuns(world.services)).toBe(false);
    world.clock.nowMs = lease;
    expect(await workPlanRuns(world.services)).toBe(true);
    expect(await run()).toMatchObject({ state: 'done' });
  }, 60_000);

  it('fails with a sentence when it cannot be begun', async () => {
    await ask();
    await world.services.db
      .updateTable('plan_run')
      .set({ problem_json: '{"input":{"wishes":[]}}' })
      .execute();
    await workPlanRuns(world.services);
    expect(await run()).toMatchObject({ state: 'failed', error: expect.stringMatching(/\.$/) });
    expect(await page()).toMatchObject({ draft: null, activity: { state: 'collecting' } });
  });

  it('is for the coordinator and administrators', async () => {
    const { services, people, otherCoordinator, administrator } = world;
    const acts = [
      (viewer: typeof administrator) => askForPlan(services, viewer, slug, { how: 'anew' }),
      (viewer: typeof administrator) => stopPlan(services, viewer, slug),
      (viewer: typeof administrator) => planRunOf(services, viewer, slug),
      (viewer: typeof administrator) => getPlanPage(services, viewer, slug),
    ];
    for (const act of acts) {
      await expect(act(people['QA1LUN']!)).rejects.toThrow(Forbidden);
      await expect(act(otherCoordinator)).rejects.toThrow(NotFound);
    }
    await askForPlan(services, administrator, slug, { how: 'anew' });
  });

  it('needs somebody who wants somebody', async () => {
    for (const callSign of ['QA1LUN', 'QB7TID']) {
      await saveAnswer(
        world.services,
        world.people[callSign]!,
        slug,
        world.stationIds[callSign]!,
        answerForm({ answer: 'notComing' }),
      );
    }
    await expect(ask()).rejects.toThrow('nothing to plan yet');
  });
});
