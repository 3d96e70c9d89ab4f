import { describe, expect, it } from 'vitest';
import { PlanProblemError } from '../../../src/domain/activity/plan/grid';
import type { PlanProblem, PlanProgress } from '../../../src/domain/activity/plan/types';
import { PlanRunFailed, startPlanRun } from '../../../src/server/solver/startPlanRun';
import { obeys, tinyProblem } from '../../unit/plan/tinyProblems';
import { crowdedProblem } from '../../unit/plan/crowdedProblem';

describe('a planning run in its thread', () => {
  it('ends by itself with a proven plan, the same each time, and tells of its progress', async () => {
    const progress: PlanProgress[] = [];
    const problem = tinyProblem(12);
    const first = await startPlanRun(problem, { onProgress: (one) => progress.push(one) }).done;
    expect(first.ending).toBe('proven');
    expect(obeys(problem, first.plan.slots)).toBe(true);
    expect(progress[0]!.phase).toBe('greedy');
    expect(progress.at(-1)!.phase).toBe('done');
    const second = await startPlanRun(problem).done;
    expect(second.plan).toEqual(first.plan);
  });

  it('keeps the best plan when it is stopped', async () => {
    const problem = crowdedProblem(14);
    const run = startPlanRun(problem, {
      onProgress: ({ phase }) => {
        if (phase === 'bound') run.stop();
      },
    });
    const { ending, plan, greedy } = await run.done;
    expect(ending).toBe('stopped');
    expect(plan.objective).toBeGreaterThanOrEqual(greedy.objective);
    expect(plan.gap).toBeGreaterThan(0);
    expect(obeys(problem, plan.slots)).toBe(true);
  });

  it('is ended by force when it does not stop, and its best plan is kept', async () => {
    const problem = crowdedProblem(14);
    const run = startPlanRun(problem, {
      graceS: 0,
      onProgress: () => {
        run.stop();
      },
    });
    const { ending, plan } = await run.done;
    expect(ending).toBe('stopped');
    expect(plan.slots.length).toBeGreaterThan(0);
    expect(obeys(problem, plan.slots)).toBe(true);
  });

  it('ends at its time limit with what it has', async () => {
    const problem = crowdedProblem(14);
    const { ending, plan } = await startPlanRun(problem, { timeLimitS: 0.2 }).done;
    expect(ending).toBe('timeLimit');
    expect(obeys(problem, plan.slots)).toBe(true);
  });

  it('fails alone when its thread dies: the next run works', async () => {
    const broken = { ...tinyProblem(3), wishes: null } as unknown as PlanProblem;
    await expect(startPlanRun(broken).done).rejects.toThrow(PlanRunFailed);
    expect((await startPlanRun(tinyProblem(3)).done).ending).toBe('proven');
  });

  it('refuses a problem that is wrong with its sentences', async () => {
    const problem = { ...tinyProblem(3), slotMinutes: 20 };
    await expect(startPlanRun(problem).done).rejects.toThrow(PlanProblemError);
    await expect(startPlanRun(problem).done).rejects.toThrow(/whole number of steps/);
  });
});
