import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  expandUsableHours,
  minuteOfDay,
  type Weekday,
  type WeeklyHours,
} from '../../../src/domain/time/weeklyHours';
import { DAY_MS, MINUTE_MS, type Interval } from '../../../src/domain/time/interval';

const ZONES = [
  'UTC',
  'Europe/Berlin',
  'Europe/London',
  'America/New_York',
  'America/St_Johns',
  'America/Santiago',
  'Australia/Lord_Howe',
  'Australia/Adelaide',
  'Pacific/Auckland',
  'Pacific/Chatham',
  'Pacific/Apia',
  'Asia/Kolkata',
  'Asia/Kathmandu',
  'Africa/Casablanca',
];

const utc = (text: string) => Date.parse(`${text}Z`);
const iso = (intervals: Interval[]) =>
  intervals.map(({ startMs, endMs }) =>
    [startMs, endMs].map((ms) => new Date(ms).toISOString().slice(0, 16)).join('/'),
  );

/** Wall clock by Intl alone, independent of the expansion. */
function wallClock(atMs: number, timeZone: string) {
  const parts = Object.fromEntries(
    new Intl.DateTimeFormat('en-GB', {
      timeZone,
      weekday: 'short',
      year: 'numeric',
      month: '2-digit',
      day: '2-digit',
      hour: '2-digit',
      minute: '2-digit',
      hourCycle: 'h23',
    })
      .formatToParts(atMs)
      .map(({ type, value }) => [type, value]),
  );
  return {
    weekday: ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'].indexOf(parts['weekday']!) + 1,
    date: `${parts['year']}-${parts['month']}-${parts['day']}`,
    minute: Number(parts['hour']) * 60 + Number(parts['minute']),
  };
}

function usableByWallClock(hours: WeeklyHours, atMs: number): boolean {
  const clock = wallClock(atMs, hours.timeZone);
  if (hours.daysOff.includes(clock.date)) return false;
  if (hours.weekly === null) return true;
  return hours.weekly.some(({ weekday, from, to }) => {
    const start = minuteOfDay(from);
    const end = minuteOfDay(to);
    if (end > start)
      return clock.weekday === weekday && clock.minute >= start && clock.minute < end;
    const nextDay = (weekday % 7) + 1;
    return (
      (clock.weekday === weekday && clock.minute >= start) ||
      (clock.weekday === nextDay && clock.minute < end)
    );
  });
}

const clockText = (minute: number) =>
  `${String(Math.floor(minute / 60)).padStart(2, '0')}:${String(minute % 60).padStart(2, '0')}`;

const hoursArbitrary = (
  timeZone: fc.Arbitrary<string>,
  dates: string[],
): fc.Arbitrary<WeeklyHours> =>
  fc.record({
    timeZone,
    weekly: fc.option(
      fc.array(
        fc.record({
          weekday: fc.constantFrom<Weekday>(1, 2, 3, 4, 5, 6, 7),
          from: fc.integer({ min: 0, max: 1439 }).map(clockText),
          to: fc.integer({ min: 0, max: 1440 }).map(clockText),
        }),
        { maxLength: 10 },
      ),
      { nil: null, freq: 8 },
    ),
    daysOff: fc.subarray(dates, { maxLength: 3 }),
  });

function datesFrom(startMs: number, days: number): string[] {
  return Array.from({ length: days }, (_, i) =>
    new Date(startMs + i * DAY_MS).toISOString().slice(0, 10),
  );
}

describe('usable hours', () => {
  // Weeks in which some of the zones change their clocks, north and south.
  const WEEKS = [
    '2027-03-11T00:00',
    '2027-03-25T00:00',
    '2027-04-01T00:00',
    '2027-09-02T00:00',
    '2027-09-23T00:00',
    '2027-10-28T00:00',
    '2027-11-04T00:00',
  ];

  it('an instant is usable exactly when the clock on the wall says so', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...WEEKS).chain((week) => {
          const startMs = utc(week);
          return fc.tuple(
            fc.constant(startMs),
            hoursArbitrary(fc.constantFrom(...ZONES), datesFrom(startMs - DAY_MS, 7)),
            fc.array(fc.integer({ min: 0, max: 5 * 1440 - 1 }), { minLength: 60, maxLength: 60 }),
          );
        }),
        ([startMs, hours, minutes]) => {
          const span = { startMs, endMs: startMs + 5 * DAY_MS };
          const intervals = expandUsableHours(hours, span);
          const edges = intervals.flatMap(({ startMs: a, endMs: b }) => [a, b - 1, b, a - 1]);
          const instants = [...minutes.map((m) => startMs + m * MINUTE_MS), ...edges].filter(
            (at) => at >= span.startMs && at < span.endMs,
          );
          for (const at of instants) {
            const inside = intervals.some((one) => at >= one.startMs && at < one.endMs);
            expect(inside, new Date(at).toISOString()).toBe(usableByWallClock(hours, at));
          }
        },
      ),
      { numRuns: 150 },
    );
  });

  it('is sorted, disjoint and inside the span', () => {
    fc.assert(
      fc.property(
        hoursArbitrary(fc.constantFrom(...ZONES), datesFrom(utc('2027-03-20T00:00'), 20)),
        fc.integer({ min: 1, max: 20 * 1440 }),
        (hours, minutes) => {
          const startMs = utc('2027-03-20T07:13');
          const span = { startMs, endMs: startMs + minutes * MINUTE_MS };
          let lastMs = span.startMs - 1;
          for (const one of expandUsableHours(hours, span)) {
            expect(one.startMs).toBeGreaterThan(lastMs);
            expect(one.endMs).toBeGreaterThan(one.startMs);
            expect(one.endMs).toBeLessThanOrEqual(span.endMs);
            lastMs = one.endMs;
          }
        },
      ),
      { numRuns: 100 },
    );
  });

  it('loses a skipped clock hour and keeps a repeated one twice', () => {
    const nights: WeeklyHours = {
      timeZone: 'Europe/Berlin',
      weekly: [{ weekday: 7, from: '02:15', to: '02:45' }],
      daysOff: [],
    };
    // 28 March 2027: 02:00 CET becomes 03:00 CEST.
    const spring = { startMs: utc('2027-03-27T12:00'), endMs: utc('2027-03-28T12:00') };
    expect(expandUsableHours(nights, spring)).toEqual([]);
    // 31 October 2027: 03:00 CEST becomes 02:00 CET.
    const autumn = { startMs: utc('2027-10-30T12:00'), endMs: utc('2027-10-31T12:00') };
    expect(iso(expandUsableHours(nights, autumn))).toEqual([
      '2027-10-31T00:15/2027-10-31T00:45',
      '2027-10-31T01:15/2027-10-31T01:45',
    ]);
  });

  it('joins hours over midnight and cuts at the range', () => {
    const hours: WeeklyHours = {
      timeZone: 'Asia/Kathmandu',
      weekly: [
        { weekday: 3, from: '22:00', to: '24:00' },
        { weekday: 4, from: '00:00', to: '02:00' },
      ],
      daysOff: [],
    };
    const span = { startMs: utc('2027-01-20T16:30'), endMs: utc('2027-01-21T12:00') };
    expect(iso(expandUsableHours(hours, span))).toEqual(['2027-01-20T16:30/2027-01-20T20:15']);
  });

  it('takes a day off by the local calendar', () => {
    const hours: WeeklyHours = {
      timeZone: 'Pacific/Auckland',
      weekly: null,
      daysOff: ['2027-02-13'],
    };
    const span = { startMs: utc('2027-02-12T00:00'), endMs: utc('2027-02-14T00:00') };
    expect(iso(expandUsableHours(hours, span))).toEqual([
      '2027-02-12T00:00/2027-02-12T11:00',
      '2027-02-13T11:00/2027-02-14T00:00',
    ]);
  });

  it('null is always, an empty list never', () => {
    const span = { startMs: 0, endMs: DAY_MS };
    expect(expandUsableHours({ timeZone: 'UTC', weekly: null, daysOff: [] }, span)).toEqual([span]);
    expect(expandUsableHours({ timeZone: 'UTC', weekly: [], daysOff: [] }, span)).toEqual([]);
    expect(() =>
      expandUsableHours({ timeZone: 'Mars/Olympus', weekly: null, daysOff: [] }, span),
    ).toThrow(RangeError);
  });
});
