/**
 * The life of a sked. `lapsed`: its time came without agreement. `cancelled`: after agreement.
 * `reported`: at least one party has said how it went.
 */
export const SKED_STATES = [
  'offered',
  'agreed',
  'declined',
  'withdrawn',
  'lapsed',
  'cancelled',
  'reported',
] as const;
export type SkedState = (typeof SKED_STATES)[number];

export const SKED_EVENT_KINDS = [
  'offered',
  'moved',
  'accepted',
  'agreed',
  'declined',
  'droppedOut',
  'withdrawn',
  'lapsed',
  'cancelled',
  'reported',
] as const;
export type SkedEventKind = (typeof SKED_EVENT_KINDS)[number];

export type SkedResult = 'completed' | 'partly' | 'notHeard';
