import type { Tx } from '../db/transaction';
import type { SkedRow } from '../db/tables';
import { enqueueMail } from '../mail/outbox';
import { renderMail, type MailContent } from '../mail/shell';
import { methodOf, skedCalendar, type PersonalEntry } from '../mail/templates/skedCalendar';
import type { SkedMailFacts, SkedRecipient } from '../mail/templates/skedFacts';
import type { Services } from '../services';
import { letterForGuest } from './recipients';
import { replyAddress } from './replyAddress';

export interface SkedLetter {
  sked: Pick<SkedRow, 'id' | 'uid'>;
  facts: SkedMailFacts;
  recipient: SkedRecipient;
  subject: string;
  content: MailContent;
  /** What the recipient's calendar should show now; absent: the mail is not about that. */
  entry?: PersonalEntry;
}

/** Puts one mail about a sked into the outbox; an answer to it goes to the recipient's own address for this sked. */
export async function sendSkedMail(tx: Tx, services: Services, letter: SkedLetter): Promise<void> {
  const { config } = services;
  const { recipient } = letter;
  const { facts, content, unsubscribeUrl } = recipient.guest
    ? await letterForGuest(tx, services, letter)
    : { ...letter, unsubscribeUrl: null };
  const { sked, subject, entry } = letter;
  const replyTo = replyAddress(config, sked.uid, recipient.personId);
  await enqueueMail(tx, services, {
    to: recipient.email,
    subject,
    ...renderMail(replyTo === null ? content : withReplyHint(content)),
    topic: 'sked',
    personId: recipient.personId,
    skedId: sked.id,
    ...(replyTo === null ? {} : { replyTo }),
    ...(unsubscribeUrl === null ? {} : { unsubscribeUrl }),
    ...(entry
      ? {
          calendar: {
            method: methodOf(entry),
            body: skedCalendar(facts, recipient, entry, replyTo ?? config.smtp.from),
          },
        }
      : {}),
  });
}

/** People must know that what they answer is read by others. */
export function withReplyHint(content: MailContent): MailContent {
  const hint = 'What you answer to this mail is shown to the other parties of the sked.';
  return { ...content, footer: `${content.footer} ${hint}` };
}
