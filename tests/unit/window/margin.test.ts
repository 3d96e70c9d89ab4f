import { describe, expect, it } from 'vitest';
import { buildMoonTable } from '~/domain/ephemeris';
import { computeLink, describe as describeLink } from '~/domain/link/budget';
import type { BandSetup } from '~/domain/station/setup';
import { DAY_MS, HOUR_MS, MINUTE_MS, type Interval } from '~/domain/time/interval';
import { judgedAt } from '~/domain/window/judge';
import { LayersCache, windowLayers } from '~/domain/window/layers';
import { ledgerTerms, ledgerText, linkSheets } from '~/domain/window/ledgerSheet';
import { linkMatrix, pairsOf } from '~/domain/window/linkMatrix';
import {
  qualityFigure,
  qualityOf,
  qualityOfDegradation,
  qualityOfMargin,
  qualityWords,
  scaleWords,
} from '~/domain/window/quality';
import { figureAt } from '~/domain/window/qualityBands';
import { emptyQuestion, type WindowQuestion } from '~/domain/window/question';
import { bestFirst, rankingSentence, windowScore } from '~/domain/window/ranking';
import type { ChosenStation } from '~/domain/window/searchData';

const FROM_MS = Date.parse('2027-01-18T00:00:00Z');
const MHZ = 1296.1;

const setup = (
  diameterM: number,
  powerAtFeedW: number,
  part: Partial<BandSetup> = {},
): BandSetup => ({
  antenna: { kind: 'dish', diameterM, apertureEfficiency: 0.55 },
  polarization: 'rightCircular',
  powerAtFeedW,
  receive: { kind: 'measured', systemTemperatureK: 60 },
  ...part,
});

function station(
  callSign: string,
  [latitudeDeg, longitudeDeg]: [number, number],
  own: BandSetup | null,
): ChosenStation {
  return {
    token: callSign,
    id: callSign,
    callSign,
    site: { latitudeDeg, longitudeDeg, heightM: 0 },
    sky: { elevationFromDeg: 8 },
    placeName: null,
    locator: 'JO00',
    timeZone: 'UTC',
    equipment: own ? [{ band: '1296', setup: own }] : [],
    own: false,
  };
}

const NORTH = station('QA1LUN', [58.4, 18.6], setup(2.4, 150));
const WEST = station('QB7TID', [43.8, -71.6], setup(1.9, 70));
const BARE = station('QC2FAR', [50.2, 8.6], null);
const PAIR = [NORTH, WEST];

const question: WindowQuestion = {
  ...emptyQuestion(FROM_MS),
  stations: ['QA1LUN', 'QB7TID'],
  lowestDeg: [null, null],
};

function weakerDb([first, second]: ChosenStation[], timeMs: number): number {
  const { directions } = computeLink({
    stations: [
      { site: first!.site, setup: first!.equipment[0]!.setup },
      { site: second!.site, setup: second!.equipment[0]!.setup },
    ],
    frequencyMhz: MHZ,
    mode: question.mode!,
    timeMs,
  });
  return Math.min(directions[0].marginDb, directions[1].marginDb);
}

const lengthMs = (intervals: readonly Interval[]) =>
  intervals.reduce((sum, at) => sum + at.endMs - at.startMs, 0);

describe('quality of a margin', () => {
  it.each([
    [-3, 'below', '−3.0'],
    [-0.06, 'below', '−0.1'],
    [-0.04, 'thin', '0.0'],
    [0, 'thin', '0.0'],
    [1.44, 'thin', '+1.4'],
    [1.46, 'fair', '+1.5'],
    [3, 'good', '+3.0'],
    [4.5, 'strong', '+4.5'],
    [5.94, 'strong', '+5.9'],
    [5.96, 'ample', '+6.0'],
    [25, 'ample', '+25.0'],
  ])('%f dB is %s and shown as %s', (marginDb, step, figure) => {
    const quality = qualityOfMargin(marginDb);
    expect(quality.step).toBe(step);
    expect(qualityFigure(quality)).toBe(figure);
    expect(qualityWords(quality)).toBe(`${figure} dB, ${step}`);
  });

  it('leaves a degradation without a sign', () => {
    expect(qualityWords(qualityOfDegradation(0.62))).toBe('0.6 dB, ample');
  });

  it('tells where its steps begin as it judges them', () => {
    for (const basis of ['margin', 'degradation'] as const) {
      for (const { step, words } of scaleWords(basis)) {
        const edge = Number(words.replace(/^\D+/, ''));
        const inside = words.startsWith('over') ? edge + 0.1 : edge;
        expect(qualityOf(basis, inside).step).toBe(step);
      }
    }
    expect(scaleWords('margin')[4]).toEqual({ step: 'ample', words: 'from 6.0' });
  });
});

describe('windows judged by margin', () => {
  const layers = windowLayers(question, PAIR);

  it('carry the margin of the weaker direction at their best moments', () => {
    expect(layers.judge).toMatchObject({
      basis: 'margin',
      sentence: 'Judged by the margin of the weaker direction in Q65-60C.',
    });
    expect(layers.windows.length).toBeGreaterThan(3);
    layers.windows.forEach((window, index) => {
      const { timeMs } = window.best;
      expect(timeMs).toBeGreaterThanOrEqual(window.startMs);
      expect(timeMs).toBeLessThanOrEqual(window.endMs);
      const quality = layers.windowQuality[index]!;
      expect(quality.basis).toBe('margin');
      expect(Math.abs(quality.db - weakerDb(PAIR, timeMs))).toBeLessThan(0.05);
      for (let at = window.startMs; at <= window.endMs; at += 30 * MINUTE_MS) {
        expect(weakerDb(PAIR, at)).toBeLessThan(quality.db + 0.05);
      }
    });
  });

  it('keep the same windows as without equipment: a margin only judges', () => {
    const plain = windowLayers({ ...question, mode: null }, PAIR);
    const edges = (of: typeof plain) => of.windows.map(({ startMs, endMs }) => [startMs, endMs]);
    expect(edges(layers)).toEqual(edges(plain));
    expect(plain.judge.basis).toBe('degradation');
  });

  it('read the curve within 0.05 dB of the link, crossed linear feeds within 0.5 dB off their nulls', () => {
    const linear = [
      station('QA1LUN', [58.4, 18.6], setup(2.4, 150, { polarization: 'horizontal' })),
      station('QB7TID', [43.8, -71.6], setup(1.9, 70, { polarization: 'horizontal' })),
    ];
    for (const [pair, toleranceDb] of [
      [PAIR, 0.05],
      [linear, 0.5],
    ] as const) {
      const { curve, windows } = windowLayers(question, [...pair]);
      for (const window of windows) {
        for (let at = window.startMs; at <= window.endMs; at += 7 * MINUTE_MS) {
          const trueDb = weakerDb([...pair], at);
          if (trueDb < -6) continue;
          expect(Math.abs(figureAt(curve, at) - trueDb)).toBeLessThan(toleranceDb);
        }
      }
    }
  });

  it('are ranked by margin, more first, and length', () => {
    const order = bestFirst(layers.windows, layers.windowQuality);
    const scores = order.map((index) =>
      windowScore(layers.windows[index]!, layers.windowQuality[index]!),
    );
    expect(scores).toEqual([...scores].sort((a, b) => b - a));
    const [window] = layers.windows;
    expect(windowScore(window!, qualityOfMargin(5))).toBeGreaterThan(
      windowScore(window!, qualityOfMargin(4)),
    );
    expect(windowScore(window!, qualityOfDegradation(5))).toBeLessThan(
      windowScore(window!, qualityOfDegradation(4)),
    );
    expect(rankingSentence('margin')).toMatch(/^Ranked by margin/);
  });

  it('end where the margin falls under the least one asked for', () => {
    const middleDb =
      layers.windowQuality.reduce((sum, { db }) => sum + db, 0) / layers.windowQuality.length;
    const asked = Math.round(middleDb * 10) / 10;
    const limited = windowLayers({ ...question, minimumMarginDb: asked }, PAIR);
    expect(limited.windows.length).toBeGreaterThan(0);
    expect(lengthMs(limited.windows)).toBeLessThan(lengthMs(layers.windows));
    expect(limited.lost.find(({ reason }) => reason === 'margin')!.hours).toBeGreaterThan(0);
    for (const { startMs, endMs } of limited.windows) {
      for (const at of [startMs, (startMs + endMs) / 2, endMs]) {
        expect(weakerDb(PAIR, at)).toBeGreaterThan(asked - 0.05);
      }
    }
    const hours =
      limited.lost.reduce((sum, lost) => sum + lost.hours, 0) + lengthMs(limited.windows) / HOUR_MS;
    expect(hours).toBeCloseTo((question.days * DAY_MS) / HOUR_MS, 6);
  });

  it('take the weakest of all pairs', () => {
    const third = station('QC2FAR', [50.2, 8.6], setup(1.2, 20));
    const three = windowLayers({ ...question, lowestDeg: [null, null, null] }, [...PAIR, third]);
    expect(three.judge.links).toHaveLength(3);
    for (const [index, { best }] of three.windows.entries()) {
      const pairs = [PAIR, [NORTH, third], [WEST, third]].map((pair) =>
        weakerDb(pair, best.timeMs),
      );
      expect(Math.abs(three.windowQuality[index]!.db - Math.min(...pairs))).toBeLessThan(0.05);
    }
  });

  it('stand in a table of all directions, whose weakest is what the round is judged by', () => {
    const third = station('QC2FAR', [50.2, 8.6], setup(1.2, 20));
    const round = [...PAIR, third];
    const { judge, windows } = windowLayers({ ...question, lowestDeg: [null, null, null] }, round);
    const { timeMs } = windows[0]!.best;
    const table = buildMoonTable({ startMs: timeMs - HOUR_MS, endMs: timeMs + HOUR_MS });
    const pairs = pairsOf(3).map((pair, at) => {
      const moment = judge.links[at]!.over(table);
      moment.compute(timeMs);
      return { ...pair, link: describeLink(moment) };
    });
    for (const { first, second, link } of pairs) {
      expect(link.directions[0].from).toBe(round[first]!.callSign);
      expect(link.directions[0].to).toBe(round[second]!.callSign);
    }
    const matrix = linkMatrix(
      round.map(({ callSign }) => callSign),
      pairs,
      timeMs,
    );
    const { from, to } = matrix.weakest!;
    const cell = matrix.cells[from]![to]!;
    expect('margin' in cell && cell.margin).toEqual(judgedAt(judge, timeMs, table));
    expect(matrix.sentence).toContain(`${round[from]!.callSign} to ${round[to]!.callSign}`);
    expect(matrix.cells.map((row, at) => row[at])).toEqual([null, null, null]);

    const set = linkMatrix(
      ['A', 'B'],
      [{ first: 0, second: 1, link: { ...pairs[0]!.link, moonUp: false } }],
      timeMs,
    );
    expect(set.cells[0]![1]).toEqual({ why: 'Moon down' });
    expect(set.sentence).toBe('No direction has a margin then.');
  });

  it('fall back to degradation and say why', () => {
    const of = (part: Partial<WindowQuestion>, stations: ChosenStation[]) =>
      windowLayers({ ...question, minimumMarginDb: 3, ...part }, stations).judge.sentence;
    expect(of({}, [NORTH, BARE])).toBe(
      'Judged by degradation, the path alone: no equipment on 1296 MHz is known of QC2FAR.',
    );
    expect(of({ band: '144' }, PAIR)).toContain(
      'no equipment on 144 MHz is known of QA1LUN and QB7TID.',
    );
    expect(of({ mode: null }, PAIR)).toContain('no mode is chosen');
    const unlimited = windowLayers(question, [NORTH, BARE]);
    const limited = windowLayers({ ...question, minimumMarginDb: 30 }, [NORTH, BARE]);
    expect(limited.windows).toEqual(unlimited.windows);
  });

  it('compute the link once for a pair, band and mode, however the limits are dragged', () => {
    const cache = new LayersCache();
    const { curve } = windowLayers(question, PAIR, cache);
    const dragged = { ...question, lowestDeg: [20, null], minimumMarginDb: 1 };
    expect(windowLayers(dragged, PAIR, cache).curve).toBe(curve);
    expect(windowLayers(dragged, PAIR, cache)).toEqual({
      ...windowLayers(dragged, PAIR),
      judge: expect.anything() as unknown,
    });
    expect(windowLayers({ ...question, mode: 'cw' }, PAIR, cache).curve).not.toBe(curve);
  });
});

describe('a ledger', () => {
  const timeMs = windowLayers(question, PAIR).windows[0]!.best.timeMs;
  const setups = [NORTH.equipment[0]!.setup, WEST.equipment[0]!.setup] as const;
  const result = computeLink({
    stations: [
      { callSign: 'QA1LUN', site: NORTH.site, setup: setups[0] },
      { callSign: 'QB7TID', site: WEST.site, setup: setups[1] },
    ],
    frequencyMhz: MHZ,
    mode: 'q65-60c',
    timeMs,
  });
  const sheets = linkSheets(result, setups, 'q65-60c', '1296 MHz', timeMs);

  it('names the weaker direction, and adds up to its margin', () => {
    expect(sheets.weaker).toBe('The weaker direction decides: QB7TID to QA1LUN.');
    sheets.directions.forEach((sheet, way) => {
      expect(sheet.margin.db).toBe(result.directions[way]!.marginDb);
      const figure = (text: string) => Number(text.replace('\u2212', '-').replace(/[^-\d.]/g, ''));
      const last = sheet.signal.at(-1)!;
      expect(figure(last.level)).toBeCloseTo(sheet.margin.db, 1);
      const summed = sheet.signal
        .filter(({ sum }) => !sum)
        .reduce((sum, line, at) => sum + figure(at === 0 ? line.level : line.value), 0);
      expect(Math.abs(summed - sheet.margin.db)).toBeLessThan(0.6);
    });
  });

  it('explains each term once and names the source of the threshold', () => {
    const terms = ledgerTerms(sheets);
    expect(new Set(terms.map(({ label }) => label)).size).toBe(terms.length);
    expect(terms.find(({ label }) => label === 'The mode’s threshold')!.sentence).toContain(
      'Source: Artemis-DB',
    );
  });

  it('is told as text with every term of both directions', () => {
    const text = ledgerText(sheets);
    for (const { from, to, signal, noise } of sheets.directions) {
      expect(text).toContain(`${from} to ${to}`);
      for (const line of [...signal, ...noise]) expect(text).toContain(line.label);
    }
    expect(text).toContain('1296 MHz, Q65-60C');
    expect(text).toContain('Model error about ±2 dB.');
  });
});
