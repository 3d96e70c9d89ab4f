import { afterEach, beforeEach, expect, it } from 'vitest';
import { inviteGuest } from '~/server/activities/inviteGuest';
import { publicPlan } from '~/server/activities/publicPlan';
import { saveAnswer } from '~/server/activities/saveAnswer';
import { answerForm, begin, newActivityWorld, type ActivityWorld } from './world';

let world: ActivityWorld;
beforeEach(async () => {
  world = await newActivityWorld();
});
afterEach(() => world.close());

it('shows no more than four characters of a place that somebody else has told', async () => {
  const { services, marit } = world;
  const { id: activityId, slug } = await begin(world);
  await inviteGuest(services, marit, slug, {
    callSign: 'QX7ARN',
    email: 'arno@qx7arn.example',
    locator: 'JN58ab12',
    bands: { '1296': 'yes' },
  });
  // As an offer of a sked describes it.
  const { id } = await services.db
    .updateTable('station')
    .set({ public_locator_length: 6 })
    .where('guest', '=', 1)
    .returning('id')
    .executeTakeFirstOrThrow();
  await saveAnswer(services, marit, slug, id, answerForm());
  await services.db
    .insertInto('activity_revision')
    .values({
      id: 'one',
      activity_id: activityId,
      number: 1,
      state: 'published',
      run_id: null,
      created_at: 1,
      published_at: 1,
    })
    .execute();
  const place = async () => (await publicPlan(services, activityId))!.stations[0]!;
  expect(await place()).toMatchObject({ locator: 'JN58', latitudeDeg: 48.5, longitudeDeg: 11 });
  await services.db.updateTable('station').set({ guest: 0 }).where('id', '=', id).execute();
  expect((await place()).locator).toBe('JN58ab');
});
