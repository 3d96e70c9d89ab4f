import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  decide,
  decideOffer,
  hasLapsed,
  holdsBooking,
  type CalendarDue,
  type Decision,
  type Sked,
  type SkedCommand,
} from '~/domain/sked/machine';
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
const act = (
  sked: Sked,
  kind: 'accept' | 'decline' | 'withdraw' | 'cancel' | 'report',
  by: string,
  nowMs = NOW,
) => decide(sked, { kind, by, version: sked.version }, { nowMs });
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
  it('is agreed when the last of the parties accepted, with a calendar REQUEST numbered 0', () => {
    const first = decide(
      offered([A, B, C]),
      { kind: 'accept', by: 'b', version: 1 },
      { nowMs: NOW },
    );
    expect(taken(first).state).toBe('offered');
    const second = act(taken(first), 'accept', 'c');
    expect(taken(second).state).toBe('agreed');
    expect(second.ok && second.calendar).toEqual({ method: 'REQUEST', sequence: 0, ...SLOT });
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

  it('gives an agreed slot up when moved: CANCEL for the old slot, then REQUEST with a higher number', () => {
    const agreed = taken(act(offered(), 'accept', 'b'));
    const moved = moveTo(agreed, 'b');
    expect(taken(moved).state).toBe('offered');
    expect(moved.ok && moved.calendar).toEqual({ method: 'CANCEL', sequence: 1, ...SLOT });
    const again = act(taken(moved), 'accept', 'a');
    expect(again.ok && again.calendar).toEqual({ method: 'REQUEST', sequence: 2, ...LATER });
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
      arbitrary: fc.constantFrom('decline', 'withdraw', 'cancel', 'report', 'lapse'),
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
          const everyoneAccepted = sked.parties.every((party) => party.answer === 'accepted');
          if (holdsBooking(sked)) expect(everyoneAccepted).toBe(true);
          if (sked.state === 'offered') {
            expect(everyoneAccepted).toBe(false);
            expect(hasLapsed(sked, nowMs)).toBe(false);
            const offering = sked.parties.find((party) => party.stationId === sked.offeredBy);
            expect(offering?.answer).toBe('accepted');
          }
          if (sked.state === 'agreed' && before.state !== 'agreed') {
            expect(decision.calendar?.method).toBe('REQUEST');
            reachedAgreement += 1;
          }
          if (before.state === 'agreed' && !holdsBooking(sked)) {
            expect(decision.calendar?.method).toBe('CANCEL');
          }
          if (decision.calendar) calendar.push(decision.calendar);
        }
        // Calendar messages alternate REQUEST, CANCEL, … and count up from 0 without a gap.
        expect(calendar.map((message) => message.sequence)).toEqual(
          calendar.map((_, index) => index),
        );
        expect(calendar.map((message) => message.method)).toEqual(
          calendar.map((_, index) => (index % 2 === 0 ? 'REQUEST' : 'CANCEL')),
        );
      }),
      { numRuns: 3000, seed: 20270118 },
    );
    expect(reachedAgreement).toBeGreaterThan(500);
  });
});
