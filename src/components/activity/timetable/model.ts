import type { PlanProblem } from '../../../domain/activity/plan/types';
import { placesOf, wishById, type Place } from '../../../domain/activity/timetable';
import type { TimetableSlot, TimetableView } from '../../../domain/activity/timetableView';

/** One change by hand, as it is sent. */
export type Change =
  | { kind: 'place'; wishId: string; band: string; startMs: number; pinned?: boolean | undefined }
  | { kind: 'remove'; wishId: string }
  | { kind: 'pin'; wishId: string; pinned: boolean };

export interface Pair {
  first: number;
  second: number;
}

export function pairOf(problem: PlanProblem, wishId: string): Pair {
  const wish = wishById(problem, wishId)!;
  return { first: wish.a, second: wish.b };
}

/** "QA1LUN and QB7TID" */
export function pairName(view: Pick<TimetableView, 'problem'>, wishId: string): string {
  const { first, second } = pairOf(view.problem, wishId);
  const { stations } = view.problem;
  return `${stations[first]!.callSign} and ${stations[second]!.callSign}`;
}

export function slotOfWish(view: TimetableView, wishId: string): TimetableSlot | undefined {
  return view.slots.find((slot) => slot.wishId === wishId);
}

/** Starts at which the wish could stand now. */
export function freePlaces(view: TimetableView, wishId: string, nowMs: number): Place[] {
  return placesOf(view.problem, view.slots, wishId).filter(
    ({ obstacles, startMs }) => obstacles.length === 0 && startMs > nowMs,
  );
}

/** The view as it will be when the server has taken the change. */
export function applied(view: TimetableView, change: Change): TimetableView {
  const others = view.slots.filter(({ wishId }) => wishId !== change.wishId);
  const present = slotOfWish(view, change.wishId);
  if (change.kind === 'remove') return { ...view, slots: others };
  if (change.kind === 'pin') {
    return {
      ...view,
      slots: view.slots.map((slot) =>
        slot.wishId === change.wishId ? { ...slot, pinned: change.pinned } : slot,
      ),
    };
  }
  const chance =
    wishById(view.problem, change.wishId)?.options.find(
      ({ band, startMs }) => band === change.band && startMs === change.startMs,
    )?.chance ?? null;
  const slot: TimetableSlot = {
    wishId: change.wishId,
    band: change.band,
    startMs: change.startMs,
    pinned: change.pinned ?? present?.pinned ?? false,
    chance,
    marginDb: null,
    begun: false,
  };
  return { ...view, slots: [...others, slot] };
}

/** What takes the change back. */
export function inverseOf(view: TimetableView, change: Change): Change {
  const before = slotOfWish(view, change.wishId);
  if (change.kind === 'pin') return { ...change, pinned: !change.pinned };
  if (!before) return { kind: 'remove', wishId: change.wishId };
  const { wishId, band, startMs, pinned } = before;
  return { kind: 'place', wishId, band, startMs, pinned };
}
