import { buildMoonTable, type MoonTable } from '../ephemeris/table';
import { DEG } from '../ephemeris/constants';
import { degradationModel, skyAndDegradation, type DegradationModel } from '../link/degradation';
import { DAY_MS, HOUR_MS, type Interval } from '../time/interval';
import { forEachPair } from '../window/allPairs';
import { seenTimes } from '../window/seenTimes';
import type { WindowStation } from '../window/types';

/** One UTC day. Where the Moon is, and what stands behind it, is told for noon UTC, seen from the Earth's centre. */
export interface OutlookDay {
  startMs: number;
  distanceKm: number;
  declinationDeg: number;
  sunSeparationDeg: number;
  degradationDb: number;
  /** What the sky adds to the degradation, 0 before the coldest sky of the Moon's path. */
  skyLossDb: number;
  /** Hours in which both ends see the Moon; between regions the mean over all pairs of their places. */
  commonHours: number;
}

export interface OutlookSearch {
  /** Midnight UTC of the first day. */
  fromMs: number;
  days: number;
  frequencyMhz: number;
  /** Who stands for either end. A station of both is no pair with itself. */
  here: readonly WindowStation[];
  there: readonly WindowStation[];
}

/** Day by day for a year or so: 400 days at most make a few hundred kB, and some ten milliseconds. */
export function outlookDays(search: OutlookSearch): OutlookDay[] {
  const { fromMs, days, frequencyMhz } = search;
  const span = { startMs: fromMs, endMs: fromMs + days * DAY_MS };
  const table = buildMoonTable(span);
  const model = degradationModel(frequencyMhz);
  const hours = commonHours(search, span);
  return Array.from(hours, (common, day) => {
    const startMs = fromMs + day * DAY_MS;
    return { startMs, ...moonAt(table, model, startMs + DAY_MS / 2), commonHours: common };
  });
}

function moonAt(
  table: MoonTable,
  model: DegradationModel,
  timeMs: number,
): Omit<OutlookDay, 'startMs' | 'commonHours'> {
  const ofDate = new Float64Array(3);
  table.moonNearlyOfDate(timeMs, ofDate);
  const { skyTemperatureK, degradationDb } = skyAndDegradation(model, timeMs, ofDate);
  const [x, y, z] = [ofDate[0]!, ofDate[1]!, ofDate[2]!];
  const receiverK = model.receiverTemperatureK;
  const sun = new Float64Array(3);
  const moon = new Float64Array(3);
  table.sunEarthFixed(timeMs, sun);
  table.moonEarthFixed(timeMs, moon);
  const dot = moon[0]! * sun[0]! + moon[1]! * sun[1]! + moon[2]! * sun[2]!;
  return {
    distanceKm: Math.hypot(x, y, z),
    declinationDeg: Math.atan2(z, Math.hypot(x, y)) / DEG,
    sunSeparationDeg: Math.acos(dot / (Math.hypot(...moon) * Math.hypot(...sun))) / DEG,
    degradationDb,
    skyLossDb: 10 * Math.log10((skyTemperatureK + receiverK) / (model.coldestK + receiverK)),
  };
}

/** Mean over the pairs of one here and one there of the hours in common on each day. */
function commonHours({ here, there, days }: OutlookSearch, span: Interval): Float64Array {
  const hours = new Float64Array(days);
  if (here.length === 0 || there.length === 0) return hours;
  const seen = seenTimes(span, [...here, ...there]);
  let pairs = 0;
  forEachPair(seen, 1, (first, second, { beginsMs, endsMs, from, to }) => {
    if (first >= here.length || second < here.length) return;
    if (here[first]!.callSign === there[second - here.length]!.callSign) return;
    pairs += 1;
    for (let index = from; index < to; index += 1) {
      addHours(hours, span.startMs, beginsMs[index]!, endsMs[index]!);
    }
  });
  return hours.map((sum) => (pairs === 0 ? 0 : sum / pairs));
}

function addHours(hours: Float64Array, startMs: number, beginMs: number, endMs: number): void {
  let fromMs = beginMs;
  while (fromMs < endMs) {
    const day = Math.floor((fromMs - startMs) / DAY_MS);
    const untilMs = Math.min(endMs, startMs + (day + 1) * DAY_MS);
    hours[day] = hours[day]! + (untilMs - fromMs) / HOUR_MS;
    fromMs = untilMs;
  }
}
