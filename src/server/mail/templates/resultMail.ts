import { actorName } from '../../../domain/sked/told';
import { listOf, RESULT_WORDS } from '../../../domain/sked/view';
import type { SaidResult } from '../../../domain/sked/result';
import { formatUtcRange } from '../../../domain/time/format';
import type { MailContent } from '../shell';
import type { SkedMailFacts } from './skedFacts';
import { skedRows } from './skedMail';

/** To the other parties when somebody has said how a sked went, or corrected it. */
export function resultMail(
  facts: SkedMailFacts,
  said: SaidResult & { personName: string; words: string; corrected: boolean },
  disagreements: readonly string[],
  reader: { timeZone: string; callSigns: readonly string[]; reportDue: boolean; url: string },
): { subject: string; content: MailContent } {
  const result = RESULT_WORDS[said.result];
  const verb = said.corrected ? 'now reports' : 'reports';
  return {
    subject: `${said.callSign} ${verb}: ${result}, ${formatUtcRange(facts)}, ${facts.bandLabel}`,
    content: {
      title: `${said.callSign} ${verb}: ${result}`,
      paragraphs: [
        `${actorName(said)} ${said.corrected ? 'corrected the result of' : 'says how'} your sked${said.corrected ? '' : ' went'}.`,
        ...disagreements,
        ...(reader.reportDue
          ? ['Your own report is still to come; until then the result stands on one side alone.']
          : []),
      ],
      facts: [
        ...skedRows(facts, reader.timeZone),
        ['Result', result],
        ...(said.reportSent ? [['Report sent', said.reportSent] as [string, string]] : []),
        ...(said.reportReceived
          ? [['Report received', said.reportReceived] as [string, string]]
          : []),
      ],
      ...(said.words ? { quote: { by: `${actorName(said)} writes`, words: said.words } } : {}),
      button: {
        label: reader.reportDue ? 'Report how it went' : 'Open the sked',
        url: reader.url,
      },
      footer: `You get this mail because you belong to the crew of ${listOf(reader.callSigns)}.`,
    },
  };
}
