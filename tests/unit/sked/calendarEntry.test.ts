import fc from 'fast-check';
import ICAL from 'ical.js';
import { describe, expect, it } from 'vitest';
import { skedCalendar, type PersonalEntry } from '~/server/mail/templates/skedCalendar';
import type { SkedMailFacts, SkedRecipient } from '~/server/mail/templates/skedFacts';
import { MINUTE_MS } from '~/domain/time/interval';

const START = Date.UTC(2027, 0, 20, 22, 0);
const SLOT = { startMs: START, endMs: START + 45 * MINUTE_MS };
const STAMP = Date.UTC(2027, 0, 18, 18, 42);
const facts: SkedMailFacts = {
  uid: 'b6b3a9f2-sked@echotide.example',
  url: 'https://echotide.example/skeds/b6b3a9f2',
  sheetUrl: 'https://echotide.example/skeds/b6b3a9f2/sheet',
  bandLabel: '1296 MHz',
  frequency: '1296.065 MHz',
  modeLabel: 'Q65-60C',
  stations: [
    { callSign: 'QA1LUN', timeZone: 'Europe/Stockholm', locator: 'JO97ee' },
    { callSign: 'QB7TID', timeZone: 'America/New_York', locator: 'FN12' },
  ],
  ...SLOT,
};
const edda: SkedRecipient = {
  personId: 'p',
  email: 'edda@tide.example',
  name: 'Edda',
  timeZone: 'America/New_York',
  guest: false,
  stationIds: ['b'],
};
const FROM = 'Echotide <mail@echotide.example>';

function write(recipient = edda, over: Partial<PersonalEntry> = {}): string {
  const entry = {
    status: 'CONFIRMED',
    sequence: 0,
    asked: false,
    stampMs: STAMP,
    ...SLOT,
  } as const;
  return skedCalendar(facts, recipient, { ...entry, ...over }, FROM);
}
function read(text: string) {
  const calendar = new ICAL.Component(ICAL.parse(text) as unknown[]);
  return { calendar, event: calendar.getFirstSubcomponent('vevent')! };
}
/** RFC 5545, 3.1: lines end with CRLF, hold at most 75 octets without it, no bare CR or LF, valid UTF-8. */
function requireContentLines(text: string): void {
  expect(text.endsWith('\r\n')).toBe(true);
  const lines = text.slice(0, -2).split('\r\n');
  for (const line of lines) {
    expect(line).not.toMatch(/[\r\n]/);
    expect(line.length).toBeGreaterThan(0);
    const octets = Buffer.from(line, 'utf8');
    expect(octets.length).toBeLessThanOrEqual(75);
    expect(octets.toString('utf8')).toBe(line);
    expect(line).not.toContain('\ufffd');
  }
}

describe('calendar entry of a sked', () => {
  it('carries everything a calendar needs, as another parser reads it', () => {
    const { calendar, event } = read(write());
    const value = (name: string) => event.getFirstPropertyValue(name);
    expect(calendar.getFirstPropertyValue('method')).toBe('REQUEST');
    expect(calendar.getFirstPropertyValue('version')).toBe('2.0');
    expect(value('uid')).toBe(facts.uid);
    expect(value('sequence')).toBe(0);
    expect(String(value('dtstart'))).toBe('2027-01-20T22:00:00Z');
    expect(String(value('dtend'))).toBe('2027-01-20T22:45:00Z');
    expect(String(value('dtstamp'))).toBe('2027-01-18T18:42:00Z');
    expect(value('status')).toBe('CONFIRMED');
    expect(value('summary')).toBe('Sked QA1LUN – QB7TID, 1296 MHz');
    expect(value('location')).toBe('QA1LUN JO97ee, QB7TID FN12');
    const description = String(value('description'));
    expect(description).toContain('Wed 20 Jan 2027 22:00–22:45 UTC');
    expect(description).toContain('QA1LUN: Wed 20 Jan 23:00–23:45 CET');
    expect(description).toContain('QB7TID: Wed 20 Jan 17:00–17:45 EST');
    expect(description).toContain(facts.url);
    const organizer = event.getFirstProperty('organizer')!;
    expect(String(organizer.getFirstValue()).toLowerCase()).toBe('mailto:mail@echotide.example');
    const attendee = event.getFirstProperty('attendee')!;
    expect(String(attendee.getFirstValue()).toLowerCase()).toBe('mailto:edda@tide.example');
    expect(attendee.getParameter('cn')).toBe('Edda');
  });

  it('cancels under the same UID with a higher number', () => {
    const { calendar, event } = read(write(edda, { status: 'CANCELLED', sequence: 3 }));
    expect(calendar.getFirstPropertyValue('method')).toBe('CANCEL');
    expect(event.getFirstPropertyValue('status')).toBe('CANCELLED');
    expect(event.getFirstPropertyValue('uid')).toBe(facts.uid);
    expect(event.getFirstPropertyValue('sequence')).toBe(3);
  });

  it('states times in UTC with Z and names no zone', () => {
    const text = write();
    expect(text).toMatch(/\r\nDTSTART:20270120T220000Z\r\n/);
    expect(text).toMatch(/\r\nDTEND:20270120T224500Z\r\n/);
    expect(text).not.toMatch(/TZID|VTIMEZONE/);
  });

  it('keeps to the rules for content lines whatever people are called', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme', minLength: 1, maxLength: 120 }), (name) => {
        const text = write({ ...edda, name });
        requireContentLines(text);
        const { event } = read(text);
        expect(event.getAllProperties('attendee')).toHaveLength(1);
        expect(event.getFirstPropertyValue('uid')).toBe(facts.uid);
      }),
      { numRuns: 400, seed: 5545 },
    );
  });

  it('takes names with quotes, commas and line breaks without breaking the line', () => {
    const text = write({
      ...edda,
      name: 'Bo "Kurz"; Müller\r\nX-EVIL:1, 🌙🌙🌙🌙🌙🌙🌙🌙🌙🌙🌙🌙🌙🌙🌙🌙🌙🌙🌙🌙',
    });
    requireContentLines(text);
    const cn = read(text).event.getFirstProperty('attendee')!.getParameter('cn');
    expect(cn).toContain('Bo ’Kurz’; Müller X-EVIL:1, 🌙');
    expect(text).not.toMatch(/^X-EVIL/m);
  });
});
