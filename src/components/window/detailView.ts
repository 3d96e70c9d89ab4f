import { buildMoonTable, moonTrack, type MoonTable, type TrackPoint } from '../../domain/ephemeris';
import { HOUR_MS, MINUTE_MS, type Interval } from '../../domain/time/interval';
import type { ChosenStation } from '../../domain/window/searchData';

const SHOWN_AROUND_MS = 2 * HOUR_MS;
const LEAST_SHOWN_MS = 9 * HOUR_MS;
const PASS_AROUND_MS = 15 * HOUR_MS;
const STEP_MS = 10 * MINUTE_MS;

export interface StationPass {
  station: ChosenStation;
  /** The whole pass of the Moon, from rise to set, that holds the window. */
  pass: TrackPoint[];
  /** The same over the shown time, risen or not. */
  shown: TrackPoint[];
}

export interface DetailView {
  table: MoonTable;
  shown: Interval;
  passes: StationPass[];
}

/** Ephemeris of one window with its surroundings. */
export function detailView(window: Interval, stations: readonly ChosenStation[]): DetailView {
  const lengthMs = window.endMs - window.startMs;
  const aroundMs = Math.max(SHOWN_AROUND_MS, (LEAST_SHOWN_MS - lengthMs) / 2);
  const shown = { startMs: window.startMs - aroundMs, endMs: window.endMs + aroundMs };
  const span = { startMs: window.startMs - PASS_AROUND_MS, endMs: window.endMs + PASS_AROUND_MS };
  const table = buildMoonTable(span);
  const middleMs = (window.startMs + window.endMs) / 2;
  return {
    table,
    shown,
    passes: stations.map((station) => {
      const whole = moonTrack(table, station.site, span, STEP_MS);
      return {
        station,
        pass: passAround(whole, middleMs),
        shown: moonTrack(table, station.site, shown, STEP_MS),
      };
    }),
  };
}

/** The stretch over the horizon that holds the moment. */
export function passAround(points: readonly TrackPoint[], atMs: number): TrackPoint[] {
  const middle = points.findIndex((point) => point.timeMs >= atMs);
  if (middle < 0) return [];
  let first = middle;
  let last = middle;
  while (first > 0 && points[first - 1]!.elevationDeg >= 0) first -= 1;
  while (last < points.length - 1 && points[last + 1]!.elevationDeg >= 0) last += 1;
  return points.slice(first, last + 1);
}
