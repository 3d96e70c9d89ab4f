import fc from 'fast-check';
import { DateTime } from 'luxon';
import { describe, expect, it } from 'vitest';
import { digestIsDue, digestTurn } from '~/domain/people/digestTime';
import { HOUR_MS, MINUTE_MS } from '~/domain/time/interval';

const at = (iso: string) => Date.parse(iso);
const iso = (ms: number) => new Date(ms).toISOString().slice(0, 16);
const daily = (hour: number) => ({ rhythm: 'daily', hour, weekday: 1 }) as const;
const weekly = (hour: number, weekday: number) => ({ rhythm: 'weekly', hour, weekday }) as const;

describe('digestTurn', () => {
  it.each([
    // 07:00 on either side of the night in which the clocks change.
    ['Europe/Berlin', 7, '2027-03-27T12:00Z', '2027-03-27T06:00'],
    ['Europe/Berlin', 7, '2027-03-28T12:00Z', '2027-03-28T05:00'],
    ['Europe/Berlin', 7, '2027-10-31T12:00Z', '2027-10-31T06:00'],
    ['America/New_York', 7, '2027-03-14T20:00Z', '2027-03-14T11:00'],
    ['America/New_York', 7, '2027-11-07T20:00Z', '2027-11-07T12:00'],
    ['Australia/Lord_Howe', 7, '2027-10-03T00:00Z', '2027-10-02T20:00'],
    // 02:00 does not exist: it comes when the clocks have been put forward.
    ['Europe/Berlin', 2, '2027-03-28T12:00Z', '2027-03-28T01:00'],
    // Midnight does not exist in Santiago.
    ['America/Santiago', 0, '2027-09-05T12:00Z', '2027-09-05T04:00'],
    ['Asia/Kathmandu', 7, '2027-01-20T12:00Z', '2027-01-20T01:15'],
  ])('in %s at %i, seen %s, is %s', (zone, hour, now, expected) => {
    expect(iso(digestTurn(at(now), zone, daily(hour)))).toBe(expected);
  });

  it('goes back a day before the hour, and a week before the day', () => {
    const now = at('2027-01-18T05:59Z');
    expect(iso(digestTurn(now, 'Europe/Berlin', daily(7)))).toBe('2027-01-17T06:00');
    expect(iso(digestTurn(now, 'Europe/Berlin', weekly(7, 1)))).toBe('2027-01-11T06:00');
    expect(iso(digestTurn(now + MINUTE_MS, 'Europe/Berlin', weekly(7, 1)))).toBe(
      '2027-01-18T06:00',
    );
    expect(iso(digestTurn(now, 'Europe/Berlin', weekly(7, 3)))).toBe('2027-01-13T06:00');
  });

  it('is at the chosen hour and day, in the past and the last such, in any zone', () => {
    const zone = fc.constantFrom(
      'Europe/Berlin',
      'America/New_York',
      'America/Santiago',
      'Australia/Lord_Howe',
      'Pacific/Auckland',
      'Pacific/Apia',
      'Asia/Kathmandu',
      'Africa/Casablanca',
      'UTC',
    );
    const moment = fc.integer({ min: at('2026-01-01T00:00Z'), max: at('2029-01-01T00:00Z') });
    const hour = fc.integer({ min: 0, max: 23 });
    const weekday = fc.integer({ min: 1, max: 7 });
    fc.assert(
      fc.property(zone, moment, hour, weekday, (timeZone, now, hour, weekday) => {
        for (const digest of [daily(hour), weekly(hour, weekday)]) {
          const turn = digestTurn(now, timeZone, digest);
          const local = DateTime.fromMillis(turn, { zone: timeZone });
          expect(turn).toBeLessThanOrEqual(now);
          // A skipped hour comes up to an hour later.
          expect([hour, hour + 1]).toContain(local.hour);
          if (digest.rhythm === 'weekly') expect(local.weekday).toBe(weekday);
          const days = digest.rhythm === 'weekly' ? 7 : 1;
          expect(now - turn).toBeLessThanOrEqual((days * 24 + 1) * HOUR_MS);
        }
      }),
      { numRuns: 500 },
    );
  });
});

describe('digestIsDue', () => {
  const zone = 'Europe/Berlin';
  const turn = at('2027-01-18T06:00Z');
  const since = { lastMs: null, sinceMs: 0 };

  it('from its turn on for half a day', () => {
    expect(digestIsDue(turn - 1, zone, daily(7), since)).toBe(false);
    expect(digestIsDue(turn, zone, daily(7), since)).toBe(true);
    expect(digestIsDue(turn + 12 * HOUR_MS, zone, daily(7), since)).toBe(true);
    expect(digestIsDue(turn + 12 * HOUR_MS + 1, zone, daily(7), since)).toBe(false);
  });

  it('not again on a day that was looked at, even when the hour is moved', () => {
    const seen = { lastMs: turn + 5, sinceMs: 0 };
    expect(digestIsDue(turn + HOUR_MS, zone, daily(7), seen)).toBe(false);
    expect(digestIsDue(turn + 3 * HOUR_MS, zone, daily(9), seen)).toBe(false);
    expect(digestIsDue(turn + 24 * HOUR_MS, zone, daily(7), seen)).toBe(true);
  });

  it('not for a turn before the wish, and not while the clock stands before the last one', () => {
    expect(digestIsDue(turn + 10, zone, daily(7), { lastMs: null, sinceMs: turn + 5 })).toBe(false);
    const ahead = { lastMs: turn + 72 * HOUR_MS, sinceMs: 0 };
    expect(digestIsDue(turn + 24 * HOUR_MS, zone, daily(7), ahead)).toBe(false);
  });

  it.each([
    ['Europe/Berlin', '2027-03-25', 6],
    ['Europe/Berlin', '2027-10-28', 2],
    ['America/New_York', '2027-03-12', 2],
    ['America/New_York', '2027-11-05', 1],
    ['Australia/Lord_Howe', '2027-04-02', 1],
    ['America/Santiago', '2027-09-03', 0],
    ['Pacific/Auckland', '2027-09-24', 2],
  ])('comes once a local day over the clock change in %s from %s at %i', (zone, first, hour) => {
    let lastMs: number | null = null;
    const days: string[] = [];
    const from = at(`${first}T00:00Z`);
    for (let now = from; now < from + 6 * 24 * HOUR_MS; now += 7 * MINUTE_MS) {
      if (!digestIsDue(now, zone, daily(hour), { lastMs, sinceMs: from })) continue;
      lastMs = now;
      days.push(DateTime.fromMillis(now, { zone }).toISODate()!);
    }
    expect(new Set(days).size).toBe(days.length);
    expect(days.length).toBeGreaterThanOrEqual(5);
    const steps = days
      .slice(1)
      .map((day, index) => DateTime.fromISO(day).diff(DateTime.fromISO(days[index]!), 'days').days);
    expect(new Set(steps.map(Math.round))).toEqual(new Set([1]));
  });
});
