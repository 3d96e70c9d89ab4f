import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { beat, workerSeenAt } from '~/server/jobs/heartbeat';
import { removeOldTokens } from '~/server/jobs/removeOldTokens';
import { startJobs } from '~/server/jobs/runner';
import { openGround, type Ground } from './ground';

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

describe('startJobs', () => {
  it('goes on with every job when one always throws', async () => {
    const ran = { broken: 0, whole: 0 };
    const stop = startJobs([
      {
        name: 'broken',
        everyMs: 5,
        run: () => {
          ran.broken += 1;
          throw new Error('always');
        },
      },
      {
        name: 'whole',
        everyMs: 5,
        run: () => {
          ran.whole += 1;
          return Promise.resolve(false);
        },
      },
    ]);
    while (ran.broken < 3 || ran.whole < 3) await pause(5);
    await stop();
    const then = { ...ran };
    await pause(50);
    expect(ran).toEqual(then);
  });

  it('runs again at once while there is more to do, never two runs of a job at a time', async () => {
    let runs = 0;
    let inside = 0;
    let most = 0;
    const stop = startJobs([
      {
        name: 'batch',
        everyMs: 3_600_000,
        run: async () => {
          inside += 1;
          most = Math.max(most, inside);
          await pause(5);
          inside -= 1;
          runs += 1;
          return runs < 4;
        },
      },
    ]);
    while (runs < 4) await pause(5);
    await stop();
    expect([runs, most]).toEqual([4, 1]);
  });

  it('lets a run under way finish when stopping', async () => {
    let finished = false;
    const stop = startJobs([
      {
        name: 'slow',
        everyMs: 1,
        run: async () => {
          await pause(100);
          finished = true;
          return false;
        },
      },
    ]);
    await stop();
    expect(finished).toBe(true);
  });
});

describe('jobs on the database', () => {
  let ground: Ground;
  beforeEach(async () => {
    ground = await openGround();
  });
  afterEach(() => ground.end());

  it('note that the worker is alive', async () => {
    expect(await workerSeenAt(ground)).toBeNull();
    await beat(ground);
    ground.passMs(10_000);
    await beat(ground);
    expect(await workerSeenAt(ground)).toBe(ground.now());
  });

  it('remove tokens a week after they expired, and no others', async () => {
    const at = ground.now();
    await ground.db
      .insertInto('person')
      .values({
        id: 'ylva',
        email: 'ylva@qa1lun.example',
        name: 'Ylva',
        password_hash: null,
        role: 'operator',
        time_zone: 'UTC',
        confirmed_at: at,
        locked_at: null,
        sessions_valid_from: at,
        created_at: at,
      })
      .execute();
    const week = 7 * 86_400_000;
    await ground.db
      .insertInto('person_token')
      .values(
        [at - week - 1, at - week, at + 1000].map((expiresAt, n) => ({
          id: `token${n}`,
          person_id: 'ylva',
          purpose: 'signIn' as const,
          token_hash: `hash${n}`,
          created_at: at - week,
          expires_at: expiresAt,
          used_at: null,
        })),
      )
      .execute();
    expect(await removeOldTokens(ground)).toBe(1);
    const left = await ground.db.selectFrom('person_token').select('id').execute();
    expect(left.map(({ id }) => id)).toEqual(['token1', 'token2']);
  });
});
