import type { Interval } from '../time/interval';
import { slotProblems, type SlotProblem } from './slot';
import type { SkedEventKind, SkedState } from './types';

export type PartyAnswer = 'waiting' | 'accepted' | 'declined';

export interface SkedParty {
  stationId: string;
  callSign: string;
  answer: PartyAnswer;
}

/** What decides the life of a sked. The slot is the one last offered. */
export interface Sked extends Interval {
  state: SkedState;
  /** Raised by every change; a command names the version it was based on. */
  version: number;
  /** The SEQUENCE that the next calendar message will carry (RFC 5545, 3.8.7.4). */
  sequence: number;
  /** Station whose offer the slot is. */
  offeredBy: string;
  parties: SkedParty[];
}

/** `by` is the station on whose behalf somebody acts, `version` the one the person saw. */
export type SkedCommand =
  | { kind: 'move'; by: string; version: number; slot: Interval }
  | { kind: 'accept' | 'decline' | 'withdraw' | 'cancel' | 'report'; by: string; version: number }
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

/** A calendar message due by a change; the slot is the one it speaks of. */
export interface CalendarDue extends Interval {
  method: 'REQUEST' | 'CANCEL';
  sequence: number;
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
  }));
  return {
    ok: true,
    sked: {
      state: 'offered',
      version: 1,
      sequence: 0,
      offeredBy: offer.by,
      parties,
      startMs,
      endMs,
    },
    happenings: [{ kind: 'offered', by: offer.by, startMs, endMs }],
    calendar: null,
  };
}

/**
 * Applies one command to a sked: the next state with what happened, or a refusal with a sentence.
 *
 * A move is a new offer: the mover counts as having accepted, every other answer is reset. Moving an
 * agreed sked gives the agreed slot up at once (the calendar entry is cancelled) and the sked waits for
 * answers again; a declined one may be moved too, which is how a counter-offer follows a "no".
 * Agreed when every party accepted the same offer.
 */
export function decide(sked: Sked, command: SkedCommand, context: SkedContext): Decision {
  if (command.kind === 'lapse') return lapse(sked, context);
  if (!sked.parties.some((party) => party.stationId === command.by)) {
    return refuse('notParty', 'Only the stations of a sked can answer it.');
  }
  if (command.version !== sked.version) {
    return refuse('stale', 'The sked changed since you opened it. Nothing was changed by you.');
  }
  switch (command.kind) {
    case 'move':
      return move(sked, command.by, command.slot, context);
    case 'accept':
      return accept(sked, command.by, context);
    case 'decline':
      return decline(sked, command.by, context);
    case 'withdraw':
      return withdraw(sked, command.by, context);
    case 'cancel':
      return cancel(sked, command.by, context);
    case 'report':
      return report(sked, command.by, context);
  }
}

/** Whether the offer's time came without agreement, even if nobody has written that down yet. */
export function hasLapsed(sked: Pick<Sked, 'state' | 'startMs'>, nowMs: number): boolean {
  return sked.state === 'lapsed' || (sked.state === 'offered' && sked.startMs <= nowMs);
}

/** Whether the stations are taken for the slot. */
export function holdsBooking(sked: Pick<Sked, 'state'>): boolean {
  return sked.state === 'agreed' || sked.state === 'reported';
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
  const wasAgreed = sked.state === 'agreed';
  return {
    ok: true,
    sked: {
      ...next(sked),
      state: 'offered',
      startMs: slot.startMs,
      endMs: slot.endMs,
      offeredBy: by,
      sequence: sked.sequence + (wasAgreed ? 1 : 0),
      parties: sked.parties.map((party) => ({
        ...party,
        answer: party.stationId === by ? 'accepted' : 'waiting',
      })),
    },
    happenings: [{ kind: 'moved', by, startMs: slot.startMs, endMs: slot.endMs }],
    calendar: wasAgreed ? calendar('CANCEL', sked) : null,
  };
}

function accept(sked: Sked, by: string, { nowMs }: SkedContext): Decision {
  const open = mustBe(sked, ['offered'], 'be accepted', nowMs);
  if (open) return open;
  const before = sked.parties.find((party) => party.stationId === by)!;
  if (before.answer === 'accepted') {
    return refuse('state', `${before.callSign} has accepted this slot already.`);
  }
  const parties = answered(sked, by, 'accepted');
  const agreed = parties.every((party) => party.answer === 'accepted');
  const happenings = [happening(sked, 'accepted', by)];
  if (!agreed) return { ok: true, sked: { ...next(sked), parties }, happenings, calendar: null };
  return {
    ok: true,
    sked: { ...next(sked), state: 'agreed', parties, sequence: sked.sequence + 1 },
    happenings: [...happenings, happening(sked, 'agreed', null)],
    calendar: calendar('REQUEST', sked),
  };
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
  return {
    ok: true,
    sked: { ...next(sked), state: 'declined', parties: answered(sked, by, 'declined') },
    happenings: [happening(sked, 'declined', by)],
    calendar: null,
  };
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
  return {
    ok: true,
    sked: { ...next(sked), state: 'withdrawn' },
    happenings: [happening(sked, 'withdrawn', by)],
    calendar: null,
  };
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
  return {
    ok: true,
    sked: { ...next(sked), state: 'cancelled', sequence: sked.sequence + 1 },
    happenings: [happening(sked, 'cancelled', by)],
    calendar: calendar('CANCEL', sked),
  };
}

function report(sked: Sked, by: string, { nowMs }: SkedContext): Decision {
  const open = mustBe(sked, ['agreed', 'reported'], 'be reported', nowMs);
  if (open) return open;
  if (sked.startMs > nowMs) {
    return refuse('early', 'The slot has not begun, so there is nothing to report yet.');
  }
  return {
    ok: true,
    sked: { ...next(sked), state: 'reported' },
    happenings: [happening(sked, 'reported', by)],
    calendar: null,
  };
}

function lapse(sked: Sked, { nowMs }: SkedContext): Decision {
  if (sked.state !== 'offered') return refuse('state', stateSentence(sked.state, 'lapse'));
  if (sked.startMs > nowMs) return refuse('early', 'The offered time has not come yet.');
  return {
    ok: true,
    sked: { ...next(sked), state: 'lapsed' },
    happenings: [happening(sked, 'lapsed', null)],
    calendar: null,
  };
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

function next(sked: Sked): Sked {
  return { ...sked, version: sked.version + 1 };
}

function answered(sked: Sked, stationId: string, answer: PartyAnswer): SkedParty[] {
  return sked.parties.map((party) =>
    party.stationId === stationId ? { ...party, answer } : { ...party },
  );
}

function happening(sked: Sked, kind: SkedEventKind, by: string | null): SkedHappening {
  return { kind, by, startMs: sked.startMs, endMs: sked.endMs };
}

function calendar(method: CalendarDue['method'], sked: Sked): CalendarDue {
  return { method, sequence: sked.sequence, startMs: sked.startMs, endMs: sked.endMs };
}

function refuse(code: Refusal['code'], sentence: string, problems: SlotProblem[] = []): Decision {
  return { ok: false, refusal: { code, sentence, problems } };
}
