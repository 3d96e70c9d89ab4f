import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { PlanProblemError } from '../../../src/domain/activity/plan/grid';
import type { PlanProblem, PlanProgress } from '../../../src/domain/activity/plan/types';
import { MINUTE_MS } from '../../../src/domain/time/interval';
import { loadHighs, type Highs } from '../../../src/server/solver/highs';
import { solvePlan, type SolveControl } from '../../../src/server/solver/solve';
import { START_MS, bestByTrying, obeys, objectiveOf, tinyProblem } from './tinyProblems';

let highs: Highs;
beforeAll(async () => {
  highs = await loadHighs();
});

const CONTROL: SolveControl = {
  nowMs: () => 0,
  stop: () => false,
  onProgress: () => undefined,
  timeLimitS: 1000,
  gapGoal: 0,
  provenWithin: 1,
};

function solve(problem: PlanProblem, control: Partial<SolveControl> = {}) {
  return solvePlan(highs, problem, { ...CONTROL, ...control });
}

/** Objectives are counted in units of 0.0001, each term rounded. */
const ROUNDING = 0.0001 * 40;

describe('a plan of a tiny activity', () => {
  it('is the best of all plans, and proven so', () => {
    for (let seed = 1; seed <= 300; seed += 1) {
      const problem = tinyProblem(seed);
      const { plan, ending } = solve(problem);
      expect(obeys(problem, plan.slots), `seed ${seed}`).toBe(true);
      expect(ending, `seed ${seed}`).toBe('proven');
      const best = bestByTrying(problem);
      expect(Math.abs(plan.objective - best), `seed ${seed}`).toBeLessThan(ROUNDING);
      expect(Math.abs(objectiveOf(problem, plan.slots) - best), `seed ${seed}`).toBeLessThan(
        ROUNDING,
      );
    }
  });

  it('leaves pinned slots where they are and is the best around them', () => {
    let pinnedOnce = 0;
    for (let seed = 301; seed <= 400; seed += 1) {
      const problem = tinyProblem(seed);
      const wish = problem.wishes.find(({ options }) => options.length > 1);
      const option = wish?.options.at(-1);
      if (!wish || !option) continue;
      pinnedOnce += 1;
      problem.pinned = [{ wishId: wish.id, band: option.band, startMs: option.startMs }];
      const { plan } = solve(problem);
      expect(plan.slots).toContainEqual({ ...problem.pinned[0]!, chance: option.chance });
      expect(obeys(problem, plan.slots)).toBe(true);
      expect(Math.abs(plan.objective - bestByTrying(problem)), `seed ${seed}`).toBeLessThan(
        ROUNDING,
      );
    }
    expect(pinnedOnce).toBeGreaterThan(50);
  });

  it('keeps an earlier plan where that is worth more', () => {
    for (let seed = 401; seed <= 440; seed += 1) {
      const problem = tinyProblem(seed);
      problem.keep = problem.wishes.flatMap(({ id, options }) =>
        options.slice(-1).map(({ band, startMs }) => ({ wishId: id, band, startMs })),
      );
      const { plan } = solve(problem);
      expect(Math.abs(plan.objective - bestByTrying(problem)), `seed ${seed}`).toBeLessThan(
        ROUNDING,
      );
    }
  });

  it('is never worse than first fit nor better than its bound, and the same every time', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1_000, max: 1_000_000 }), (seed) => {
        const problem = tinyProblem(seed);
        const first = solve(problem);
        expect(first.plan.objective).toBeGreaterThanOrEqual(first.greedy.objective);
        expect(first.plan.bound).toBeGreaterThanOrEqual(first.plan.objective);
        expect(solve(JSON.parse(JSON.stringify(problem)) as PlanProblem)).toEqual(first);
      }),
      { numRuns: 40, seed: 7 },
    );
  });
});

describe('a run', () => {
  it('tells of its progress: never a worse plan, never a looser bound', () => {
    const seen: PlanProgress[] = [];
    solve(tinyProblem(5), { onProgress: (progress) => seen.push(progress) });
    expect(seen[0]).toMatchObject({ phase: 'greedy', bound: null });
    expect(seen.at(-1)).toMatchObject({ phase: 'done', gap: 0 });
    seen.slice(1).forEach((progress, at) => {
      expect(progress.objective).toBeGreaterThanOrEqual(seen[at]!.objective);
      expect(progress.bound ?? Infinity).toBeLessThanOrEqual((seen[at]!.bound ?? Infinity) + 1e-6);
    });
  });

  it('gives first fit when it is stopped before it began, or has no time', () => {
    const problem = tinyProblem(5);
    const stopped = solve(problem, { stop: () => true });
    expect(stopped.ending).toBe('stopped');
    expect(stopped.plan.objective).toBe(stopped.greedy.objective);
    const late = solve(problem, { timeLimitS: 0 });
    expect(late.ending).toBe('timeLimit');
    expect(obeys(problem, late.plan.slots)).toBe(true);
  });

  it('answers an activity without a single possible start with an empty plan', () => {
    const problem = tinyProblem(5);
    problem.wishes.forEach((wish) => (wish.options = []));
    expect(solve(problem)).toMatchObject({
      ending: 'proven',
      plan: { slots: [], worth: 0, gap: 0 },
    });
  });

  it('refuses fixed slots that stand against each other, with a sentence', () => {
    const problem = tinyProblem(5);
    const [first, second] = problem.wishes;
    second!.a = first!.a;
    second!.b = first!.b;
    problem.pinned = [first!, second!].map(({ id }) => ({
      wishId: id,
      band: '432',
      startMs: START_MS + 30 * MINUTE_MS,
    }));
    expect(() => solve(problem)).toThrow(PlanProblemError);
    expect(() => solve(problem)).toThrow(/Two fixed slots of Q\dA stand against each other/);
  });
});
