import { newId } from '../../../src/server/ids';

const CRLF = '\r\n';

export interface ReplyParts {
  from: string;
  to: string;
  uid: string;
  sequence: number;
  partstat: string;
  attendee?: string;
  comment?: string;
  method?: string;
  messageId?: string;
  headers?: string[];
  encoding?: 'base64' | '8bit' | 'quoted-printable';
}

/** What a calendar program sends back: the answer as an alternative beside a line for people. */
export function calendarReply(parts: ReplyParts): Buffer {
  const attendee = parts.attendee ?? parts.from;
  const calendar = [
    'BEGIN:VCALENDAR',
    'PRODID:-//Calendar of somebody//EN',
    'VERSION:2.0',
    `METHOD:${parts.method ?? 'REPLY'}`,
    'BEGIN:VEVENT',
    `UID:${parts.uid}`,
    `SEQUENCE:${parts.sequence}`,
    'DTSTAMP:20270118T190000Z',
    'DTSTART:20270120T220000Z',
    'DTEND:20270120T223000Z',
    `ORGANIZER;CN=Echotide:mailto:${parts.to}`,
    `ATTENDEE;PARTSTAT=${parts.partstat};CN="Somebody, at`,
    `  home":MAILTO:${attendee}`,
    ...(parts.comment ? [`COMMENT:${parts.comment}`] : []),
    'END:VEVENT',
    'END:VCALENDAR',
    '',
  ].join(CRLF);
  const encoding = parts.encoding ?? 'base64';
  const bodies = {
    base64: () =>
      Buffer.from(calendar)
        .toString('base64')
        .replace(/(.{76})/g, `$1${CRLF}`),
    '8bit': () => calendar,
    'quoted-printable': () => calendar.replace(/=/g, '=3D'),
  };
  return Buffer.from(
    [
      `Message-ID: ${parts.messageId ?? `<${newId()}@somewhere.example>`}`,
      `From: "Somebody" <${parts.from}>`,
      `To: Echotide <${parts.to}>`,
      'Subject: =?utf-8?Q?Accepted=3A_Sked?=',
      'Date: Mon, 18 Jan 2027 20:00:00 +0100',
      ...(parts.headers ?? []),
      'MIME-Version: 1.0',
      'Content-Type: multipart/alternative; boundary="b1"',
      '',
      '--b1',
      'Content-Type: text/plain; charset=utf-8',
      '',
      'Somebody has answered.',
      '--b1',
      `Content-Type: text/calendar; charset="utf-8"; method=${parts.method ?? 'REPLY'}`,
      `Content-Transfer-Encoding: ${encoding}`,
      '',
      bodies[encoding](),
      '--b1--',
      '',
    ].join(CRLF),
  );
}

/** A mail in plain words. */
export function wordsMail(parts: {
  from: string;
  to: string;
  text: string;
  messageId?: string;
  headers?: string[];
}): Buffer {
  return Buffer.from(
    [
      `Message-ID: ${parts.messageId ?? `<${newId()}@somewhere.example>`}`,
      `From: ${parts.from}`,
      `To: ${parts.to}`,
      'Subject: Re: QA1LUN offers a sked',
      ...(parts.headers ?? []),
      'MIME-Version: 1.0',
      'Content-Type: text/plain; charset=utf-8',
      '',
      parts.text.replace(/\r?\n/g, CRLF),
    ].join(CRLF),
  );
}
