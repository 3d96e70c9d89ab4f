import { listOf } from '../../../domain/sked/view';
import { formatUtcRange } from '../../../domain/time/format';
import type { MailContent } from '../shell';
import type { SkedMailFacts, SkedRecipient } from './skedFacts';
import { skedRows } from './skedMail';

/** Tells somebody who joined or left a crew what becomes of one sked in their calendar. */
export function skedCrewMail(
  facts: SkedMailFacts,
  recipient: SkedRecipient,
  about: { callSign: string; joined: boolean; asked: boolean; agreed: boolean },
): { subject: string; content: MailContent } {
  const { callSign, joined, asked, agreed } = about;
  const others = facts.stations
    .map((station) => station.callSign)
    .filter((name) => name !== callSign);
  const what = agreed ? 'agreed sked' : 'offered sked';
  const title = joined
    ? `${agreed ? 'Agreed' : 'Offered'}: ${callSign}’s sked with ${listOf(others)}`
    : `No longer yours: ${callSign}’s sked with ${listOf(others)}`;
  const paragraph = joined
    ? `You belong to the crew of ${callSign} now, and this ${what} of it lies ahead. The calendar entry is in this mail.`
    : `You no longer belong to the crew of ${callSign}. This ${what} of it is taken out of your calendar; the crew keeps it.`;
  return {
    subject: `${title}, ${formatUtcRange(facts)}, ${facts.bandLabel}`,
    content: {
      title,
      paragraphs: [paragraph],
      facts: skedRows(facts, recipient.timeZone),
      ...(joined
        ? { button: { label: asked ? 'Answer the offer' : 'Open the sked', url: facts.url } }
        : {}),
      footer: joined
        ? `You get this mail because you belong to the crew of ${callSign}.`
        : `You get this mail because you belonged to the crew of ${callSign}.`,
    },
  };
}
