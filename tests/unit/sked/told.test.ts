import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { countdownParts } from '~/domain/sked/countdown';
import { clockOfDay, moveFields, slotOfFields } from '~/domain/sked/moveChoice';
import { historyOf, nextSteps, shiftWords, situation } from '~/domain/sked/told';
import type { SkedEventView, SkedView } from '~/domain/sked/view';
import { moonOver } from '~/domain/sky/moonOver';
import { moonSampleDirect } from '~/domain/ephemeris';
import { DAY_MS, HOUR_MS, MINUTE_MS } from '~/domain/time/interval';

const START = Date.UTC(2027, 0, 20, 22, 0);
const slot = { startMs: START, endMs: START + 45 * MINUTE_MS };
const earlier = { startMs: START - 15 * MINUTE_MS, endMs: START + 30 * MINUTE_MS };

function event(kind: SkedEventView['kind'], version: number, over: Partial<SkedEventView> = {}) {
  return {
    version,
    kind,
    callSign: 'QB7TID',
    personName: 'Edda',
    byViewer: false,
    words: '',
    atMs: START - DAY_MS + version,
    ...slot,
    ...over,
  };
}
const mine = { callSign: 'QA1LUN', personName: 'Ylva', byViewer: true };

function sked(over: Partial<SkedView>): SkedView {
  return {
    id: 'x',
    state: 'offered',
    version: 3,
    band: '1296',
    frequencyMhz: 1296.065,
    mode: 'q65-60c',
    offeredBy: 'b',
    parties: [
      { stationId: 'a', callSign: 'QA1LUN', timeZone: 'UTC', answer: 'waiting', mine: true },
      { stationId: 'b', callSign: 'QB7TID', timeZone: 'UTC', answer: 'accepted', mine: false },
    ],
    leftParties: [],
    droppedOut: false,
    waitsForViewer: true,
    reportDue: false,
    disagreements: [],
    events: [],
    reports: [],
    choices: {
      accept: 'a',
      decline: 'a',
      dropOut: null,
      withdraw: null,
      cancel: null,
      move: 'a',
      report: null,
    },
    ...slot,
    ...over,
  };
}

describe('a sked in words', () => {
  const moved = sked({
    events: [
      event('offered', 1, { ...earlier }),
      event('declined', 2, mine),
      event('moved', 3, { ...mine, ...earlier }),
      event('moved', 4),
    ],
  });

  it('tells what became of each offer', () => {
    expect(
      historyOf(moved).map((line) => [line.who, line.did, line.outcome, line.current]),
    ).toEqual([
      ['Edda, QB7TID', 'offered', 'declined by you', false],
      ['You', 'declined', null, false],
      ['You', 'moved it', 'replaced', false],
      ['Edda, QB7TID', 'moved it', null, true],
    ]);
  });

  it('says an agreed slot was given up', () => {
    const given = sked({
      events: [
        event('offered', 1),
        event('accepted', 2, mine),
        event('agreed', 2),
        event('moved', 3),
      ],
    });
    expect(historyOf(given)[0]!.outcome).toBe('agreed, given up');
  });

  it('says who asks for what, and who has not answered', () => {
    expect(situation(moved)).toBe('Edda asks for another time: 15 min later than before.');
    const waiting = sked({
      waitsForViewer: false,
      parties: moved.parties.map((party) => ({
        ...party,
        answer: party.mine ? ('accepted' as const) : ('waiting' as const),
      })),
    });
    expect(situation(waiting)).toBe('QB7TID has not answered yet.');
    expect(shiftWords(slot, { ...slot, endMs: slot.endMs + 10 * MINUTE_MS })).toBe(
      'the same start, 10 min longer',
    );
  });

  it('ends when nothing happens any more', () => {
    expect(nextSteps(moved, START - HOUR_MS)[0]!.lead).toBe('You accept.');
    for (const state of ['withdrawn', 'lapsed', 'cancelled'] as const) {
      expect(nextSteps(sked({ state }), START)).toEqual([]);
    }
  });
});

describe('countdown', () => {
  it('keeps two digits after the first figure', () => {
    const words = (ms: number) =>
      countdownParts(ms)
        .map(({ figure, unit }) => figure + unit)
        .join(' ');
    expect(words(2 * HOUR_MS + 17 * MINUTE_MS + 53_000)).toBe('2h 17min 53s');
    expect(words(DAY_MS + 5000)).toBe('1d 00h 00min 05s');
    expect(words(59_000)).toBe('0min 59s');
    expect(words(-5)).toBe('0min 00s');
  });
});

describe('fields of a move', () => {
  it('round-trips every whole-minute slot', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 60_000_000 }),
        fc.integer({ min: 1, max: 1440 }),
        (startMinute, minutes) => {
          const startMs = startMinute * MINUTE_MS;
          const one = { startMs, endMs: startMs + minutes * MINUTE_MS };
          expect(slotOfFields(moveFields(one))).toEqual(one);
        },
      ),
    );
  });

  it.each(['24:00', '7', '22:60', 'noon', ''])('reads no time of day in "%s"', (text) => {
    expect(clockOfDay(text)).toBeNull();
  });

  it('reads times with and without the colon', () => {
    expect(clockOfDay('22:05')).toBe(22 * HOUR_MS + 5 * MINUTE_MS);
    expect(clockOfDay('2205')).toBe(clockOfDay('22:05'));
    expect(clockOfDay('9:05')).toBe(9 * HOUR_MS + 5 * MINUTE_MS);
  });
});

describe('the Moon over a place', () => {
  const site = { latitudeDeg: 57.19, longitudeDeg: 18.38, heightM: 20 };

  it('gives the present pass, or the next, and when that changes', () => {
    for (let hour = 0; hour < 72; hour += 3) {
      const nowMs = START + hour * HOUR_MS;
      const moon = moonOver(site, nowMs)!;
      const here = moonSampleDirect(site, nowMs).elevationDeg;
      expect(moon.up).toBe(here >= 0);
      expect(moon.changeMs).toBeGreaterThan(nowMs);
      // Crosses 0° there, to what ten-minute steps and a straight line between them give.
      expect(Math.abs(moonSampleDirect(site, moon.changeMs).elevationDeg)).toBeLessThan(0.02);
      if (moon.up) expect(moon.pass[0]!.timeMs).toBeLessThanOrEqual(nowMs);
      else expect(moon.pass[0]!.timeMs).toBeGreaterThan(nowMs);
      expect(moon.highest.elevationDeg).toBeGreaterThan(0);
    }
  });

  it('is null where the Moon does not rise or set', () => {
    expect(moonOver({ latitudeDeg: 89.9, longitudeDeg: 0, heightM: 0 }, START)).toBeNull();
  });
});
