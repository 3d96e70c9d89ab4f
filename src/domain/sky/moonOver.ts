import { buildMoonTable, moonTrack, type MoonSample, type MoonTable } from '../ephemeris';
import type { TrackPoint } from '../ephemeris/samples';
import { HOUR_MS, MINUTE_MS } from '../time/interval';
import type { Site } from './limits';

/** The Moon over one place now, and its present or next pass above the horizon. */
export interface MoonOver {
  now: MoonSample;
  up: boolean;
  /** From rise to set in steps of ten minutes; the present pass, or the next when the Moon is down. */
  pass: TrackPoint[];
  highest: TrackPoint;
  /** Set of the present pass, or rise of the next. */
  changeMs: number;
  table: MoonTable;
}

const LOOK_MS = 27 * HOUR_MS;
const STEP_MS = 10 * MINUTE_MS;

/** Null where the Moon neither rises nor sets within a day, near the poles. Airless, against 0°. */
export function moonOver(site: Site, nowMs: number): MoonOver | null {
  const span = { startMs: nowMs - LOOK_MS, endMs: nowMs + 2 * LOOK_MS };
  const table = buildMoonTable(span);
  const now = table.sample(site, nowMs);
  const track = moonTrack(table, site, span, STEP_MS);
  const up = now.elevationDeg >= 0;
  const here = track.findIndex((point) => point.timeMs > nowMs);
  const isUp = (index: number) => (track[index]?.elevationDeg ?? -1) >= 0;
  let from = here;
  if (up) while (from > 0 && isUp(from - 1)) from -= 1;
  else while (from < track.length && !isUp(from)) from += 1;
  let to = Math.max(from, here);
  while (to < track.length - 1 && isUp(to + 1)) to += 1;
  const pass = track.slice(from, to + 1);
  const highest = pass.reduce<TrackPoint | null>(
    (best, point) => (!best || point.elevationDeg > best.elevationDeg ? point : best),
    null,
  );
  const edge = up ? to : from - 1;
  const before = track[edge];
  const after = track[edge + 1];
  if (!highest || !before || !after || from === 0) return null;
  const share = before.elevationDeg / (before.elevationDeg - after.elevationDeg);
  return { now, up, pass, highest, changeMs: before.timeMs + share * STEP_MS, table };
}
