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
  const parameter = (name: string) => String(attendee?.getFirstParameter(name) ?? '');
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

/**
 * What a calendar program shows to each person for each UID after these mails, whatever order they came in: the message
 * with the highest SEQUENCE counts, among equals the one with the latest DTSTAMP (RFC 5546, 2.1.5).
 */
export function calendarsAfter(mails: readonly OutboxRow[]): Map<string, Map<string, Entry>> {
  const people = new Map<string, Map<string, Entry>>();
  for (const mail of mails) {
    if (mail.calendar_body === null) continue;
    const entry = readEntry(mail.calendar_body);
    const own = people.get(mail.recipient) ?? new Map<string, Entry>();
    const known = own.get(entry.uid);
    const newer =
      !known ||
      entry.sequence > known.sequence ||
      (entry.sequence === known.sequence && entry.stampMs >= known.stampMs);
    if (newer) own.set(entry.uid, entry);
    people.set(mail.recipient, own);
  }
  return people;
}
