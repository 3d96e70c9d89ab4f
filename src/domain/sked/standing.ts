import type { Interval } from '../time/interval';
import type { SkedState } from './types';

/**
 * A calendar message due by a change; the slot is the one it speaks of. Stations that have just dropped out get CANCEL
 * where the others get REQUEST.
 */
export interface CalendarDue extends Interval {
  status: 'TENTATIVE' | 'CONFIRMED' | 'CANCELLED';
  sequence: number;
}

/** Whether the offer's time came without agreement, even if nobody has written that down yet. */
export function hasLapsed(sked: { state: SkedState; startMs: number }, nowMs: number): boolean {
  return sked.state === 'lapsed' || (sked.state === 'offered' && sked.startMs <= nowMs);
}

/** Whether the stations are taken for the slot. */
export function holdsBooking(sked: { state: SkedState }): boolean {
  return sked.state === 'agreed' || sked.state === 'reported';
}

/** The stations that have not dropped out. */
export function stillIn<T extends { left: boolean }>(parties: readonly T[]): T[] {
  return parties.filter((party) => !party.left);
}

/** What a calendar should show of the sked as it stands now. */
export function calendarOf(sked: { state: SkedState; sequence: number } & Interval): CalendarDue {
  const { sequence, startMs, endMs } = sked;
  const status =
    sked.state === 'offered' ? 'TENTATIVE' : holdsBooking(sked) ? 'CONFIRMED' : 'CANCELLED';
  return { status, sequence, startMs, endMs };
}
