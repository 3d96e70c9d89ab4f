import { buildMoonTable, moonSamples } from '../ephemeris';
import { dopplerHz } from '../link/doppler';
import type { Site } from '../sky/limits';
import type { Interval } from '../time/interval';

export const TRACK_STEPS_S = [10, 30, 60] as const;
export type TrackStepS = (typeof TRACK_STEPS_S)[number];

/**
 * The Moon's track of one station through a slot as CSV (RFC 4180: CRLF, a header line): instant in UTC, azimuth and
 * airless elevation to 0.1°, Doppler of the own echo to 1 Hz. The slot's end is included.
 */
export function trackCsv(
  site: Site,
  { startMs, endMs }: Interval,
  stepS: TrackStepS,
  frequencyMhz: number,
): string {
  const times: number[] = [];
  for (let timeMs = startMs; timeMs < endMs; timeMs += stepS * 1000) times.push(timeMs);
  times.push(endMs);
  const rows = moonSamples(site, times, buildMoonTable({ startMs, endMs })).map((sample) =>
    [
      new Date(sample.timeMs).toISOString().replace('.000Z', 'Z'),
      // 359.96 would read 360.0.
      (Number(sample.azimuthDeg.toFixed(1)) % 360).toFixed(1),
      sample.elevationDeg.toFixed(1).replace(/^-0\.0$/, '0.0'),
      String(Math.round(dopplerHz(frequencyMhz, sample.rangeRateMps)) || 0),
    ].join(','),
  );
  return ['utc,azimuth_deg,elevation_deg,own_echo_doppler_hz', ...rows, ''].join('\r\n');
}
