import { describe, expect, it } from 'vitest';
import { createLinkEvaluator } from '~/domain/link/evaluator';
import type { LinkStation } from '~/domain/link/setup';
import { WindowCache, findCommonWindows, type InnerLimit } from '~/domain/window/index';
import { NORTH, WEST, withSetup } from './stations';

const SPAN = { startMs: Date.UTC(2026, 8, 1), endMs: Date.UTC(2026, 8, 15) };
const MINUTE_MS = 60_000;

const asSearched = ({ callSign = '', site }: LinkStation) => ({ callSign, site, sky: {} });

/** The link as a limit of a window search; a plain look every minute is the judge. */
describe.each([
  ['circular feeds at 1296 MHz', 1296.1, NORTH, WEST, 3],
  [
    'linear feeds at 1296 MHz, whose offset turns through crossed',
    1296.1,
    withSetup(NORTH, { polarization: 'horizontal' }),
    withSetup(WEST, { polarization: 'vertical' }),
    0,
  ],
  [
    'linear feeds at 144 MHz before the galaxy',
    144.1,
    withSetup(NORTH, { polarization: 'horizontal', antenna: { kind: 'gain', gainDbi: 23 } }),
    withSetup(WEST, { polarization: 'horizontal', antenna: { kind: 'gain', gainDbi: 23 } }),
    -6,
  ],
] as const)('windows by margin: %s', (_name, mhz, first, second, minimumDb) => {
  const cache = new WindowCache();
  const evaluator = createLinkEvaluator([first, second], mhz, 'cw');
  const moment = evaluator.over(cache.table(SPAN));
  const marginDb = (timeMs: number) => {
    moment.compute(timeMs);
    return moment.marginDb;
  };
  const limit: InnerLimit = {
    cause: { callSign: null, reason: 'margin' },
    stepMs: 5 * MINUTE_MS,
    evaluate: (timeMs) => marginDb(timeMs) - minimumDb,
  };
  const stations = [first, second].map(asSearched);
  const { windows } = findCommonWindows({ ...SPAN, stations, minimumMinutes: 0 }, cache, [limit]);

  it('agree with every minute of two weeks', () => {
    const series = evaluator.series(SPAN, MINUTE_MS);
    let [up, inside, position] = [0, 0, 0];
    series.marginThereDb.forEach((there, step) => {
      if (Number.isNaN(there)) return;
      up += 1;
      const timeMs = SPAN.startMs + step * MINUTE_MS;
      while (position < windows.length && windows[position]!.endMs < timeMs) position += 1;
      const window = windows[position];
      const found = window !== undefined && window.startMs <= timeMs;
      if (found) inside += 1;
      expect(found).toBe(Math.min(there, series.marginBackDb[step]!) >= minimumDb);
    });
    expect(up).toBeGreaterThan(2000);
    expect(inside).toBeGreaterThan(up * 0.03);
    expect(inside).toBeLessThan(up * 0.97);
  });

  it('open and close by margin where the margin is what was asked', () => {
    const edges = windows.flatMap(({ startMs, endMs, opens, closes }) => [
      ...(opens.reason === 'margin' ? [startMs] : []),
      ...(closes.reason === 'margin' ? [endMs] : []),
    ]);
    for (const edgeMs of edges) {
      expect(Math.abs(marginDb(edgeMs) - minimumDb)).toBeLessThan(0.001);
    }
    expect(edges.length).toBeGreaterThanOrEqual(2);
  });
});
