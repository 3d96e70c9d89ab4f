import type { MailContent } from '../shell';

/** What a mail to somebody without an account has to say beside its news. */
export interface GuestMailFacts {
  /** The link that needs no account. */
  url: string;
  noMoreUrl: string;
  /** "Ylva, QA1LUN," */
  askedBy: string;
}

/** The same news for somebody who has not heard of Echotide: what it is, who asks, and how to end it. */
export function guestContent(content: MailContent, facts: GuestMailFacts): MailContent {
  const { url, noMoreUrl, askedBy } = facts;
  return {
    ...content,
    paragraphs: [
      ...content.paragraphs,
      `Echotide finds the hours when the Moon stands in the sky of both stations and keeps what they agree on. ${askedBy} asked it to write to you; you answer behind the link, without an account.`,
    ],
    ...(content.button ? { button: { ...content.button, url } } : {}),
    footer: `You get this mail because ${askedBy} gave your address for this sked. The link is for you alone: whoever has it can answer for you.`,
    unsubscribe: { label: 'Write to me no more', url: noMoreUrl },
  };
}
