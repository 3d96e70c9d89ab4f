import { inTransaction } from '~/server/db/transaction';
import type { OutboxRow } from '~/server/db/tables';
import { enqueueMail, type OutgoingMail } from '~/server/mail/outbox';
import { renderMail } from '~/server/mail/shell';
import type { Ground } from '../platform/ground';

export const ENTRY_UID = '7d0f7a34-sked@echotide.example';

/** A calendar entry as the sked mails carry it. */
export const ENTRY = [
  'BEGIN:VCALENDAR',
  'VERSION:2.0',
  'PRODID:-//Echotide//Test//EN',
  'METHOD:REQUEST',
  'BEGIN:VEVENT',
  `UID:${ENTRY_UID}`,
  'SEQUENCE:2',
  'DTSTAMP:20270118T184200Z',
  'DTSTART:20270119T210000Z',
  'DTEND:20270119T220000Z',
  'SUMMARY:Sked QA1LUN – QB7TID',
  'END:VEVENT',
  'END:VCALENDAR',
  '',
].join('\r\n');

export function letter(change: Partial<OutgoingMail> = {}): OutgoingMail {
  return {
    to: 'ylva@qa1lun.example',
    subject: 'Sked agreed: QA1LUN – QB7TID',
    ...renderMail({
      title: 'Sked agreed',
      paragraphs: ['Edda wrote: <b>see you & 73</b>'],
      facts: [
        ['Start', '2027-01-19 21:00 UTC'],
        ['End', '22:00 UTC'],
      ],
      button: { label: 'Open the sked', url: 'https://echotide.example/skeds/1?a=1&b=2' },
      footer: 'You get this mail because you keep QA1LUN.',
    }),
    calendar: { method: 'REQUEST', body: ENTRY },
    ...change,
  };
}

export function post(ground: Ground, change: Partial<OutgoingMail> = {}): Promise<string> {
  return inTransaction(ground.db, (tx) => enqueueMail(tx, ground, letter(change)));
}

export function rowOf({ db }: Ground, id: string): Promise<OutboxRow> {
  return db.selectFrom('outbox').selectAll().where('id', '=', id).executeTakeFirstOrThrow();
}
