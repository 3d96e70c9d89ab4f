import { HOUR_MS, MINUTE_MS, type Interval } from '../time/interval';
import type { Quality } from '../window/quality';

/** A common window to which a sked can be moved, with a slot of the sked's length in it. */
export interface MoveChoice {
  window: Interval;
  slot: Interval;
  /** At the best moment of the window. */
  quality: Quality;
}

/** What the form of a move holds: day and clock in UTC, length in minutes, as typed. */
export interface MoveFields {
  date: string;
  time: string;
  minutes: string;
}

export function moveFields(slot: Interval): MoveFields {
  const [date, clock] = new Date(slot.startMs).toISOString().split('T') as [string, string];
  return {
    date,
    time: clock.slice(0, 5),
    minutes: String(Math.round((slot.endMs - slot.startMs) / MINUTE_MS)),
  };
}

/** The slot that the fields name, or null while they do not name one. Slots are half-open, in UTC. */
export function slotOfFields({ date, time, minutes }: MoveFields): Interval | null {
  const dayMs = /^\d{4}-\d{2}-\d{2}$/.test(date) ? Date.parse(`${date}T00:00:00Z`) : NaN;
  const clockMs = clockOfDay(time);
  const length = /^\d{1,4}$/.test(minutes.trim()) ? Number(minutes) : 0;
  if (Number.isNaN(dayMs) || clockMs === null || length === 0) return null;
  const startMs = dayMs + clockMs;
  return { startMs, endMs: startMs + length * MINUTE_MS };
}

/** Milliseconds after midnight of a typed time of day, "22:00", "9:05" or "2200"; null when it is none. */
export function clockOfDay(text: string): number | null {
  const clock = /^([01]?\d|2[0-3]):?([0-5]\d)$/.exec(text.trim());
  return clock ? Number(clock[1]) * HOUR_MS + Number(clock[2]) * MINUTE_MS : null;
}
