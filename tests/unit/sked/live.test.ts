import { describe, expect, it } from 'vitest';
import { moonSampleDirect } from '~/domain/ephemeris';
import { hourSheet } from '~/domain/sked/hourSheet';
import { dialAt, liveData, liveState, lookAt, marginsAt } from '~/domain/sked/live';
import { MINUTE_MS } from '~/domain/time/interval';
import { NORTH, SKED, WEST } from './stations';

const sheet = hourSheet([NORTH, WEST], 'QA1LUN', SKED);
const data = liveData([NORTH, WEST], 'QA1LUN', SKED, sheet.plan);

describe('the live view', () => {
  it('counts down to the first period', () => {
    const state = liveState(data, SKED.startMs - 90_000);
    expect(state).toMatchObject({ phase: 'before', leftMs: 90_000, period: null });
    expect(state.next).toMatchObject({ callSign: 'QA1LUN', startMs: SKED.startMs });
  });

  it('changes hands at the second', () => {
    const changeMs = SKED.startMs + 5 * MINUTE_MS;
    expect(liveState(data, changeMs - 1).period!.callSign).toBe('QA1LUN');
    const state = liveState(data, changeMs);
    expect(state.period).toMatchObject({ callSign: 'QB7TID', startMs: changeMs });
    expect(state.next).toMatchObject({ callSign: 'QA1LUN' });
    expect(state.strip).toHaveLength(6);
    expect(state.strip[1]).toEqual(state.period);
  });

  it('ends with the slot', () => {
    const last = liveState(data, SKED.endMs - 1000);
    expect(last.next).toBeNull();
    expect(last.period!.endMs).toBe(SKED.endMs);
    expect(liveState(data, SKED.endMs)).toMatchObject({ phase: 'over', period: null, strip: [] });
  });

  it('finds the Moon between the steps of its track', () => {
    for (const timeMs of [SKED.startMs - 50 * MINUTE_MS, SKED.startMs + 31_000, SKED.endMs]) {
      for (const { callSign, site } of [NORTH, WEST]) {
        const look = lookAt(data, callSign, timeMs)!;
        const exact = moonSampleDirect(site, timeMs);
        expect(Math.abs(look.azimuthDeg - exact.azimuthDeg)).toBeLessThan(0.02);
        expect(Math.abs(look.elevationDeg - exact.elevationDeg)).toBeLessThan(0.02);
      }
    }
    expect(lookAt(data, 'QA1LUN', SKED.startMs - 2 * 60 * MINUTE_MS)).toBeNull();
  });

  it('passes north without a jump', () => {
    const turning = {
      ...data,
      track: {
        startMs: 0,
        stepMs: 1000,
        skies: [
          {
            callSign: 'QA1LUN',
            azimuthsDeg: [359, 1],
            elevationsDeg: [40, 40],
            ownEchosHz: [0, 0],
          },
        ],
      },
    };
    expect(lookAt(turning, 'QA1LUN', 250)!.azimuthDeg).toBeCloseTo(359.5, 9);
    expect(lookAt(turning, 'QA1LUN', 750)!.azimuthDeg).toBeCloseTo(0.5, 9);
  });

  it('shows the dials and margins of the sheet', () => {
    const { middle } = sheet.pairs[0]!;
    const dial = dialAt(data, data.partners[0]!, middle.timeMs)!;
    expect(Math.abs(dial.transmitHz - middle.ownDial.transmitHz)).toBeLessThan(0.1);
    expect(Math.abs(dial.receiveHz - middle.ownDial.receiveHz)).toBeLessThan(0.1);
    const margins = marginsAt(data, data.partners[0]!, middle.timeMs)!;
    expect(margins.theyHearDb).toBeCloseTo(middle.theyHearDb!, 1);
    expect(margins.youHearDb).toBeCloseTo(middle.youHearDb!, 1);
  });

  it('gives the browser no places', () => {
    expect(JSON.stringify(data)).not.toMatch(/latitude|longitude/i);
  });
});
