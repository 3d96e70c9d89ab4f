import { describe, expect, it } from 'vitest';
import { layGrid } from '~/domain/activity/plan/grid';
import type { PlanPriority, PlanProblem } from '~/domain/activity/plan/types';
import { DEFAULT_WEIGHTS, planPriority, planWeights, type Favour } from '~/domain/activity/weights';

/** A likely contact of a low priority and an unlikely one of a high priority, each at one start. */
function problem(favour: Favour, likely: PlanPriority, unlikely: PlanPriority): PlanProblem {
  const weights = { ...DEFAULT_WEIGHTS, favour };
  const wish = (id: string, b: number, priority: PlanPriority, chance: number) => ({
    id,
    a: 0,
    b,
    priority: planPriority(priority, weights),
    options: [{ band: '1296', startMs: 0, chance }],
  });
  return {
    startMs: 0,
    endMs: 3_600_000,
    gridMinutes: 30,
    slotMinutes: 30,
    bandChangeMinutes: 0,
    mostInARow: 0,
    leastPauseMinutes: 0,
    stations: ['QA1', 'QB2', 'QC3'].map((callSign) => ({ id: callSign, callSign, most: 9 })),
    wishes: [wish('likely', 1, likely, 1), wish('unlikely', 2, unlikely, 0.05)],
    pinned: [],
    keep: [],
    weights: planWeights(weights),
  };
}

/** What the two starts count, the likely one first. */
function counted(...given: Parameters<typeof problem>): [number, number] {
  const { optionValue } = layGrid(problem(...given));
  return [optionValue[0]!, optionValue[1]!];
}

describe('what a plan favours', () => {
  it.each([
    [1, 2],
    [2, 3],
    [1, 3],
  ] as const)('counts high priorities first where that is chosen (%i and %i)', (low, high) => {
    const [likely, unlikely] = counted('priority', low, high);
    expect(unlikely).toBeGreaterThan(likely);
    for (const favour of ['both', 'chance'] as const) {
      const [more, less] = counted(favour, low, high);
      expect(more).toBeGreaterThan(less);
    }
  });

  it('counts likely contacts among equals', () => {
    for (const favour of ['both', 'chance', 'priority'] as const) {
      const [likely, unlikely] = counted(favour, 2, 2);
      expect(likely).toBeGreaterThan(unlikely);
    }
  });

  it('tells the worth of a plan as priority times chance, whatever is favoured', () => {
    const worths = (['both', 'priority'] as const).map((favour) => [
      ...layGrid(problem(favour, 1, 3)).optionWorth,
    ]);
    expect(worths[0]).toEqual(worths[1]);
  });
});
