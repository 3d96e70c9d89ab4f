import ICAL from 'ical.js';
import { describe, expect, it } from 'vitest';
import { formatClock, formatLocalRange } from '~/domain/time/format';
import { HOUR_MS, MINUTE_MS, type Interval } from '~/domain/time/interval';
import { publishedCalendar, skedCalendar } from '~/server/mail/templates/skedCalendar';
import type { SkedMailFacts, SkedRecipient } from '~/server/mail/templates/skedFacts';
import { skedMail } from '~/server/mail/templates/skedMail';

/** Zones of every kind: north, south, half an hour off, and one whose clocks turn by half an hour. */
const ZONES = [
  'Europe/Stockholm',
  'Europe/London',
  'America/New_York',
  'America/St_Johns',
  'America/Santiago',
  'Australia/Sydney',
  'Australia/Adelaide',
  'Australia/Lord_Howe',
  'Pacific/Auckland',
];

/** What a clock on the wall shows, from another source than ours. */
function wall(atMs: number, timeZone: string): string {
  return WALLS.get(timeZone)!.format(atMs);
}

const WALLS = new Map(
  ZONES.map((timeZone) => [
    timeZone,
    new Intl.DateTimeFormat('en-GB', {
      timeZone,
      hour: '2-digit',
      minute: '2-digit',
      hourCycle: 'h23',
    }),
  ]),
);

function wallMinutes(atMs: number, timeZone: string): number {
  const [hours, minutes] = wall(atMs, timeZone).split(':').map(Number);
  return hours! * 60 + minutes!;
}

/** Both changes of 2027: when, and by how many minutes the clock is put forward. */
function changesOf(timeZone: string): { atMs: number; byMinutes: number }[] {
  const changes: { atMs: number; byMinutes: number }[] = [];
  for (let atMs = Date.UTC(2027, 0, 1); atMs < Date.UTC(2028, 0, 1); atMs += HOUR_MS / 2) {
    const step = wallMinutes(atMs, timeZone) - wallMinutes(atMs - MINUTE_MS, timeZone);
    const byMinutes = ((step - 1 + 720 + 1440) % 1440) - 720;
    if (byMinutes !== 0) changes.push({ atMs, byMinutes });
  }
  return changes;
}

const CASES = ZONES.flatMap((timeZone) =>
  changesOf(timeZone).flatMap(({ atMs, byMinutes }) =>
    [
      { name: 'over it', startMs: atMs - 20 * MINUTE_MS, endMs: atMs + 25 * MINUTE_MS },
      { name: 'before it', startMs: atMs - 45 * MINUTE_MS, endMs: atMs },
      { name: 'after it', startMs: atMs, endMs: atMs + 45 * MINUTE_MS },
    ].map((slot) => ({ ...slot, timeZone, kind: byMinutes > 0 ? 'gap' : 'overlap' })),
  ),
);

describe('a sked on the night of a clock change', () => {
  it('is looked at in gap and overlap of every zone', () => {
    expect(CASES).toHaveLength(ZONES.length * 2 * 3);
    expect(new Set(CASES.map(({ kind }) => kind))).toEqual(new Set(['gap', 'overlap']));
  });

  it.each(CASES.map((one) => [one.timeZone, one.kind, one.name, one] as const))(
    '%s, %s, %s: mail, page, entry and feed agree',
    (_zone, _kind, name, { timeZone, startMs, endMs }) => {
      const slot: Interval = { startMs, endMs };
      const facts: SkedMailFacts = {
        uid: 'x@echotide.example',
        url: 'https://echotide.example/skeds/x',
        sheetUrl: 'https://echotide.example/skeds/x/sheet',
        bandLabel: '1296 MHz',
        frequency: '1296.065 MHz',
        modeLabel: 'Q65-60C',
        stations: [
          { callSign: 'QA1LUN', timeZone, locator: 'JO97' },
          { callSign: 'QB7TID', timeZone: 'UTC', locator: 'FN12' },
        ],
        ...slot,
      };
      const reader: SkedRecipient = {
        personId: 'p',
        email: 'edda@tide.example',
        name: 'Edda',
        timeZone,
        guest: false,
        stationIds: ['a'],
      };
      const clocks = [wall(startMs, timeZone), wall(endMs, timeZone)];
      const utc = [startMs, endMs].map((at) => new Date(at).toISOString().slice(11, 16));

      // The page.
      expect([formatClock(startMs, timeZone), formatClock(endMs, timeZone)]).toEqual(clocks);

      // The mail: UTC, the reader's time, and each station's; both zone names where they differ.
      const { content } = skedMail(
        {
          kind: 'agreed',
          facts,
          by: null,
          words: '',
          before: slot,
          gaveUpAgreed: false,
          yourOffer: false,
          asked: false,
          out: false,
          state: 'agreed',
          waiting: [],
        },
        reader,
        ['QA1LUN'],
      );
      const rows = new Map(content.facts);
      expect(rows.get('UTC')!.match(/\d\d:\d\d/g)).toEqual(utc);
      expect(rows.get('Your time')!.match(/(?<![+−]\d?)\b\d\d:\d\d\b/g)).toEqual(clocks);
      // An hour that comes twice says which.
      if (name === 'over it') expect(rows.get('Your time')).toContain(' – ');
      expect(rows.get('QA1LUN')).toBe(rows.get('Your time'));
      expect(rows.get('Your time')).toBe(formatLocalRange(slot, timeZone));

      // The entry of the mail, and the feed: the same instants, and the same words.
      const entry = {
        status: 'CONFIRMED',
        sequence: 1,
        asked: false,
        stampMs: startMs - HOUR_MS,
        ...slot,
      } as const;
      const organizer = 'mail@echotide.example';
      for (const body of [
        skedCalendar(facts, reader, entry, organizer),
        publishedCalendar('Skeds', [{ facts, entry, organizer }]),
      ]) {
        const calendar = new ICAL.Component(ICAL.parse(body) as unknown[]);
        const event = new ICAL.Event(calendar.getFirstSubcomponent('vevent')!);
        const shown = [event.startDate, event.endDate].map((time) => time.toJSDate().getTime());
        expect(shown).toEqual([startMs, endMs]);
        expect(shown.map((at) => wall(at, timeZone))).toEqual(clocks);
        expect(event.description).toContain(`QA1LUN: ${rows.get('Your time')!}`);
      }
    },
  );
});
