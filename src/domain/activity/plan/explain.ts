import type { LeftOut, LeftOutReason } from './findings';
import type { PlanInput, PlanInputStation, PlanInputWish } from './input';
import { contacts } from './words';
import { noOptionWords } from './noOption';
import { PairChances, buildOptions } from './options';
import { remediesFor } from './remedies';
import { Standing, type StandingObstacle } from './standing';
import type { PlanOption, PlanSlot } from './types';

/** A wish that is not in the plan, with what belongs to it. */
export interface OpenWish {
  wish: PlanInputWish;
  a: PlanInputStation;
  b: PlanInputStation;
  /** Starts that the windows allow. */
  options: readonly PlanOption[];
  chances: PairChances;
}

/**
 * Why each wish that is not in the plan is not, and what would let it in, in the order of the wishes. Works for a plan
 * that was changed by hand too.
 */
export function explainLeftOut(input: PlanInput, slots: readonly PlanSlot[]): LeftOut[] {
  const placed = new Set(slots.map(({ wishId }) => wishId));
  const stations = new Map(input.stations.map((station) => [station.id, station]));
  const open = input.wishes.filter(({ id }) => !placed.has(id));
  const chances = new PairChances(input);
  const options = buildOptions({ ...input, wishes: open }, chances);
  const standing = new Standing(input, slots);
  return open.flatMap((wish, index) => {
    const a = stations.get(wish.a);
    const b = stations.get(wish.b);
    if (!a || !b) return [];
    return explain(input, standing, slots, { wish, a, b, options: options[index]!, chances });
  });
}

function explain(
  input: PlanInput,
  standing: Standing,
  slots: readonly PlanSlot[],
  open: OpenWish,
): LeftOut {
  const { wish, options } = open;
  const why = options.length === 0 ? noOptionWords(input, open) : takenWords(input, standing, open);
  return {
    wishId: wish.id,
    ...why,
    possibleStarts: options.length,
    remedies: why.reason === 'never' ? [] : remediesFor(input, standing, slots, open),
  };
}

type Why = Pick<LeftOut, 'reason' | 'sentence'>;

/** Every possible start looked at: what stands against it in the plan. */
function takenWords(
  { rules }: PlanInput,
  standing: Standing,
  { wish, a, b, options }: OpenWish,
): Why {
  const full = [a, b].find(({ id, most }) => standing.count(id) >= most);
  if (full) {
    return {
      reason: 'tooMany',
      sentence: `${full.callSign} has ${contacts(full.most)} already, as many as it wants.`,
    };
  }
  const kinds = options.map(({ band, startMs }) =>
    worst(standing.against([wish.a, wish.b], band, startMs)),
  );
  const count = (reason: LeftOutReason) => kinds.filter((kind) => kind === reason).length;
  const starts = options.length === 1 ? '1 start possible' : `${options.length} starts possible`;
  const free = count('free');
  if (free > 0) {
    return {
      reason: 'free',
      sentence: `${starts}, ${free === options.length ? 'all' : free} still free.`,
    };
  }
  const taken = count('taken');
  const change = count('bandChange');
  const rest = count('rest');
  if (taken === options.length) {
    const all = options.length === 1 ? 'taken by an earlier wish' : 'all taken by earlier wishes';
    return { reason: 'taken', sentence: `${starts}, ${all}.` };
  }
  const parts = [
    taken > 0 ? `${taken} taken by earlier wishes` : null,
    change > 0 ? `at ${change} there is no time to change band` : null,
    rest > 0
      ? `at ${rest} somebody would have more than ${contacts(rules.mostInARow)} in a row`
      : null,
  ].filter((part) => part !== null);
  return { reason: rest > 0 ? 'rest' : 'bandChange', sentence: `${starts}: ${parts.join(', ')}.` };
}

/** The obstacle that is hardest to move away. */
function worst(obstacles: readonly StandingObstacle[]): LeftOutReason {
  const kinds = new Set(obstacles.map(({ kind }) => kind));
  if (kinds.has('overlap')) return 'taken';
  if (kinds.has('bandChange')) return 'bandChange';
  if (kinds.has('rest')) return 'rest';
  return 'free';
}
