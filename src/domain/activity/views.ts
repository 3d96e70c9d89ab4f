import type { BandId } from '../station/bands';
import type { Interval } from '../time/interval';
import type { ActivityBand } from './bands';
import type { PlanPriority } from './plan/types';
import type { ActivityStage, ActivityState } from './states';
import type { ActivityWeights } from './weights';
import type { WishKind } from './wishes';

/** An activity in a list. */
export interface ActivityCard extends Interval {
  slug: string;
  title: string;
  stage: ActivityStage;
  bands: BandId[];
  coordinatorName: string;
  /** Stations on the roster, and those of them that are coming. */
  stations: number;
  coming: number;
  /** The viewer's part in it. */
  mine: 'coordinator' | 'waiting' | 'answered' | 'none';
  answersByMs: number | null;
}

/** An activity as its pages need it. */
export interface ActivityView extends Interval {
  id: string;
  slug: string;
  version: number;
  title: string;
  state: ActivityState;
  stage: ActivityStage;
  coordinatorId: string;
  coordinatorName: string;
  bands: ActivityBand[];
  slotMinutes: number;
  gridMinutes: number;
  bandChangeMinutes: number;
  mostInARow: number;
  leastPauseMinutes: number;
  weights: ActivityWeights;
  invitation: string;
  notes: string;
  answersByMs: number | null;
}

export type RosterAnswer = 'waiting' | 'coming' | 'notComing';

export const ANSWER_WORDS: Record<RosterAnswer, string> = {
  waiting: 'no answer yet',
  coming: 'coming',
  notComing: 'not coming',
};

/** A station on the roster. */
export interface RosterStation {
  stationId: string;
  /** Number on the roster, from 1. */
  place: number;
  callSign: string;
  name: string;
  /** As far as it is shown to others. */
  locator: string;
  timeZone: string;
  guest: boolean;
  /** Mail addresses of its crew; the coordinator entered those of guests, the others are not told. */
  mail: string | null;
  answer: RosterAnswer;
  /** Bands in this activity; those on which no equipment is known in `assumed`. */
  bands: BandId[];
  assumed: BandId[];
  bandsNamed: boolean;
  /** When it is there, within the activity. */
  usable: Interval[];
  /** Whether the hours were named for this activity. */
  hoursNamed: boolean;
  mostContacts: number | null;
  wants: 'everyone' | 'list';
  priority: PlanPriority;
  note: string;
  invitedAtMs: number | null;
  remindedAtMs: number | null;
  answeredAtMs: number | null;
}

export interface RosterWish {
  stationId: string;
  partnerId: string;
  kind: WishKind;
  priority: PlanPriority;
}

/** A station that can be wished for, and what of the roster others may know. */
export interface AnswerPartner {
  stationId: string;
  place: number;
  callSign: string;
  name: string;
  locator: string;
  bands: RosterStation['bands'];
  answer: RosterStation['answer'];
}
