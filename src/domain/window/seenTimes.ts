import { StationTrack } from '../ephemeris/track';
import { buildMoonTable, type MoonTable } from '../ephemeris/table';
import { compileSky, type CompiledSky } from '../sky/compile';
import { freeSky } from '../sky/free';
import type { Interval } from '../time/interval';
import { BoundaryGrid } from './boundaryGrid';
import { FreeScan } from './freeScan';
import { stationTimeline } from './stationTimeline';
import type { WindowStation } from './types';

/**
 * When each of many stations can use the Moon: the stretches of station s are those from `firsts[s]` to below
 * `firsts[s + 1]`, sorted and apart from each other, in whole milliseconds rounded inwards.
 */
export interface SeenTimes extends Interval {
  readonly stations: number;
  readonly firsts: Int32Array;
  readonly beginsMs: Float64Array;
  readonly endsMs: Float64Array;
}

/**
 * Every station's sky limits and usable hours over the span, the same stretches as `visibleIntervals` gives one by
 * one. What is kept is 16 bytes a stretch, so that thousands of stations over a year fit in some tens of MB.
 */
export function seenTimes(
  search: Interval,
  stations: readonly WindowStation[],
  refraction = false,
): SeenTimes {
  const span = { startMs: Math.round(search.startMs), endMs: Math.round(search.endMs) };
  const table = buildMoonTable(span);
  const list = new StretchList();
  const firsts = new Int32Array(stations.length + 1);
  const scan = new FreeScan(table);
  const profiles = new ProfileSkies(table);
  stations.forEach((station, index) => {
    list.usable = station.usable;
    const sky = freeSky(station.sky, refraction);
    if (sky) scan.stretches(station.site, sky, list);
    else profiles.stretches(station, compileSky(station.sky, refraction), list);
    firsts[index + 1] = list.length;
  });
  return { ...span, stations: stations.length, firsts, ...list.finish() };
}

/** Skies with a horizon profile, in one track's arrays. */
class ProfileSkies {
  #track: StationTrack | undefined;
  #grid: BoundaryGrid | undefined;

  constructor(readonly table: MoonTable) {}

  stretches({ site, callSign }: WindowStation, sky: CompiledSky, list: StretchList): void {
    if (this.#track) this.#track.moveTo(site);
    else this.#track = new StationTrack(this.table, site);
    this.#grid ??= new BoundaryGrid(this.#track);
    const { beginsMs, codes, endMs } = stationTimeline(this.#track, sky, callSign, this.#grid);
    for (let at = 0; at < codes.length; at += 1) {
      if (codes[at] === 0) list.add(beginsMs[at]!, beginsMs[at + 1] ?? endMs);
    }
  }
}

class StretchList {
  length = 0;
  /** Only within these hours, where given; sorted and disjoint. */
  usable: readonly Interval[] | undefined;
  #beginsMs = new Float64Array(1024);
  #endsMs = new Float64Array(1024);

  /** Appends a stretch, rounded inwards, or what the usable hours leave of it. */
  add(beginMs: number, endMs: number): void {
    if (!this.usable) {
      this.#append(Math.ceil(beginMs), Math.floor(endMs));
      return;
    }
    const start = this.length;
    for (const hours of this.usable) {
      if (hours.endMs <= beginMs) continue;
      if (hours.startMs >= endMs) break;
      const fromMs = Math.ceil(Math.max(hours.startMs, beginMs));
      const toMs = Math.floor(Math.min(hours.endMs, endMs));
      const last = this.length - 1;
      if (last >= start && this.#endsMs[last] === fromMs) this.#endsMs[last] = toMs;
      else this.#append(fromMs, toMs);
    }
  }

  #append(beginMs: number, endMs: number): void {
    if (endMs <= beginMs) return;
    if (this.length === this.#beginsMs.length) this.#grow();
    this.#beginsMs[this.length] = beginMs;
    this.#endsMs[this.length] = endMs;
    this.length += 1;
  }

  #grow(): void {
    const beginsMs = new Float64Array(2 * this.length);
    const endsMs = new Float64Array(2 * this.length);
    beginsMs.set(this.#beginsMs);
    endsMs.set(this.#endsMs);
    this.#beginsMs = beginsMs;
    this.#endsMs = endsMs;
  }

  finish(): { beginsMs: Float64Array; endsMs: Float64Array } {
    return {
      beginsMs: this.#beginsMs.subarray(0, this.length),
      endsMs: this.#endsMs.subarray(0, this.length),
    };
  }
}
