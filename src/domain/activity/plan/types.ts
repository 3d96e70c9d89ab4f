/**
 * The kernel's view of a weekend: instants on a grid, wishes with their possible starts, stations as indexes. Plain
 * JSON, and everything that an answer depends on, so that a run can be saved and replayed.
 */
export interface PlanProblem {
  /** Begin and end of the activity, ms UTC. Starts lie on the grid that begins at `startMs`. */
  startMs: number;
  endMs: number;
  gridMinutes: number;
  /** Length of a slot, a multiple of the grid. */
  slotMinutes: number;
  /** Least pause at a station between two slots on different bands. */
  bandChangeMinutes: number;
  /** Most contacts of a station without a pause of at least `leastPauseMinutes`; 0: as many as you like. */
  mostInARow: number;
  leastPauseMinutes: number;
  stations: PlanStation[];
  wishes: PlanWish[];
  /** Slots that a person fixed. They stand in every plan. */
  pinned: PlanSlot[];
  /** An earlier plan from which as little as possible should change. */
  keep: PlanSlot[];
  weights: PlanWeights;
}

export interface PlanStation {
  id: string;
  callSign: string;
  /** Contacts at most in the whole plan. */
  most: number;
}

/** 3 is the most wanted. */
export type PlanPriority = 1 | 2 | 3;

export interface PlanWish {
  id: string;
  /** Indexes into `stations`. */
  a: number;
  b: number;
  priority: PlanPriority;
  /** Starts at which the whole slot lies in a common window and inside every limit. */
  options: PlanOption[];
}

export interface PlanOption {
  band: string;
  startMs: number;
  /** Of completing the contact, 0 … 1 in steps of 0.01. */
  chance: number;
}

/**
 * What counts beside the sum of priority × chance over the slots of a plan, in the same unit. A station's n-th contact
 * adds `balance` / n, its first `firstContact` more; so what is left after worth goes to stations with few contacts.
 */
export interface PlanWeights {
  firstContact: number;
  balance: number;
  /** For every slot that stands as it stood in the earlier plan. */
  keep: number;
  /** Share of a wish's priority that counts at every start, whatever its chance; absent: none. */
  sure?: number;
}

export const PLAN_WEIGHTS: PlanWeights = { firstContact: 0.1, balance: 0.01, keep: 1 };

export interface PlanSlot {
  wishId: string;
  band: string;
  startMs: number;
}

export interface PlannedSlot extends PlanSlot {
  /** Of completing the contact, as its option says; 0 for a fixed slot outside of every option. */
  chance: number;
}

/** An answer. Slots are in order of time, then of their wishes. */
export interface Plan {
  slots: PlannedSlot[];
  /** Sum of priority × chance. */
  worth: number;
  /** Worth and the rest of what was maximised (`PlanWeights`). */
  objective: number;
  /** No plan can have a greater objective; null: not known yet. */
  bound: number | null;
  /** (bound − objective) / bound; 0: proven, no plan is better by half a hundredth of a contact's chance. */
  gap: number | null;
}

/** `greedy` first fit, `search` moves and swaps, `bound` prices of the hours, `proof` branch and bound, `done`. */
export type PlanPhase = 'greedy' | 'search' | 'bound' | 'proof' | 'done';

export interface PlanProgress {
  phase: PlanPhase;
  /** Contacts placed, worth and objective of the best plan so far. */
  placed: number;
  worth: number;
  objective: number;
  bound: number | null;
  gap: number | null;
  elapsedMs: number;
}

/** How a run came to its end: proven best, within the gap asked for, out of time, or told to stop. */
export type PlanEnding = 'proven' | 'withinGap' | 'timeLimit' | 'stopped';

export interface PlanResult {
  plan: Plan;
  ending: PlanEnding;
  elapsedMs: number;
  /** The greedy plan with which the run began, for comparison. */
  greedy: { placed: number; worth: number; objective: number };
}
