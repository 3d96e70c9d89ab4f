import { Numbers } from '../../../src/domain/activity/plan/numbers';
import { PLAN_WEIGHTS, type PlanProblem } from '../../../src/domain/activity/plan/types';
import { HOUR_MS, MINUTE_MS } from '../../../src/domain/time/interval';
import { START_MS } from './tinyProblems';

/** Everybody wants everybody and there is room for half of it: no run is done with it at once. */
export function crowdedProblem(stations: number): PlanProblem {
  const numbers = new Numbers(99);
  const pairs = Array.from({ length: stations }, (_, a) =>
    Array.from({ length: stations - a - 1 }, (__, at) => [a, a + 1 + at] as const),
  ).flat();
  return {
    startMs: START_MS,
    endMs: START_MS + 24 * HOUR_MS,
    gridMinutes: 15,
    slotMinutes: 45,
    bandChangeMinutes: 15,
    mostInARow: 3,
    leastPauseMinutes: 30,
    stations: Array.from({ length: stations }, (_, index) => ({
      id: `s${index}`,
      callSign: `Q${index}A`,
      most: 20,
    })),
    wishes: pairs.map(([a, b]) => {
      const from = numbers.below(20);
      return {
        id: `${a}-${b}`,
        a,
        b,
        priority: (1 + numbers.below(3)) as 1 | 2 | 3,
        options: ['432', '1296'].flatMap((band) =>
          Array.from({ length: 16 }, (_, step) => ({
            band,
            startMs: START_MS + (from + step) * 15 * MINUTE_MS,
            chance: (30 + numbers.below(71)) / 100,
          })),
        ),
      };
    }),
    pinned: [],
    keep: [],
    weights: PLAN_WEIGHTS,
  };
}
