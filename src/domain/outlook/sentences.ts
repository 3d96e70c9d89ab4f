import { formatDay, formatDuration, formatNumber } from '../time/format';
import { HOUR_MS } from '../time/interval';
import type { OutlookDay } from './year';
import type { Weekend } from './weekends';

/** So many days on either side of a least or greatest distance the Moon is said to be near it. */
const NEAR_DAYS = 2;
const MEAN_DISTANCE_KM = 384_400;
const COLD_SKY_DB = 0.3;
const WARM_SKY_DB = 1;
const MILKY_WAY_DB = 2.5;
const SUN_NEAR_DEG = 15;

/**
 * Why a weekend stands where it does: "Moon near perigee, 24° north, cold sky behind it, 7 h common; the Sun 90°
 * away." `days` is the year the weekend belongs to.
 */
export function weekendSentence(weekend: Weekend, days: readonly OutlookDay[]): string {
  const words = [
    distanceWords(weekend, days),
    declinationWords(weekend),
    skyWords(weekend.skyLossDb),
    commonWords(weekend.commonHours),
  ];
  return `${words.join(', ')}; ${sunWords(weekend.sunSeparationDeg)}.`;
}

function distanceWords({ at, saturday, sunday }: Weekend, days: readonly OutlookDay[]): string {
  for (let day = at - NEAR_DAYS; day <= at + 1 + NEAR_DAYS; day += 1) {
    const [before, here, after] = [days[day - 1], days[day], days[day + 1]];
    if (!before || !here || !after) continue;
    const { distanceKm } = here;
    if (distanceKm <= before.distanceKm && distanceKm < after.distanceKm)
      return 'Moon near perigee';
    if (distanceKm >= before.distanceKm && distanceKm > after.distanceKm) return 'Moon near apogee';
  }
  const meanKm = (saturday.distanceKm + sunday.distanceKm) / 2;
  const way = sunday.distanceKm < saturday.distanceKm ? 'closing' : 'receding';
  return `Moon ${meanKm < MEAN_DISTANCE_KM ? 'nearer' : 'farther'} than its mean and ${way}`;
}

function declinationWords({ saturday, sunday }: Weekend): string {
  const first = Math.round(saturday.declinationDeg);
  const second = Math.round(sunday.declinationDeg);
  if (first === second) return side(first);
  if (first < 0 === second < 0 && first !== 0 && second !== 0) {
    return `${Math.abs(first)}° to ${side(second)}`;
  }
  return `${side(first)} to ${side(second)}`;
}

function side(declinationDeg: number): string {
  if (declinationDeg === 0) return 'on the equator';
  return `${Math.abs(declinationDeg)}° ${declinationDeg > 0 ? 'north' : 'south'}`;
}

function skyWords(lossDb: number): string {
  if (lossDb < COLD_SKY_DB) return 'cold sky behind it';
  if (lossDb < WARM_SKY_DB) return 'fairly cold sky behind it';
  if (lossDb < MILKY_WAY_DB) return `warm sky behind it (${formatNumber(lossDb, 1)} dB)`;
  return `the Milky Way behind it (${formatNumber(lossDb, 1)} dB)`;
}

function commonWords(hours: number): string {
  return hours * HOUR_MS < 60_000 ? 'never up for both' : `${hoursText(hours)} common`;
}

function sunWords(separationDeg: number): string {
  const degrees = `${formatNumber(separationDeg)}°`;
  return separationDeg < SUN_NEAR_DEG ? `the Sun only ${degrees} away` : `the Sun ${degrees} away`;
}

/** "7 h", "40 min": to the hour from three hours on, because noon figures and means are no finer. */
export function hoursText(hours: number): string {
  return hours >= 3 ? `${Math.round(hours)} h` : formatDuration(hours * HOUR_MS);
}

/** "Sat 13 – Sun 14 Feb 2027", "Sat 31 Jul – Sun 1 Aug 2027". */
export function weekendName({ saturday, sunday }: Pick<Weekend, 'saturday' | 'sunday'>): string {
  const first = formatDay(saturday.startMs);
  const second = formatDay(sunday.startMs, { withYear: true });
  const sameMonth = first.split(' ')[2] === second.split(' ')[2];
  return `${sameMonth ? first.split(' ').slice(0, 2).join(' ') : first} – ${second}`;
}

/** What the year holds in one sentence; null without any common hour. */
export function yearSentence(days: readonly OutlookDay[], weekends: readonly Weekend[]): string {
  const up = days.filter(({ commonHours }) => commonHours > 0);
  if (up.length === 0) {
    return 'The Moon never stands above both at once within the limits of these places.';
  }
  const hours = days.reduce((sum, day) => sum + day.commonHours, 0);
  const worth = weekends.filter(({ commonHours }) => commonHours >= 0.5).length;
  return `${formatNumber(hours)} common hours on ${up.length} of ${days.length} days; ${worth} of ${weekends.length} weekends have some.`;
}
