import type { Interval } from '../time/interval';
import type { ActivityBand } from './bands';
import type { LeftOut } from './plan/findings';
import type { PlanProblem, PlanSlot } from './plan/types';

/** Everything that the timetable of a draft shows, and what it needs to tell where a slot may go. */
export interface TimetableView extends Interval {
  slug: string;
  title: string;
  /** Number of the revision, and the version of the draft on which a change is based. */
  number: number;
  version: number;
  /** Whether an earlier revision is published, whose stations would hear of changes. */
  published: boolean;
  bands: ActivityBand[];
  stations: TimetableStation[];
  slots: TimetableSlot[];
  /** Starts, rules and wishes: `placesOf` tells from it where a slot may go. */
  problem: PlanProblem;
  leftOut: LeftOut[];
}

export interface TimetableStation {
  id: string;
  /** Number on the roster. */
  place: number;
  callSign: string;
  name: string;
  timeZone: string;
  /** When its people are there, and nothing else is agreed. */
  usable: Interval[];
  /** Elevation of the Moon every 20 minutes from the start of the activity, in degrees; below 0 it is down. */
  moonElevationDeg: number[];
}

export const MOON_STEP_MINUTES = 20;

export interface TimetableSlot extends PlanSlot {
  pinned: boolean;
  chance: number | null;
  marginDb: number | null;
  /** Whether it has begun, so that it must stay. */
  begun: boolean;
}

/** Wishes without a slot, with the reason where the computation gave one. */
export function leftOutNow({
  problem,
  slots,
  leftOut,
}: Pick<TimetableView, 'problem' | 'slots' | 'leftOut'>): {
  wishId: string;
  why: LeftOut | null;
}[] {
  const placed = new Set(slots.map(({ wishId }) => wishId));
  const reasons = new Map(leftOut.map((one) => [one.wishId, one]));
  return problem.wishes
    .filter(({ id }) => !placed.has(id))
    .map(({ id }) => ({ wishId: id, why: reasons.get(id) ?? null }));
}
