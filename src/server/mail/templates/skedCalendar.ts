import ical, {
  ICalAttendeeRole,
  ICalAttendeeStatus,
  ICalCalendarMethod,
  ICalEventStatus,
  ICalEventTransparency,
  type ICalCalendar,
  type ICalEvent,
} from 'ical-generator';
import type { CalendarDue } from '../../../domain/sked/standing';
import { formatLocalRange, formatUtcRange } from '../../../domain/time/format';
import type { SkedMailFacts, SkedRecipient } from './skedFacts';

/** What one person's calendar shows of a sked. */
export interface PersonalEntry extends CalendarDue {
  /** Whether the person still has to answer. */
  asked: boolean;
  /** When the entry was last told anew. */
  stampMs: number;
}

export function methodOf(entry: Pick<PersonalEntry, 'status'>): 'REQUEST' | 'CANCEL' {
  return entry.status === 'CANCELLED' ? 'CANCEL' : 'REQUEST';
}

/**
 * The calendar message of a sked for one recipient (RFC 5545, method per RFC 5546): the same UID for the whole life
 * of the sked, SEQUENCE raised by every message after the first, times in UTC. `organizer`: where the answer goes.
 */
export function skedCalendar(
  facts: SkedMailFacts,
  recipient: Pick<SkedRecipient, 'email' | 'name'>,
  entry: PersonalEntry,
  organizer: string,
): string {
  const calendar = newCalendar(
    methodOf(entry) === 'CANCEL' ? ICalCalendarMethod.CANCEL : ICalCalendarMethod.REQUEST,
  );
  addSked(calendar, facts, recipient, entry, organizer);
  return written(calendar);
}

export interface PublishedSked {
  facts: SkedMailFacts;
  /** Its `stampMs` is when the sked last changed. */
  entry: PersonalEntry;
  organizer: string;
}

/** A calendar to be read as it stands, without asking anybody: a feed, or one sked to download (RFC 5546, 3.2.1). */
export function publishedCalendar(name: string, skeds: readonly PublishedSked[]): string {
  const calendar = newCalendar(ICalCalendarMethod.PUBLISH);
  calendar.name(name);
  calendar.ttl(REREAD_S);
  for (const { facts, entry, organizer } of skeds) {
    addSked(calendar, facts, null, entry, organizer).lastModified(new Date(entry.stampMs));
  }
  const text = written(calendar);
  return skeds.length > 0 ? text : text.replace('END:VCALENDAR', `${EMPTY}END:VCALENDAR`);
}

const REREAD_S = 3600;

/** A calendar has at least one component (RFC 5545, 3.6); without a sked it is the zone that all times are in. */
const EMPTY = [
  'BEGIN:VTIMEZONE',
  'TZID:UTC',
  'BEGIN:STANDARD',
  'DTSTART:19700101T000000',
  'TZOFFSETFROM:+0000',
  'TZOFFSETTO:+0000',
  'END:STANDARD',
  'END:VTIMEZONE',
  '',
].join('\r\n');

function newCalendar(method: ICalCalendarMethod): ICalCalendar {
  return ical({
    prodId: { company: 'Echotide', product: 'Echotide', language: 'EN' },
    method,
    scale: 'gregorian',
  });
}

/** Only the recipient is named as attendee, so that nobody's address is given to the other side. */
function addSked(
  calendar: ICalCalendar,
  facts: SkedMailFacts,
  recipient: Pick<SkedRecipient, 'email' | 'name'> | null,
  entry: PersonalEntry,
  organizer: string,
): ICalEvent {
  const callSigns = facts.stations.map((station) => station.callSign);
  const event = calendar.createEvent({
    id: facts.uid,
    sequence: entry.sequence,
    stamp: new Date(entry.stampMs),
    start: new Date(entry.startMs),
    end: new Date(entry.endMs),
    summary: `Sked ${callSigns.join(' – ')}, ${facts.bandLabel}`,
    description: [
      `${facts.frequency}, ${facts.modeLabel}`,
      formatUtcRange(entry, { withYear: true }),
      ...facts.stations.map(
        ({ callSign, timeZone }) => `${callSign}: ${formatLocalRange(entry, timeZone)}`,
      ),
      facts.url,
    ].join('\n'),
    location: facts.stations.map(({ callSign, locator }) => `${callSign} ${locator}`).join(', '),
    url: facts.url,
    organizer: mailbox(organizer),
    status: STATUS[entry.status],
    // An offer holds nobody; an agreed slot does.
    transparency:
      entry.status === 'CONFIRMED'
        ? ICalEventTransparency.OPAQUE
        : ICalEventTransparency.TRANSPARENT,
  });
  if (!recipient) return event;
  event.createAttendee({
    email: recipient.email,
    name: parameterText(recipient.name),
    role: ICalAttendeeRole.REQ,
    status: entry.asked ? ICalAttendeeStatus.NEEDSACTION : ICalAttendeeStatus.ACCEPTED,
    rsvp: entry.asked,
  });
  return event;
}

const STATUS: Record<PersonalEntry['status'], ICalEventStatus> = {
  TENTATIVE: ICalEventStatus.TENTATIVE,
  CONFIRMED: ICalEventStatus.CONFIRMED,
  CANCELLED: ICalEventStatus.CANCELLED,
};

/** Every content line ends with CRLF, the last one too; the generator leaves that to us. */
function written(calendar: ICalCalendar): string {
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
