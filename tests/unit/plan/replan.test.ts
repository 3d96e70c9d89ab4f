import { beforeAll, describe, expect, it } from 'vitest';
import { checkPlan } from '../../../src/domain/activity/plan/check';
import type { PlanInput } from '../../../src/domain/activity/plan/input';
import { buildProblem, type PlanStart } from '../../../src/domain/activity/plan/options';
import type { PlanSlot } from '../../../src/domain/activity/plan/types';
import { loadHighs, type Highs } from '../../../src/server/solver/highs';
import { solvePlan } from '../../../src/server/solver/solve';
import { planWeekend } from '../../bench/planInstances';

let highs: Highs;
beforeAll(async () => {
  highs = await loadHighs();
});

function solve(input: PlanInput, start?: PlanStart) {
  const { plan } = solvePlan(highs, buildProblem(input, start), {
    nowMs: () => 0,
    stop: () => false,
    onProgress: () => undefined,
    timeLimitS: 1000,
    gapGoal: 1e-3,
  });
  expect(checkPlan(input, plan, start?.pinned).violations).toEqual([]);
  return plan.slots.map(({ wishId, band, startMs }) => ({ wishId, band, startMs }));
}

const key = ({ wishId, band, startMs }: PlanSlot) => `${wishId} ${band} ${startMs}`;

describe('planning again', () => {
  it('leaves nearly everything where it was when a station drops out, and fills the hours', () => {
    const input = planWeekend(20, 90);
    const before = solve(input);
    const gone = input.stations[2]!;
    const without: PlanInput = {
      ...input,
      stations: input.stations.filter((station) => station !== gone),
      wishes: input.wishes.filter(({ a, b }) => a !== gone.id && b !== gone.id),
    };
    const ids = new Set(without.wishes.map(({ id }) => id));
    const keep = before.filter(({ wishId }) => ids.has(wishId));
    expect(keep.length).toBeLessThan(before.length);
    const after = solve(without, { keep });
    const stands = new Set(after.map(key));
    const changed = keep.filter((slot) => !stands.has(key(slot))).length;
    expect(changed / keep.length).toBeLessThan(0.05);
    expect(after.length).toBeGreaterThanOrEqual(keep.length);
  });

  it('builds around fixed slots, wherever a person put them', () => {
    const input = planWeekend(20, 90);
    const problem = buildProblem(input);
    const pinned = problem.wishes
      .filter(({ options }) => options.length > 8)
      .slice(0, 1)
      .map(({ id, options }) => ({
        wishId: id,
        band: options[7]!.band,
        startMs: options[7]!.startMs,
      }));
    expect(solve(input, { pinned }).map(key)).toContain(key(pinned[0]!));
  });
});
