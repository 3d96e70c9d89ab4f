import fc from 'fast-check';
import { expect, it } from 'vitest';
import { NOW_MS } from '../world';
import { CALL_SIGNS, commands } from './commands';
import { sameBackwards } from './invariants';
import type { Model } from './model';
import { newReal } from './real';

it('keeps every sked, booking and calendar right through any life', async () => {
  const states: Record<string, number> = {};
  let left = 0;
  await fc.assert(
    fc.asyncProperty(commands, async (steps) => {
      const real = await newReal();
      const model: Model = {
        nowMs: NOW_MS,
        skeds: [],
        crews: new Map(CALL_SIGNS.map((callSign) => [callSign, new Set<string>()])),
      };
      try {
        await fc.asyncModelRun(() => ({ model, real }), steps);
        sameBackwards(real);
      } finally {
        await real.world.close();
      }
      for (const sked of model.skeds) {
        states[sked.state] = (states[sked.state] ?? 0) + 1;
        left += sked.left.size;
      }
    }),
    { numRuns: 40, seed: 20270118, endOnFailure: false },
  );
  // It went everywhere.
  expect(Object.keys(states).sort()).toEqual(
    ['agreed', 'cancelled', 'declined', 'lapsed', 'offered', 'reported', 'withdrawn'].sort(),
  );
  expect(left).toBeGreaterThan(5);
}, 60_000);
