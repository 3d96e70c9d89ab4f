import ical, {
  ICalAttendeeRole,
  ICalAttendeeStatus,
  ICalCalendarMethod,
  ICalEventStatus,
  ICalEventTransparency,
} from 'ical-generator';
import type { CalendarDue } from '../../../domain/sked/machine';
import { formatLocalRange, formatUtcRange } from '../../../domain/time/format';
import type { SkedMailFacts, SkedRecipient } from './skedFacts';

/**
 * The calendar entry of a sked for one recipient (RFC 5545, method per RFC 5546): the same UID for the whole life
 * of the sked, SEQUENCE raised by every message after the first, times in UTC. Only the recipient is named as
 * attendee, so that nobody's address is given to the other side.
 */
export function skedCalendar(
  facts: SkedMailFacts,
  recipient: SkedRecipient,
  due: CalendarDue,
  organizer: string,
  stampMs: number,
): string {
  const cancelled = due.method === 'CANCEL';
  const calendar = ical({
    prodId: { company: 'Echotide', product: 'Echotide', language: 'EN' },
    method: cancelled ? ICalCalendarMethod.CANCEL : ICalCalendarMethod.REQUEST,
    scale: 'gregorian',
  });
  const callSigns = facts.stations.map((station) => station.callSign);
  const event = calendar.createEvent({
    id: facts.uid,
    sequence: due.sequence,
    stamp: new Date(stampMs),
    start: new Date(due.startMs),
    end: new Date(due.endMs),
    summary: `Sked ${callSigns.join(' – ')}, ${facts.bandLabel}`,
    description: [
      `${facts.frequency}, ${facts.modeLabel}`,
      formatUtcRange(due, { withYear: true }),
      ...facts.stations.map(
        ({ callSign, timeZone }) => `${callSign}: ${formatLocalRange(due, timeZone)}`,
      ),
      facts.url,
    ].join('\n'),
    location: facts.stations.map(({ callSign, locator }) => `${callSign} ${locator}`).join(', '),
    url: facts.url,
    organizer: mailbox(organizer),
    status: cancelled ? ICalEventStatus.CANCELLED : ICalEventStatus.CONFIRMED,
    transparency: cancelled ? ICalEventTransparency.TRANSPARENT : ICalEventTransparency.OPAQUE,
  });
  event.createAttendee({
    email: recipient.email,
    name: parameterText(recipient.name),
    role: ICalAttendeeRole.REQ,
    status: ICalAttendeeStatus.ACCEPTED,
    rsvp: false,
  });
  // Every content line ends with CRLF, the last one too; the generator leaves that to us.
  return `${calendar.toString()}\r\n`;
}

/** The configured sender, "Echotide <mail@echotide.example>" or the bare address. */
function mailbox(from: string): { name: string; email: string } {
  const named = /^\s*(.*?)\s*<([^<>]+)>\s*$/.exec(from);
  const name = parameterText(named?.[1] ?? '') || 'Echotide';
  return { name, email: (named?.[2] ?? from).trim() };
}

/** A parameter value may hold neither quotes nor control characters (RFC 5545, 3.2), nor the generator's escape. */
function parameterText(text: string): string {
  return text
    .replace(/["\\]/g, '’')
    .replace(/[\p{Cc}\s]+/gu, ' ')
    .trim();
}
