import { expect } from '@playwright/test';
import ICAL from 'ical.js';
import type { RunningServer } from './server';

/** A mail as the catcher got it. */
export interface CaughtMail {
  id: string;
  subject: string;
  text: string;
  html: string;
  to: string[];
  source: string;
}

interface CatcherMail {
  id: string;
  subject: string;
  text?: string;
  html?: string;
  to: { address: string }[];
}

/** Every mail to the address so far, in the order in which they came. */
export async function mailsTo(server: RunningServer, address: string): Promise<CaughtMail[]> {
  const all = (await readJson(server, '/api/email')) as CatcherMail[];
  const mine = all.filter((mail) => mail.to.some((to) => to.address === address));
  return Promise.all(
    mine.map(async ({ id, subject, text = '', html = '', to }) => ({
      id,
      subject,
      text,
      html,
      to: to.map((one) => one.address),
      source: await (await fetch(`${server.mailUrl}/api/email/${id}/source`)).text(),
    })),
  );
}

async function readJson(server: RunningServer, path: string): Promise<unknown> {
  const response = await fetch(server.mailUrl + path);
  if (!response.ok) throw new Error(`The mail catcher answers ${response.status} at ${path}.`);
  return response.json();
}

/** Waits for a mail to the address whose subject matches; the newest of several. */
export async function waitForMail(
  server: RunningServer,
  address: string,
  subject: RegExp,
): Promise<CaughtMail> {
  let found: CaughtMail | undefined;
  await expect
    .poll(
      async () => {
        found = (await mailsTo(server, address))
          .filter((mail) => subject.test(mail.subject))
          .at(-1);
        return found?.subject;
      },
      { message: `a mail to ${address} about ${String(subject)}`, timeout: 20_000 },
    )
    .toBeDefined();
  return found!;
}

/** The first link of the mail's text that leads to this server and matches. */
export function linkIn(server: RunningServer, mail: CaughtMail, path: RegExp): string {
  const links = mail.text.match(/https?:\/\/[^\s<>"]+/g) ?? [];
  const found = links.find((link) => link.startsWith(server.url) && path.test(link));
  if (!found) throw new Error(`No link ${String(path)} in “${mail.subject}”:\n${mail.text}`);
  return found;
}

export interface CalendarEntry {
  /** METHOD of the calendar and `method` of its MIME part. */
  method: string;
  mimeMethod: string;
  uid: string;
  sequence: number;
  startMs: number;
  endMs: number;
  status: string;
  summary: string;
}

/** The calendar entry in a mail, read by another library than the one that wrote it. */
export function calendarIn(mail: CaughtMail): CalendarEntry {
  const part = mimeParts(mail.source).find(({ head }) =>
    /^content-type:\s*text\/calendar/im.test(head),
  );
  if (!part) throw new Error(`No calendar entry in “${mail.subject}”.`);
  const mimeMethod = /method="?([A-Z]+)"?/i.exec(part.head)?.[1] ?? '';
  const calendar = new ICAL.Component(ICAL.parse(part.body) as unknown[]);
  const event = new ICAL.Event(calendar.getFirstSubcomponent('vevent')!);
  return {
    method: String(calendar.getFirstPropertyValue('method')),
    mimeMethod,
    uid: event.uid,
    sequence: event.sequence,
    startMs: event.startDate.toJSDate().getTime(),
    endMs: event.endDate.toJSDate().getTime(),
    status: String(event.component.getFirstPropertyValue('status') ?? ''),
    summary: event.summary,
  };
}

/** Leaves of the MIME tree with their transfer encoding undone. */
function mimeParts(source: string): { head: string; body: string }[] {
  const at = source.search(/\r?\n\r?\n/);
  const head = source.slice(0, at).replace(/\r?\n[ \t]+/g, ' ');
  const body = source.slice(at).replace(/^\r?\n\r?\n/, '');
  const boundary = /^content-type:\s*multipart\/.*boundary="?([^";]+)"?/im.exec(head)?.[1];
  if (boundary) {
    return body
      .split(`--${boundary}`)
      .slice(1, -1)
      .flatMap((part) => mimeParts(part.replace(/^\r?\n/, '')));
  }
  const encoding = /^content-transfer-encoding:\s*(\S+)/im.exec(head)?.[1]?.toLowerCase();
  return [{ head, body: decoded(body, encoding) }];
}

function decoded(body: string, encoding: string | undefined): string {
  if (encoding === 'base64') return Buffer.from(body, 'base64').toString('utf8');
  if (encoding !== 'quoted-printable') return body;
  const bytes = body
    .replace(/=\r?\n/g, '')
    .replace(/=([0-9A-F]{2})/gi, (_, hex: string) => String.fromCharCode(parseInt(hex, 16)));
  return Buffer.from(bytes, 'latin1').toString('utf8');
}
