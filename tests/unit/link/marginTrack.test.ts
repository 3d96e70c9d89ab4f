import { describe, expect, it } from 'vitest';
import { buildMoonTable } from '~/domain/ephemeris/index';
import { computeLink } from '~/domain/link/budget';
import { LinkInputError } from '~/domain/link/inputError';
import { MarginTrack } from '~/domain/link/marginTrack';
import { NORTH, SOUTH, WEST, withSetup } from './stations';

const SPAN = { startMs: Date.UTC(2026, 8, 1), endMs: Date.UTC(2026, 8, 4) };
const ALL = [NORTH, WEST, SOUTH];

describe('the lowest margin among several stations', () => {
  const track = new MarginTrack(buildMoonTable(SPAN), ALL, 1296.1, 'cw');

  it('is that of the worst pair and direction', () => {
    let compared = 0;
    track.values.forEach((value, node) => {
      if (node % 6 !== 0 || track.skips(node)) return;
      const timeMs = track.gridStartMs + node * track.gridStepMs;
      const margins = [
        [NORTH, WEST],
        [NORTH, SOUTH],
        [WEST, SOUTH],
      ].flatMap(([first, second]) =>
        computeLink({
          stations: [first!, second!],
          frequencyMhz: 1296.1,
          mode: 'cw',
          timeMs,
        }).directions.map(({ marginDb }) => marginDb),
      );
      expect(Math.abs(value - Math.min(...margins))).toBeLessThan(0.01);
      compared += 1;
    });
    expect(compared).toBeGreaterThan(15);
  });

  it('passes over the hours with the Moon far down', () => {
    const skipped = Array.from(track.values).filter((_, node) => track.skips(node)).length;
    expect(skipped).toBeGreaterThan(track.values.length / 2);
    expect(skipped).toBeLessThan(track.values.length);
  });

  it('knows the worst chance too', () => {
    const up = track.values.findIndex((_, node) => node > 50 && !track.skips(node)) + 12;
    const { marginDb, chance } = track.worstAt(track.gridStartMs + up * track.gridStepMs);
    expect(marginDb).toBe(track.values[up]);
    expect(chance).toBeGreaterThan(0);
    expect(chance).toBeLessThan(1);
  });

  it('refuses what cannot be computed', () => {
    const mute = withSetup(NORTH, { powerAtFeedW: 0 });
    expect(() => new MarginTrack(buildMoonTable(SPAN), [mute, WEST], 1296, 'cw')).toThrow(
      LinkInputError,
    );
  });
});
