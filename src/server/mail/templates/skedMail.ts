import { actorName } from '../../../domain/sked/told';
import { listOf } from '../../../domain/sked/view';
import {
  formatDuration,
  formatLocalRange,
  formatUtc,
  formatUtcRange,
} from '../../../domain/time/format';
import type { SkedState } from '../../../domain/sked/types';
import type { Interval } from '../../../domain/time/interval';
import type { MailContent } from '../shell';
import type { SkedMailFacts, SkedRecipient } from './skedFacts';

export type SkedMailKind =
  | 'offered'
  | 'moved'
  | 'accepted'
  | 'agreed'
  | 'declined'
  | 'droppedOut'
  | 'withdrawn'
  | 'lapsed'
  | 'cancelled';

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
  /** Whether the recipient has to answer now. */
  asked: boolean;
  /** Whether the recipient's stations have no part in it any more. */
  out: boolean;
  /** Where the sked stands now. */
  state: SkedState;
  /** Call signs that have not answered yet. */
  waiting: string[];
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
        ...skedRows(facts, recipient.timeZone),
        ...(words && by ? [[`${by.personName} writes`, words] as [string, string]] : []),
        ...(news.kind === 'agreed' && !recipient.guest
          ? [['For the hour itself', facts.sheetUrl] as [string, string]]
          : []),
      ],
      button: { label: button, url: facts.url },
      footer: `You get this mail because you belong to the crew of ${listOf(yourCallSigns)}.`,
    },
  };
}

/** When and on what, as every mail about a sked says it. */
export function skedRows(facts: SkedMailFacts, timeZone: string): [string, string][] {
  return [
    ['UTC', formatUtcRange(facts, { withYear: true })],
    ...(timeZone === 'UTC'
      ? []
      : [['Your time', formatLocalRange(facts, timeZone)] as [string, string]]),
    ...facts.stations.map(
      (station) =>
        [station.callSign, formatLocalRange(facts, station.timeZone)] as [string, string],
    ),
    ['Band and mode', `${facts.frequency}, ${facts.modeLabel}`],
  ];
}

interface Told {
  title: string;
  paragraphs: string[];
  button: string;
}

const TENTATIVE = 'It stands in your calendar as tentative until every party has accepted.';
const REMOVED = 'The tentative entry is taken out of your calendar.';

function told(news: SkedNews, yours: readonly string[]): Told {
  const { facts, by, waiting } = news;
  const callSigns = facts.stations.map((station) => station.callSign);
  const all = listOf(callSigns);
  const others = callSigns.filter((callSign) => !yours.includes(callSign));
  const partners = listOf(others.length > 0 ? others : callSigns);
  const you = by?.you === true;
  const actor = you ? 'You' : (by?.callSign ?? '');
  const who = you || !by ? 'You' : withComma(actorName(by));
  const lapses = `Without an answer the offer lapses ${formatUtc(facts.startMs)}.`;
  const awaited = `${listOf(waiting)} ${waiting.length === 1 ? 'has' : 'have'} not answered yet. ${lapses}`;
  const open = news.asked ? 'Answer the offer' : 'Open the sked';
  switch (news.kind) {
    case 'offered':
      return {
        title: `${actor} ${you ? 'offer' : 'offers'} a sked`,
        paragraphs: [
          `${who} ${you ? 'offer' : 'offers'} a sked on ${facts.bandLabel}${news.asked ? '' : ` to ${partners}`}. ${lapses}`,
          ...(news.asked ? [] : [TENTATIVE]),
        ],
        button: open,
      };
    case 'moved':
      return {
        title: `${actor} moved ${news.yourOffer && !you ? 'your offer' : 'the sked'}`,
        paragraphs: [
          `${who} ${you ? 'ask' : 'asks'} for another time: ${shift(news.before, facts)} than before.`,
          ...(news.gaveUpAgreed
            ? [
                `The agreed ${formatUtcRange(news.before)} is given up. The entry in your calendar moves to the new ` +
                  'time and is tentative until every party has accepted it.',
              ]
            : []),
          lapses,
        ],
        button: open,
      };
    case 'accepted':
      return {
        title: `${actor} accepted the sked`,
        paragraphs: [awaited, TENTATIVE],
        button: open,
      };
    case 'agreed':
      return {
        title: `Agreed: sked with ${partners}`,
        paragraphs: [
          `${all} have accepted the same slot. The calendar entry is in this mail; it follows when the sked is moved or cancelled.`,
        ],
        button: open,
      };
    case 'declined':
      return {
        title: `${actor} declined the sked`,
        paragraphs: [
          you
            ? `You declined this slot. You can still offer another time on its page. ${REMOVED}`
            : `${who} cannot take this slot. You can offer another time on its page. ${REMOVED}`,
        ],
        button: 'Offer another time',
      };
    case 'droppedOut':
      return droppedOut(news, { actor, who, all, awaited, open });
    case 'withdrawn':
      return {
        title: `${actor} withdrew the offer`,
        paragraphs: [`${who} took the offer back. There is nothing left to answer. ${REMOVED}`],
        button: open,
      };
    case 'lapsed':
      return {
        title: `Lapsed: the sked with ${partners}`,
        paragraphs: [
          `Its time came before every party had accepted it. Nothing was agreed. ${REMOVED}`,
        ],
        button: open,
      };
    case 'cancelled':
      return {
        title: you ? `You cancelled the sked with ${partners}` : `${actor} cancelled the sked`,
        paragraphs: [
          `The agreed sked between ${all} will not be worked. Its calendar entry is withdrawn with this mail.`,
        ],
        button: open,
      };
  }
}

function droppedOut(
  news: SkedNews,
  words: { actor: string; who: string; all: string; awaited: string; open: string },
): Told {
  const { actor, who, all, awaited, open } = words;
  if (news.out) {
    return {
      title: `${actor} dropped out of the sked`,
      paragraphs: [
        `${who} no longer ${actor === 'You' ? 'take' : 'takes'} part; ${all} keep the slot. The entry is taken out of your calendar.`,
      ],
      button: open,
    };
  }
  const now =
    news.state === 'agreed'
      ? 'Everybody who is left has accepted the slot: the sked is agreed.'
      : awaited;
  return {
    title: `${actor} dropped out of the sked`,
    paragraphs: [`${who} no longer takes part. ${all} keep the slot.`, now],
    button: open,
  };
}

/** "15 min later", "1 d 2 h earlier"; where only the length changes: "10 min longer". */
function shift(before: Interval, after: Interval): string {
  const byMs = after.startMs - before.startMs;
  if (byMs !== 0) return `${formatDuration(Math.abs(byMs))} ${byMs > 0 ? 'later' : 'earlier'}`;
  const longerMs = after.endMs - before.endMs;
  return `${formatDuration(Math.abs(longerMs))} ${longerMs > 0 ? 'longer' : 'shorter'}`;
}

/** "Edda, QB7TID," and "QB7TID" */
function withComma(name: string): string {
  return name.includes(',') ? `${name},` : name;
}
