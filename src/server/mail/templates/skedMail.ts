import { listOf } from '../../../domain/sked/view';
import {
  formatDuration,
  formatLocalRange,
  formatUtc,
  formatUtcRange,
} from '../../../domain/time/format';
import type { Interval } from '../../../domain/time/interval';
import type { MailContent } from '../shell';
import type { SkedMailFacts, SkedRecipient } from './skedFacts';

export type SkedMailKind =
  'offered' | 'moved' | 'agreed' | 'declined' | 'withdrawn' | 'lapsed' | 'cancelled';

export interface SkedNews {
  kind: SkedMailKind;
  facts: SkedMailFacts;
  /** Station and person that acted; null where nobody did. `you`: the recipient is that person. */
  by: { callSign: string; personName: string; you: boolean } | null;
  words: string;
  /** Slot before a move. */
  before: Interval;
  /** Whether the move gave an agreed slot up. */
  gaveUpAgreed: boolean;
  /** Whether the slot before was the recipient's own offer. */
  yourOffer: boolean;
}

/** Subject and content of a mail about a sked for one recipient: UTC first, then the recipient's own zone. */
export function skedMail(
  news: SkedNews,
  recipient: SkedRecipient,
  yourCallSigns: readonly string[],
): { subject: string; content: MailContent } {
  const { facts, words, by } = news;
  const { title, paragraphs, button } = told(news, yourCallSigns);
  return {
    subject: `${title}, ${formatUtcRange(facts)}, ${facts.bandLabel}`,
    content: {
      title,
      paragraphs,
      facts: [
        ['UTC', formatUtcRange(facts, { withYear: true })],
        ...(recipient.timeZone === 'UTC'
          ? []
          : [['Your time', formatLocalRange(facts, recipient.timeZone)] as [string, string]]),
        ...facts.stations.map(
          ({ callSign, timeZone }) =>
            [callSign, formatLocalRange(facts, timeZone)] as [string, string],
        ),
        ['Band and mode', `${facts.frequency}, ${facts.modeLabel}`],
        ...(words && by ? [[`${by.personName} writes`, words] as [string, string]] : []),
        ...(news.kind === 'agreed'
          ? [['For the hour itself', facts.sheetUrl] as [string, string]]
          : []),
      ],
      button: { label: button, url: facts.url },
      footer: `You get this mail because you belong to the crew of ${listOf(yourCallSigns)}.`,
    },
  };
}

interface Told {
  title: string;
  paragraphs: string[];
  button: string;
}

function told(news: SkedNews, yours: readonly string[]): Told {
  const { facts, by } = news;
  const all = listOf(facts.stations.map((station) => station.callSign));
  const others = facts.stations
    .map((station) => station.callSign)
    .filter((callSign) => !yours.includes(callSign));
  const partners = listOf(others.length > 0 ? others : facts.stations.map((one) => one.callSign));
  const actor = by?.you ? 'You' : (by?.callSign ?? '');
  const who = by?.you ? 'You' : `${by?.personName}, ${by?.callSign},`;
  const asks = by?.you ? 'ask' : 'asks';
  const lapses = `Without an answer the offer lapses ${formatUtc(facts.startMs)}.`;
  switch (news.kind) {
    case 'offered':
      return {
        title: `${actor} offers a sked`,
        paragraphs: [`${who} offers a sked on ${facts.bandLabel}. ${lapses}`],
        button: 'Answer the offer',
      };
    case 'moved':
      return {
        title: `${actor} moved ${news.yourOffer && !by?.you ? 'your offer' : 'the sked'}`,
        paragraphs: [
          `${who} ${asks} for another time: ${shift(news.before, facts)} than before.`,
          ...(news.gaveUpAgreed
            ? [
                `The agreed ${formatUtcRange(news.before)} is given up and taken out of your calendar. ` +
                  'The sked is agreed again when every party has accepted the new time.',
              ]
            : []),
          lapses,
        ],
        button: by?.you ? 'Open the sked' : 'Answer the offer',
      };
    case 'agreed':
      return {
        title: `Agreed: sked with ${partners}`,
        paragraphs: [
          `${all} have accepted the same slot. The calendar entry is in this mail; it follows when the sked is moved or cancelled.`,
        ],
        button: 'Open the sked',
      };
    case 'declined':
      return {
        title: `${actor} declined the sked`,
        paragraphs: [`${who} cannot take this slot. You can offer another time on its page.`],
        button: 'Offer another time',
      };
    case 'withdrawn':
      return {
        title: `${actor} withdrew the offer`,
        paragraphs: [`${who} took the offer back. There is nothing left to answer.`],
        button: 'Open the sked',
      };
    case 'lapsed':
      return {
        title: `Lapsed: the sked with ${partners}`,
        paragraphs: ['Its time came before every party had accepted it. Nothing was agreed.'],
        button: 'Open the sked',
      };
    case 'cancelled':
      return {
        title: by?.you ? `You cancelled the sked with ${partners}` : `${actor} cancelled the sked`,
        paragraphs: [
          `The agreed sked between ${all} will not be worked. Its calendar entry is withdrawn with this mail.`,
        ],
        button: 'Open the sked',
      };
  }
}

/** "15 min later", "1 d 2 h earlier"; where only the length changes: "10 min longer". */
function shift(before: Interval, after: Interval): string {
  const byMs = after.startMs - before.startMs;
  if (byMs !== 0) return `${formatDuration(Math.abs(byMs))} ${byMs > 0 ? 'later' : 'earlier'}`;
  const longerMs = after.endMs - before.endMs;
  return `${formatDuration(Math.abs(longerMs))} ${longerMs > 0 ? 'longer' : 'shorter'}`;
}
