import { degradationModel, type DegradationModel } from '../link';
import { bandById, type BandId } from '../station/bands';
import { DAY_MS, intersectIntervals, subtractIntervals, type Interval } from '../time/interval';
import { WindowCache } from './cache';
import { findCommonWindows } from './findCommonWindows';
import type { InnerLimit } from './innerLimit';
import { judgedCurve, judgeOf, type Judge } from './judge';
import { moonPhase, type MoonPhase } from './moonPhase';
import { qualityOfDegradation, worthDb, type Quality } from './quality';
import {
  bestMoment,
  figureAt,
  qualityBands,
  type QualityBand,
  type QualityCurve,
} from './qualityBands';
import { questionSpan, type WindowQuestion } from './question';
import { setupOn, type ChosenStation } from './searchData';
import { freeIntervals } from './timeline';
import type { CommonWindow, WindowResult, WindowSearch, WindowStation } from './types';

/** One day of the raster: what its right columns and the phone's list say. */
export interface RasterDay {
  startMs: number;
  usableMs: number;
  /** At its best moment of the day; null without a window. */
  best: Quality | null;
}

/** The answer to a question, in the layers in which it is drawn and told. */
export interface WindowLayers extends WindowResult {
  /** Quality at the best moment of each window. */
  windowQuality: Quality[];
  bands: QualityBand[];
  /** Moon clear for everyone, yet not counted: somebody's hours, too short, or beyond a limit. */
  outside: QualityBand[];
  /** Moon over every horizon, yet hidden or too low for somebody. */
  hidden: Interval[];
  days: RasterDay[];
  /** The Moon at noon UTC of each day; the same array as long as the dates stay. */
  phases: MoonPhase[];
  curve: QualityCurve;
  judge: Judge;
}

const KEPT = 8;

/** What stays while limits change: ephemeris, visibility by station, and quality by band. */
export class LayersCache {
  readonly windows = new WindowCache();
  readonly #models = new Map<BandId, DegradationModel>();
  readonly #curves = new Map<string, QualityCurve>();
  readonly #judges = new Map<string, Judge>();
  readonly #names = new WeakMap<Judge, string>();
  #named = 0;
  readonly #phases = new Map<string, MoonPhase[]>();

  model(band: BandId): DegradationModel {
    const model = this.#models.get(band) ?? degradationModel(bandById(band).centreMhz);
    this.#models.set(band, model);
    return model;
  }

  /** By what a question is judged; the same object as long as stations, band and mode stay. */
  judge({ band, mode }: WindowQuestion, stations: readonly ChosenStation[]): Judge {
    const judged = stations.map((station) => ({
      callSign: station.callSign,
      site: station.site,
      setup: setupOn(station, band),
    }));
    const key = JSON.stringify([band, mode, judged]);
    const known = this.#judges.get(key);
    if (known) return known;
    const judge = judgeOf(judged, bandById(band).centreMhz, mode);
    if (this.#judges.size >= KEPT) this.#judges.clear();
    this.#judges.set(key, judge);
    return judge;
  }

  curve(span: Interval, judge: Judge): QualityCurve {
    // Every degradation of a frequency is the same; a margin belongs to its stations.
    const whose = judge.basis === 'margin' ? this.#nameOf(judge) : judge.frequencyMhz;
    const key = `${span.startMs}/${span.endMs} ${whose}`;
    const known = this.#curves.get(key);
    if (known) return known;
    const curve = judgedCurve(judge, this.windows.table(span));
    if (this.#curves.size >= KEPT) this.#curves.clear();
    this.#curves.set(key, curve);
    return curve;
  }

  #nameOf(judge: Judge): string {
    const name = this.#names.get(judge) ?? `judge ${(this.#named += 1)}`;
    this.#names.set(judge, name);
    return name;
  }

  phases(span: Interval): MoonPhase[] {
    const key = `${span.startMs}/${span.endMs}`;
    const known = this.#phases.get(key);
    if (known) return known;
    const table = this.windows.table(span);
    const phases: MoonPhase[] = [];
    for (let atMs = span.startMs + DAY_MS / 2; atMs < span.endMs; atMs += DAY_MS) {
      phases.push(moonPhase(table, atMs));
    }
    if (this.#phases.size > KEPT) this.#phases.clear();
    this.#phases.set(key, phases);
    return phases;
  }
}

/** The search that a question stands for, with the lowest elevations it asks for. */
export function searchOf(
  question: WindowQuestion,
  stations: readonly ChosenStation[],
): WindowSearch {
  return {
    ...questionSpan(question),
    stations: stations.map(({ callSign, site, sky, usable }, index): WindowStation => {
      const lowest = question.lowestDeg[index] ?? null;
      return {
        callSign,
        site,
        sky: lowest === null ? sky : { ...sky, elevationFromDeg: lowest },
        usable: question.counting === 'awake' ? usable : undefined,
      };
    }),
    frequencyMhz: bandById(question.band).centreMhz,
    minimumMinutes: question.minimumMinutes,
    maximumDegradationDb: question.maximumDegradationDb ?? undefined,
    minimumSunSeparationDeg: question.minimumSunSeparationDeg ?? undefined,
  };
}

/** Below this a station does not look, as the question and its own limits stand together. */
export function lowestElevationDeg(station: ChosenStation, asked: number | null): number {
  return (
    asked ?? Math.max(station.sky.elevationFromDeg ?? 0, station.sky.transmitElevationFromDeg ?? 0)
  );
}

/** Answers a question. With a cache, only what has changed since the last question is computed anew. */
export function windowLayers(
  question: WindowQuestion,
  stations: readonly ChosenStation[],
  cache: LayersCache = new LayersCache(),
): WindowLayers {
  const search = searchOf(question, stations);
  const span = questionSpan(question);
  const judge = cache.judge(question, stations);
  const curve = cache.curve(span, judge);
  const { windows: found, lost } = findCommonWindows(
    search,
    cache.windows,
    marginLimit(question, judge, curve),
  );
  const best = found.map((window) => bestMoment(curve, window));
  const windows: CommonWindow[] =
    judge.basis === 'degradation'
      ? found
      : found.map((window, index) => ({ ...window, best: { timeMs: best[index]!.timeMs } }));
  const clear = common(search.stations.map((station) => visible(station, span, cache)));
  const up = common(
    search.stations.map((station) => visible({ ...station, sky: {} }, span, cache)),
  );
  return {
    windows,
    lost,
    windowQuality: windows.map(({ best: { degradationDb } }, index) =>
      degradationDb === undefined ? best[index]!.quality : qualityOfDegradation(degradationDb),
    ),
    bands: qualityBands(curve, windows),
    outside: qualityBands(curve, subtractIntervals(clear, windows)),
    hidden: subtractIntervals(up, clear),
    days: rasterDays(question, windows, curve),
    phases: cache.phases(span),
    curve,
    judge,
  };
}

/** The least margin as a limit read off the curve, so that edges lie where the shade changes. */
function marginLimit(
  { minimumMarginDb }: WindowQuestion,
  { basis }: Judge,
  curve: QualityCurve,
): InnerLimit[] {
  if (minimumMarginDb === null || basis !== 'margin') return [];
  return [
    {
      cause: { callSign: null, reason: 'margin' },
      stepMs: curve.stepMs,
      evaluate: (timeMs) => figureAt(curve, timeMs) - minimumMarginDb,
    },
  ];
}

function visible(station: WindowStation, span: Interval, cache: LayersCache): Interval[] {
  return freeIntervals(cache.windows.timeline(span, station, false));
}

function common(lists: readonly Interval[][]): Interval[] {
  return lists.reduce((left, right) => intersectIntervals(left, right));
}

function rasterDays(
  { fromMs, days }: WindowQuestion,
  windows: readonly CommonWindow[],
  curve: QualityCurve,
): RasterDay[] {
  return Array.from({ length: days }, (_, index) => {
    const startMs = fromMs + index * DAY_MS;
    const today = intersectIntervals(windows, [{ startMs, endMs: startMs + DAY_MS }]);
    return {
      startMs,
      usableMs: today.reduce((sum, piece) => sum + piece.endMs - piece.startMs, 0),
      best: bestOf(curve, today),
    };
  });
}

function bestOf(curve: QualityCurve, pieces: readonly Interval[]): Quality | null {
  let best: Quality | null = null;
  for (const piece of pieces) {
    const { quality } = bestMoment(curve, piece);
    if (!best || worthDb(quality) > worthDb(best)) best = quality;
  }
  return best;
}
