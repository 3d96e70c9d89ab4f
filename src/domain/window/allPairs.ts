import { DAY_MS, MINUTE_MS } from '../time/interval';
import type { SeenTimes } from './seenTimes';

/** The common windows of one pair: entries `from` to below `to` of both arrays, in order of time. */
export interface PairWindows {
  readonly beginsMs: Float64Array;
  readonly endsMs: Float64Array;
  readonly from: number;
  readonly to: number;
}

/**
 * The common windows of all pairs; those of pair p (see `pairIndex`) lie from `firsts[p]` to below `firsts[p + 1]`.
 * Milliseconds after `startMs`.
 */
export interface AllPairs {
  readonly startMs: number;
  readonly firsts: Int32Array;
  readonly beginsAfterMs: Int32Array;
  readonly endsAfterMs: Int32Array;
}

/** Room for answers that is kept between searches; what was written into it last is lost with the next search. */
export class PairRoom {
  #firsts = new Int32Array(0);
  #begins = new Int32Array(0);
  #ends = new Int32Array(0);

  /** Arrays for so many pairs and windows; nothing in them counts but the leading 0 of `firsts`. */
  take(pairs: number, most: number): ShortTimes {
    if (this.#firsts.length <= pairs) this.#firsts = new Int32Array(pairs + 1);
    if (this.#begins.length < most) {
      this.#begins = new Int32Array(most);
      this.#ends = new Int32Array(most);
    }
    return {
      firsts: this.#firsts.subarray(0, pairs + 1),
      begins: this.#begins,
      ends: this.#ends,
    };
  }
}

/** So many milliseconds still fit into 31 bits. */
export const LONGEST_KEPT_MS = 24 * DAY_MS;
/** 320 MB at 8 bytes each; what stays empty is never touched. */
export const MOST_KEPT = 40_000_000;

export function pairCount(stations: number): number {
  return (stations * (stations - 1)) / 2;
}

/** Place of the pair of stations `first` < `second` in `AllPairs`: 0-1, 0-2, …, 1-2, … */
export function pairIndex(stations: number, first: number, second: number): number {
  return first * stations - (first * (first + 1)) / 2 + (second - first - 1);
}

/**
 * Common windows of every pair of stations, the same as `findCommonWindows` finds for each by itself. All are kept,
 * 8 bytes each: 500 stations over 72 hours make 2.5 MB. For more of either use `forEachPair`.
 *
 * @param minimumMinutes as in a search: shorter ones are left out.
 * @param room where the answer is written; hand in the same one to search again and again without new memory.
 * @throws RangeError where the span is longer or the windows could be more than can be kept.
 */
export function allPairWindows(
  seen: SeenTimes,
  minimumMinutes = 1,
  room = new PairRoom(),
): AllPairs {
  const { stations, firsts: seenFirsts, startMs, endMs } = seen;
  const most = mostWindows(seen);
  if (most > MOST_KEPT || endMs - startMs > LONGEST_KEPT_MS) {
    throw new RangeError('So many windows are not kept at once: ask pair by pair.');
  }
  const out = room.take(pairCount(stations), most);
  const { firsts, begins, ends } = out;
  const short: ShortTimes = {
    firsts: seenFirsts,
    begins: after(startMs, seen.beginsMs),
    ends: after(startMs, seen.endsMs),
  };
  const minimumMs = leastLength(minimumMinutes);
  let pair = 0;
  for (let first = 0; first < stations; first += 1) {
    pair = intersectWithLater(short, first, stations, minimumMs, out, pair);
  }
  const found = firsts[pair]!;
  return {
    startMs,
    firsts,
    beginsAfterMs: begins.subarray(0, found),
    endsAfterMs: ends.subarray(0, found),
  };
}

/**
 * Calls `visit` for every pair in the order of `pairIndex`, with its windows in arrays that are used again for the
 * next pair. Memory stays that of `seen`, however many pairs and days there are.
 */
export function forEachPair(
  seen: SeenTimes,
  minimumMinutes: number,
  visit: (first: number, second: number, windows: PairWindows) => void,
): void {
  const { stations, firsts } = seen;
  let longest = 0;
  for (let station = 0; station < stations; station += 1) {
    longest = Math.max(longest, firsts[station + 1]! - firsts[station]!);
  }
  const windows = {
    beginsMs: new Float64Array(2 * longest + 1),
    endsMs: new Float64Array(2 * longest + 1),
    from: 0,
    to: 0,
  };
  const minimumMs = leastLength(minimumMinutes);
  for (let first = 0; first < stations; first += 1) {
    for (let second = first + 1; second < stations; second += 1) {
      windows.to = intersect(seen, first, second, minimumMs, windows);
      visit(first, second, windows);
    }
  }
}

function after(startMs: number, timesMs: Float64Array): Int32Array {
  const short = new Int32Array(timesMs.length);
  for (let index = 0; index < short.length; index += 1) short[index] = timesMs[index]! - startMs;
  return short;
}

function leastLength(minimumMinutes: number): number {
  return Math.max(Math.round(minimumMinutes * MINUTE_MS), 1);
}

/** Two lists of a and b stretches have fewer than a + b in common; one place more may be written to and given up. */
function mostWindows({ stations, firsts }: SeenTimes): number {
  return firsts[stations]! * Math.max(stations - 1, 0) + 1;
}

/**
 * Writes what two stations have in common and returns how much it is. Which list goes on is as good as random, so
 * nothing here is a branch but the loop: the greater of two is half of their sum and difference, exact for whole
 * milliseconds, and each candidate is written and only then counted or not.
 */
function intersect(
  { firsts, beginsMs, endsMs }: SeenTimes,
  first: number,
  second: number,
  minimumMs: number,
  out: PairWindows,
): number {
  const firstEnd = firsts[first + 1]!;
  const secondEnd = firsts[second + 1]!;
  let one = firsts[first]!;
  let other = firsts[second]!;
  let found = 0;
  while (one < firstEnd && other < secondEnd) {
    const oneBegin = beginsMs[one]!;
    const otherBegin = beginsMs[other]!;
    const oneEnd = endsMs[one]!;
    const otherEnd = endsMs[other]!;
    const beginMs = (oneBegin + otherBegin + Math.abs(oneBegin - otherBegin)) / 2;
    const endMs = (oneEnd + otherEnd - Math.abs(oneEnd - otherEnd)) / 2;
    out.beginsMs[found] = beginMs;
    out.endsMs[found] = endMs;
    found += Number(endMs - beginMs >= minimumMs);
    const oneGoesOn = Number(oneEnd < otherEnd);
    one += oneGoesOn;
    other += 1 - oneGoesOn;
  }
  return found;
}

/** Lists of stretches in whole milliseconds that fit into 31 bits. */
interface ShortTimes {
  readonly firsts: Int32Array;
  readonly begins: Int32Array;
  readonly ends: Int32Array;
}

/**
 * `intersect` in whole numbers, for a station and all after it: a difference shifted by 31 is −1 where it is
 * negative and 0 where not. Begins with pair `pair` and returns the one after the last.
 */
function intersectWithLater(
  { firsts, begins, ends }: ShortTimes,
  first: number,
  stations: number,
  minimumMs: number,
  out: ShortTimes,
  pair: number,
): number {
  const { firsts: outFirsts, begins: outBegins, ends: outEnds } = out;
  const firstBegin = firsts[first]!;
  const firstEnd = firsts[first + 1]!;
  let at = pair;
  let found = outFirsts[at]!;
  for (let second = first + 1; second < stations; second += 1) {
    const secondEnd = firsts[second + 1]!;
    let one = firstBegin;
    let other = firsts[second]!;
    while (one < firstEnd && other < secondEnd) {
      const oneBegin = begins[one]!;
      const otherEnd = ends[other]!;
      const later = (oneBegin - begins[other]!) | 0;
      const longer = (ends[one]! - otherEnd) | 0;
      const oneGoesOn = longer >> 31;
      const begin = (oneBegin - (later & (later >> 31))) | 0;
      const end = (otherEnd + (longer & oneGoesOn)) | 0;
      outBegins[found] = begin;
      outEnds[found] = end;
      found = (found + 1 - ((end - begin - minimumMs) >>> 31)) | 0;
      one = (one - oneGoesOn) | 0;
      other = (other + 1 + oneGoesOn) | 0;
    }
    at += 1;
    outFirsts[at] = found;
  }
  return at;
}
