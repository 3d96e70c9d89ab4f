import { createLinkEvaluator } from '../../src/domain/link/evaluator';
import type { LinkSetup, LinkStation } from '../../src/domain/link/setup';
import { DAY_MS } from '../../src/domain/time/interval';
import { median, timed, type Bench } from './results';

const STEP_MS = 300_000;
const WARM_UP_RUNS = 15;
const RUNS = 31;

const dish = (diameterM: number): LinkSetup => ({
  antenna: { kind: 'dish', diameterM, apertureEfficiency: 0.55 },
  polarization: 'rightCircular',
  powerAtFeedW: 200,
  receive: {
    kind: 'stages',
    stages: [
      { kind: 'loss', lossDb: 0.1 },
      { kind: 'amplifier', gainDb: 30, noiseFigureDb: 0.3 },
      { kind: 'loss', lossDb: 4 },
      { kind: 'amplifier', gainDb: 0, noiseFigureDb: 6 },
    ],
    spilloverK: 20,
  },
});

const PAIR: readonly [LinkStation, LinkStation] = [
  { site: { latitudeDeg: 50, longitudeDeg: 10, heightM: 200 }, setup: dish(3) },
  { site: { latitudeDeg: 40, longitudeDeg: -75, heightM: 0 }, setup: dish(2.4) },
];

/**
 * The whole link, both directions with chance, every 5 minutes through 30 days, Moon table included; a new span every
 * run, so that nothing is left from the run before.
 */
function wholeMonth(run: number): void {
  const startMs = Date.UTC(2027, 0, 1) + run * DAY_MS;
  const evaluator = createLinkEvaluator(PAIR, 1296.1, 'q65-60c');
  const series = evaluator.series({ startMs, endMs: startMs + 30 * DAY_MS }, STEP_MS);
  if (!series.contactChance.some((chance) => chance > 0)) throw new Error('No link was computed.');
}

export const linkPair30d: Bench = {
  name: 'link.pair30d',
  run: () => {
    for (let run = 0; run < WARM_UP_RUNS; run += 1) wholeMonth(run);
    const runsMs = Array.from({ length: RUNS }, (_, run) => timed(() => wholeMonth(run)));
    return [
      {
        name: 'link.pair30d.warmMs',
        value: median(runsMs),
        unit: 'ms',
        note: `median of ${RUNS} runs, least ${Math.min(...runsMs).toFixed(2)} ms; every 5 minutes, both directions with chance, Moon table included`,
      },
    ];
  },
};
