import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  decide,
  type AnswerKind,
  decideOffer,
  hasLapsed,
  holdsBooking,
  type Decision,
  type Sked,
  type SkedCommand,
} from '~/domain/sked/machine';
import type { CalendarDue } from '~/domain/sked/standing';
import { stillIn } from '~/domain/sked/standing';
import { DAY_MS, HOUR_MS, MINUTE_MS } from '~/domain/time/interval';

const NOW = Date.UTC(2027, 0, 18, 18, 42);
const START = Date.UTC(2027, 0, 20, 22, 0);
const SLOT = { startMs: START, endMs: START + 45 * MINUTE_MS };
const LATER = { startMs: START + HOUR_MS, endMs: START + 2 * HOUR_MS };
const A = { stationId: 'a', callSign: 'QA1LUN' };
const B = { stationId: 'b', callSign: 'QB7TID' };
const C = { stationId: 'c', callSign: 'QC2FAR' };

function taken(decision: Decision): Sked {
  if (!decision.ok) throw new Error(`refused: ${decision.refusal.sentence}`);
  return decision.sked;
}
function offered(parties = [A, B]): Sked {
  return taken(decideOffer({ by: 'a', parties, slot: SLOT }, { nowMs: NOW }));
}
function refusal(decision: Decision) {
  if (decision.ok) throw new Error('not refused');
  return decision.refusal;
}
const act = (sked: Sked, kind: AnswerKind, by: string, nowMs = NOW) =>
  decide(sked, { kind, by, version: sked.version }, { nowMs });
const moveTo = (sked: Sked, by: string, slot = LATER, nowMs = NOW) =>
  decide(sked, { kind: 'move', by, version: sked.version, slot }, { nowMs });

describe('offering', () => {
  it('counts the offering station as accepted and waits for the others', () => {
    const sked = offered([A, B, C]);
    expect(sked.state).toBe('offered');
    expect(sked.parties.map((party) => party.answer)).toEqual(['accepted', 'waiting', 'waiting']);
  });

  it.each([
    ['9 minutes', { startMs: START, endMs: START + 9 * MINUTE_MS }, 'at least 10 minutes'],
    ['over 24 hours', { startMs: START, endMs: START + 1441 * MINUTE_MS }, 'at most 24 hours'],
    ['the past', { startMs: NOW - HOUR_MS, endMs: NOW }, 'has passed'],
    ['now itself', { startMs: NOW, endMs: NOW + HOUR_MS }, 'has passed'],
    ['half minutes', { startMs: START + 30_000, endMs: START + HOUR_MS }, 'whole minute'],
    ['backwards', { startMs: START, endMs: START - HOUR_MS }, 'after the start'],
    [
      'next year but one',
      { startMs: START + 401 * DAY_MS, endMs: START + 401 * DAY_MS + HOUR_MS },
      '400 days',
    ],
  ])('refuses %s', (_name, slot, words) => {
    const refused = refusal(decideOffer({ by: 'a', parties: [A, B], slot }, { nowMs: NOW }));
    expect(refused.code).toBe('slot');
    expect(refused.sentence).toContain(words);
    expect(refused.problems.length).toBeGreaterThan(0);
  });

  it('takes the shortest and the longest slot', () => {
    for (const minutes of [10, 1440]) {
      const slot = { startMs: START, endMs: START + minutes * MINUTE_MS };
      expect(decideOffer({ by: 'a', parties: [A, B], slot }, { nowMs: NOW }).ok).toBe(true);
    }
  });

  it('refuses one station, a station twice, and an offer from outside', () => {
    const tries = [
      { by: 'a', parties: [A] },
      { by: 'a', parties: [A, A] },
      { by: 'c', parties: [A, B] },
    ];
    for (const offer of tries) {
      expect(decideOffer({ ...offer, slot: SLOT }, { nowMs: NOW }).ok).toBe(false);
    }
  });
});

describe('answering', () => {
  it('is agreed when the last of the parties accepted, and the calendar entry becomes firm', () => {
    const first = decide(
      offered([A, B, C]),
      { kind: 'accept', by: 'b', version: 1 },
      { nowMs: NOW },
    );
    expect(taken(first).state).toBe('offered');
    const second = act(taken(first), 'accept', 'c');
    expect(taken(second).state).toBe('agreed');
    expect(second.ok && second.calendar).toEqual({ status: 'CONFIRMED', sequence: 2, ...SLOT });
    expect(second.ok && second.happenings.map((event) => event.kind)).toEqual([
      'accepted',
      'agreed',
    ]);
  });

  it('resets the other answers when moved, and the mover counts as accepted', () => {
    const half = taken(act(offered([A, B, C]), 'accept', 'b'));
    const moved = taken(moveTo(half, 'c'));
    expect(moved.offeredBy).toBe('c');
    expect(moved.parties.map((party) => party.answer)).toEqual(['waiting', 'waiting', 'accepted']);
    expect(moved).toMatchObject(LATER);
  });

  it('gives an agreed slot up when moved: tentative at the new time, firm again with a higher number', () => {
    const agreed = taken(act(offered(), 'accept', 'b'));
    const moved = moveTo(agreed, 'b');
    expect(taken(moved).state).toBe('offered');
    expect(moved.ok && moved.calendar).toEqual({ status: 'TENTATIVE', sequence: 2, ...LATER });
    const again = act(taken(moved), 'accept', 'a');
    expect(again.ok && again.calendar).toEqual({ status: 'CONFIRMED', sequence: 3, ...LATER });
  });

  it('lets a counter-offer follow a "no"', () => {
    const declined = taken(act(offered(), 'decline', 'b'));
    expect(declined.state).toBe('declined');
    expect(taken(moveTo(declined, 'b')).state).toBe('offered');
  });

  it('refuses a command based on an older version', () => {
    const moved = taken(moveTo(offered(), 'b'));
    const late = decide(moved, { kind: 'accept', by: 'a', version: 1 }, { nowMs: NOW });
    expect(refusal(late).code).toBe('stale');
  });

  it('refuses what the state forbids, saying what to do instead', () => {
    const agreed = taken(act(offered(), 'accept', 'b'));
    expect(refusal(act(offered(), 'accept', 'a')).sentence).toContain('QA1LUN has accepted');
    expect(refusal(act(offered(), 'withdraw', 'b')).sentence).toContain('decline');
    expect(refusal(act(offered(), 'decline', 'a')).sentence).toContain('Withdraw');
    expect(refusal(act(offered(), 'cancel', 'a')).sentence).toContain('not agreed');
    expect(refusal(act(agreed, 'decline', 'b')).sentence).toContain('Cancel');
    expect(refusal(act(agreed, 'withdraw', 'a')).sentence).toContain('Cancel');
    expect(refusal(moveTo(offered(), 'b', SLOT)).sentence).toContain('slot the sked has now');
    expect(refusal(act(offered(), 'accept', 'zz')).code).toBe('notParty');
  });

  it('cancels before and during the slot, never after it', () => {
    const agreed = taken(act(offered(), 'accept', 'b'));
    expect(act(agreed, 'cancel', 'a', SLOT.endMs - 1).ok).toBe(true);
    expect(refusal(act(agreed, 'cancel', 'a', SLOT.endMs)).sentence).toContain('Report');
  });

  it('takes reports of each side from the start on', () => {
    const agreed = taken(act(offered(), 'accept', 'b'));
    expect(refusal(act(agreed, 'report', 'a', START - 1)).code).toBe('early');
    const reported = taken(act(agreed, 'report', 'a', START));
    expect(reported.state).toBe('reported');
    expect(act(reported, 'report', 'b', START + DAY_MS).ok).toBe(true);
  });
});

describe('dropping out', () => {
  const three = () => offered([A, B, C]);
  const agreedByThree = () => taken(act(taken(act(three(), 'accept', 'b')), 'accept', 'c'));

  it('keeps an agreed slot for the rest, whoever leaves, the one whose offer it was too', () => {
    for (const by of ['a', 'b', 'c']) {
      const decision = act(agreedByThree(), 'dropOut', by);
      const sked = taken(decision);
      expect(sked).toMatchObject({ state: 'agreed', ...SLOT });
      expect(stillIn(sked.parties).map((party) => party.stationId)).not.toContain(by);
      expect(decision.ok && decision.happenings.map((event) => event.kind)).toEqual(['droppedOut']);
      expect(decision.ok && decision.calendar).toMatchObject({ status: 'CONFIRMED', ...SLOT });
    }
  });

  it('makes the offer agreed when everybody who is left has accepted it', () => {
    const half = taken(act(three(), 'accept', 'b'));
    const decision = act(half, 'dropOut', 'c');
    expect(taken(decision).state).toBe('agreed');
    expect(decision.ok && decision.happenings.map((event) => event.kind)).toEqual([
      'droppedOut',
      'agreed',
    ]);
    expect(taken(act(three(), 'dropOut', 'c')).state).toBe('offered');
  });

  it('leaves two at least, and says what to do instead', () => {
    expect(refusal(act(offered(), 'dropOut', 'b')).sentence).toContain('Decline the offer');
    const agreed = taken(act(offered(), 'accept', 'b'));
    expect(refusal(act(agreed, 'dropOut', 'b')).sentence).toContain('Cancel the sked');
    const left = taken(act(agreedByThree(), 'dropOut', 'c'));
    expect(refusal(act(left, 'dropOut', 'b')).sentence).toContain('Two stations are left');
  });

  it('is for good, and not for one’s own open offer, nor after the slot', () => {
    const left = taken(act(agreedByThree(), 'dropOut', 'c'));
    for (const kind of ['accept', 'decline', 'dropOut', 'cancel', 'report'] as const) {
      expect(refusal(act(left, kind, 'c')).sentence).toContain('QC2FAR has dropped out');
    }
    expect(refusal(moveTo(left, 'c')).sentence).toContain('QC2FAR has dropped out');
    const moved = taken(moveTo(left, 'a'));
    expect(taken(act(moved, 'accept', 'b')).state).toBe('agreed');
    expect(refusal(act(three(), 'dropOut', 'a')).sentence).toContain('Withdraw');
    const over = act(agreedByThree(), 'dropOut', 'c', SLOT.endMs);
    expect(refusal(over).sentence).toContain('Report');
  });
});

describe('lapsing', () => {
  it('lapses an offer at its start and nothing else', () => {
    expect(refusal(decide(offered(), { kind: 'lapse' }, { nowMs: START - 1 })).code).toBe('early');
    expect(taken(decide(offered(), { kind: 'lapse' }, { nowMs: START })).state).toBe('lapsed');
    const agreed = taken(act(offered(), 'accept', 'b'));
    expect(decide(agreed, { kind: 'lapse' }, { nowMs: START }).ok).toBe(false);
  });

  it('treats an offer whose time has come as lapsed before anybody wrote it down', () => {
    expect(refusal(act(offered(), 'accept', 'b', START)).sentence).toContain('lapsed');
    expect(refusal(moveTo(offered(), 'b', LATER, START)).sentence).toContain('lapsed');
  });
});

const commandArbitrary = fc.record({
  kind: fc.oneof(
    { weight: 6, arbitrary: fc.constant('accept') },
    { weight: 3, arbitrary: fc.constant('move') },
    {
      weight: 3,
      arbitrary: fc.constantFrom('decline', 'dropOut', 'withdraw', 'cancel', 'report', 'lapse'),
    },
  ),
  by: fc.constantFrom('a', 'a', 'b', 'b', 'c', 'c', 'stranger'),
  staleBy: fc.constantFrom(0, 0, 0, 0, 0, 0, 1, -1),
  startInMinutes: fc.integer({ min: -200, max: 9000 }),
  minutes: fc.integer({ min: 1, max: 1500 }),
  waitMinutes: fc.constantFrom(0, 0, 0, 0, 1, 30, 600),
});

describe('any sequence of commands', () => {
  it('keeps the invariants of a sked', () => {
    let reachedAgreement = 0;
    fc.assert(
      fc.property(fc.array(commandArbitrary, { minLength: 1, maxLength: 40 }), (steps) => {
        let nowMs = NOW;
        let sked = offered([A, B, C]);
        const calendar: CalendarDue[] = [];
        for (const step of steps) {
          nowMs += step.waitMinutes * MINUTE_MS;
          const before = structuredClone(sked);
          const startMs = nowMs + step.startInMinutes * MINUTE_MS;
          const version = sked.version + step.staleBy;
          const slot = { startMs, endMs: startMs + step.minutes * MINUTE_MS };
          const command: SkedCommand =
            step.kind === 'lapse'
              ? { kind: 'lapse' }
              : step.kind === 'move'
                ? { kind: 'move', by: step.by, version, slot }
                : {
                    kind: step.kind as 'accept',
                    by: step.by,
                    version,
                  };
          const decision = decide(sked, command, { nowMs });
          expect(sked).toEqual(before);
          if (!decision.ok) {
            expect(decision.refusal.sentence).toMatch(/^[A-Z].*\.$/);
            continue;
          }
          expect(command.kind === 'lapse' || step.staleBy === 0).toBe(true);
          expect(step.by !== 'stranger' || command.kind === 'lapse').toBe(true);
          sked = decision.sked;
          expect(sked.version).toBe(before.version + 1);
          expect(decision.happenings.length).toBeGreaterThan(0);
          expect(['withdrawn', 'lapsed', 'cancelled']).not.toContain(before.state);
          const still = stillIn(sked.parties);
          expect(still.length).toBeGreaterThanOrEqual(2);
          for (const party of before.parties) {
            const after = sked.parties.find(({ stationId }) => stationId === party.stationId)!;
            if (party.left) expect(after).toEqual(party);
          }
          const everyoneAccepted = still.every((party) => party.answer === 'accepted');
          if (holdsBooking(sked)) expect(everyoneAccepted).toBe(true);
          if (sked.state === 'offered') {
            expect(everyoneAccepted).toBe(false);
            expect(hasLapsed(sked, nowMs)).toBe(false);
            const offering = still.find((party) => party.stationId === sked.offeredBy);
            expect(offering?.answer).toBe('accepted');
          }
          if (sked.state === 'agreed' && before.state !== 'agreed') {
            expect(decision.calendar?.status).toBe('CONFIRMED');
            reachedAgreement += 1;
          }
          if (before.state === 'agreed' && !holdsBooking(sked)) {
            expect(decision.calendar?.status).toBe(
              sked.state === 'offered' ? 'TENTATIVE' : 'CANCELLED',
            );
          }
          if (decision.calendar) calendar.push(decision.calendar);
        }
        // Calendar messages count up from the offer's 0 without a gap; only a report sends none.
        expect(calendar.map((message) => message.sequence)).toEqual(
          calendar.map((_, index) => index + 1),
        );
      }),
      { numRuns: 3000, seed: 20270118 },
    );
    expect(reachedAgreement).toBeGreaterThan(500);
  });
});
