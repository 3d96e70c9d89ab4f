import { degradationModel, skyAndDegradation, type DegradationModel } from '../link';
import { bandById, type BandId } from '../station/bands';
import { DAY_MS, intersectIntervals, subtractIntervals, type Interval } from '../time/interval';
import { WindowCache } from './cache';
import { findCommonWindows } from './findCommonWindows';
import { moonPhase, type MoonPhase } from './moonPhase';
import { qualityOfDegradation, type Quality } from './quality';
import {
  qualityAt,
  qualityBands,
  qualityCurve,
  type QualityBand,
  type QualityCurve,
} from './qualityBands';
import { questionSpan, type WindowQuestion } from './question';
import type { ChosenStation } from './searchData';
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
}

const KEPT = 8;

/** What stays while limits change: ephemeris, visibility by station, and quality by band. */
export class LayersCache {
  readonly windows = new WindowCache();
  readonly #models = new Map<BandId, DegradationModel>();
  readonly #curves = new Map<string, QualityCurve>();
  readonly #phases = new Map<string, MoonPhase[]>();

  model(band: BandId): DegradationModel {
    const model = this.#models.get(band) ?? degradationModel(bandById(band).centreMhz);
    this.#models.set(band, model);
    return model;
  }

  curve(span: Interval, band: BandId): QualityCurve {
    const key = `${span.startMs}/${span.endMs} ${band}`;
    const known = this.#curves.get(key);
    if (known) return known;
    const table = this.windows.table(span);
    const model = this.model(band);
    const moon = new Float64Array(3);
    const curve = qualityCurve(span, (timeMs) => {
      table.moonNearlyOfDate(timeMs, moon);
      return skyAndDegradation(model, timeMs, moon).degradationDb;
    });
    if (this.#curves.size > KEPT) this.#curves.clear();
    this.#curves.set(key, curve);
    return curve;
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
  const result = findCommonWindows(search, cache.windows);
  const curve = cache.curve(span, question.band);
  const clear = common(search.stations.map((station) => visible(station, span, cache)));
  const up = common(
    search.stations.map((station) => visible({ ...station, sky: {} }, span, cache)),
  );
  return {
    ...result,
    windowQuality: result.windows.map((window) =>
      window.best.degradationDb === undefined
        ? qualityAt(curve, window.best.timeMs)
        : qualityOfDegradation(window.best.degradationDb),
    ),
    bands: qualityBands(curve, result.windows),
    outside: qualityBands(curve, subtractIntervals(clear, result.windows)),
    hidden: subtractIntervals(up, clear),
    days: rasterDays(question, result.windows, curve),
    phases: cache.phases(span),
    curve,
  };
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

const LOOK_MS = 10 * 60_000;

function bestOf(curve: QualityCurve, pieces: readonly Interval[]): Quality | null {
  let best: Quality | null = null;
  for (const piece of pieces) {
    for (let at = piece.startMs; ; at = Math.min(at + LOOK_MS, piece.endMs)) {
      const quality = qualityAt(curve, at);
      if (!best || quality.db > best.db) best = quality;
      if (at >= piece.endMs) break;
    }
  }
  return best;
}
