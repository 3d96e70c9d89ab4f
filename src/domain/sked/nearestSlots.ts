import { MINUTE_MS, type Interval } from '../time/interval';

/** Starts are put on these minutes where the free stretch leaves room, because people round. */
const NICE_STEP_MS = 5 * MINUTE_MS;

/**
 * Up to `count` slots of the wished length inside the free stretches, nearest to the wished start first, at most
 * one in each stretch. Starts fall on whole minutes, on fives where possible.
 */
export function nearestSlots(
  free: readonly Interval[],
  wished: Interval,
  count: number,
): Interval[] {
  const lengthMs = wished.endMs - wished.startMs;
  const slots = free.flatMap((stretch) => {
    const startMs = nearestStart(stretch, wished.startMs, lengthMs);
    return startMs === null ? [] : [{ startMs, endMs: startMs + lengthMs }];
  });
  const distance = (slot: Interval) => Math.abs(slot.startMs - wished.startMs);
  return slots.sort((a, b) => distance(a) - distance(b)).slice(0, count);
}

function nearestStart(stretch: Interval, wishedMs: number, lengthMs: number): number | null {
  for (const stepMs of [NICE_STEP_MS, MINUTE_MS]) {
    const earliestMs = Math.ceil(stretch.startMs / stepMs) * stepMs;
    const latestMs = Math.floor((stretch.endMs - lengthMs) / stepMs) * stepMs;
    if (latestMs < earliestMs) continue;
    const nearMs = Math.round(wishedMs / stepMs) * stepMs;
    return Math.min(latestMs, Math.max(earliestMs, nearMs));
  }
  return null;
}
