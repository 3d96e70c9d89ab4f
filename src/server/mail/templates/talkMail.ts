import { actorName } from '../../../domain/sked/told';
import { listOf } from '../../../domain/sked/view';
import { formatUtcRange } from '../../../domain/time/format';
import type { MailContent } from '../shell';
import type { SkedMailFacts } from './skedFacts';
import { skedRows } from './skedMail';

/** A message of a sked partner. The words stand apart, so that they cannot pass for ours. */
export function talkMail(
  facts: SkedMailFacts,
  by: { callSign: string; personName: string; words: string },
  reader: { timeZone: string; callSigns: readonly string[] },
): { subject: string; content: MailContent } {
  return {
    subject: `${by.callSign} writes about the sked ${formatUtcRange(facts)}, ${facts.bandLabel}`,
    content: {
      title: `${by.callSign} writes about the sked`,
      paragraphs: [],
      facts: skedRows(facts, reader.timeZone),
      quote: { by: `${actorName(by)} writes`, words: by.words },
      button: { label: 'Open the sked', url: facts.url },
      footer: `You get this mail because you belong to the crew of ${listOf(reader.callSigns)}.`,
    },
  };
}
