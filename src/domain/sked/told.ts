import { formatDuration, formatUtc, formatUtcRange } from '../time/format';
import type { SkedEventKind } from './types';
import { listOf, partnersOf, RESULT_WORDS, type SkedEventView, type SkedView } from './view';

/** One line of the history: who did what, and for an offer what became of it. */
export interface HistoryLine extends SkedEventView {
  who: string;
  did: string;
  /** Only for offers. */
  outcome: string | null;
  /** Whether this is the offer that the sked stands on now. */
  current: boolean;
}

const DID: Record<SkedEventKind, string> = {
  offered: 'offered',
  moved: 'moved it',
  accepted: 'accepted',
  agreed: 'agreed',
  declined: 'declined',
  droppedOut: 'dropped out',
  withdrawn: 'withdrew it',
  lapsed: 'lapsed',
  cancelled: 'cancelled it',
  reported: 'reported',
};

function isOffer(event: SkedEventView): boolean {
  return event.kind === 'offered' || event.kind === 'moved';
}

/** "Edda, QB7TID"; the call sign alone where nobody has given a name for it. */
export function actorName(by: { personName: string | null; callSign: string }): string {
  return by.personName && by.personName !== by.callSign
    ? `${by.personName}, ${by.callSign}`
    : by.callSign;
}

/** "You", "Edda, QB7TID", or "Nobody" where time alone acted. */
export function whoActed(event: SkedEventView): string {
  if (event.byViewer) return 'You';
  if (!event.callSign) return '';
  return actorName({ personName: event.personName, callSign: event.callSign });
}

/** The history without the "agreed" that follows from the last acceptance. */
export function historyOf(sked: SkedView): HistoryLine[] {
  const lastOffer = sked.events.filter(isOffer).at(-1);
  return sked.events
    .filter((event) => event.kind !== 'agreed')
    .map((event) => ({
      ...event,
      who: whoActed(event),
      did: DID[event.kind],
      current: event === lastOffer,
      outcome: isOffer(event) && event !== lastOffer ? outcomeOf(sked.events, event) : null,
    }));
}

/** What became of an offer that a later one followed. */
function outcomeOf(events: readonly SkedEventView[], offer: SkedEventView): string {
  const later = events.slice(events.indexOf(offer) + 1);
  const until = later.findIndex(isOffer);
  const answers = later.slice(0, until < 0 ? later.length : until);
  const declined = answers.find((event) => event.kind === 'declined');
  if (declined) return declined.byViewer ? 'declined by you' : `declined by ${declined.callSign}`;
  return answers.some((event) => event.kind === 'agreed') ? 'agreed, given up' : 'replaced';
}

/** Where the sked stands, in one sentence for the viewer. */
export function situation(sked: SkedView): string {
  const partners = partnersOf(sked.parties);
  const last = sked.events.filter(isOffer).at(-1);
  const before = sked.events.filter(isOffer).at(-2);
  if (sked.droppedOut) return droppedOutSituation(sked);
  switch (sked.state) {
    case 'offered': {
      if (!sked.waitsForViewer) {
        const waiting = sked.parties.filter((party) => party.answer === 'waiting');
        return `${left(sked)}${listOf(waiting.map((party) => party.callSign))} ${waiting.length === 1 ? 'has' : 'have'} not answered yet.`;
      }
      const who = last?.byViewer ? 'You' : (last?.personName ?? last?.callSign ?? partners);
      const ask = last?.byViewer ? 'ask' : 'asks';
      if (last?.kind === 'moved' && before)
        return `${who} ${ask} for another time: ${shiftWords(before, last)}.`;
      return `${who} ${ask} for this slot.`;
    }
    case 'agreed':
      return `${left(sked)}Every station ${sked.leftParties.length > 0 ? 'that is left ' : ''}has accepted this slot. It stands in your calendar.`;
    case 'declined': {
      const declined = sked.events.filter((event) => event.kind === 'declined').at(-1);
      const who = declined ? whoActed(declined) : partners;
      return `${who} declined this slot. Another time can still be offered.`;
    }
    case 'withdrawn':
      return 'The offer was taken back.';
    case 'lapsed':
      return 'Its time came before every station had accepted.';
    case 'cancelled':
      return 'The agreed sked was cancelled, and the slot is free again.';
    case 'reported':
      return `Reported: ${sked.reports.map((report) => `${report.callSign} ${RESULT_WORDS[report.result]}`).join(', ')}.`;
  }
}

/** "QC2FAR dropped out. ", or nothing. */
function left(sked: SkedView): string {
  const names = sked.leftParties.map((party) => party.callSign);
  return names.length > 0 ? `${listOf(names)} dropped out. ` : '';
}

function droppedOutSituation(sked: SkedView): string {
  const rest = listOf(sked.parties.map((party) => party.callSign));
  const now: Record<SkedView['state'], string> = {
    offered: `${rest} have yet to agree on the slot.`,
    agreed: `${rest} keep the slot.`,
    declined: `${rest} have not agreed on a slot.`,
    withdrawn: 'The offer was taken back.',
    lapsed: 'Its time came without agreement.',
    cancelled: `${rest} cancelled the sked.`,
    reported: `${rest} worked it.`,
  };
  return `You dropped out. ${now[sked.state]}`;
}

/** "15 min later than before", "the same start, 10 min longer". */
export function shiftWords(
  before: { startMs: number; endMs: number },
  after: { startMs: number; endMs: number },
): string {
  const byMs = after.startMs - before.startMs;
  if (byMs !== 0) {
    return `${formatDuration(Math.abs(byMs))} ${byMs > 0 ? 'later' : 'earlier'} than before`;
  }
  const longerMs = after.endMs - before.endMs;
  return `the same start, ${formatDuration(Math.abs(longerMs))} ${longerMs > 0 ? 'longer' : 'shorter'}`;
}

export interface NextStep {
  lead: string;
  text: string;
}

/** What happens next, in order; empty when nothing will. */
export function nextSteps(sked: SkedView, nowMs: number): NextStep[] {
  if (sked.droppedOut) return [];
  const lapse = {
    lead: `${formatUtc(sked.startMs)}.`,
    text: 'Without agreement the offer lapses, and everybody gets a mail.',
  };
  const work = {
    lead: `${formatUtcRange(sked)}.`,
    text: `${sked.parties.length > 2 ? 'All' : 'Both'} stations are on frequency. Check T/R changeover before power.`,
  };
  const report = {
    lead: `After ${formatUtc(sked.endMs)}.`,
    text: 'Every station reports: completed, partly or not heard.',
  };
  const two = sked.parties.length === 2;
  const both = two ? 'Both of you get' : 'Every crew gets';
  switch (sked.state) {
    case 'offered': {
      const waiting = sked.parties.filter((party) => party.answer === 'waiting');
      const others = listOf(waiting.map((party) => party.callSign));
      const accept = sked.waitsForViewer
        ? 'You accept.'
        : `${others} ${waiting.length === 1 ? 'accepts' : 'accept'}.`;
      return [
        {
          lead: accept,
          text: `The sked is agreed. ${both} a mail, and the calendar entry becomes firm.`,
        },
        work,
        report,
        lapse,
      ].sort((a, b) => Number(a === lapse) - Number(b === lapse));
    }
    case 'agreed':
      return nowMs < sked.endMs ? [work, report] : [report];
    case 'reported':
      return sked.reports.length < sked.parties.length
        ? [
            {
              lead: `${listOf(
                sked.parties
                  .filter((party) => !sked.reports.some((one) => one.stationId === party.stationId))
                  .map((party) => party.callSign),
              )} reports.`,
              text: 'Until then the result stands on one side alone.',
            },
          ]
        : [];
    case 'declined':
      return nowMs < sked.startMs || sked.choices.move
        ? [{ lead: 'You may offer another time.', text: 'The others then answer again.' }]
        : [];
    default:
      return [];
  }
}
