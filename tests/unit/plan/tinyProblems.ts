import { Numbers } from '../../../src/domain/activity/plan/numbers';
import {
  PLAN_WEIGHTS,
  type PlanProblem,
  type PlanSlot,
  type PlanWish,
} from '../../../src/domain/activity/plan/types';
import { HOUR_MS, MINUTE_MS } from '../../../src/domain/time/interval';

export const START_MS = Date.UTC(2027, 1, 13);
const BANDS = ['432', '1296'];

/** A problem so small that every plan can be tried; rules and numbers are drawn by lot. */
export function tinyProblem(seed: number): PlanProblem {
  const numbers = new Numbers(seed);
  const slotSteps = 1 + numbers.below(3);
  const stations = 3 + numbers.below(3);
  const steps = 5 + numbers.below(8);
  const gridMinutes = 15;
  const wishes: PlanWish[] = Array.from({ length: 3 + numbers.below(4) }, (_, index) => {
    const a = numbers.below(stations);
    const b = (a + 1 + numbers.below(stations - 1)) % stations;
    const options = new Map<string, PlanWish['options'][number]>();
    for (let count = numbers.below(6); count > 0; count -= 1) {
      const step = numbers.below(Math.max(steps - slotSteps + 1, 1));
      const band = BANDS[numbers.below(2)]!;
      const startMs = START_MS + step * gridMinutes * MINUTE_MS;
      options.set(`${band} ${step}`, { band, startMs, chance: (1 + numbers.below(100)) / 100 });
    }
    const priority = (1 + numbers.below(3)) as 1 | 2 | 3;
    return { id: `w${index}`, a, b, priority, options: [...options.values()] };
  });
  return {
    startMs: START_MS,
    endMs: START_MS + 6 * HOUR_MS,
    gridMinutes,
    slotMinutes: slotSteps * gridMinutes,
    bandChangeMinutes: gridMinutes * numbers.below(3),
    mostInARow: numbers.below(4),
    leastPauseMinutes: gridMinutes * numbers.below(4),
    stations: Array.from({ length: stations }, (_, index) => ({
      id: `s${index}`,
      callSign: `Q${index}A`,
      most: 1 + numbers.below(4),
    })),
    wishes,
    pinned: [],
    keep: [],
    weights: numbers.below(2) === 0 ? PLAN_WEIGHTS : { firstContact: 0.5, balance: 0.3, keep: 1 },
  };
}

/** Whether slots obey every rule, said in minutes and without the code under test. */
export function obeys(problem: PlanProblem, slots: readonly PlanSlot[]): boolean {
  const wishes = new Map(problem.wishes.map((wish) => [wish.id, wish]));
  if (new Set(slots.map(({ wishId }) => wishId)).size < slots.length) return false;
  return problem.stations.every(({ most }, station) => {
    const own = slots
      .filter(({ wishId }) => {
        const { a, b } = wishes.get(wishId)!;
        return a === station || b === station;
      })
      .sort((one, other) => one.startMs - other.startMs);
    if (own.length > most) return false;
    let run = 1;
    return own.slice(1).every((slot, at) => {
      const before = own[at]!;
      const pause = (slot.startMs - before.startMs) / MINUTE_MS - problem.slotMinutes;
      if (pause < 0) return false;
      if (slot.band !== before.band && pause < problem.bandChangeMinutes) return false;
      run = pause >= problem.leastPauseMinutes ? 1 : run + 1;
      return problem.mostInARow === 0 || run <= problem.mostInARow;
    });
  });
}

/** The objective as types.ts defines it. */
export function objectiveOf(problem: PlanProblem, slots: readonly PlanSlot[]): number {
  const { firstContact, balance, keep } = problem.weights;
  const count = problem.stations.map(() => 0);
  let sum = 0;
  for (const slot of slots) {
    const wish = problem.wishes.find(({ id }) => id === slot.wishId)!;
    const option = wish.options.find(
      ({ band, startMs }) => band === slot.band && startMs === slot.startMs,
    );
    sum += wish.priority * (option?.chance ?? 0);
    const kept = problem.keep.some(
      ({ wishId, band, startMs }) =>
        wishId === slot.wishId && band === slot.band && startMs === slot.startMs,
    );
    if (kept) sum += keep;
    for (const station of [wish.a, wish.b]) {
      count[station]! += 1;
      sum += balance / count[station]! + (count[station] === 1 ? firstContact : 0);
    }
  }
  return sum;
}

/** The greatest objective of all plans, each tried. */
export function bestByTrying(problem: PlanProblem): number {
  let best = 0;
  const pins = new Map(problem.pinned.map((pin) => [pin.wishId, pin]));
  const go = (index: number, slots: PlanSlot[]) => {
    const wish = problem.wishes[index];
    if (!wish) {
      best = Math.max(best, objectiveOf(problem, slots));
      return;
    }
    const pin = pins.get(wish.id);
    if (!pin) go(index + 1, slots);
    for (const option of pin ? [pin] : wish.options) {
      const more = [...slots, { wishId: wish.id, band: option.band, startMs: option.startMs }];
      // Slots only add to what is forbidden, so a plan that breaks a rule is given up.
      if (obeys(problem, more)) go(index + 1, more);
    }
  };
  go(0, []);
  return best;
}
