import type { PlanSlot } from './types';

/** Why a plan is refused. */
export type ViolationKind =
  | 'unknownWish'
  | 'wishTwice'
  | 'never'
  | 'wrongBand'
  | 'outsideActivity'
  | 'offGrid'
  | 'outsideWindow'
  | 'usableHours'
  | 'lowChance'
  | 'overlap'
  | 'bandChange'
  | 'rest'
  | 'tooMany'
  | 'pinMoved'
  | 'wrongWorth';

export interface PlanViolation {
  kind: ViolationKind;
  sentence: string;
  /** The slots that it is about. */
  slots: PlanSlot[];
}

/** What an independent look at a plan finds: it is refused unless `violations` is empty. */
export interface PlanCheck {
  violations: PlanViolation[];
  /** Sum of priority × chance, counted anew. */
  worth: number;
}

/** What keeps a wish out of the plan; `free`: nothing but that nobody put it in. */
export type LeftOutReason =
  | 'never'
  | 'noBand'
  | 'noMoon'
  | 'noHours'
  | 'noWindow'
  | 'lowChance'
  | 'taken'
  | 'bandChange'
  | 'rest'
  | 'tooMany'
  | 'free';

export interface LeftOut {
  wishId: string;
  reason: LeftOutReason;
  /** "The Moon is never above 10° for both." */
  sentence: string;
  /** Starts that the windows allow, whatever else stands in the plan. */
  possibleStarts: number;
  /** What would let it in, each found by computing it. */
  remedies: Remedy[];
}

export type RemedyKind =
  'moreHours' | 'otherBand' | 'lowerElevation' | 'oneMore' | 'lessChance' | 'moveOne';

export interface Remedy {
  kind: RemedyKind;
  /** "One hour more at QB7TID before 18:00 UTC lets it in." */
  sentence: string;
}
