import { MINUTE_MS } from '../../time/interval';
import type { PlanProblem, PlanSlot } from './types';

/** Objective units per unit of worth: everything inside is whole numbers, so that sums are the same everywhere. */
export const UNITS = 10_000;

/** A problem as arrays of whole numbers. Times are steps of the grid, options of wish w are `firsts[w]` … below `firsts[w + 1]`. */
export interface PlanGrid {
  readonly problem: PlanProblem;
  readonly steps: number;
  /** Steps of a slot, between slots on different bands, of a pause that rests. */
  readonly slot: number;
  readonly change: number;
  readonly pause: number;
  /** Contacts without a pause at most; 0: as many as you like. */
  readonly inARow: number;
  readonly stations: number;
  readonly bands: readonly string[];
  readonly wishes: number;
  readonly wishA: Int32Array;
  readonly wishB: Int32Array;
  readonly firsts: Int32Array;
  readonly optionWish: Int32Array;
  readonly optionBand: Int32Array;
  readonly optionStep: Int32Array;
  /** Worth, with what of the priority counts whatever the chance, and what is added for keeping. */
  readonly optionValue: Int32Array;
  /** Priority × chance alone. */
  readonly optionWorth: Int32Array;
  /** Contacts at most, and no more than there are wishes. */
  readonly most: Int32Array;
  /** What the first n contacts of a station add together; the same for every station. */
  readonly gain: Int32Array;
  /** The option that is fixed, or −1. */
  readonly pinned: Int32Array;
}

/** What is wrong with a problem itself, in sentences: no plan could be right. */
export class PlanProblemError extends Error {
  constructor(readonly sentences: readonly string[]) {
    super(sentences.join(' '));
    this.name = 'PlanProblemError';
  }
}

/**
 * Lays a problem on the grid. A pinned wish keeps only its pinned option (made for it where the windows have none, with
 * no worth); options that stand against a pinned slot are left out. Throws PlanProblemError.
 */
export function layGrid(problem: PlanProblem): PlanGrid {
  const gridMs = problem.gridMinutes * MINUTE_MS;
  const stepOf = (startMs: number) => (startMs - problem.startMs) / gridMs;
  const slot = problem.slotMinutes / problem.gridMinutes;
  const faults = faultsOf(problem, slot);
  if (faults.length > 0) throw new PlanProblemError(faults);
  const change = Math.ceil(problem.bandChangeMinutes / problem.gridMinutes);
  const bands = bandsOf(problem);
  const bandIndex = new Map(bands.map((band, index) => [band, index]));
  const pinnedSlots = new Map(problem.pinned.map((pin) => [pin.wishId, pin]));
  const keep = new Map(problem.keep.map((kept) => [kept.wishId, kept]));
  const taken = takenByPins(problem, bandIndex, stepOf);
  const { sure = 0 } = problem.weights;
  const wishes = problem.wishes.length;
  const firsts = new Int32Array(wishes + 1);
  const pinned = new Int32Array(wishes).fill(-1);
  const rows: { wish: number; band: number; step: number; value: number; worth: number }[] = [];
  problem.wishes.forEach((wish, index) => {
    firsts[index] = rows.length;
    const pin = pinnedSlots.get(wish.id);
    const kept = keep.get(wish.id);
    const lay = (option: PlanSlot & { chance: number }) => {
      const worth = Math.round(wish.priority * option.chance * UNITS);
      const sought = Math.round(wish.priority * (sure + (1 - sure) * option.chance) * UNITS);
      const same = kept?.band === option.band && kept.startMs === option.startMs;
      rows.push({
        wish: index,
        band: bandIndex.get(option.band)!,
        step: stepOf(option.startMs),
        value: sought + (same ? Math.round(problem.weights.keep * UNITS) : 0),
        worth,
      });
    };
    if (pin) {
      const option = wish.options.find((one) => sameStart(one, pin));
      pinned[index] = rows.length;
      lay({ ...pin, chance: option?.chance ?? 0 });
      return;
    }
    for (const option of wish.options) {
      const step = stepOf(option.startMs);
      const band = bandIndex.get(option.band)!;
      const free = [wish.a, wish.b].every((station) =>
        taken[station]!.every((pinnedAt) => {
          const apart = Math.abs(pinnedAt.step - step);
          return apart >= slot + (pinnedAt.band === band ? 0 : change);
        }),
      );
      if (free) lay({ wishId: wish.id, ...option });
    }
  });
  firsts[wishes] = rows.length;
  const possible = new Int32Array(problem.stations.length);
  problem.wishes.forEach(({ a, b }, index) => {
    if (firsts[index] === firsts[index + 1]) return;
    possible[a] = possible[a]! + 1;
    possible[b] = possible[b]! + 1;
  });
  const mostOfAll = Math.max(0, ...possible);
  return {
    problem,
    steps: Math.floor((problem.endMs - problem.startMs) / gridMs),
    slot,
    change,
    pause: Math.ceil(problem.leastPauseMinutes / problem.gridMinutes),
    inARow: problem.leastPauseMinutes > 0 ? problem.mostInARow : 0,
    stations: problem.stations.length,
    bands,
    wishes,
    wishA: Int32Array.from(problem.wishes, ({ a }) => a),
    wishB: Int32Array.from(problem.wishes, ({ b }) => b),
    firsts,
    optionWish: Int32Array.from(rows, ({ wish }) => wish),
    optionBand: Int32Array.from(rows, ({ band }) => band),
    optionStep: Int32Array.from(rows, ({ step }) => step),
    optionValue: Int32Array.from(rows, ({ value }) => value),
    optionWorth: Int32Array.from(rows, ({ worth }) => worth),
    most: Int32Array.from(problem.stations, ({ most }, index) => Math.min(most, possible[index]!)),
    gain: gains(problem, mostOfAll),
    pinned,
  };
}

/** The slot that an option stands for. */
export function slotOf(grid: PlanGrid, option: number): PlanSlot {
  const { problem } = grid;
  return {
    wishId: problem.wishes[grid.optionWish[option]!]!.id,
    band: grid.bands[grid.optionBand[option]!]!,
    startMs: problem.startMs + grid.optionStep[option]! * problem.gridMinutes * MINUTE_MS,
  };
}

function sameStart(one: { band: string; startMs: number }, other: typeof one): boolean {
  return one.band === other.band && one.startMs === other.startMs;
}

function bandsOf(problem: PlanProblem): string[] {
  const bands = new Set<string>();
  for (const wish of problem.wishes) for (const { band } of wish.options) bands.add(band);
  for (const { band } of problem.pinned) bands.add(band);
  return [...bands].sort();
}

function gains({ weights }: PlanProblem, most: number): Int32Array {
  const gain = new Int32Array(most + 1);
  for (let n = 1; n <= most; n += 1) {
    const step = weights.balance / n + (n === 1 ? weights.firstContact : 0);
    gain[n] = gain[n - 1]! + Math.round(step * UNITS);
  }
  return gain;
}

interface TakenStep {
  step: number;
  band: number;
}

function takenByPins(
  problem: PlanProblem,
  bandIndex: ReadonlyMap<string, number>,
  stepOf: (startMs: number) => number,
): TakenStep[][] {
  const taken: TakenStep[][] = problem.stations.map(() => []);
  const wishes = new Map(problem.wishes.map((wish) => [wish.id, wish]));
  for (const pin of problem.pinned) {
    const wish = wishes.get(pin.wishId)!;
    const at = { step: stepOf(pin.startMs), band: bandIndex.get(pin.band)! };
    taken[wish.a]!.push(at);
    taken[wish.b]!.push(at);
  }
  return taken;
}

function faultsOf(problem: PlanProblem, slot: number): string[] {
  const faults: string[] = [];
  if (!(problem.gridMinutes > 0)) faults.push('The grid needs a length in minutes.');
  if (!Number.isInteger(slot) || slot < 1) {
    faults.push('A slot must be a whole number of steps of the grid long.');
  }
  if (problem.endMs <= problem.startMs) faults.push('The activity must end after it begins.');
  const ids = new Set<string>();
  problem.wishes.forEach(({ id, a, b }) => {
    if (ids.has(id)) faults.push(`Two wishes have the name ${id}.`);
    ids.add(id);
    if (!problem.stations[a] || !problem.stations[b] || a === b) {
      faults.push(`Wish ${id} must name two stations of the roster.`);
    }
  });
  if (faults.length > 0) return faults;
  return pinFaults(problem, slot);
}

/** Pinned slots that cannot all stand. */
function pinFaults(problem: PlanProblem, slot: number): string[] {
  const { pinned, stations, gridMinutes } = problem;
  const faults: string[] = [];
  const wishes = new Map(problem.wishes.map((wish) => [wish.id, wish]));
  const seen = new Set<string>();
  const gridMs = gridMinutes * MINUTE_MS;
  const known = pinned.filter(({ wishId, startMs }) => {
    if (!wishes.has(wishId)) faults.push(`A fixed slot belongs to no wish (${wishId}).`);
    else if (seen.has(wishId)) faults.push(`Wish ${wishId} has two fixed slots.`);
    else if (!Number.isInteger((startMs - problem.startMs) / gridMs)) {
      faults.push(`The fixed slot of wish ${wishId} does not begin on the grid.`);
    } else if (startMs < problem.startMs || startMs + slot * gridMs > problem.endMs) {
      faults.push(`The fixed slot of wish ${wishId} lies outside the activity.`);
    } else {
      seen.add(wishId);
      return true;
    }
    seen.add(wishId);
    return false;
  });
  stations.forEach((station, index) => {
    const own = known
      .filter(({ wishId }) => wishes.get(wishId)!.a === index || wishes.get(wishId)!.b === index)
      .sort((one, other) => one.startMs - other.startMs);
    if (own.length > station.most) {
      faults.push(
        `${station.callSign} has ${own.length} fixed slots, more than its ${station.most} contacts.`,
      );
    }
    let run = 1;
    own.slice(1).forEach((next, at) => {
      const before = own[at]!;
      const pauseMinutes = (next.startMs - before.startMs) / MINUTE_MS - problem.slotMinutes;
      if (pauseMinutes < (next.band === before.band ? 0 : problem.bandChangeMinutes)) {
        faults.push(`Two fixed slots of ${station.callSign} stand against each other.`);
      }
      run = pauseMinutes < problem.leastPauseMinutes ? run + 1 : 1;
      if (problem.mostInARow > 0 && run === problem.mostInARow + 1) {
        faults.push(`The fixed slots of ${station.callSign} leave it no pause.`);
      }
    });
  });
  return faults;
}
