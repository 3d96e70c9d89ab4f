import { describe, expect, it } from 'vitest';
import { planOf } from '../../../src/domain/activity/plan/answer';
import { checkPlan } from '../../../src/domain/activity/plan/check';
import type { ViolationKind } from '../../../src/domain/activity/plan/findings';
import { greedyBoard } from '../../../src/domain/activity/plan/greedy';
import { layGrid } from '../../../src/domain/activity/plan/grid';
import type { PlanInput } from '../../../src/domain/activity/plan/input';
import { buildProblem } from '../../../src/domain/activity/plan/options';
import type { PlanSlot } from '../../../src/domain/activity/plan/types';
import { MINUTE_MS } from '../../../src/domain/time/interval';
import { planWeekend } from '../../bench/planInstances';
import { SLOT_MS, middleStart, threeStations } from './threeStations';

const start = middleStart(threeStations());

/** Three contacts one after the other, an hour apart. */
function goodSlots(): PlanSlot[] {
  return ['ab', 'ac', 'bc'].map((wishId, at) => ({
    wishId,
    band: '1296',
    startMs: start + 2 * at * SLOT_MS,
  }));
}

interface Broken {
  kind: ViolationKind;
  why: string;
  sentence: RegExp;
  slots?: (slots: PlanSlot[]) => PlanSlot[];
  input?: (input: PlanInput) => void;
  pinned?: PlanSlot[];
  worth?: number;
}

const BROKEN: Broken[] = [
  {
    kind: 'unknownWish',
    why: 'nobody wished it',
    slots: (slots) => [...slots, { wishId: 'xy', band: '1296', startMs: start + 8 * SLOT_MS }],
    sentence: /belongs to no wish/,
  },
  {
    kind: 'wishTwice',
    why: 'one wish has two slots',
    slots: (slots) => [...slots, { ...slots[0]!, startMs: start + 8 * SLOT_MS }],
    sentence: /QA1ABC and QB1ABC have two slots for one wish/,
  },
  {
    kind: 'never',
    why: 'one does not want the other',
    input: ({ stations }) => stations[1]!.never.push('a'),
    sentence: /QA1ABC and QB1ABC must not be put together/,
  },
  {
    kind: 'wrongBand',
    why: 'one of them has nothing for the band',
    input: ({ stations }) => delete stations[1]!.setups['1296'],
    slots: ([first]) => [first!],
    sentence: /do not work each other on 1296 MHz/,
  },
  {
    kind: 'wrongBand',
    why: 'the wish is for another band',
    input: ({ wishes }) => (wishes[0]!.bands = ['432']),
    sentence: /QA1ABC and QB1ABC do not work each other on 1296 MHz/,
  },
  {
    kind: 'outsideActivity',
    why: 'it ends after the activity',
    input: (input) => (input.endMs = start + 4 * SLOT_MS + 15 * MINUTE_MS),
    sentence: /lies outside the activity/,
  },
  {
    kind: 'offGrid',
    why: 'it begins between two steps',
    slots: ([first]) => [{ ...first!, startMs: first!.startMs + 5 * MINUTE_MS }],
    sentence: /does not begin on a step of 15 min/,
  },
  {
    kind: 'outsideWindow',
    why: 'a barn stands before the Moon',
    input: ({ stations }) =>
      (stations[0]!.sky.blocked = [
        {
          azimuthFromDeg: 0,
          azimuthToDeg: 359.9,
          elevationFromDeg: 0,
          elevationToDeg: 90,
          name: 'barn',
        },
      ]),
    slots: ([first]) => [first!],
    sentence: /the Moon is behind QA1ABC’s barn at/,
  },
  {
    kind: 'outsideWindow',
    why: 'the Moon is lower than the activity asks for',
    input: ({ rules }) => (rules.leastElevationDeg = 80),
    slots: ([first]) => [first!],
    sentence: /the Moon is below 80° at Q/,
  },
  {
    kind: 'usableHours',
    why: 'somebody leaves in the middle',
    input: ({ stations, startMs }) =>
      (stations[0]!.usable = [{ startMs, endMs: start + 15 * MINUTE_MS }]),
    slots: ([first]) => [first!],
    sentence: /nobody is there at QA1ABC/,
  },
  {
    kind: 'lowChance',
    why: 'the signal is too weak',
    input: ({ stations }) => (stations[0]!.setups['1296']!.powerAtFeedW = 0.02),
    slots: ([first]) => [first!],
    sentence: /the chance is \d+ %, less than 10 %/,
  },
  {
    kind: 'overlap',
    why: 'a station is wanted twice at once',
    slots: ([first, second]) => [first!, { ...second!, startMs: start + 15 * MINUTE_MS }],
    sentence: /QA1ABC has two slots at once/,
  },
  {
    kind: 'bandChange',
    why: 'there is no time to change band',
    slots: ([first, second]) => [first!, { ...second!, band: '432', startMs: start + SLOT_MS }],
    sentence: /QA1ABC cannot change band within 0 min/,
  },
  {
    kind: 'rest',
    why: 'a station gets no pause',
    input: ({ rules }) => (rules.mostInARow = 1),
    slots: ([first, second]) => [first!, { ...second!, startMs: start + SLOT_MS }],
    sentence: /QA1ABC has more than 1 contact from/,
  },
  {
    kind: 'tooMany',
    why: 'a station has more than it wants',
    input: ({ stations }) => (stations[2]!.most = 1),
    sentence: /QC1ABC has 2 contacts, more than the 1 it wants/,
  },
  {
    kind: 'pinMoved',
    why: 'a fixed slot is somewhere else',
    pinned: [{ wishId: 'ab', band: '1296', startMs: start + SLOT_MS }],
    sentence: /The slot fixed at .* does not stand in the plan/,
  },
  {
    kind: 'wrongWorth',
    why: 'it says that it is worth more',
    worth: 7,
    sentence: /says that it is worth 7.00/,
  },
];

describe('the independent check', () => {
  it('finds nothing against a good plan', () => {
    const { violations, worth } = checkPlan(threeStations(), { slots: goodSlots() });
    expect(violations).toEqual([]);
    expect(worth).toBeGreaterThan(4);
  });

  it('finds nothing against what the builder and first fit make of a whole weekend', () => {
    const input = planWeekend(16, 60);
    const grid = layGrid(buildProblem(input));
    const plan = planOf(grid, greedyBoard(grid).chosen, null);
    const { violations, worth } = checkPlan(input, plan);
    expect(violations).toEqual([]);
    expect(plan.slots.length).toBeGreaterThan(30);
    expect(Math.abs(worth - plan.worth)).toBeLessThan(0.005 * 2 * plan.slots.length);
  });

  it.each(BROKEN)('refuses a plan: $why', ({ kind, slots, input, pinned, worth, sentence }) => {
    const changed = threeStations();
    input?.(changed);
    const plan = { slots: slots ? slots(goodSlots()) : goodSlots(), worth };
    const { violations } = checkPlan(changed, plan, pinned);
    expect([...new Set(violations.map((violation) => violation.kind))]).toEqual([kind]);
    expect(violations[0]!.sentence).toMatch(sentence);
  });
});
