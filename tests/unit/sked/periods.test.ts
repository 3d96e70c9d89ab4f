import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  largestDuty,
  listedPeriods,
  periodAt,
  periodsIn,
  transmitOrder,
  trPlan,
} from '~/domain/sked/periods';
import { HOUR_MS, MINUTE_MS } from '~/domain/time/interval';

const at = (hour: number, minute: number, second = 0) =>
  Date.UTC(2027, 0, 20, hour, minute, second);
const clock = (timeMs: number) => new Date(timeMs).toISOString().slice(11, 19);
const shown = (plan: Parameters<typeof periodsIn>[0]) =>
  periodsIn(plan).map(
    ({ startMs, endMs, turn }) => `${clock(startMs)}–${clock(endMs)} ${plan.order[turn]}`,
  );

const EAST = { callSign: 'QE1EAS', longitudeDeg: 139 };
const MIDDLE = { callSign: 'QM1MID', longitudeDeg: 10 };
const WEST = { callSign: 'QW1WES', longitudeDeg: -122 };

describe('the order of transmitting', () => {
  it('begins in the east, counted from the date line', () => {
    expect(transmitOrder([WEST, EAST], true)).toEqual(['QE1EAS', 'QW1WES']);
    expect(transmitOrder([EAST, WEST], true)).toEqual(['QE1EAS', 'QW1WES']);
  });

  it('begins in the west where that is set', () => {
    expect(transmitOrder([EAST, WEST], false)).toEqual(['QW1WES', 'QE1EAS']);
  });

  it('goes by longitude with three', () => {
    expect(transmitOrder([MIDDLE, WEST, EAST], true)).toEqual(['QE1EAS', 'QM1MID', 'QW1WES']);
  });
});

describe('the periods of a slot', () => {
  const order = ['QE1EAS', 'QW1WES'];
  const plan = (
    mode: 'cw' | 'q65-60c' | 'q65-120d' | 'ssb',
    frequencyMhz: number,
    startMs: number,
    endMs: number,
    of = order,
  ) => trPlan({ startMs, endMs }, { mode, frequencyMhz, order: of });

  it('are 2.5 minutes for CW on 432 MHz, counted from the hour and cut by the slot', () => {
    expect(shown(plan('cw', 432.05, at(22, 1), at(22, 11)))).toEqual([
      '22:01:00–22:02:30 QE1EAS',
      '22:02:30–22:05:00 QW1WES',
      '22:05:00–22:07:30 QE1EAS',
      '22:07:30–22:10:00 QW1WES',
      '22:10:00–22:11:00 QE1EAS',
    ]);
  });

  it('are one minute for CW on 144 MHz', () => {
    expect(shown(plan('cw', 144.1, at(22, 30), at(22, 32)))).toEqual([
      '22:30:00–22:31:00 QE1EAS',
      '22:31:00–22:32:00 QW1WES',
    ]);
  });

  it('follow a digital mode', () => {
    expect(plan('q65-120d', 10_368.1, at(22, 0), at(23, 0)).periodMs).toBe(120_000);
  });

  it.each([
    ['cw', 432.05],
    ['cw', 144.1],
    ['q65-60c', 1296.1],
  ] as const)('begin with the same station at each hour and half hour: %s on %s', (mode, mhz) => {
    const one = plan(mode, mhz, at(22, 10), at(23, 40));
    for (const timeMs of [at(22, 30), at(23, 0), at(23, 30)]) {
      expect(periodAt(one, timeMs)).toMatchObject({ turn: 0, startMs: timeMs });
    }
  });

  it('fill the slot without gap or overlap, whoever takes part', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 59 }),
        fc.integer({ min: 10, max: 300 }),
        fc.integer({ min: 2, max: 7 }),
        fc.constantFrom('cw' as const, 'q65-60c' as const, 'q65-120d' as const),
        (minute, minutes, parties, mode) => {
          const names = Array.from({ length: parties }, (_, index) => `Q${index}ANY`);
          const startMs = at(22, minute);
          const endMs = startMs + minutes * MINUTE_MS;
          const all = periodsIn(plan(mode, 1296.1, startMs, endMs, names));
          expect(all[0]!.startMs).toBe(startMs);
          expect(all.at(-1)!.endMs).toBe(endMs);
          for (const [index, period] of all.slice(1).entries()) {
            expect(period.startMs).toBe(all[index]!.endMs);
            expect(period.turn).toBe((all[index]!.turn + 1) % parties);
          }
        },
      ),
    );
  });

  it('of a long slot are listed for one hour when every hour is alike', () => {
    const long = plan('q65-60c', 1296.1, at(12, 0), at(20, 0));
    const { periods, rest } = listedPeriods(long);
    expect([periods.length, rest]).toEqual([60, 'alike']);
    const seven = Array.from({ length: 7 }, (_, index) => `Q${index}ANY`);
    const odd = listedPeriods(plan('q65-60c', 1296.1, at(12, 0), at(20, 0), seven));
    expect([odd.periods.length, odd.rest]).toEqual([180, 'goesOn']);
  });
});

describe('the largest share of an averaging time', () => {
  const plan = (periodMs: number, parties: number) => ({
    startMs: 0,
    endMs: HOUR_MS,
    anchorMs: 0,
    periodMs,
    order: Array.from({ length: parties }, (_, index) => `Q${index}ANY`),
  });

  it('is one half for one-minute turns', () => {
    expect(largestDuty(plan(60_000, 2), 6)).toBe(0.5);
    expect(largestDuty(plan(60_000, 2), 30)).toBe(0.5);
  });

  it('counts the whole period that a short averaging time can hold', () => {
    // 2.5 + 1 of 6 minutes.
    expect(largestDuty(plan(150_000, 2), 6)).toBeCloseTo(3.5 / 6, 12);
    expect(largestDuty(plan(300_000, 2), 6)).toBeCloseTo(5 / 6, 12);
  });

  it('is what sliding along the plan finds', () => {
    for (const [periodMs, parties] of [
      [60_000, 2],
      [150_000, 2],
      [120_000, 3],
      [300_000, 2],
    ] as const) {
      const one = { ...plan(periodMs, parties), endMs: 10 * HOUR_MS };
      const mine = periodsIn(one).filter(({ turn }) => turn === 0);
      let most = 0;
      for (let startMs = 0; startMs < HOUR_MS; startMs += 10_000) {
        const endMs = startMs + 6 * MINUTE_MS;
        const sum = mine.reduce(
          (total, period) =>
            total + Math.max(0, Math.min(period.endMs, endMs) - Math.max(period.startMs, startMs)),
          0,
        );
        most = Math.max(most, sum / (6 * MINUTE_MS));
      }
      expect(largestDuty(one, 6), `${periodMs} ms, ${parties}`).toBeCloseTo(most, 9);
    }
  });
});
