import { moonSampleDirect } from '../../ephemeris';
import { skyCause } from '../../sky';
import { formatClock, formatNumber } from '../../time/format';
import { MINUTE_MS } from '../../time/interval';
import type { LimitReason } from '../../window';
import type { PlanInputStation, PlanRules } from './input';

/** The first minute at which a station cannot see the Moon, and why. */
export interface MoonObstacle {
  timeMs: number;
  reason: LimitReason;
  sentence: string;
}

/** The ends of a slot are looked at so much inside it; the Moon moves by less than 0.001° in that time. */
const INWARD_MS = 100;

/** Asks the ephemeris itself for every minute from start to end, both included. null: nothing stands in the way. */
export function moonObstacle(
  { callSign, site, sky }: PlanInputStation,
  { leastElevationDeg }: PlanRules,
  startMs: number,
  endMs: number,
): MoonObstacle | null {
  for (let minuteMs = startMs; minuteMs <= endMs; minuteMs += MINUTE_MS) {
    const timeMs = Math.min(Math.max(minuteMs, startMs + INWARD_MS), endMs - INWARD_MS);
    const { azimuthDeg, elevationDeg } = moonSampleDirect(site, timeMs);
    const at = `at ${formatClock(minuteMs)} UTC`;
    const cause = skyCause(sky, azimuthDeg, elevationDeg);
    if (cause) {
      const sentence = `the Moon is ${whereWords(cause.reason, cause.name, callSign)} ${at}.`;
      return { timeMs, reason: cause.reason, sentence };
    }
    if (elevationDeg < leastElevationDeg) {
      const least = formatNumber(leastElevationDeg, leastElevationDeg % 1 === 0 ? 0 : 1);
      return {
        timeMs,
        reason: 'elevationLimit',
        sentence: `the Moon is below ${least}° at ${callSign} ${at}.`,
      };
    }
  }
  return null;
}

function whereWords(reason: LimitReason, name: string | undefined, callSign: string): string {
  switch (reason) {
    case 'blockedSector':
      return `behind ${callSign}’s ${name ?? 'blocked sector'}`;
    case 'horizonProfile':
      return `behind ${callSign}’s skyline`;
    case 'azimuthLimit':
      return `outside ${callSign}’s range of azimuth`;
    case 'transmitElevation':
      return `too low for ${callSign} to transmit`;
    case 'elevationLimit':
      return `outside ${callSign}’s range of elevation`;
    default:
      return `below ${callSign}’s horizon`;
  }
}
