import { newId } from '../ids';
import type { CalendarMethod, MailTopic } from '../db/tables';
import type { Services } from '../services';
import type { Tx } from '../db/transaction';

/** One mail to one person, with a calendar entry when it is about a time. */
export interface OutgoingMail {
  to: string;
  subject: string;
  text: string;
  html: string;
  /** `method` must be the METHOD inside `body`, or mail programs ignore the entry. */
  calendar?: { method: CalendarMethod; body: string };
  /** Default: about the account, which cannot be switched off. */
  topic?: MailTopic;
  /** Whom and what it is about, so that an answer to the mail finds its way. */
  personId?: string;
  skedId?: string;
  activityId?: string;
  replyTo?: string;
  /** Address that ends mails of this topic with one press (RFC 8058). */
  unsubscribeUrl?: string;
  /** The mail is a reminder; delivery drops it when what it reminds of is no longer so. */
  reminderId?: string;
}

/**
 * Puts a mail into the outbox within the caller's transaction: it goes out exactly when the
 * transaction commits, and the worker delivers it. The Message-ID is fixed here, so that a mail which
 * has to be sent twice is recognised as one. Returns the id of the row.
 */
export async function enqueueMail(
  tx: Tx,
  services: Pick<Services, 'config' | 'now'>,
  mail: OutgoingMail,
): Promise<string> {
  if (!isOneAddress(mail.to)) throw new Error('A mail needs exactly one plain address.');
  if (mail.calendar) requireMethod(mail.calendar);
  const id = newId();
  const now = services.now();
  await tx
    .insertInto('outbox')
    .values({
      id,
      message_id: `<${newId()}@${new URL(services.config.publicUrl).hostname}>`,
      recipient: mail.to,
      subject: oneLine(mail.subject),
      text_body: mail.text,
      html_body: mail.html,
      calendar_method: mail.calendar?.method ?? null,
      calendar_body: mail.calendar?.body ?? null,
      topic: mail.topic ?? 'account',
      person_id: mail.personId ?? null,
      sked_id: mail.skedId ?? null,
      activity_id: mail.activityId ?? null,
      reply_to: mail.replyTo ?? null,
      unsubscribe_url: mail.unsubscribeUrl ?? null,
      reminder_id: mail.reminderId ?? null,
      created_at: now,
      next_attempt_at: now,
      leased_until: null,
      sent_at: null,
      set_aside_at: null,
      last_error: null,
    })
    .execute();
  return id;
}

/** Anything that could end the header or name a second recipient is refused. */
function isOneAddress(text: string): boolean {
  return /^[^\s@,;:<>()[\]"\\\p{Cc}]+@[^\s@,;:<>()"\\\p{Cc}]+$/u.test(text);
}

/** A subject is one header line: line breaks and control characters become single spaces. */
function oneLine(text: string): string {
  return text.replace(/[\p{Cc}\p{Zl}\p{Zp}\s]+/gu, ' ').trim();
}

function requireMethod(calendar: { method: string; body: string }): void {
  const found = /^METHOD:(.+?)\r?$/m.exec(calendar.body)?.[1];
  if (found !== calendar.method) {
    throw new Error(
      `The calendar entry says METHOD:${found ?? '(none)'}, the mail ${calendar.method}.`,
    );
  }
}
