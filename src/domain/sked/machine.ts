import type { Interval } from '../time/interval';
import { calendarOf, hasLapsed, stillIn, type CalendarDue } from './standing';
import { slotProblems, type SlotProblem } from './slot';
import type { SkedEventKind, SkedState } from './types';

export { holdsBooking, hasLapsed } from './standing';

export type PartyAnswer = 'waiting' | 'accepted' | 'declined';

export interface SkedParty {
  stationId: string;
  callSign: string;
  answer: PartyAnswer;
  /** Whether the station has dropped out; it keeps its place in the history only. */
  left: boolean;
}

/** What decides the life of a sked. The slot is the one last offered. */
export interface Sked extends Interval {
  state: SkedState;
  /** Raised by every change; a command names the version it was based on. */
  version: number;
  /** The SEQUENCE of the newest calendar message (RFC 5545, 3.8.7.4); every message raises it. */
  sequence: number;
  /** Station whose offer the slot is. */
  offeredBy: string;
  parties: SkedParty[];
}

/** What a station can do to a sked without naming a slot. */
export type AnswerKind = 'accept' | 'decline' | 'dropOut' | 'withdraw' | 'cancel' | 'report';

/** `by` is the station on whose behalf somebody acts, `version` the one the person saw. */
export type SkedCommand =
  | { kind: 'move'; by: string; version: number; slot: Interval }
  | { kind: AnswerKind; by: string; version: number }
  | { kind: 'lapse' };

export interface SkedOffer {
  by: string;
  parties: readonly { stationId: string; callSign: string }[];
  slot: Interval;
}

export interface SkedContext {
  nowMs: number;
}

/** What happened, to be kept for good. `by` is null where nobody acted. */
export interface SkedHappening extends Interval {
  kind: SkedEventKind;
  by: string | null;
}

export interface Refusal {
  /** `slot`: the input is wrong; `notParty`: the station has no part in it; the others: the state forbids it. */
  code: 'stale' | 'state' | 'early' | 'slot' | 'notParty';
  sentence: string;
  problems: SlotProblem[];
}

export type Decision =
  | { ok: true; sked: Sked; happenings: SkedHappening[]; calendar: CalendarDue | null }
  | { ok: false; refusal: Refusal };

/**
 * Begins a sked. The offering station counts as having accepted, every other one waits.
 * Refused when the slot breaks the slot rules, fewer than two stations take part, one is named twice,
 * or the offering station is not among them.
 */
export function decideOffer(offer: SkedOffer, context: SkedContext): Decision {
  const ids = offer.parties.map((party) => party.stationId);
  if (ids.length < 2) return refuse('slot', 'A sked needs at least two stations.');
  if (new Set(ids).size !== ids.length) {
    return refuse('slot', 'A station cannot have a sked with itself.');
  }
  if (!ids.includes(offer.by)) {
    return refuse('notParty', 'The station that offers must take part in the sked.');
  }
  const problems = slotProblems(offer.slot, context.nowMs);
  if (problems[0]) return refuse('slot', problems[0].sentence, problems);
  const { startMs, endMs } = offer.slot;
  const parties: SkedParty[] = offer.parties.map(({ stationId, callSign }) => ({
    stationId,
    callSign,
    answer: stationId === offer.by ? 'accepted' : 'waiting',
    left: false,
  }));
  const sked: Sked = {
    state: 'offered',
    version: 1,
    sequence: 0,
    offeredBy: offer.by,
    parties,
    startMs,
    endMs,
  };
  const happenings: SkedHappening[] = [{ kind: 'offered', by: offer.by, startMs, endMs }];
  return { ok: true, sked, happenings, calendar: calendarOf(sked) };
}

/**
 * Applies one command to a sked: the next state with what happened, or a refusal with a sentence.
 *
 * A move is a new offer: the mover counts as having accepted, every other answer is reset. Moving an
 * agreed sked gives the agreed slot up at once (the calendar entry becomes tentative at the new time) and the sked waits
 * for answers again; a declined one may be moved too, which is how a counter-offer follows a "no".
 * Agreed when every party that is still in it accepted the same offer.
 */
export function decide(sked: Sked, command: SkedCommand, context: SkedContext): Decision {
  if (command.kind === 'lapse') return lapse(sked, context);
  const own = sked.parties.find((party) => party.stationId === command.by);
  if (!own) return refuse('notParty', 'Only the stations of a sked can answer it.');
  if (command.version !== sked.version) {
    return refuse('stale', 'The sked changed since you opened it. Nothing was changed by you.');
  }
  if (own.left) {
    return refuse(
      'state',
      `${own.callSign} has dropped out, so it has no part in the sked any more.`,
    );
  }
  switch (command.kind) {
    case 'move':
      return move(sked, command.by, command.slot, context);
    case 'accept':
      return accept(sked, command.by, context);
    case 'decline':
      return decline(sked, command.by, context);
    case 'dropOut':
      return dropOut(sked, command.by, context);
    case 'withdraw':
      return withdraw(sked, command.by, context);
    case 'cancel':
      return cancel(sked, command.by, context);
    case 'report':
      return report(sked, command.by, context);
  }
}

function move(sked: Sked, by: string, slot: Interval, { nowMs }: SkedContext): Decision {
  const open = mustBe(sked, ['offered', 'agreed', 'declined'], 'be moved', nowMs);
  if (open) return open;
  if (sked.state === 'agreed' && sked.startMs <= nowMs) {
    return refuse('state', 'The agreed slot has begun, so the sked cannot be moved.');
  }
  const problems = slotProblems(slot, nowMs);
  if (problems[0]) return refuse('slot', problems[0].sentence, problems);
  const same = slot.startMs === sked.startMs && slot.endMs === sked.endMs;
  if (same && sked.state !== 'declined') {
    const sentence = 'That is the slot the sked has now. Choose another one.';
    return refuse('slot', sentence, [{ field: 'start', sentence }]);
  }
  const { startMs, endMs } = slot;
  const parties: SkedParty[] = sked.parties.map((party) => {
    if (party.left) return { ...party };
    return { ...party, answer: party.stationId === by ? 'accepted' : 'waiting' };
  });
  return told({ ...sked, state: 'offered', startMs, endMs, offeredBy: by, parties }, [
    { kind: 'moved', by, startMs, endMs },
  ]);
}

function accept(sked: Sked, by: string, { nowMs }: SkedContext): Decision {
  const open = mustBe(sked, ['offered'], 'be accepted', nowMs);
  if (open) return open;
  const before = sked.parties.find((party) => party.stationId === by)!;
  if (before.answer === 'accepted') {
    return refuse('state', `${before.callSign} has accepted this slot already.`);
  }
  return settled(sked, answered(sked, by, 'accepted'), happening(sked, 'accepted', by));
}

/** The sked with these answers: agreed when nobody is left to answer. */
function settled(sked: Sked, parties: SkedParty[], what: SkedHappening): Decision {
  const agreed = stillIn(parties).every((party) => party.answer === 'accepted');
  if (!agreed || sked.state === 'agreed') return told({ ...sked, parties }, [what]);
  const happenings = [what, happening(sked, 'agreed', null)];
  return told({ ...sked, state: 'agreed', parties }, happenings);
}

function decline(sked: Sked, by: string, { nowMs }: SkedContext): Decision {
  if (sked.state === 'agreed') {
    return refuse('state', 'The sked is agreed. Cancel it if you cannot keep it.');
  }
  const open = mustBe(sked, ['offered'], 'be declined', nowMs);
  if (open) return open;
  if (by === sked.offeredBy) {
    return refuse('state', 'This is your own offer. Withdraw it if it no longer stands.');
  }
  return told({ ...sked, state: 'declined', parties: answered(sked, by, 'declined') }, [
    happening(sked, 'declined', by),
  ]);
}

function dropOut(sked: Sked, by: string, { nowMs }: SkedContext): Decision {
  const open = mustBe(sked, ['offered', 'agreed'], 'be left', nowMs);
  if (open) return open;
  if (sked.endMs <= nowMs) {
    return refuse('state', 'The slot is over. Report how it went instead.');
  }
  if (sked.state === 'offered' && by === sked.offeredBy) {
    return refuse('state', 'This is your own offer. Withdraw it if it no longer stands.');
  }
  if (stillIn(sked.parties).length < 3) {
    const instead = sked.state === 'agreed' ? 'Cancel the sked' : 'Decline the offer';
    return refuse('state', `Two stations are left, and it takes two. ${instead} instead.`);
  }
  const parties = sked.parties.map((party) => ({
    ...party,
    left: party.left || party.stationId === by,
  }));
  return settled(sked, parties, happening(sked, 'droppedOut', by));
}

function withdraw(sked: Sked, by: string, { nowMs }: SkedContext): Decision {
  if (sked.state === 'agreed') {
    return refuse('state', 'The sked is agreed. Cancel it if you cannot keep it.');
  }
  const open = mustBe(sked, ['offered'], 'be withdrawn', nowMs);
  if (open) return open;
  if (by !== sked.offeredBy) {
    return refuse(
      'state',
      'Only the station whose offer it is can withdraw it. You can decline it.',
    );
  }
  return told({ ...sked, state: 'withdrawn' }, [happening(sked, 'withdrawn', by)]);
}

function cancel(sked: Sked, by: string, { nowMs }: SkedContext): Decision {
  if (sked.state === 'offered' && !hasLapsed(sked, nowMs)) {
    return refuse('state', 'The sked is not agreed. Withdraw or decline the offer instead.');
  }
  const open = mustBe(sked, ['agreed'], 'be cancelled', nowMs);
  if (open) return open;
  if (sked.endMs <= nowMs) {
    return refuse('state', 'The slot is over. Report how it went instead.');
  }
  return told({ ...sked, state: 'cancelled' }, [happening(sked, 'cancelled', by)]);
}

function report(sked: Sked, by: string, { nowMs }: SkedContext): Decision {
  const open = mustBe(sked, ['agreed', 'reported'], 'be reported', nowMs);
  if (open) return open;
  if (sked.startMs > nowMs) {
    return refuse('early', 'The slot has not begun, so there is nothing to report yet.');
  }
  return {
    ok: true,
    sked: { ...sked, version: sked.version + 1, state: 'reported' },
    happenings: [happening(sked, 'reported', by)],
    calendar: null,
  };
}

function lapse(sked: Sked, { nowMs }: SkedContext): Decision {
  if (sked.state !== 'offered') return refuse('state', stateSentence(sked.state, 'lapse'));
  if (sked.startMs > nowMs) return refuse('early', 'The offered time has not come yet.');
  return told({ ...sked, state: 'lapsed' }, [happening(sked, 'lapsed', null)]);
}

const STATE_WORDS: Record<SkedState, string> = {
  offered: 'is not agreed',
  agreed: 'is agreed',
  declined: 'was declined',
  withdrawn: 'was withdrawn',
  lapsed: 'lapsed: its time came without agreement',
  cancelled: 'was cancelled',
  reported: 'has been reported',
};

function stateSentence(state: SkedState, verb: string): string {
  return `The sked ${STATE_WORDS[state]}, so it cannot ${verb}.`;
}

/** A refusal unless the sked is in one of the states (an offer whose time has come counts as lapsed). */
function mustBe(
  sked: Sked,
  allowed: readonly SkedState[],
  verb: string,
  nowMs: number,
): Decision | null {
  const state = hasLapsed(sked, nowMs) ? 'lapsed' : sked.state;
  return allowed.includes(state) ? null : refuse('state', stateSentence(state, verb));
}

/** A decision that calendars must learn of. */
function told(changed: Sked, happenings: SkedHappening[]): Decision {
  const sked = { ...changed, version: changed.version + 1, sequence: changed.sequence + 1 };
  return { ok: true, sked, happenings, calendar: calendarOf(sked) };
}

function answered(sked: Sked, stationId: string, answer: PartyAnswer): SkedParty[] {
  return sked.parties.map((party) =>
    party.stationId === stationId ? { ...party, answer } : { ...party },
  );
}

function happening(sked: Sked, kind: SkedEventKind, by: string | null): SkedHappening {
  return { kind, by, startMs: sked.startMs, endMs: sked.endMs };
}

function refuse(code: Refusal['code'], sentence: string, problems: SlotProblem[] = []): Decision {
  return { ok: false, refusal: { code, sentence, problems } };
}
