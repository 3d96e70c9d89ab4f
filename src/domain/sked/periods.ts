import { modeFigures, periodS } from '../link/modes';
import type { ModeId } from '../station/modes';
import { HOUR_MS, MINUTE_MS, type Interval } from '../time/interval';

/** One period of the T/R plan, cut at the ends of the slot. `turn`: place of its station in the order. */
export interface TrPeriod extends Interval {
  turn: number;
}

/**
 * Who transmits when. Periods are counted from the full hour in which the slot begins; every cycle that divides the
 * half hour therefore begins anew at each hour and half hour.
 */
export interface TrPlan extends Interval {
  periodMs: number;
  /** Call signs in the order in which they transmit. */
  order: string[];
  anchorMs: number;
}

/**
 * The order of transmitting: the station farthest east, counted from the date line, first (published practice, read
 * in the source; some guides say the opposite, hence the choice). More than two take turns by longitude.
 */
export function transmitOrder(
  stations: readonly { callSign: string; longitudeDeg: number }[],
  eastFirst: boolean,
): string[] {
  const sign = eastFirst ? -1 : 1;
  return [...stations]
    .sort((a, b) => sign * (a.longitudeDeg - b.longitudeDeg))
    .map(({ callSign }) => callSign);
}

/** The plan of a slot: periods of the mode's length, of CW by the band (`periodS`). */
export function trPlan(
  slot: Interval,
  { mode, frequencyMhz, order }: { mode: ModeId; frequencyMhz: number; order: string[] },
): TrPlan {
  return {
    startMs: slot.startMs,
    endMs: slot.endMs,
    periodMs: periodS(modeFigures(mode)!, frequencyMhz) * 1000,
    order,
    anchorMs: Math.floor(slot.startMs / HOUR_MS) * HOUR_MS,
  };
}

/** The uncut period at an instant, inside the slot or not. */
export function periodAt(plan: TrPlan, timeMs: number): TrPeriod {
  const index = Math.floor((timeMs - plan.anchorMs) / plan.periodMs);
  const startMs = plan.anchorMs + index * plan.periodMs;
  const turns = plan.order.length;
  return { startMs, endMs: startMs + plan.periodMs, turn: ((index % turns) + turns) % turns };
}

/** The periods from one instant to another, the first and the last cut there. */
export function periodsIn(plan: TrPlan, span: Interval = plan): TrPeriod[] {
  const periods: TrPeriod[] = [];
  for (let atMs = span.startMs; atMs < span.endMs;) {
    const period = periodAt(plan, atMs);
    periods.push({
      turn: period.turn,
      startMs: Math.max(period.startMs, span.startMs),
      endMs: Math.min(period.endMs, span.endMs),
    });
    atMs = period.endMs;
  }
  return periods;
}

/** Whether every hour has the same turns, so that one hour shows them all. */
export function sameEachHour({ periodMs, order }: TrPlan): boolean {
  return HOUR_MS % (periodMs * order.length) === 0;
}

/** How long a slot may be for every period of it to be listed. */
const LISTED_IN_FULL_MS = 3 * HOUR_MS;

/** What of a plan is listed: all of it, of a long slot one hour (every hour alike) or its first three. */
export function listedPeriods(plan: TrPlan): {
  periods: TrPeriod[];
  rest: 'none' | 'alike' | 'goesOn';
} {
  if (plan.endMs - plan.startMs <= LISTED_IN_FULL_MS) {
    return { periods: periodsIn(plan), rest: 'none' };
  }
  const alike = sameEachHour(plan);
  const endMs = plan.startMs + (alike ? HOUR_MS : LISTED_IN_FULL_MS);
  return {
    periods: periodsIn(plan, { startMs: plan.startMs, endMs }),
    rest: alike ? 'alike' : 'goesOn',
  };
}

/**
 * The largest share of any stretch of this length that one station transmits in full periods, 0 … 1: what exposure is
 * averaged with. Of 6 minutes with periods of 2.5 minutes: one whole period and one minute, 0.58.
 */
export function largestDuty({ periodMs, order }: TrPlan, averagedOverMin: number): number {
  const windowMs = averagedOverMin * MINUTE_MS;
  const cycleMs = periodMs * order.length;
  const wholeCycles = Math.floor(windowMs / cycleMs);
  const restMs = Math.min(windowMs - wholeCycles * cycleMs, periodMs);
  return (wholeCycles * periodMs + restMs) / windowMs;
}
