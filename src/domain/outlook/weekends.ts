import { DAY_MS } from '../time/interval';
import type { OutlookDay } from './year';

/** Saturday and Sunday, UTC. */
export interface Weekend {
  /** Index of the Saturday among the days. */
  at: number;
  saturday: OutlookDay;
  sunday: OutlookDay;
  /** Hours in common on both days together. */
  commonHours: number;
  /** Mean of the two days. */
  degradationDb: number;
  skyLossDb: number;
  /** The smaller of the two days. */
  sunSeparationDeg: number;
  /** What it is ranked by, dB; higher is better. */
  score: number;
}

const DB_PER_DOUBLING = 1;
const LONGEST_COUNTED_HOURS = 24;
/** Hours below which a weekend is of no use to an activity. */
const LEAST_HOURS = 0.5;
const SUN_CLOSE_DEG = 15;
const SUN_CLOSE_DB = 3;

/** How weekends are ranked, for people. */
export const WEEKEND_RANKING_SENTENCE =
  'Ranked by degradation at noon UTC on both days and by common hours: twice the hours count as 1 dB, up to 24 h; with the Sun within 15° of the Moon 3 dB are taken off.';

/** Every whole weekend of the days (which follow each other without a gap), in order of time. */
export function weekendsOf(days: readonly OutlookDay[]): Weekend[] {
  return days.flatMap((saturday, at) => {
    const sunday = days[at + 1];
    if (new Date(saturday.startMs).getUTCDay() !== 6 || !sunday) return [];
    const commonHours = saturday.commonHours + sunday.commonHours;
    const degradationDb = (saturday.degradationDb + sunday.degradationDb) / 2;
    const sunSeparationDeg = Math.min(saturday.sunSeparationDeg, sunday.sunSeparationDeg);
    const hours = Math.min(Math.max(commonHours, LEAST_HOURS), LONGEST_COUNTED_HOURS);
    return [
      {
        at,
        saturday,
        sunday,
        commonHours,
        degradationDb,
        skyLossDb: (saturday.skyLossDb + sunday.skyLossDb) / 2,
        sunSeparationDeg,
        score:
          DB_PER_DOUBLING * Math.log2(hours) -
          degradationDb -
          (sunSeparationDeg < SUN_CLOSE_DEG ? SUN_CLOSE_DB : 0),
      },
    ];
  });
}

/** The best weekends, best first; those with hardly an hour in common are left out, equal ones in order of time. */
export function bestWeekends(weekends: readonly Weekend[], most: number): Weekend[] {
  return weekends
    .filter(({ commonHours }) => commonHours >= LEAST_HOURS)
    .sort((a, b) => b.score - a.score || a.saturday.startMs - b.saturday.startMs)
    .slice(0, most);
}

/** Midnight UTC between the two days. */
export function middleOf(weekend: Weekend): number {
  return weekend.saturday.startMs + DAY_MS;
}
