import ICAL from 'ical.js';

/** What a calendar program says about one event. */
export interface CalendarAnswer {
  method: string;
  uid: string;
  sequence: number;
  /** Who answers; one, where the rules are kept (RFC 5546, 3.2.3). */
  attendees: { email: string; partstat: string }[];
  comment: string;
}

/** The first answer among the calendar parts of a mail; null when there is none that can be read. */
export function readAnswer(calendars: readonly string[]): CalendarAnswer | null {
  for (const text of calendars) {
    const answer = readOne(text);
    if (answer) return answer;
  }
  return null;
}

function readOne(text: string): CalendarAnswer | null {
  try {
    const calendar = new ICAL.Component(ICAL.parse(text) as unknown[]);
    const event = calendar.getFirstSubcomponent('vevent');
    const method = String(calendar.getFirstPropertyValue('method') ?? '').toUpperCase();
    const uid = String(event?.getFirstPropertyValue('uid') ?? '');
    if (!event || uid === '' || !['REPLY', 'COUNTER'].includes(method)) return null;
    const sequence = Number(event.getFirstPropertyValue('sequence') ?? 0);
    return {
      method,
      uid,
      sequence: Number.isSafeInteger(sequence) ? sequence : 0,
      attendees: event.getAllProperties('attendee').map((attendee) => ({
        email: String(attendee.getFirstValue())
          .replace(/^mailto:/i, '')
          .trim()
          .toLowerCase(),
        partstat: textOf(attendee.getParameter('partstat')).toUpperCase(),
      })),
      comment: String(event.getFirstPropertyValue('comment') ?? '').trim(),
    };
  } catch {
    return null;
  }
}

function textOf(parameter: unknown): string {
  return typeof parameter === 'string' ? parameter : '';
}
