import { buildMoonTable, moonTrack } from '../../domain/ephemeris';
import type { Site } from '../../domain/sky/limits';
import { formatClock } from '../../domain/time/format';
import { DAY_MS, HOUR_MS, MINUTE_MS } from '../../domain/time/interval';

const STEP_MS = 20 * MINUTE_MS;

/** The Moon's path over a station in the next 24 hours; every fourth hour carries its number in UTC. */
export function moonTrackToday(site: Site, nowMs: number) {
  const startMs = Math.floor(nowMs / HOUR_MS) * HOUR_MS;
  const span = { startMs, endMs: startMs + DAY_MS };
  return moonTrack(buildMoonTable(span), site, span, STEP_MS).map((point) => ({
    ...point,
    ...(point.timeMs % (4 * HOUR_MS) === 0 ? { hour: formatClock(point.timeMs).slice(0, 2) } : {}),
  }));
}
