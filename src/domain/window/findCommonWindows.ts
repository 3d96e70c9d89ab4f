import type { StationTrack } from '../ephemeris/track';
import { degradationModel } from '../link/degradation';
import { HOUR_MS, MINUTE_MS, type Interval } from '../time/interval';
import { WindowCache } from './cache';
import { DegradationTrack, degradationTimeline } from './degradationTimeline';
import { cutByLimit, type InnerLimit } from './innerLimit';
import { highestLowerMoment, leastDegradationMoment, stationSummary } from './moments';
import { sunTimeline } from './sunTimeline';
import { sweepTimelines, type Stretch } from './sweep';
import { timelineOfIntervals, type Timeline } from './timeline';
import type {
  CommonWindow,
  LimitCause,
  LostHours,
  WindowResult,
  WindowSearch,
  WindowStation,
} from './types';

const SEARCH_LIMIT: LimitCause = { callSign: null, reason: 'searchLimit' };
const TOO_SHORT: LimitCause = { callSign: null, reason: 'tooShort' };

/**
 * Every stretch of at least `minimumMinutes` in which every station can see the Moon and every other limit holds;
 * works for one station too. Window edges are solved to a millisecond of the ephemeris and rounded inwards, so
 * that both ends satisfy every limit. `lost` accounts for every other hour of the search by the first limit that
 * fails in `REASON_ORDER`; lost and window hours together are the whole search, to the millisecond.
 *
 * @param cache keeps Moon tables and station timelines between calls; hand in the same one while limits change.
 * @param inner further limits, asked only where all others are satisfied.
 */
export function findCommonWindows(
  search: WindowSearch,
  cache: WindowCache = new WindowCache(),
  inner: readonly InnerLimit[] = [],
): WindowResult {
  const span = searchSpan(search);
  const tracks = search.stations.map((station) => cache.track(span, station.site));
  const degradation = degradationTrack(search, span, cache);
  const stretches = inner.reduce(cutByLimit, sweepSearch(search, tracks, degradation, cache));
  const minimumMs = (search.minimumMinutes ?? 1) * MINUTE_MS;
  const windows: CommonWindow[] = [];
  stretches.forEach((stretch, index) => {
    if (stretch.cause) return;
    if (stretch.endMs - stretch.startMs < minimumMs) {
      stretch.cause = TOO_SHORT;
      return;
    }
    windows.push({
      startMs: stretch.startMs,
      endMs: stretch.endMs,
      opens: stretches[index - 1]?.cause ?? SEARCH_LIMIT,
      closes: stretches[index + 1]?.cause ?? SEARCH_LIMIT,
      best: best(tracks, degradation, stretch),
      stations: search.stations.map(({ callSign }, station) =>
        stationSummary(tracks[station]!, callSign, stretch),
      ),
    });
  });
  return { windows, lost: lostHours(stretches) };
}

export interface CommonUp {
  /** The Moon stands above 0° (airless) for every station. */
  up: Interval[];
  /** The parts of `up` that some limit of the search hides, each with the first that does. */
  hidden: (Interval & { cause: LimitCause })[];
}

/** When the Moon is geometrically up for all stations of a search, and what of that is hidden and by what. */
export function commonMoonUp(
  search: WindowSearch,
  cache: WindowCache = new WindowCache(),
): CommonUp {
  const span = searchSpan(search);
  const tracks = search.stations.map((station) => cache.track(span, station.site));
  const bare = search.stations.map((station) => ({ ...station, sky: {} }));
  const upTimelines = bare.map((station) => cache.timeline(span, station, false));
  const up = sweepTimelines(span, upTimelines).filter(({ cause }) => !cause);
  const stretches = sweepSearch(search, tracks, degradationTrack(search, span, cache), cache);
  const hidden: CommonUp['hidden'] = [];
  let position = 0;
  for (const { startMs, endMs, cause } of stretches) {
    if (!cause) continue;
    while (position < up.length && up[position]!.endMs <= startMs) position += 1;
    for (let index = position; index < up.length && up[index]!.startMs < endMs; index += 1) {
      const part = up[index]!;
      hidden.push({
        startMs: Math.max(startMs, part.startMs),
        endMs: Math.min(endMs, part.endMs),
        cause,
      });
    }
  }
  return { up: up.map(({ startMs, endMs }) => ({ startMs, endMs })), hidden };
}

/** Stretches in which one station sees the Moon, usable hours included. */
export function visibleIntervals(
  station: WindowStation,
  span: Interval,
  options: { refraction?: boolean; cache?: WindowCache } = {},
): Interval[] {
  const { refraction, cache = new WindowCache() } = options;
  const search = { ...span, stations: [station], refraction };
  const stretches = sweepSearch(search, [cache.track(span, station.site)], null, cache);
  return stretches.filter(({ cause }) => !cause).map(({ startMs, endMs }) => ({ startMs, endMs }));
}

function searchSpan(search: WindowSearch): Interval {
  if (search.stations.length === 0) throw new RangeError('A window search needs a station.');
  return { startMs: Math.round(search.startMs), endMs: Math.round(search.endMs) };
}

function degradationTrack(
  search: WindowSearch,
  span: Interval,
  cache: WindowCache,
): DegradationTrack | null {
  if (search.frequencyMhz === undefined) return null;
  return new DegradationTrack(cache.table(span), degradationModel(search.frequencyMhz));
}

function sweepSearch(
  search: WindowSearch,
  tracks: readonly StationTrack[],
  degradation: DegradationTrack | null,
  cache: WindowCache,
): Stretch[] {
  const span = searchSpan(search);
  const timelines: Timeline[] = [];
  const byCallSign = [...search.stations].sort((a, b) => (a.callSign < b.callSign ? -1 : 1));
  for (const station of byCallSign) {
    timelines.push(cache.timeline(span, station, search.refraction ?? false));
    if (station.usable) {
      const cause: LimitCause = { callSign: station.callSign, reason: 'usableHours' };
      timelines.push(timelineOfIntervals(span, station.usable, cause));
    }
  }
  if (search.minimumSunSeparationDeg !== undefined) {
    for (const track of tracks) timelines.push(sunTimeline(track, search.minimumSunSeparationDeg));
  }
  if (degradation && search.maximumDegradationDb !== undefined) {
    timelines.push(degradationTimeline(degradation, search.maximumDegradationDb));
  }
  return sweepTimelines(span, timelines);
}

function best(
  tracks: readonly StationTrack[],
  degradation: DegradationTrack | null,
  window: Interval,
): CommonWindow['best'] {
  if (!degradation) return { timeMs: highestLowerMoment(tracks, window) };
  const timeMs = leastDegradationMoment(degradation, window);
  return { timeMs, degradationDb: degradation.evaluate(timeMs) };
}

function lostHours(stretches: readonly Stretch[]): LostHours[] {
  const byCause = new Map<LimitCause, number>();
  for (const { startMs, endMs, cause } of stretches) {
    if (cause) byCause.set(cause, (byCause.get(cause) ?? 0) + endMs - startMs);
  }
  const lost = new Map<string, { cause: LimitCause; lostMs: number }>();
  for (const [cause, lostMs] of byCause) {
    const key = `${cause.reason} ${cause.callSign} ${cause.name ?? ''}`;
    const entry = lost.get(key);
    if (entry) entry.lostMs += lostMs;
    else lost.set(key, { cause, lostMs });
  }
  return [...lost.values()]
    .sort((a, b) => b.lostMs - a.lostMs)
    .map(({ cause, lostMs }) => ({ ...cause, hours: lostMs / HOUR_MS }));
}
