import { DAY_MS, HOUR_MS, MINUTE_MS, type Interval } from '../time/interval';

export const SHORTEST_SLOT_MS = 10 * MINUTE_MS;
export const LONGEST_SLOT_MS = 24 * HOUR_MS;
export const FARTHEST_AHEAD_MS = 400 * DAY_MS;

/** One thing wrong with a slot: which of its two fields, and a sentence for a person. */
export interface SlotProblem {
  field: 'start' | 'end';
  sentence: string;
}

/**
 * Everything wrong with a slot as seen at `nowMs`; an empty list means it may be offered.
 * A slot lasts 10 minutes to 24 hours, lies on whole minutes, starts after now and at most
 * 400 days ahead.
 */
export function slotProblems(slot: Interval, nowMs: number): SlotProblem[] {
  const problems: SlotProblem[] = [];
  if (slot.startMs % MINUTE_MS !== 0) {
    problems.push({ field: 'start', sentence: 'The start must fall on a whole minute.' });
  }
  if (slot.endMs % MINUTE_MS !== 0) {
    problems.push({ field: 'end', sentence: 'The end must fall on a whole minute.' });
  }
  if (slot.startMs <= nowMs) {
    problems.push({ field: 'start', sentence: 'The start has passed. Choose a later one.' });
  } else if (slot.startMs - nowMs > FARTHEST_AHEAD_MS) {
    problems.push({ field: 'start', sentence: 'The start is more than 400 days ahead.' });
  }
  const lengthMs = slot.endMs - slot.startMs;
  if (lengthMs <= 0) {
    problems.push({ field: 'end', sentence: 'The end must come after the start.' });
  } else if (lengthMs < SHORTEST_SLOT_MS) {
    problems.push({ field: 'end', sentence: 'A sked lasts at least 10 minutes.' });
  } else if (lengthMs > LONGEST_SLOT_MS) {
    problems.push({ field: 'end', sentence: 'A sked lasts at most 24 hours.' });
  }
  return problems;
}
