import { formatUtcRange } from '../../../domain/time/format';
import type { Interval } from '../../../domain/time/interval';
import type { MailContent } from '../shell';
import type { SkedMailFacts, SkedRecipient } from './skedFacts';
import { skedRows } from './skedMail';

/** Tells somebody why an answer by mail changed nothing, what has happened since, and what can be done instead. */
export function skedAnswerMail(
  facts: SkedMailFacts,
  recipient: SkedRecipient,
  why: { sentences: string[]; alternatives: Interval[]; corrects: boolean },
): { subject: string; content: MailContent } {
  const title = 'Your answer changed nothing';
  return {
    subject: `${title}: sked ${formatUtcRange(facts)}, ${facts.bandLabel}`,
    content: {
      title,
      paragraphs: [
        why.sentences.join(' '),
        ...(why.alternatives.length > 0
          ? ['Near it these are free; offer one of them on the page of the sked.']
          : []),
        ...(why.corrects
          ? ['The calendar entry in this mail sets your calendar right again.']
          : []),
      ],
      facts: [
        ...why.alternatives.map((slot) => ['Free', formatUtcRange(slot)] as [string, string]),
        ...skedRows(facts, recipient.timeZone),
      ],
      button: { label: 'Open the sked', url: facts.url },
      footer: 'You get this mail because you answered a mail about this sked.',
    },
  };
}
