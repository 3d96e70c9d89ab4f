import { formatUtcRange } from '../time/format';
import { MINUTE_MS } from '../time/interval';
import type { PlanOption, PlanProblem, PlanSlot, PlanWish } from './plan/types';

/** What stands against a slot at one of its stations. */
export interface Obstacle {
  kind: 'taken' | 'bandChange' | 'rest' | 'tooMany';
  /** Index of the station in the problem. */
  station: number;
  /** The slot it would collide with, for `taken` and `bandChange`. */
  other: PlanSlot | null;
}

/** A start that the sky allows, and what of the rest of the plan stands against it. */
export interface Place extends PlanOption {
  obstacles: Obstacle[];
}

/** Every start of a wish, free or not, in order of band and time. A slot of the wish itself in the plan does not count. */
export function placesOf(
  problem: PlanProblem,
  slots: readonly PlanSlot[],
  wishId: string,
): Place[] {
  const wish = wishById(problem, wishId);
  if (!wish) return [];
  const lay = layOut(problem, slots, wishId);
  return wish.options.map((option) => ({ ...option, obstacles: lay(wish, option) }));
}

/** What stands against one slot in a plan. The sky is not asked: `optionAt` tells that. */
export function obstaclesOf(
  problem: PlanProblem,
  slots: readonly PlanSlot[],
  candidate: PlanSlot,
): Obstacle[] {
  const wish = wishById(problem, candidate.wishId);
  return wish ? layOut(problem, slots, candidate.wishId)(wish, candidate) : [];
}

/** The option that a slot stands for, or null where the sky, the hours or the least chance do not allow it. */
export function optionAt(problem: PlanProblem, slot: PlanSlot): PlanOption | null {
  return (
    wishById(problem, slot.wishId)?.options.find(
      ({ band, startMs }) => band === slot.band && startMs === slot.startMs,
    ) ?? null
  );
}

export function wishById(problem: PlanProblem, wishId: string): PlanWish | undefined {
  return problem.wishes.find(({ id }) => id === wishId);
}

/** "QA1LUN has QB7TID then, Sat 13 Feb 21:00–21:30 UTC." */
export function obstacleWords(problem: PlanProblem, { kind, station, other }: Obstacle): string {
  const { callSign, most } = problem.stations[station]!;
  switch (kind) {
    case 'taken':
      return `${callSign} has ${partnerIn(problem, other!, station)} then, ${timeOf(problem, other!)}.`;
    case 'bandChange':
      return `${callSign} needs ${problem.bandChangeMinutes} min to change bands from or to ${partnerIn(problem, other!, station)}, ${timeOf(problem, other!)}.`;
    case 'rest':
      return `${callSign} would have more than ${problem.mostInARow} contacts without a pause of ${problem.leastPauseMinutes} min.`;
    case 'tooMany':
      return `${callSign} has its ${most} ${most === 1 ? 'contact' : 'contacts'} already.`;
  }
}

function partnerIn(problem: PlanProblem, slot: PlanSlot, station: number): string {
  const { a, b } = wishById(problem, slot.wishId)!;
  return problem.stations[a === station ? b : a]!.callSign;
}

function timeOf({ slotMinutes }: PlanProblem, { startMs }: PlanSlot): string {
  return formatUtcRange({ startMs, endMs: startMs + slotMinutes * MINUTE_MS });
}

type Laid = (wish: PlanWish, at: Pick<PlanSlot, 'band' | 'startMs'>) => Obstacle[];

/** The slots of the plan by station, in order of time, ready to be asked about many starts of one wish. */
function layOut(problem: PlanProblem, slots: readonly PlanSlot[], exceptWish: string): Laid {
  const wishes = new Map(problem.wishes.map((wish) => [wish.id, wish]));
  const byStation = problem.stations.map((): PlanSlot[] => []);
  for (const slot of slots) {
    const wish = wishes.get(slot.wishId);
    if (!wish || slot.wishId === exceptWish) continue;
    byStation[wish.a]!.push(slot);
    byStation[wish.b]!.push(slot);
  }
  for (const own of byStation) own.sort((one, other) => one.startMs - other.startMs);
  return (wish, at) =>
    [wish.a, wish.b].flatMap((station) => atStation(problem, byStation[station]!, station, at));
}

function atStation(
  problem: PlanProblem,
  own: readonly PlanSlot[],
  station: number,
  at: Pick<PlanSlot, 'band' | 'startMs'>,
): Obstacle[] {
  const slotMs = problem.slotMinutes * MINUTE_MS;
  const changeMs = problem.bandChangeMinutes * MINUTE_MS;
  const found: Obstacle[] = [];
  for (const other of own) {
    const apartMs = Math.abs(other.startMs - at.startMs) - slotMs;
    if (apartMs < 0) found.push({ kind: 'taken', station, other });
    else if (other.band !== at.band && apartMs < changeMs) {
      found.push({ kind: 'bandChange', station, other });
    }
  }
  if (own.length >= problem.stations[station]!.most) {
    found.push({ kind: 'tooMany', station, other: null });
  }
  if (found.length === 0 && longestRun(problem, own, at.startMs) > mostInARow(problem)) {
    found.push({ kind: 'rest', station, other: null });
  }
  return found;
}

function mostInARow({ mostInARow: most, leastPauseMinutes }: PlanProblem): number {
  return most === 0 || leastPauseMinutes === 0 ? Infinity : most;
}

/** Contacts without a pause around one that begins then, itself counted. */
function longestRun(problem: PlanProblem, own: readonly PlanSlot[], startMs: number): number {
  const slotMs = problem.slotMinutes * MINUTE_MS;
  const pauseMs = problem.leastPauseMinutes * MINUTE_MS;
  const starts = [...own.map((slot) => slot.startMs), startMs].sort((a, b) => a - b);
  const here = starts.indexOf(startMs);
  let run = 1;
  for (let at = here; at > 0; at -= 1) {
    if (starts[at]! - starts[at - 1]! - slotMs >= pauseMs) break;
    run += 1;
  }
  for (let at = here; at < starts.length - 1; at += 1) {
    if (starts[at + 1]! - starts[at]! - slotMs >= pauseMs) break;
    run += 1;
  }
  return run;
}
