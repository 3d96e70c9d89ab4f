import type { MoonTable } from '../ephemeris/table';
import { degradationModel, skyAndDegradation } from '../link/degradation';
import { dopplerHz } from '../link/doppler';
import type { LinkEvaluator } from '../link/evaluator';
import { PairGeometry } from '../link/geometry';
import { polarizationOffsetDeg } from '../link/polarization';
import { spreadHz } from '../link/spread';
import type { Site } from '../sky/limits';
import { MINUTE_MS, type Interval } from '../time/interval';

/** Between two samples of a curve. */
export const CURVE_STEP_MS = 5 * MINUTE_MS;

/** What belongs to a pair only. */
export interface PairCurves {
  /** The first station heard by the second and back, Hz. */
  mutualHz: Float64Array;
  /** Limb to limb, Hz. */
  spreadHz: Float64Array;
  /** 0 … below 180. */
  polarizationOffsetDeg: Float64Array;
  /** First to second and back, dB, NaN while the Moon is not up for both; null without equipment or mode. */
  marginDb: readonly [Float64Array, Float64Array] | null;
}

/** Figures at even steps, on whole five minutes of UTC. */
export interface WindowCurves {
  timesMs: Float64Array;
  /** Airless, a curve a station, in their order. */
  elevationDeg: Float64Array[];
  ownEchoHz: Float64Array[];
  degradationDb: Float64Array;
  /** Null for any number of stations but two. */
  pair: PairCurves | null;
}

export interface CurveRequest {
  /** Holds the span and half a minute on both sides. */
  table: MoonTable;
  span: Interval;
  sites: readonly Site[];
  frequencyMhz: number;
  /** The pair's link, or null where it cannot be computed. */
  link: LinkEvaluator | null;
  stepMs?: number;
}

/** Everything that changes through a window, for a picture and its table. */
export function windowCurves(request: CurveRequest): WindowCurves {
  const { table, sites, frequencyMhz } = request;
  const timesMs = evenTimes(request.span, request.stepMs ?? CURVE_STEP_MS);
  const overTime = (figure: (timeMs: number) => number) => timesMs.map(figure);
  const model = degradationModel(frequencyMhz);
  const moon = new Float64Array(3);
  return {
    timesMs,
    elevationDeg: sites.map((site) => overTime((at) => table.sample(site, at).elevationDeg)),
    ownEchoHz: sites.map((site) =>
      overTime((at) => dopplerHz(frequencyMhz, table.sample(site, at).rangeRateMps)),
    ),
    degradationDb: overTime((at) => {
      table.moonNearlyOfDate(at, moon);
      return skyAndDegradation(model, at, moon).degradationDb;
    }),
    pair: sites.length === 2 ? pairCurves(request, timesMs) : null,
  };
}

function pairCurves(request: CurveRequest, timesMs: Float64Array): PairCurves {
  const { table, sites, frequencyMhz, link } = request;
  const geometry = new PairGeometry(table, sites[0]!, sites[1]!);
  const { first, second } = geometry;
  const empty = () => new Float64Array(timesMs.length).fill(NaN);
  const curves = { mutualHz: empty(), spreadHz: empty(), polarizationOffsetDeg: empty() };
  timesMs.forEach((timeMs, index) => {
    geometry.computeElevations(timeMs);
    geometry.computeRest(timeMs);
    curves.mutualHz[index] = dopplerHz(frequencyMhz, first.rangeRateMps, second.rangeRateMps);
    curves.spreadHz[index] = spreadHz(frequencyMhz, first.libration, second.libration);
    curves.polarizationOffsetDeg[index] = polarizationOffsetDeg(
      first.parallacticDeg,
      second.parallacticDeg,
    );
  });
  if (!link) return { ...curves, marginDb: null };
  const marginDb = [empty(), empty()] as const;
  const moment = link.over(table);
  timesMs.forEach((timeMs, index) => {
    if (!moment.look(timeMs)) return;
    moment.compute(timeMs);
    marginDb[0][index] = moment.directions[0].marginDb;
    marginDb[1][index] = moment.directions[1].marginDb;
  });
  return { ...curves, marginDb };
}

function evenTimes({ startMs, endMs }: Interval, stepMs: number): Float64Array {
  const firstMs = Math.ceil(startMs / stepMs) * stepMs;
  const count = Math.max(Math.floor((endMs - firstMs) / stepMs) + 1, 0);
  return Float64Array.from({ length: count }, (_, index) => firstMs + index * stepMs);
}
