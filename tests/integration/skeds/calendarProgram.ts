import ICAL from 'ical.js';
import type { OutboxRow } from '../../../src/server/db/tables';

/** One calendar message as another library reads it. */
export interface Entry {
  method: string;
  uid: string;
  sequence: number;
  stampMs: number;
  startMs: number;
  endMs: number;
  status: string;
  organizer: string;
  attendee: string;
  partstat: string;
  rsvp: string;
  transparent: boolean;
}

export function readEntry(body: string): Entry {
  const calendar = new ICAL.Component(ICAL.parse(body) as unknown[]);
  const component = calendar.getFirstSubcomponent('vevent')!;
  const event = new ICAL.Event(component);
  const attendee = component.getFirstProperty('attendee');
  const text = (name: string) => String(component.getFirstPropertyValue(name));
  const parameter = (name: string) => {
    const value: unknown = attendee?.getParameter(name);
    return typeof value === 'string' ? value : '';
  };
  const stamp = component.getFirstPropertyValue('dtstamp') as ICAL.Time;
  return {
    method: String(calendar.getFirstPropertyValue('method')),
    uid: event.uid,
    sequence: event.sequence,
    stampMs: stamp.toJSDate().getTime(),
    startMs: event.startDate.toJSDate().getTime(),
    endMs: event.endDate.toJSDate().getTime(),
    status: text('status'),
    organizer: text('organizer').toLowerCase(),
    attendee: attendee ? String(attendee.getFirstValue()).toLowerCase() : '',
    partstat: parameter('partstat'),
    rsvp: parameter('rsvp').toUpperCase(),
    transparent: text('transp') === 'TRANSPARENT',
  };
}

/** What calendar programs show: for each person, for each UID. */
export type Calendars = Map<string, Map<string, Entry>>;

/**
 * Takes one message in, as a calendar program does whatever order they come in: the one with the highest SEQUENCE
 * counts, among equals the one with the latest DTSTAMP (RFC 5546, 2.1.5).
 */
export function takeIn(calendars: Calendars, recipient: string, entry: Entry): void {
  const own = calendars.get(recipient) ?? new Map<string, Entry>();
  const known = own.get(entry.uid);
  const newer =
    !known ||
    entry.sequence > known.sequence ||
    (entry.sequence === known.sequence && entry.stampMs >= known.stampMs);
  if (newer) own.set(entry.uid, entry);
  calendars.set(recipient, own);
}

/** What calendar programs show after these mails. */
export function calendarsAfter(mails: readonly OutboxRow[]): Calendars {
  const calendars: Calendars = new Map();
  for (const mail of mails) {
    if (mail.calendar_body !== null)
      takeIn(calendars, mail.recipient, readEntry(mail.calendar_body));
  }
  return calendars;
}
