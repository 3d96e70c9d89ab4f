import { DEFAULT_WEIGHTS } from '../../domain/activity/weights';
import type { ActivitySettings } from '../../domain/activity/settings';
import { regionStations } from '../../domain/outlook/regions';
import { bestWeekends, weekendsOf, type Weekend } from '../../domain/outlook/weekends';
import { outlookDays, type OutlookDay } from '../../domain/outlook/year';
import { bandById } from '../../domain/station/bands';
import { defaultMode } from '../../domain/station/modes';
import { DAY_MS } from '../../domain/time/interval';
import type { Services } from '../services';

const SHOWN_WEEKENDS = 8;
const AHEAD_DAYS = 182;
const ANSWERS_BEFORE_DAYS = 7;

export interface GoodWeekends {
  best: Weekend[];
  days: OutlookDay[];
  between: string;
}

let kept: { fromMs: number; weekends: GoodWeekends } | undefined;

/** The best weekends of the half year ahead, between the two regions with the most stations in the trade. */
export function goodWeekends(services: Pick<Services, 'now'>): GoodWeekends {
  const fromMs = Math.floor(services.now() / DAY_MS) * DAY_MS;
  if (kept?.fromMs === fromMs) return kept.weekends;
  const days = outlookDays({
    fromMs,
    days: AHEAD_DAYS,
    frequencyMhz: bandById('1296').centreMhz,
    here: regionStations('Europe'),
    there: regionStations('North America'),
  });
  const weekends = {
    best: bestWeekends(weekendsOf(days), SHOWN_WEEKENDS),
    days,
    between: 'Between Europe and North America on 1296 MHz, best first',
  };
  kept = { fromMs, weekends };
  return weekends;
}

/** What a new activity begins with: the chosen weekend, else the best one that leaves time for answers. */
export function newSettings(
  best: readonly Weekend[],
  nowMs: number,
  weekend: string | null,
): ActivitySettings {
  const startMs = saturdayOf(weekend) ?? firstGood(best, nowMs);
  const answersByMs = startMs - ANSWERS_BEFORE_DAYS * DAY_MS;
  return {
    title: '',
    startMs,
    endMs: startMs + 2 * DAY_MS,
    bands: (['432', '1296'] as const).map((band) => ({
      band,
      frequencyMhz: bandById(band).centreMhz,
      mode: defaultMode(band),
    })),
    slotMinutes: 30,
    gridMinutes: 30,
    bandChangeMinutes: 30,
    mostInARow: 4,
    leastPauseMinutes: 30,
    weights: DEFAULT_WEIGHTS,
    invitation: '',
    notes: '',
    answersByMs: answersByMs > nowMs ? answersByMs : null,
  };
}

function saturdayOf(text: string | null): number | null {
  if (text === null || !/^\d{4}-\d{2}-\d{2}$/.test(text)) return null;
  const atMs = Date.parse(`${text}T00:00:00Z`);
  return Number.isNaN(atMs) ? null : atMs;
}

function firstGood(best: readonly Weekend[], nowMs: number): number {
  const inTime = best.find(({ saturday }) => saturday.startMs > nowMs + 14 * DAY_MS);
  if (inTime) return inTime.saturday.startMs;
  const midnightMs = Math.floor(nowMs / DAY_MS) * DAY_MS;
  const untilSaturday = (6 - new Date(midnightMs).getUTCDay() + 7) % 7;
  return midnightMs + (untilSaturday + 14) * DAY_MS;
}
