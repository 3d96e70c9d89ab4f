import { formatClock, formatDay, formatDuration, formatNumber } from '../time/format';
import { DAY_MS, HOUR_MS, intersectIntervals, overlaps, type Interval } from '../time/interval';
import type { WindowLayers } from './layers';
import type { TakenSlot } from './searchData';
import type { CommonWindow, LimitCause, LostHours } from './types';

/** What stands behind a limit: its degrees, by station and reason, where it has some. */
export type LimitDegrees = (callSign: string, reason: LimitCause['reason']) => number | null;

/** "QA1LUN’s barn", "QA1LUN’s 8° limit", "the Sun": goes after "Opens at" and "ends at". */
export function causeWords(cause: LimitCause, degreesOf: LimitDegrees = () => null): string {
  const whose = cause.callSign === null ? 'a' : `${cause.callSign}’s`;
  const degrees = cause.callSign === null ? null : degreesOf(cause.callSign, cause.reason);
  const figure = degrees === null ? '' : `${formatNumber(degrees, degrees % 1 === 0 ? 0 : 1)}° `;
  switch (cause.reason) {
    case 'horizon':
      return `${whose} horizon`;
    case 'elevationLimit':
      return `${whose} ${figure}limit`;
    case 'transmitElevation':
      return `${whose} ${figure}limit for transmitting`;
    case 'azimuthLimit':
      return `the end of ${whose} azimuth range`;
    case 'blockedSector':
      return `${whose} ${cause.name ?? 'blocked sector'}`;
    case 'horizonProfile':
      return `${whose} skyline`;
    case 'usableHours':
      return `${whose} hours`;
    case 'degradation':
      return 'the largest degradation allowed';
    case 'sunSeparation':
      return 'the least distance from the Sun';
    case 'margin':
      return 'the least margin allowed';
    case 'tooShort':
      return 'a stretch too short';
    case 'searchLimit':
      return 'the edge of the dates';
  }
}

/** "7 h 40 min. Opens at QB7TID’s ridge, ends at QA1LUN’s 8° limit." */
export function windowSentence(window: CommonWindow, degreesOf?: LimitDegrees): string {
  const length = formatDuration(window.endMs - window.startMs);
  return `${length}. Opens at ${causeWords(window.opens, degreesOf)}, ends at ${causeWords(window.closes, degreesOf)}.`;
}

export interface WhyFacts {
  geocentricDistanceKm: number;
  /** What the sky adds to the degradation, dB. */
  skyLossDb: number;
  /** What the link loses beside the path, where it is known: of the weaker direction, dB. */
  polarizationLossDb?: number | undefined;
  spreadLossDb?: number | undefined;
  taken: readonly TakenSlot[];
  degreesOf?: LimitDegrees | undefined;
}

/** Why a window is where it is in the ranking: at most four reasons, "Moon near perigee, cold sky, short, ends at QA1LUN’s hours". */
export function whyWords(window: CommonWindow, facts: WhyFacts): string {
  const { geocentricDistanceKm: km, skyLossDb } = facts;
  const words: string[] = [];
  if (km < 363_000) words.push('Moon near perigee');
  else if (km < 376_000) words.push('Moon close');
  else if (km > 403_000) words.push('Moon near apogee');
  else if (km > 393_000) words.push('Moon far');
  if (skyLossDb < 0.15) words.push('cold sky');
  else if (skyLossDb > 2.5) words.push('the Milky Way behind it');
  else if (skyLossDb > 1) words.push('warm sky');
  if ((facts.polarizationLossDb ?? 0) > 2) words.push('polarisations crossed');
  if ((facts.spreadLossDb ?? 0) > 1) words.push('echo spread wide');

  const lowest = [...window.stations].sort(
    (a, b) => a.maximumElevationDeg - b.maximumElevationDeg,
  )[0];
  if (lowest && lowest.maximumElevationDeg < 15) words.push(`low at ${lowest.callSign}`);
  else if (lowest && lowest.maximumElevationDeg >= 30) {
    words.push(window.stations.length === 2 ? 'high for both' : 'high for all');
  }
  const lengthMs = window.endMs - window.startMs;
  if (lengthMs >= 4 * HOUR_MS) words.push('long');
  else if (lengthMs <= HOUR_MS) words.push('short');

  const taken = facts.taken.find((slot) => overlaps(slot, window));
  const end =
    window.closes.reason === 'searchLimit'
      ? null
      : `ends at ${causeWords(window.closes, facts.degreesOf)}`;
  const last = [
    taken
      ? `${taken.state === 'agreed' ? 'a sked' : 'an offer'} at ${formatClock(taken.startMs)} stands in it`
      : null,
    end,
  ].filter((word) => word !== null);
  const sentence = [...words.slice(0, 4 - last.length), ...last].join(', ');
  return sentence.charAt(0).toUpperCase() + sentence.slice(1);
}

/** "18 common windows" and ", 37 h in all."; without any, "No common window" and ".". */
export function totalWords(windows: readonly Interval[]): { count: string; total: string } {
  if (windows.length === 0) return { count: 'No common window', total: '.' };
  const totalMs = windows.reduce((sum, window) => sum + window.endMs - window.startMs, 0);
  const total =
    totalMs >= 10 * HOUR_MS ? `${Math.round(totalMs / HOUR_MS)} h` : formatDuration(totalMs);
  return {
    count: windows.length === 1 ? '1 common window' : `${windows.length} common windows`,
    total: `, ${total} in all.`,
  };
}

/** A run of days without a window shorter than this is not worth a sentence. */
const LEAST_GAP_DAYS = 4;

/** "From 26 Jan to 5 Feb no hour fits: …", about the longest run of days without a window; null when there is none. */
export function gapSentence(layers: WindowLayers): string | null {
  const [first, last] = longestEmptyRun(layers.days);
  const days = last - first + 1;
  if (days < LEAST_GAP_DAYS || days === layers.days.length) return null;
  const gap = {
    startMs: layers.days[first]!.startMs,
    endMs: layers.days[last]!.startMs + DAY_MS,
  };
  return `From ${shortDay(gap.startMs)} to ${shortDay(layers.days[last]!.startMs)} no hour fits: ${gapReason(layers, gap)}.`;
}

/** First and last index of the longest run of days without a window; without any, a run of length 0. */
function longestEmptyRun(days: WindowLayers['days']): [first: number, last: number] {
  let longest: [number, number] = [0, -1];
  let from = 0;
  days.forEach((day, index) => {
    if (day.usableMs > 0) from = index + 1;
    else if (index - from > longest[1] - longest[0]) longest = [from, index];
  });
  return longest;
}

function gapReason(layers: WindowLayers, gap: Interval): string {
  const outsideMs = lengthWithin(layers.outside, gap);
  const hiddenMs = lengthWithin(layers.hidden, gap);
  const clear = 'the Moon is clear only outside the hours and limits you count';
  const hidden = 'the Moon stays hidden or too low';
  if (outsideMs + hiddenMs < 10 * 60_000) return 'the Moon is never up for all at once';
  if (outsideMs < hiddenMs / 10) return hidden;
  if (hiddenMs < outsideMs / 10) return clear;
  const clearFirst = middleOf(layers.outside, gap) < middleOf(layers.hidden, gap);
  return clearFirst
    ? 'first the Moon is clear only outside the hours and limits you count, then it stays hidden or too low'
    : 'first the Moon stays hidden or too low, then it is clear only outside the hours and limits you count';
}

function lengthWithin(intervals: readonly Interval[], within: Interval): number {
  return intersectIntervals(intervals, [within]).reduce(
    (sum, piece) => sum + piece.endMs - piece.startMs,
    0,
  );
}

function middleOf(intervals: readonly Interval[], within: Interval): number {
  let weight = 0;
  let sum = 0;
  for (const piece of intersectIntervals(intervals, [within])) {
    const lengthMs = piece.endMs - piece.startMs;
    weight += lengthMs;
    sum += (lengthMs * (piece.startMs + piece.endMs)) / 2;
  }
  return weight === 0 ? Infinity : sum / weight;
}

function shortDay(atMs: number): string {
  return formatDay(atMs).replace(/^\S+ /, '');
}

/** "below the horizon": what took hours away, for a table that names the station beside it. */
export function lostWords(lost: LostHours, degreesOf: LimitDegrees = () => null): string {
  const degrees = lost.callSign === null ? null : degreesOf(lost.callSign, lost.reason);
  const figure = degrees === null ? '' : ` ${formatNumber(degrees, degrees % 1 === 0 ? 0 : 1)}°`;
  switch (lost.reason) {
    case 'horizon':
      return 'Moon below the horizon';
    case 'elevationLimit':
      return degrees === null
        ? 'outside its range of elevation'
        : `outside its range of elevation, from${figure}`;
    case 'transmitElevation':
      return `too low to transmit${figure === '' ? '' : `, below${figure}`}`;
    case 'azimuthLimit':
      return 'outside its range of azimuth';
    case 'blockedSector':
      return lost.name ? `behind the ${lost.name}` : 'behind a blocked sector';
    case 'horizonProfile':
      return 'behind the skyline';
    case 'usableHours':
      return 'asleep or away';
    case 'degradation':
      return 'degradation over your limit';
    case 'sunSeparation':
      return 'Moon too near the Sun';
    case 'margin':
      return 'margin under your limit';
    case 'tooShort':
      return 'stretches shorter than you ask for';
    case 'searchLimit':
      return 'outside the dates';
  }
}

/** What would help when nothing was found, in the order in which it is offered. */
export type NextStep =
  'countAny' | 'shorter' | 'dropDegradation' | 'dropMargin' | 'dropSun' | 'lower' | 'otherDates';

export interface NothingFound {
  title: string;
  sentence: string;
  steps: NextStep[];
}

/** Why a question has no window, and what to try. */
export function nothingFound(layers: WindowLayers, lowered: boolean): NothingFound {
  const first = layers.days[0]!;
  const last = layers.days.at(-1)!;
  const whole = { startMs: first.startMs, endMs: last.startMs + DAY_MS };
  const title = `No common window from ${shortDay(first.startMs)} to ${shortDay(last.startMs)}`;
  const lostMs = (reason: LimitCause['reason']) =>
    layers.lost.filter((lost) => lost.reason === reason).reduce((sum, lost) => sum + lost.hours, 0);
  const clearMs = lengthWithin(layers.outside, whole);
  const hiddenMs = lengthWithin(layers.hidden, whole);
  if (clearMs + hiddenMs === 0) {
    return {
      title,
      sentence:
        'The Moon never stands above every horizon at once on these days: these places are too far apart, or the Moon is too far north or south.',
      steps: ['otherDates'],
    };
  }
  if (clearMs === 0) {
    return {
      title,
      sentence: `The Moon is above every horizon for ${formatDuration(hiddenMs)}, but always hidden or too low for somebody.`,
      steps: lowered ? ['lower', 'otherDates'] : ['otherDates'],
    };
  }
  const steps: NextStep[] = [];
  const reasons: string[] = [];
  if (lostMs('usableHours') > 0) {
    steps.push('countAny');
    reasons.push('while somebody sleeps or is away');
  }
  if (lostMs('degradation') > 0) {
    steps.push('dropDegradation');
    reasons.push('with more degradation than you allow');
  }
  if (lostMs('margin') > 0) {
    steps.push('dropMargin');
    reasons.push('with less margin than you ask for');
  }
  if (lostMs('sunSeparation') > 0) {
    steps.push('dropSun');
    reasons.push('too near the Sun');
  }
  if (lostMs('tooShort') > 0) {
    steps.push('shorter');
    reasons.push('in stretches shorter than you ask for');
  }
  return {
    title,
    sentence: `The Moon is clear for everyone for ${formatDuration(clearMs)}, but only ${listWords(reasons)}.`,
    steps: [...steps, 'otherDates'],
  };
}

/** "a", "a and b", "a, b and c". */
export function listWords(words: readonly string[], between = 'and'): string {
  if (words.length < 2) return words.join('');
  return `${words.slice(0, -1).join(', ')} ${between} ${words.at(-1)}`;
}
