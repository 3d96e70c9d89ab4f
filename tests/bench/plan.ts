import { checkPlan } from '../../src/domain/activity/plan/check';
import type { PlanInput } from '../../src/domain/activity/plan/input';
import { buildProblem, type PlanStart } from '../../src/domain/activity/plan/options';
import type { PlanResult } from '../../src/domain/activity/plan/types';
import { startPlanRun } from '../../src/server/solver/startPlanRun';
import { planWeekend } from './planInstances';
import type { Bench, BenchResult } from './results';

const GREEDY = 'first fit in order of worth, in the same run';

interface Timed {
  result: PlanResult;
  /** From the stations' data to the answer, the solver's thread included. */
  seconds: number;
  buildSeconds: number;
  options: number;
}

async function solved(input: PlanInput, timeLimitS: number, start?: PlanStart): Promise<Timed> {
  const beginMs = performance.now();
  const problem = buildProblem(input, start);
  const builtMs = performance.now();
  const result = await startPlanRun(problem, { timeLimitS }).done;
  const endMs = performance.now();
  const { violations } = checkPlan(input, result.plan);
  if (violations.length > 0) throw new Error(violations[0]!.sentence);
  return {
    result,
    seconds: (endMs - beginMs) / 1000,
    buildSeconds: (builtMs - beginMs) / 1000,
    options: problem.wishes.reduce((sum, wish) => sum + wish.options.length, 0),
  };
}

function proof(name: string, { result, seconds, buildSeconds, options }: Timed): BenchResult {
  if (result.ending !== 'proven') {
    throw new Error(`${name} was not proven: the gap is ${result.plan.gap}.`);
  }
  return {
    name: `${name}.secondsToProof`,
    value: seconds,
    unit: 's',
    note: `${result.plan.slots.length} contacts, proven best; ${options} possible starts, computed from the stations' data in ${buildSeconds.toFixed(1)} s of it`,
  };
}

function gain(name: string, { plan, greedy }: PlanResult): BenchResult {
  return {
    name: `${name}.gainOverGreedy`,
    value: plan.worth / greedy.worth - 1,
    unit: 'share',
    peer: GREEDY,
    note: `worth ${plan.worth.toFixed(1)} in ${plan.slots.length} contacts, first fit ${greedy.worth.toFixed(1)} in ${greedy.placed}`,
  };
}

export const plan40x200: Bench = {
  name: 'plan.40x200',
  run: async () => [proof('plan.40x200', await solved(planWeekend(40, 200), 120))],
};

export const plan24x276: Bench = {
  name: 'plan.24x276',
  run: async () => {
    const timed = await solved(planWeekend(24, 'everyone'), 120);
    return [proof('plan.24x276', timed), gain('plan.24x276', timed.result)];
  },
};

export const plan100x1000: Bench = {
  name: 'plan.100x1000',
  run: async () => {
    const { result, options, buildSeconds } = await solved(planWeekend(100, 1000), 60);
    return [
      {
        name: 'plan.100x1000.gapAt60s',
        value: result.plan.gap ?? 1,
        unit: 'share',
        note: `of the bound ${result.plan.bound?.toFixed(1)}, after ${(result.elapsedMs / 1000).toFixed(1)} s; ${options} possible starts, computed in ${buildSeconds.toFixed(1)} s before`,
      },
      gain('plan.100x1000', result),
    ];
  },
};

/** The busiest station drops out of a plan that is known to be the best; everything else should stay. */
export const replan40x200: Bench = {
  name: 'plan.replan40x200',
  run: async () => {
    const input = planWeekend(40, 200);
    const before = (await solved(input, 120)).result.plan.slots;
    const contacts = (id: string) =>
      before.filter(({ wishId }) => wishId.split('-').includes(id)).length;
    const gone = input.stations.reduce((most, one) =>
      contacts(one.id) > contacts(most.id) ? one : most,
    );
    const wishes = input.wishes.filter(({ a, b }) => a !== gone.id && b !== gone.id);
    const stations = input.stations.filter((station) => station !== gone);
    const left = new Set(wishes.map(({ id }) => id));
    const keep = before
      .filter(({ wishId }) => left.has(wishId))
      .map(({ wishId, band, startMs }) => ({ wishId, band, startMs }));
    const { result, seconds } = await solved({ ...input, stations, wishes }, 60, { keep });
    const stands = new Set(
      result.plan.slots.map(({ wishId, band, startMs }) => `${wishId} ${band} ${startMs}`),
    );
    const changed = keep.filter(
      ({ wishId, band, startMs }) => !stands.has(`${wishId} ${band} ${startMs}`),
    ).length;
    const note = `${gone.callSign} with ${contacts(gone.id)} contacts drops out, ${changed} of ${keep.length} other slots changed, ${result.plan.slots.length} contacts afterwards, ${result.ending}`;
    return [
      { name: 'plan.replan40x200.seconds', value: seconds, unit: 's', note },
      {
        name: 'plan.replan40x200.changedShare',
        value: changed / keep.length,
        unit: 'share',
        note,
      },
    ];
  },
};
