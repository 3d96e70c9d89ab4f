import { buildMoonTable, moonSamples, moonTrack, type TrackPoint } from '../ephemeris';
import { degradationModel, dopplerHz, skyAndDegradation } from '../link';
import { HOUR_MS, MINUTE_MS, type Interval } from '../time/interval';
import { commonMoonUp, findCommonWindows, WindowCache, type CommonWindow } from '../window';
import { judgedAt, judgedCurve, type Judge } from '../window/judge';
import type { Quality } from '../window/quality';
import { bestMoment, qualityBands, type QualityBand } from '../window/qualityBands';
import type { SkedStation } from './obstacle';

/** One line of the track table. */
export interface TrackRow {
  timeMs: number;
  /** In the order of the parties. Elevations airless, ranges topocentric. */
  stations: { azimuthDeg: number; elevationDeg: number; rangeKm: number; ownEchoHz: number }[];
  /** Between the two stations; null where there are more. */
  mutualHz: number | null;
  degradationDb: number;
  /** By what the sked is judged. */
  quality: Quality;
}

/** What surrounds the slot, for the twin tide. */
export interface SkedTide extends Interval {
  stations: { callSign: string; points: TrackPoint[] }[];
  bands: QualityBand[];
  hidden: Interval[];
}

export interface SkedSheet {
  rows: TrackRow[];
  /** The common window that holds most of the slot, by the sky alone; null where there is none. */
  window: CommonWindow | null;
  /** The best moment of that window. */
  best: { timeMs: number; quality: Quality } | null;
  tide: SkedTide;
}

const LOOK_AROUND_MS = 18 * HOUR_MS;
const TIDE_MARGIN_MS = 1.5 * HOUR_MS;
const TIDE_LONGEST_MS = 16 * HOUR_MS;

/** Everything the page of a sked tells about the Moon in its slot. */
export function skedSheet(
  stations: readonly SkedStation[],
  slot: Interval,
  judge: Judge,
): SkedSheet {
  const { frequencyMhz } = judge;
  const cache = new WindowCache();
  const search = {
    startMs: slot.startMs - LOOK_AROUND_MS,
    endMs: slot.endMs + LOOK_AROUND_MS,
    stations: stations.map(({ callSign, site, sky }) => ({ callSign, site, sky })),
    frequencyMhz,
  };
  const { windows } = findCommonWindows(search, cache);
  const window = windows.reduce<CommonWindow | null>((best, one) => {
    const shared = sharedMs(one, slot);
    return shared > 0 && (!best || shared > sharedMs(best, slot)) ? one : best;
  }, null);
  return {
    rows: trackRows(stations, slot, judge),
    window,
    best: window && bestMoment(judgedCurve(judge, cache.table(search)), window),
    tide: {
      ...tideOf(stations, tideSpan(slot, window), judge, windows),
      hidden: commonMoonUp(search, cache).hidden.map(({ startMs, endMs }) => ({ startMs, endMs })),
    },
  };
}

/** Rows every 5 minutes, in longer slots every 10, 30 or 60; the first at the start, the last at the end. */
export function trackRows(
  stations: readonly SkedStation[],
  slot: Interval,
  judge: Judge,
): TrackRow[] {
  const { frequencyMhz } = judge;
  const lengthMs = slot.endMs - slot.startMs;
  const stepMs =
    [5, 10, 30].map((minutes) => minutes * MINUTE_MS).find((step) => lengthMs <= 18 * step) ??
    HOUR_MS;
  const times: number[] = [];
  for (let timeMs = slot.startMs; timeMs < slot.endMs; timeMs += stepMs) times.push(timeMs);
  times.push(slot.endMs);
  const samples = stations.map((station) => moonSamples(station.site, times));
  const model = degradationModel(frequencyMhz);
  const table = buildMoonTable(slot);
  return times.map((timeMs, index) => {
    const here = samples.map((track) => track[index]!);
    return {
      timeMs,
      stations: here.map((sample) => ({
        azimuthDeg: sample.azimuthDeg,
        elevationDeg: sample.elevationDeg,
        rangeKm: sample.rangeKm,
        ownEchoHz: dopplerHz(frequencyMhz, sample.rangeRateMps),
      })),
      mutualHz:
        here.length === 2
          ? dopplerHz(frequencyMhz, here[0]!.rangeRateMps, here[1]!.rangeRateMps)
          : null,
      degradationDb: skyAndDegradation(model, timeMs).degradationDb,
      quality: judgedAt(judge, timeMs, table),
    };
  });
}

function sharedMs(a: Interval, b: Interval): number {
  return Math.min(a.endMs, b.endMs) - Math.max(a.startMs, b.startMs);
}

function tideSpan(slot: Interval, window: Interval | null): Interval {
  const startMs = Math.min(slot.startMs, window?.startMs ?? slot.startMs) - TIDE_MARGIN_MS;
  const endMs = Math.max(slot.endMs, window?.endMs ?? slot.endMs) + TIDE_MARGIN_MS;
  const lengthMs = slot.endMs - slot.startMs;
  if (endMs - startMs <= TIDE_LONGEST_MS || lengthMs >= TIDE_LONGEST_MS) return { startMs, endMs };
  const aroundMs = (TIDE_LONGEST_MS - lengthMs) / 2;
  return {
    startMs: Math.max(startMs, slot.startMs - aroundMs),
    endMs: Math.min(endMs, slot.endMs + aroundMs),
  };
}

function tideOf(
  stations: readonly SkedStation[],
  span: Interval,
  judge: Judge,
  windows: readonly Interval[],
): Omit<SkedTide, 'hidden'> {
  const table = buildMoonTable(span);
  return {
    ...span,
    stations: stations.map(({ callSign, site }) => ({
      callSign,
      points: moonTrack(table, site, span, 10 * MINUTE_MS),
    })),
    bands: qualityBands(judgedCurve(judge, table), windows),
  };
}
