import { HOUR_MS, MINUTE_MS, type Interval } from '../../domain/time/interval';

const GRID_MS = 15 * MINUTE_MS;
const DEFAULT_LENGTH_MS = HOUR_MS;
const SHORTEST_MS = 10 * MINUTE_MS;

/** Whole minutes inside a window: its edges are solved to the millisecond. */
export function wholeMinutes(window: Interval): Interval {
  return {
    startMs: Math.ceil(window.startMs / MINUTE_MS) * MINUTE_MS,
    endMs: Math.floor(window.endMs / MINUTE_MS) * MINUTE_MS,
  };
}

/**
 * A slot of an hour, or of the whole window where that is shorter, starting at the quarter hour that was pressed
 * and moved so that it lies inside the window.
 */
export function slotAt(window: Interval, atMs: number): Interval {
  const inside = wholeMinutes(window);
  const lengthMs = Math.min(DEFAULT_LENGTH_MS, inside.endMs - inside.startMs);
  const wished = Math.floor(atMs / GRID_MS) * GRID_MS;
  const startMs = Math.min(Math.max(wished, inside.startMs), inside.endMs - lengthMs);
  return { startMs, endMs: startMs + lengthMs };
}

/** A slot about the best moment. */
export function slotAround(window: Interval, bestMs: number): Interval {
  return slotAt(window, bestMs - DEFAULT_LENGTH_MS / 2 + GRID_MS / 2);
}

/** Keeps a dragged slot inside its window and at least ten minutes long; the edge that moved gives way. */
export function heldSlot(window: Interval, before: Interval, wished: Interval): Interval {
  const inside = wholeMinutes(window);
  let { startMs, endMs } = wished;
  if (startMs !== before.startMs) {
    startMs = Math.min(Math.max(startMs, inside.startMs), endMs - SHORTEST_MS);
  }
  if (endMs !== before.endMs) {
    endMs = Math.max(Math.min(endMs, inside.endMs), startMs + SHORTEST_MS);
  }
  return { startMs, endMs };
}
