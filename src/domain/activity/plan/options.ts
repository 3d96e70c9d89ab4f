import { buildMoonTable, type MoonTable } from '../../ephemeris';
import { createLinkEvaluator } from '../../link/evaluator';
import { LinkInputError } from '../../link/inputError';
import type { LinkMoment } from '../../link/moment';
import { MINUTE_MS, type Interval } from '../../time/interval';
import type { WindowStation } from '../../window';
import { forEachPair, pairIndex } from '../../window/allPairs';
import { seenTimes } from '../../window/seenTimes';
import type { PlanBand, PlanInput, PlanInputStation, PlanInputWish, PlanRules } from './input';
import {
  PLAN_WEIGHTS,
  type PlanOption,
  type PlanProblem,
  type PlanSlot,
  type PlanWeights,
} from './types';

/** What a run starts from beside the activity's own data. */
export interface PlanStart {
  pinned?: PlanSlot[] | undefined;
  keep?: PlanSlot[] | undefined;
  weights?: PlanWeights | undefined;
}

/**
 * The problem that an activity poses: for every wish each start at which the whole slot lies in the common window of
 * its two stations (sky, usable hours, the activity's own least elevation), on each band that both work, with its
 * chance. Pairs on a never-list get none.
 */
export function buildProblem(input: PlanInput, start: PlanStart = {}): PlanProblem {
  const { rules } = input;
  const indexOf = new Map(input.stations.map(({ id }, index) => [id, index]));
  const options = buildOptions(input);
  return {
    startMs: input.startMs,
    endMs: input.endMs,
    gridMinutes: rules.gridMinutes,
    slotMinutes: rules.slotMinutes,
    bandChangeMinutes: rules.bandChangeMinutes,
    mostInARow: rules.mostInARow,
    leastPauseMinutes: rules.leastPauseMinutes,
    stations: input.stations.map(({ id, callSign, most }) => ({ id, callSign, most })),
    wishes: input.wishes.map(({ id, a, b, priority }, index) => ({
      id,
      a: indexOf.get(a) ?? -1,
      b: indexOf.get(b) ?? -1,
      priority,
      options: options[index]!,
    })),
    pinned: start.pinned ?? [],
    keep: start.keep ?? [],
    weights: start.weights ?? PLAN_WEIGHTS,
  };
}

/**
 * The options of every wish, in the order of the wishes; each list by band, then by time.
 * @param kept chances of the same activity; hand in the same one to ask for a pair again and again.
 */
export function buildOptions(input: PlanInput, kept?: PairChances): PlanOption[][] {
  const { rules, stations, wishes } = input;
  const options: PlanOption[][] = wishes.map(() => []);
  const asked = wishesByPair(input);
  if (asked.size === 0 || input.endMs <= input.startMs) return options;
  const span = { startMs: input.startMs, endMs: input.endMs };
  const chances = kept ?? new PairChances(input);
  const seen = seenTimes(
    span,
    stations.map((station) => windowStation(station, rules)),
  );
  forEachPair(seen, rules.slotMinutes, (first, second, windows) => {
    const ofPair = asked.get(pairIndex(stations.length, first, second));
    if (!ofPair || windows.to === windows.from) return;
    const starts: number[] = [];
    for (let at = windows.from; at < windows.to; at += 1) {
      const window = { startMs: windows.beginsMs[at]!, endMs: windows.endsMs[at]! };
      starts.push(...startsWithin(window, input.startMs, rules));
    }
    chances.take(stations[first]!, stations[second]!);
    for (const index of ofPair) {
      options[index] = optionsAt(starts, wishes[index]!, chances, rules);
    }
  });
  return options;
}

/** A station with the activity's least elevation on top of its own limits. */
export function windowStation(station: PlanInputStation, rules: PlanRules): WindowStation {
  const { sky } = station;
  const least = rules.leastElevationDeg;
  return {
    callSign: station.callSign,
    site: station.site,
    sky: least > 0 ? { ...sky, elevationFromDeg: Math.max(sky.elevationFromDeg ?? 0, least) } : sky,
    usable: station.usable,
  };
}

/** Starts on the grid from `originMs` at which the whole slot lies in the window. */
export function startsWithin(window: Interval, originMs: number, rules: PlanRules): number[] {
  const gridMs = rules.gridMinutes * MINUTE_MS;
  const slotMs = rules.slotMinutes * MINUTE_MS;
  const starts: number[] = [];
  let startMs = originMs + Math.ceil((window.startMs - originMs) / gridMs) * gridMs;
  for (; startMs + slotMs <= window.endMs; startMs += gridMs) starts.push(startMs);
  return starts;
}

/** Indexes of the wishes of each pair that may be put together. */
function wishesByPair({ stations, wishes }: PlanInput): Map<number, number[]> {
  const indexOf = new Map(stations.map(({ id }, index) => [id, index]));
  const never = stations.map((station) => new Set(station.never));
  const byPair = new Map<number, number[]>();
  wishes.forEach(({ a, b }, index) => {
    const one = indexOf.get(a);
    const other = indexOf.get(b);
    if (one === undefined || other === undefined || one === other) return;
    if (never[one]!.has(b) || never[other]!.has(a)) return;
    const pair = pairIndex(stations.length, Math.min(one, other), Math.max(one, other));
    const known = byPair.get(pair);
    if (known) known.push(index);
    else byPair.set(pair, [index]);
  });
  return byPair;
}

function optionsAt(
  starts: readonly number[],
  wish: PlanInputWish,
  chances: PairChances,
  rules: PlanRules,
): PlanOption[] {
  return wish.bands.flatMap((band) =>
    starts.flatMap((startMs) => {
      const chance = chances.of(band, startMs);
      if (chance === null || chance <= 0 || chance < rules.leastChance) return [];
      return [{ band, startMs, chance }];
    }),
  );
}

/** Chances of one pair after the other, each instant of the grid computed once. */
export class PairChances {
  readonly #bands: readonly PlanBand[];
  readonly #rules: PlanRules;
  readonly #table: MoonTable;
  readonly #moments = new Map<string, LinkMoment | null>();
  readonly #at = new Map<string, Map<number, number>>();
  #pair: readonly [PlanInputStation, PlanInputStation] | null = null;

  constructor({ bands, rules, startMs, endMs }: PlanInput) {
    this.#bands = bands;
    this.#rules = rules;
    this.#table = buildMoonTable({ startMs, endMs });
  }

  /** What was computed is kept where place and equipment are those of the pair before. */
  take(first: PlanInputStation, second: PlanInputStation): void {
    const before = this.#pair;
    this.#pair = [first, second];
    if (before && sameLink(before[0], first) && sameLink(before[1], second)) return;
    this.#moments.clear();
    this.#at.clear();
  }

  /**
   * Chance of completing the contact in the slot that begins then: the mean over the grid's instants in it, both ends
   * included, in steps of 0.01. null: not both work the band, or its figures cannot be computed.
   */
  of(band: string, startMs: number): number | null {
    const moment = this.#moment(band);
    if (!moment) return null;
    const { gridMinutes, slotMinutes } = this.#rules;
    const steps = Math.round(slotMinutes / gridMinutes);
    let sum = 0;
    for (let step = 0; step <= steps; step += 1) {
      sum += this.#chanceAt(moment, band, startMs + step * gridMinutes * MINUTE_MS);
    }
    return Math.round((100 * sum) / (steps + 1)) / 100;
  }

  #chanceAt(moment: LinkMoment, band: string, timeMs: number): number {
    let known = this.#at.get(band);
    if (!known) this.#at.set(band, (known = new Map<number, number>()));
    let chance = known.get(timeMs);
    if (chance === undefined) {
      moment.compute(timeMs);
      chance = moment.contactChance;
      known.set(timeMs, chance);
    }
    return chance;
  }

  #moment(bandId: string): LinkMoment | null {
    let moment = this.#moments.get(bandId);
    if (moment === undefined) {
      moment = this.#evaluate(bandId);
      this.#moments.set(bandId, moment);
    }
    return moment;
  }

  #evaluate(bandId: string): LinkMoment | null {
    const band = this.#bands.find(({ id }) => id === bandId);
    const [first, second] = this.#pair!;
    const firstSetup = first.setups[bandId];
    const secondSetup = second.setups[bandId];
    if (!band || !firstSetup || !secondSetup) return null;
    try {
      return createLinkEvaluator(
        [
          { callSign: first.callSign, site: first.site, setup: firstSetup },
          { callSign: second.callSign, site: second.site, setup: secondSetup },
        ],
        band.frequencyMhz,
        band.mode,
        { chance: { slotMinutes: this.#rules.slotMinutes } },
      ).over(this.#table);
    } catch (error) {
      if (error instanceof LinkInputError) return null;
      throw error;
    }
  }
}

function sameLink(one: PlanInputStation, other: PlanInputStation): boolean {
  return one.site === other.site && one.setups === other.setups;
}
