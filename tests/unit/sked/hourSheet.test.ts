import { describe, expect, it } from 'vitest';
import { dialTowards } from '~/domain/sked/dial';
import { hourSheet, sheetStepMs, sheetTimes } from '~/domain/sked/hourSheet';
import { sheetExposure } from '~/domain/sked/sheetExposure';
import { checksBefore, nothingHeard, planSentences } from '~/domain/sked/sheetWords';
import { HOUR_MS, MINUTE_MS } from '~/domain/time/interval';
import { NORTH, SKED, SOUTH, WEST } from './stations';

describe('the lines of the sheet', () => {
  it.each([
    [30, 2],
    [60, 5],
    [180, 10],
    [300, 20],
    [600, 30],
    [1440, 60],
  ])('in a slot of %s minutes come every %s', (minutes, step) => {
    const slot = { startMs: SKED.startMs, endMs: SKED.startMs + minutes * MINUTE_MS };
    expect(sheetStepMs(slot)).toBe(step * MINUTE_MS);
    const times = sheetTimes(slot);
    expect(times[0]).toBe(slot.startMs);
    expect(times.at(-1)).toBe(slot.endMs);
    expect(times.length).toBeLessThanOrEqual(26);
    expect([...new Set(times)].sort((a, b) => a - b)).toEqual(times);
  });

  it('stand on round minutes even where the slot begins beside them', () => {
    const startMs = Date.UTC(2027, 0, 20, 22, 3);
    const times = sheetTimes({ startMs, endMs: startMs + HOUR_MS });
    expect(times.slice(0, 3).map((time) => new Date(time).getUTCMinutes())).toEqual([3, 5, 10]);
  });
});

describe('the sheet', () => {
  it('says the same from both sides', () => {
    const mine = hourSheet([NORTH, WEST], 'QA1LUN', SKED);
    const theirs = hourSheet([NORTH, WEST], 'QB7TID', SKED);
    expect(mine.plan).toEqual(theirs.plan);
    expect(mine.plan.order).toEqual(['QA1LUN', 'QB7TID']);
    const [here, there] = [mine.pairs[0]!, theirs.pairs[0]!];
    for (const [index, row] of here.rows.entries()) {
      const other = there.rows[index]!;
      expect(row.ownDial).toEqual(other.partnerDial);
      expect(row.partnerDial).toEqual(other.ownDial);
      expect(row.own).toEqual(other.partner);
      expect(row.theyHearDb).toBeCloseTo(other.youHearDb!, 9);
    }
    // Twice the power on one side.
    expect(here.middle.theyHearDb! - here.middle.youHearDb!).toBeCloseTo(10 * Math.log10(2), 1);
  });

  it.each(['firstCorrectsAll', 'secondCorrectsAll'] as const)(
    'keeps who is first whoever looks: %s',
    (convention) => {
      const sked = { ...SKED, convention };
      const corrects = convention === 'firstCorrectsAll' ? 'QA1LUN' : 'QB7TID';
      for (const own of ['QA1LUN', 'QB7TID']) {
        const { ownDial, partnerDial, mutualHz } = hourSheet([NORTH, WEST], own, sked).pairs[0]!
          .middle;
        const [correcting, still] =
          own === corrects ? [ownDial, partnerDial] : [partnerDial, ownDial];
        expect(still).toEqual({ transmitHz: 0, receiveHz: 0 });
        expect(correcting.receiveHz).toBeCloseTo(mutualHz, 6);
      }
    },
  );

  it.each([
    'none',
    'constantAtMoon',
    'firstCorrectsAll',
    'receiveOnly',
    'ownEchoOnFrequency',
  ] as const)('puts both on each other’s signal: %s', (convention) => {
    for (const [one, two] of [
      [900, -300],
      [-41, 2710],
    ] as const) {
      const first = dialTowards(convention, one, two, true);
      const second = dialTowards(convention, two, one, false);
      const mutual = (one + two) / 2;
      const missed = first.transmitHz + mutual - second.receiveHz;
      const missedBack = second.transmitHz + mutual - first.receiveHz;
      // Without correction the partner is found beside the dial.
      expect(missed).toBeCloseTo(convention === 'none' ? mutual : 0, 9);
      expect(missedBack).toBeCloseTo(convention === 'none' ? mutual : 0, 9);
    }
  });

  it('goes from one station towards each of the others', () => {
    const sheet = hourSheet([WEST, NORTH, SOUTH], 'QA1LUN', SKED);
    expect(sheet.pairs.map(({ partner }) => partner)).toEqual(['QB7TID', 'QC2FAR']);
    expect(sheet.plan.order).toEqual(['QA1LUN', 'QC2FAR', 'QB7TID']);
  });

  it('does without equipment', () => {
    const sheet = hourSheet([{ ...NORTH, setup: null }, WEST], 'QA1LUN', SKED);
    expect(sheet.pairs[0]!.middle.theyHearDb).toBeNull();
    expect(sheet.pairs[0]!.chance).toBeNull();
    expect(
      checksBefore(null, sheet.elevationsDeg, null)
        .map(({ text }) => text)
        .join(' '),
    ).not.toMatch(/NaN|null|undefined/);
  });
});

describe('what the sheet says', () => {
  const { plan, pairs } = hourSheet([NORTH, WEST], 'QA1LUN', SKED);

  it('about the periods', () => {
    expect(planSentences(plan, { ...SKED, eastFirst: true })).toEqual([
      'Periods of 60 s, as Q65-60C has them.',
      'QA1LUN, the eastern station counted from the date line, transmits first, from the hour or half hour.',
    ]);
    const cw = planSentences({ ...plan, periodMs: 150_000 }, { ...SKED, mode: 'cw' });
    expect(cw[0]).toBe('Periods of 2.5 min, the usual ones for CW from 432 MHz up.');
  });

  it('when nothing is heard: pointing first, writing last', () => {
    const advice = nothingHeard(pairs, null, 1296, true);
    expect(advice[0]!.lead).toBe('Pointing.');
    expect(advice.at(-1)!.text).toContain('QB7TID');
  });

  it('with the duty of the plan in the exposure estimate', () => {
    const levels = sheetExposure(NORTH.setup!, 1296, { ...plan, periodMs: 150_000 })!.levels;
    expect(levels.map(({ duty }) => Number(duty.toFixed(3)))).toEqual([0.583, 0.5, 0.5]);
    const silent = sheetExposure({ ...NORTH.setup!, powerAtFeedW: 0 }, 1296, plan);
    expect(silent).toBeNull();
  });
});
