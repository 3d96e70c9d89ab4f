import nodemailer from 'nodemailer';
import type { Config } from '../config';
import type { OutboxRow } from '../db/tables';

/** Hands one mail to the mail server. Resolves when the server has taken responsibility for it. */
export type SendMail = (mail: OutboxRow, signal: AbortSignal) => Promise<void>;

/** Why a mail was not taken. `permanent` means that trying again would give the same answer. */
export class NotTaken extends Error {
  constructor(
    readonly reason: string,
    readonly permanent: boolean,
  ) {
    super(reason);
    this.name = 'NotTaken';
  }
}

const SMTP_TIMEOUTS = { connectionTimeout: 10_000, greetingTimeout: 10_000, socketTimeout: 20_000 };

/** The configured mail server as a function. One connection a mail: simple, and nothing to keep alive. */
export function smtpTransport({ smtp, publicUrl }: Config): SendMail {
  const transporter = nodemailer.createTransport({
    host: smtp.host,
    port: smtp.port,
    secure: smtp.tls === 'tls',
    requireTLS: smtp.tls === 'starttls',
    ignoreTLS: smtp.tls === 'none',
    name: new URL(publicUrl).hostname,
    disableFileAccess: true,
    disableUrlAccess: true,
    ...(smtp.user === undefined ? {} : { auth: { user: smtp.user, pass: smtp.password ?? '' } }),
    ...SMTP_TIMEOUTS,
  });
  return async (mail, signal) => {
    try {
      await transporter.sendMail({
        from: smtp.from,
        to: { name: '', address: mail.recipient },
        subject: mail.subject,
        text: mail.text_body,
        html: mail.html_body,
        messageId: mail.message_id,
        date: new Date(mail.created_at),
        headers: { 'Auto-Submitted': 'auto-generated', ...unsubscribeHeaders(mail) },
        ...(mail.reply_to === null ? {} : { replyTo: mail.reply_to }),
        ...calendarPart(mail),
        signal,
      });
    } catch (error) {
      throw notTaken(error);
    }
  };
}

/** One-press unsubscribing (RFC 8058): the mail program posts to the address by itself. */
function unsubscribeHeaders({ unsubscribe_url: url }: OutboxRow): Record<string, string> {
  if (url === null) return {};
  return {
    'List-Unsubscribe': `<${url}>`,
    'List-Unsubscribe-Post': 'List-Unsubscribe=One-Click',
  };
}

/**
 * nodemailer puts the entry in twice: as a text/calendar alternative with the method (mail programs
 * that show an invitation read that one) and as the attachment invite.ics (for those that only file it).
 */
function calendarPart(mail: OutboxRow): object {
  if (mail.calendar_method === null || mail.calendar_body === null) return {};
  return {
    icalEvent: {
      method: mail.calendar_method,
      content: mail.calendar_body,
      filename: 'invite.ics',
    },
  };
}

/** What nodemailer tells about a failed conversation. */
interface SmtpFailure {
  message: string;
  code?: string;
  responseCode?: number;
  command?: string;
}

/**
 * Only a 5xx to this very mail (sender, recipient or content) is final. A 5xx to the connection, the
 * greeting or the password is about our configuration, and other mails would be lost with it.
 */
export function notTaken(error: unknown): NotTaken {
  const failure = error as SmtpFailure;
  const aboutThisMail = ['MAIL FROM', 'RCPT TO', 'DATA'].includes(failure.command ?? '');
  const permanent = aboutThisMail && (failure.responseCode ?? 0) >= 500;
  const words = failure.message.replace(/\s+/g, ' ').trim();
  return new NotTaken(failure.code ? `${failure.code}: ${words}` : words, permanent);
}
