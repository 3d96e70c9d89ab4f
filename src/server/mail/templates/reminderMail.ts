import { listOf, RESULT_WORDS } from '../../../domain/sked/view';
import type { SkedResult } from '../../../domain/sked/types';
import { formatClock, formatDuration, formatUtcRange } from '../../../domain/time/format';
import type { MailContent } from '../shell';
import type { SkedMailFacts } from './skedFacts';
import { skedRows } from './skedMail';

/** The cautions in one line, for wherever transmitting is spoken of. */
export const CAUTIONS_LINE =
  'Before you transmit: people out of the beam and away from the feed, changeover checked before power, ' +
  'supplies treated as deadly, wind stow in reach. Your national rules and your licence come first.';

interface Reader {
  timeZone: string;
  callSigns: readonly string[];
}

/** Where the mail leads: without an account to one page that has everything. */
export type ReminderLinks =
  | { account: true; sked: string; sheet: string; live: string; report: string }
  | { account: false; answer: string };

/** Before the start. The time that is left is true when the mail is written, and says so. */
export function beforeMail(
  facts: SkedMailFacts,
  reader: Reader,
  links: ReminderLinks,
  nowMs: number,
): { subject: string; content: MailContent } {
  const left = formatDuration(facts.startMs - nowMs);
  const partners = partnersFor(facts, reader);
  return {
    subject: `In ${left}: sked with ${partners}, ${formatUtcRange(facts)}, ${facts.bandLabel}`,
    content: {
      title: `Sked with ${partners} in ${left}`,
      paragraphs: [`It begins in ${left}, counted from ${formatClock(nowMs)} UTC.`],
      facts: [...skedRows(facts, reader.timeZone), ['Band', facts.bandLabel]],
      ...(links.account
        ? {
            button: { label: 'Open the sked sheet', url: links.sheet },
            links: [
              { label: 'Live view, for beside the rotator', url: links.live },
              { label: 'The sked, to move or cancel it', url: links.sked },
            ],
          }
        : { button: { label: 'Open the sked', url: links.answer } }),
      closing: [CAUTIONS_LINE],
      footer: why(reader),
    },
  };
}

/** After the end, while the reader's station has not said how it went. */
export function reportDueMail(
  facts: SkedMailFacts,
  reader: Reader & { dueCallSigns: readonly string[] },
  links: ReminderLinks,
  others: readonly { callSign: string; result: SkedResult }[],
): { subject: string; content: MailContent } {
  const partners = partnersFor(facts, reader);
  const heard = others.map(({ callSign, result }) => `${callSign} says ${RESULT_WORDS[result]}.`);
  return {
    subject: `How did it go? Sked with ${partners}, ${formatUtcRange(facts)}, ${facts.bandLabel}`,
    content: {
      title: `How did the sked with ${partners} go?`,
      paragraphs: [
        `The report of ${listOf(reader.dueCallSigns)} is still to come: completed, partly or not heard.`,
        ...(heard.length > 0 ? [heard.join(' ')] : []),
      ],
      facts: skedRows(facts, reader.timeZone),
      button: { label: 'Report how it went', url: links.account ? links.report : links.answer },
      footer: why(reader),
    },
  };
}

function partnersFor(facts: SkedMailFacts, { callSigns }: Reader): string {
  const all = facts.stations.map((station) => station.callSign);
  const others = all.filter((callSign) => !callSigns.includes(callSign));
  return listOf(others.length > 0 ? others : all);
}

function why({ callSigns }: Reader): string {
  return `You get this mail because you belong to the crew of ${listOf(callSigns)}.`;
}
