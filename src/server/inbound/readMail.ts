import { createHash } from 'node:crypto';
import PostalMime, { addressParser, type Attachment, type Email } from 'postal-mime';
import { InvalidInput } from '../errors';

/** A mail that came in, as far as it matters here. */
export interface InboundMail {
  messageId: string;
  /** Every address it was sent or delivered to. */
  recipients: string[];
  /** Written by a program, such as a note of absence or a bounce, so that nobody waits for an answer. */
  automatic: boolean;
  /** Plain text of the message, "" when it has none. */
  text: string;
  /** Texts of its calendar parts. */
  calendars: string[];
}

const ADDRESSED = ['to', 'cc', 'delivered-to', 'x-original-to'];
const LONGEST_ID = 250;

/** Reads a message (RFC 5322, MIME). Throws `InvalidInput` when it is none. */
export async function readMail(raw: Uint8Array): Promise<InboundMail> {
  let email: Email;
  try {
    email = await PostalMime.parse(raw, { forceRfc822Attachments: true, maxNestingDepth: 20 });
  } catch (error) {
    throw new InvalidInput(`The message cannot be read: ${reasonOf(error)}.`);
  }
  if (!email.headers.some(({ key }) => key === 'from' || ADDRESSED.includes(key))) {
    throw new InvalidInput('That is not a mail: it has neither sender nor recipient.');
  }
  return {
    messageId: messageIdOf(email, raw),
    recipients: email.headers
      .filter(({ key }) => ADDRESSED.includes(key))
      .flatMap(({ value }) => addressParser(value, { flatten: true }))
      .flatMap(({ address }) => (address ? [address.toLowerCase()] : [])),
    automatic: isAutomatic(email),
    text: email.text ?? '',
    calendars: email.attachments.filter(isCalendar).map(textOf),
  };
}

function reasonOf(error: unknown): string {
  return error instanceof Error ? error.message.replace(/[\s.]+$/, '') : String(error);
}

/** The Message-ID, or what stands for it where there is none. */
function messageIdOf(email: Email, raw: Uint8Array): string {
  const given = email.messageId?.trim() ?? '';
  if (given !== '' && given.length <= LONGEST_ID) return given;
  return `sha256:${createHash('sha256').update(raw).digest('base64url')}`;
}

/** RFC 3834, 2, and what older programs say instead. */
function isAutomatic(email: Email): boolean {
  const value = (name: string) =>
    email.headers
      .find(({ key }) => key === name)
      ?.value.trim()
      .toLowerCase() ?? '';
  const submitted = value('auto-submitted').split(';')[0]!.trim();
  return (
    (submitted !== '' && submitted !== 'no') ||
    value('return-path') === '<>' ||
    /^(bulk|junk|list|auto_reply)$/.test(value('precedence')) ||
    value('x-autoreply') !== '' ||
    value('x-autorespond') !== '' ||
    value('content-type').startsWith('multipart/report') ||
    /^(mailer-daemon|postmaster)@/i.test(email.from?.address ?? '')
  );
}

function isCalendar({ mimeType, filename }: Attachment): boolean {
  if (mimeType === 'text/calendar' || mimeType === 'application/ics') return true;
  return mimeType === 'application/octet-stream' && /\.ics$/i.test(filename ?? '');
}

function textOf({ content }: Attachment): string {
  return typeof content === 'string' ? content : new TextDecoder().decode(content);
}
