import { IANAZone } from 'luxon';
import { DAY_MS, HOUR_MS, MINUTE_MS, unionIntervals, type Interval } from './interval';

/** ISO weekday: 1 Monday … 7 Sunday. */
export type Weekday = 1 | 2 | 3 | 4 | 5 | 6 | 7;

/**
 * A stretch of the week by the clock on the wall. `from` "00:00" … "23:59", `to` "00:00" … "24:00", not
 * included. A `to` not after `from` is on the next day: 22:00 to 02:00, and 08:00 to 08:00 is a full day.
 */
export interface WeeklyStretch {
  weekday: Weekday;
  from: string;
  to: string;
}

/**
 * When the people of a station are awake and there.
 * `weekly`: null is always, an empty list is never. `daysOff`: dates by the local calendar
 * ("2027-02-13") on which nobody is there, from local midnight to local midnight, whatever `weekly` says.
 */
export interface WeeklyHours {
  timeZone: string;
  weekly: WeeklyStretch[] | null;
  daysOff: string[];
}

/**
 * The instants of `span` at which the clock on the wall stands inside the weekly hours on a day that is
 * not off; sorted and disjoint. That one rule covers the change of clocks: a clock time that is skipped
 * never comes, so a stretch loses it; a clock time that comes twice is usable both times.
 * Throws `RangeError` for an unknown zone.
 */
export function expandUsableHours(hours: WeeklyHours, span: Interval): Interval[] {
  const zone = IANAZone.create(hours.timeZone);
  if (!zone.isValid) throw new RangeError(`Unknown time zone ${hours.timeZone}.`);
  if (hours.weekly === null && hours.daysOff.length === 0) {
    return unionIntervals([span]);
  }
  const week = minutesByWeekday(hours.weekly);
  const off = new Set(hours.daysOff);
  const usable: Interval[] = [];
  for (const segment of offsetSegments(zone, span)) {
    const firstDay = Math.floor((segment.startMs + segment.offsetMs) / DAY_MS);
    const lastDay = Math.floor((segment.endMs - 1 + segment.offsetMs) / DAY_MS);
    for (let day = firstDay; day <= lastDay; day += 1) {
      const date = new Date(day * DAY_MS);
      if (off.has(date.toISOString().slice(0, 10))) continue;
      const midnightMs = day * DAY_MS - segment.offsetMs;
      for (const [fromMinute, toMinute] of week[date.getUTCDay()]!) {
        usable.push({
          startMs: Math.max(segment.startMs, midnightMs + fromMinute * MINUTE_MS),
          endMs: Math.min(segment.endMs, midnightMs + toMinute * MINUTE_MS),
        });
      }
    }
  }
  return unionIntervals(usable);
}

/** Stretches in minutes of the day for Sunday (0) … Saturday (6); those over midnight are split. */
function minutesByWeekday(weekly: WeeklyStretch[] | null): [number, number][][] {
  const week: [number, number][][] = Array.from({ length: 7 }, () =>
    weekly === null ? [[0, 1440]] : [],
  );
  for (const { weekday, from, to } of weekly ?? []) {
    const fromMinute = minuteOfDay(from);
    const toMinute = minuteOfDay(to);
    if (toMinute > fromMinute) {
      week[weekday % 7]!.push([fromMinute, toMinute]);
    } else {
      week[weekday % 7]!.push([fromMinute, 1440]);
      week[(weekday + 1) % 7]!.push([0, toMinute]);
    }
  }
  return week;
}

/** "07:30" is 450, "24:00" is 1440. Throws `RangeError`. */
export function minuteOfDay(clock: string): number {
  const match = /^(\d{2}):(\d{2})$/.exec(clock);
  const minute = match ? Number(match[1]) * 60 + Number(match[2]) : NaN;
  if (!match || Number(match[2]) > 59 || minute > 1440) {
    throw new RangeError(`“${clock}” is not a time of the day from 00:00 to 24:00.`);
  }
  return minute;
}

interface OffsetSegment extends Interval {
  offsetMs: number;
}

/** Cuts the span where the zone's offset changes. No zone has changed twice within twelve hours. */
function offsetSegments(zone: IANAZone, span: Interval): OffsetSegment[] {
  const offsetAt = (atMs: number) => Math.round(zone.offset(atMs) * MINUTE_MS);
  const segments: OffsetSegment[] = [];
  let startMs = span.startMs;
  let offsetMs = offsetAt(startMs);
  for (let cursorMs = startMs; cursorMs < span.endMs;) {
    const nextMs = Math.min(cursorMs + 12 * HOUR_MS, span.endMs);
    const nextOffsetMs = offsetAt(nextMs);
    if (nextOffsetMs !== offsetMs) {
      let before = cursorMs;
      let after = nextMs;
      while (after - before > 1) {
        const middle = Math.floor((before + after) / 2);
        if (offsetAt(middle) === offsetMs) before = middle;
        else after = middle;
      }
      segments.push({ startMs, endMs: after, offsetMs });
      startMs = after;
      offsetMs = nextOffsetMs;
    }
    cursorMs = nextMs;
  }
  if (startMs < span.endMs) segments.push({ startMs, endMs: span.endMs, offsetMs });
  return segments;
}
