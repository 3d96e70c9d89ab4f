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
  #words = new Int32Array(0);

  /** At least so many numbers, whatever they are. */
  take(least: number): Int32Array {
    if (this.#words.length < least) this.#words = new Int32Array(least);
    return this.#words;
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
  const { stations, startMs, endMs } = seen;
  const most = mostWindows(seen);
  if (most > MOST_KEPT || endMs - startMs > LONGEST_KEPT_MS) {
    throw new RangeError('So many windows are not kept at once: ask pair by pair.');
  }
  const row = new PairRow(seen, room, most);
  const minimumMs = leastLength(minimumMinutes);
  for (let first = 0; first < stations; first += 1) row.intersect(first, minimumMs);
  return { startMs, ...row.windows() };
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
  const { stations } = seen;
  const longest = longestList(seen);
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

/** Stretches are looked up by their begin in steps of 2¹⁹ ms, 8.7 minutes. */
const STEP_BITS = 19;

/**
 * `intersect` in whole numbers, for a station and all after it at once. For each step of time is noted which stretch
 * of the first station is next there. So every stretch of all the others knows by itself where to begin, one after
 * the other through all stations, and no step waits for the one before. Everything lies in one array, which is
 * quicker than many: the places below are where its parts begin.
 */
class PairRow {
  readonly #words: Int32Array;
  readonly #count: number;
  readonly #lengthMs: number;
  /** Of each stretch of all stations: begin, end, station. */
  readonly #seen: number;
  readonly #stretches: number;
  /** Begins and ends of the first station's stretches, and one at the end of time, so that nobody asks how many. */
  readonly #row: number;
  /** By step of time, the place in the row of the first stretch that ends later than the step begins. */
  readonly #next: number;
  readonly #steps: number;
  readonly #begins: number;
  readonly #ends: number;
  /** Stations that never see the Moon. */
  readonly #blind: number[] = [];

  constructor(
    readonly seenTimes: SeenTimes,
    room: PairRoom,
    most: number,
  ) {
    const { stations, firsts, beginsMs, endsMs, startMs, endMs } = seenTimes;
    const stretches = firsts[stations]!;
    this.#count = stations;
    this.#lengthMs = endMs - startMs;
    this.#stretches = stretches;
    this.#steps = (this.#lengthMs >> STEP_BITS) + 1;
    this.#seen = pairCount(stations) + 1;
    this.#row = this.#seen + 3 * stretches;
    this.#next = this.#row + 2 * longestList(seenTimes) + 4;
    this.#begins = this.#next + this.#steps;
    this.#ends = this.#begins + most;
    const words = room.take(this.#ends + most);
    this.#words = words;
    words[0] = 0;
    let at = this.#seen;
    for (let station = 0; station < stations; station += 1) {
      const to = firsts[station + 1]!;
      if (to === firsts[station]) this.#blind.push(station);
      for (let stretch = firsts[station]!; stretch < to; stretch += 1, at += 3) {
        const begin = beginsMs[stretch]! - startMs;
        words[at] = begin;
        words[at + 1] = endsMs[stretch]! - startMs;
        words[at + 2] = station;
      }
    }
  }

  windows(): Omit<AllPairs, 'startMs'> {
    const words = this.#words;
    const pairs = pairCount(this.#count);
    const found = words[pairs]!;
    return {
      firsts: words.subarray(0, pairs + 1),
      beginsAfterMs: words.subarray(this.#begins, this.#begins + found),
      endsAfterMs: words.subarray(this.#ends, this.#ends + found),
    };
  }

  /**
   * Writes the pairs of this station with every later one; those of the stations before it must be there. The
   * greater of two numbers is one plus their difference where that is positive: shifted by 31, a difference is −1
   * where it is negative and 0 where not.
   */
  intersect(first: number, minimumMs: number): void {
    this.#lay(first);
    const words = this.#words;
    const { firsts } = this.seenTimes;
    // The pair with station s ends at `pair + s`.
    const pair = (pairIndex(this.#count, first, first + 1) - first) | 0;
    const toEnds = (this.#ends - this.#begins) | 0;
    const stop = (this.#seen + 3 * this.#stretches) | 0;
    let found = (this.#begins + words[pair + first]!) | 0;
    const base = this.#begins | 0;
    const next = this.#next | 0;
    const leastMs = Math.min(minimumMs, this.#lengthMs + 1) | 0;
    for (
      let other = (this.#seen + 3 * firsts[first + 1]!) | 0;
      other < stop;
      other = (other + 3) | 0
    ) {
      const otherBegin = words[other]!;
      const otherEnd = words[other + 1]!;
      let one = words[next + (otherBegin >> STEP_BITS)]!;
      do {
        const later = (words[one]! - otherBegin) | 0;
        const longer = (words[one + 1]! - otherEnd) | 0;
        const begin = (otherBegin + (later & ~(later >> 31))) | 0;
        const end = (otherEnd + (longer & (longer >> 31))) | 0;
        words[found] = begin;
        words[found + toEnds] = end;
        found = (found + 1 - ((((end - begin) | 0) - leastMs) >>> 31)) | 0;
        one = (one + 2) | 0;
      } while (words[one]! < otherEnd);
      words[pair + words[other + 2]!] = (found - base) | 0;
    }
    for (const station of this.#blind) {
      if (station > first) words[pair + station] = words[pair + station - 1]!;
    }
  }

  #lay(first: number): void {
    const words = this.#words;
    const { firsts } = this.seenTimes;
    const to = this.#seen + 3 * firsts[first + 1]!;
    let row = this.#row;
    const next = this.#next;
    let step = next;
    for (let at = this.#seen + 3 * firsts[first]!; at < to; at += 3, row += 2) {
      const end = words[at + 1]!;
      words[row] = words[at]!;
      words[row + 1] = end;
      const after = next + ((end - 1) >> STEP_BITS) + 1;
      words.fill(row, step, after);
      step = after;
    }
    words.fill(row, step, next + this.#steps);
    words.fill(this.#lengthMs, row, row + 4);
  }
}

function longestList({ stations, firsts }: SeenTimes): number {
  let longest = 0;
  for (let station = 0; station < stations; station += 1) {
    longest = Math.max(longest, firsts[station + 1]! - firsts[station]!);
  }
  return longest;
}
