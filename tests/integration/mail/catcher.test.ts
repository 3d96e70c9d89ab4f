import ICAL from 'ical.js';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { deliverDue } from '~/server/mail/deliver';
import { switchableMail } from '~/server/mail/switchable';
import { smtpTransport } from '~/server/mail/transport';
import { readUnsubscribeToken } from '~/server/mail/unsubscribe';
import { startChild } from '../platform/children';
import { freePorts } from '../platform/freePorts';
import { openGround, type Ground } from '../platform/ground';
import { ENTRY_UID, letter, post, rowOf } from './letters';

/** What the catcher's API says of a mail. */
interface Caught {
  id: string;
  subject: string;
  text: string;
  html: string;
  to: { address: string }[];
  from: { address: string; name: string }[];
  attachments: { fileName?: string; filename?: string; contentType: string }[];
}

let ground: Ground;
let api: string;
let catcher: ReturnType<typeof startChild>;

beforeAll(async () => {
  const [smtp, web] = await freePorts(2);
  catcher = startChild(['mail-fake/main.mjs'], {
    MAIL_PORT: String(smtp),
    MAIL_WEB_PORT: String(web),
  });
  await catcher.ready;
  ground = await openGround({ SMTP_PORT: String(smtp) });
  api = `http://127.0.0.1:${web}`;
}, 60_000);
afterAll(async () => {
  catcher.child.kill('SIGTERM');
  expect((await catcher.ended).code).toBe(0);
  await ground.end();
});

async function caught(): Promise<Caught[]> {
  return (await (await fetch(`${api}/api/email`)).json()) as Caught[];
}

describe('a mail through a real SMTP server', () => {
  let source: string;
  let mail: Caught;
  let messageId: string;

  beforeAll(async () => {
    const id = await post(ground);
    await deliverDue(ground, {
      send: smtpTransport(ground.config),
      leaseMs: 60_000,
      atOnce: 1,
    });
    const row = await rowOf(ground, id);
    expect(row.last_error).toBeNull();
    messageId = row.message_id;
    mail = (await caught())[0]!;
    source = await (await fetch(`${api}/api/email/${mail.id}/source`)).text();
  });

  it('arrives with what was written', () => {
    const { subject, text, html } = letter();
    expect(mail.subject).toBe(subject);
    expect(mail.to[0]?.address).toBe('ylva@qa1lun.example');
    expect(mail.from[0]).toEqual({ name: 'Echotide', address: 'echotide@echotide.example' });
    expect(mail.text.trim()).toBe(text.trim());
    expect(mail.html.trim()).toBe(html.replaceAll('\r\n', '\n').trim());
  });

  it('has the fixed Message-ID, its own date, and says that nobody wrote it by hand', () => {
    expect(source).toContain(`Message-ID: ${messageId}`);
    expect(source).toContain('Date: Mon, 18 Jan 2027 18:42:00 +0000');
    expect(source).toContain('Auto-Submitted: auto-generated');
  });

  it('carries the calendar entry as an invitation and as invite.ics', () => {
    const types = source.match(/^Content-Type: (text\/calendar|application\/ics).*(\r?\n\s.*)*/gm);
    expect(types).toHaveLength(2);
    expect(types![0]).toMatch(/text\/calendar;[\s\S]*method=REQUEST/);
    expect(types![1]).toMatch(/application\/ics;[\s\S]*name=invite\.ics/);
    expect(mail.attachments.some((part) => JSON.stringify(part).includes('invite.ics'))).toBe(true);
    const entries = partsOf(source, /text\/calendar|application\/ics/);
    expect(entries).toHaveLength(2);
    for (const entry of entries) {
      const calendar = new ICAL.Component(ICAL.parse(entry) as unknown[]);
      expect(calendar.getFirstPropertyValue('method')).toBe('REQUEST');
      const event = new ICAL.Event(calendar.getFirstSubcomponent('vevent')!);
      expect([event.uid, event.sequence, event.summary]).toEqual([
        ENTRY_UID,
        2,
        'Sked QA1LUN – QB7TID',
      ]);
    }
  });
});

describe('a mail that can be switched off', () => {
  it('arrives with both headers of one-press unsubscribing and a link in its text', async () => {
    const to = { personId: 'person-ylva', email: 'ylva@qa1lun.example' };
    const content = { title: 'Reminder', paragraphs: [], footer: 'Why.' };
    const letter = switchableMail(ground.config, to, 'reminder', {
      subject: 'A reminder',
      content,
    });
    await ground.db
      .insertInto('person')
      .values({
        id: to.personId,
        email: to.email,
        name: 'Ylva',
        password_hash: null,
        role: 'operator',
        time_zone: 'UTC',
        confirmed_at: 0,
        locked_at: null,
        sessions_valid_from: 0,
        created_at: 0,
      })
      .execute();
    await post(ground, { ...letter, calendar: undefined, topic: 'sked' } as never);
    await deliverDue(ground, { send: smtpTransport(ground.config), leaseMs: 60_000, atOnce: 9 });
    const mail = (await caught()).find(({ subject }) => subject === 'A reminder')!;
    const source = await (await fetch(`${api}/api/email/${mail.id}/source`)).text();
    const unfolded = source.replace(/\r?\n[ \t]+/g, ' ');
    expect(unfolded).toContain(`List-Unsubscribe: <${letter.unsubscribeUrl}>`);
    expect(unfolded).toContain('List-Unsubscribe-Post: List-Unsubscribe=One-Click');
    expect(mail.text).toContain(letter.unsubscribeUrl);
    expect(mail.html).toContain(letter.unsubscribeUrl);
    const token = letter.unsubscribeUrl!.split('/').at(-1)!;
    expect(readUnsubscribeToken(ground.config, token)).toEqual({
      personId: to.personId,
      topic: 'reminder',
    });
  });
});

/** The decoded bodies of the parts of a type. */
function partsOf(source: string, type: RegExp): string[] {
  return source
    .replaceAll('\r\n', '\n')
    .split(/^--\S+$/m)
    .filter((part) => type.test(/^Content-Type:.*/m.exec(part)?.[0] ?? ''))
    .map((part) => {
      const [head = '', ...rest] = part.trimStart().split('\n\n');
      const body = rest.join('\n\n');
      if (/base64/i.test(head)) return Buffer.from(body, 'base64').toString('utf8');
      if (!/quoted-printable/i.test(head)) return body;
      const bytes = body
        .replace(/=\n/g, '')
        .replace(/=([0-9A-F]{2})/g, (_all, hex: string) => String.fromCharCode(parseInt(hex, 16)));
      return Buffer.from(bytes, 'latin1').toString('utf8');
    });
}
