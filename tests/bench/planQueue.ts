import type { PlanInput } from '../../src/domain/activity/plan/input';
import type { SavedRun } from '../../src/domain/activity/run';
import { DEFAULT_WEIGHTS, planWeights } from '../../src/domain/activity/weights';
import { wishIdOf } from '../../src/server/activities/planInput';
import type { Db } from '../../src/server/db/connection';

/** A run for the demo's activity, with stations of these ids, so that its plan can become a draft. */
export async function queueRun(db: Db, input: PlanInput): Promise<string> {
  const activity = await db.selectFrom('activity').selectAll().executeTakeFirstOrThrow();
  const like = await db.selectFrom('station').selectAll().executeTakeFirstOrThrow();
  for (const { id, callSign } of input.stations) {
    await db
      .insertInto('station')
      .values({ ...like, id, call_sign: `Q${callSign}`.slice(0, 12), listed: 0, guest: 1 })
      .execute();
  }
  const saved: SavedRun = {
    input: {
      ...input,
      wishes: input.wishes.map((wish) => ({ ...wish, id: wishIdOf(wish.a, wish.b) })),
    },
    pinned: [],
    keep: [],
    begun: [],
    weights: planWeights(DEFAULT_WEIGHTS),
    problem: null,
  };
  const id = 'bench-run';
  await db
    .insertInto('plan_run')
    .values({
      id,
      activity_id: activity.id,
      state: 'queued',
      problem_json: JSON.stringify(saved),
      progress_json: null,
      result_json: null,
      error: null,
      asked_by: activity.coordinator_id,
      asked_at: Date.now(),
      leased_until: null,
      stop_asked_at: null,
      ended_at: null,
    })
    .execute();
  return id;
}
