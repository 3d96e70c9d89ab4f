import { buildMoonTable, moonSamples } from '../ephemeris';
import { dopplerHz, type DialConvention, type DialShift } from '../link/doppler';
import { HOUR_MS, MINUTE_MS, type Interval } from '../time/interval';
import { dialTowards } from './dial';
import { momentOf, type SheetSked, type SheetStation } from './hourSheet';
import { periodAt, type TrPeriod, type TrPlan } from './periods';

/** The Moon in one sky at even steps, to 0.01° and 0.1 Hz. */
export interface LiveSky {
  callSign: string;
  azimuthsDeg: number[];
  elevationsDeg: number[];
  ownEchosHz: number[];
}

/** Margins towards one partner at the same steps; null where there is no link to compute. */
export interface LivePartner {
  callSign: string;
  /** Whether the own station stands before this one among the sked's parties. */
  ownFirst: boolean;
  theyHearDb: number[] | null;
  youHearDb: number[] | null;
}

/**
 * What the live view needs, computed beforehand where the exact places are known: the browser gets the track, not the
 * places.
 */
export interface LiveData {
  own: string;
  frequencyMhz: number;
  convention: DialConvention;
  plan: TrPlan;
  track: { startMs: number; stepMs: number; skies: LiveSky[] };
  partners: LivePartner[];
}

/** Before the slot the Moon is looked for, after it the antenna is parked. */
const BEFORE_MS = HOUR_MS;
const AFTER_MS = 20 * MINUTE_MS;
const MOST_STEPS = 400;

/** The track a minute apart, wider in slots beyond five hours. */
export function liveTrackTimes(slot: Interval): {
  startMs: number;
  stepMs: number;
  times: number[];
} {
  const startMs = slot.startMs - BEFORE_MS;
  const endMs = slot.endMs + AFTER_MS;
  const stepMs = Math.ceil((endMs - startMs) / MINUTE_MS / MOST_STEPS) * MINUTE_MS;
  const times: number[] = [];
  for (let timeMs = startMs; timeMs < endMs + stepMs; timeMs += stepMs) times.push(timeMs);
  return { startMs, stepMs, times };
}

/** Computes what the live view shows. `stations` in the order of the sked's parties. */
export function liveData(
  stations: readonly SheetStation[],
  ownCallSign: string,
  sked: SheetSked,
  plan: TrPlan,
): LiveData {
  const { startMs, stepMs, times } = liveTrackTimes(sked);
  const table = buildMoonTable({ startMs, endMs: times.at(-1)! });
  const ownIndex = stations.findIndex(({ callSign }) => callSign === ownCallSign);
  const own = stations[ownIndex]!;
  return {
    own: ownCallSign,
    frequencyMhz: sked.frequencyMhz,
    convention: sked.convention,
    plan,
    track: {
      startMs,
      stepMs,
      skies: stations.map(({ callSign, site }) => {
        const samples = moonSamples(site, times, table);
        return {
          callSign,
          azimuthsDeg: samples.map(({ azimuthDeg }) => rounded(azimuthDeg, 2)),
          elevationsDeg: samples.map(({ elevationDeg }) => rounded(elevationDeg, 2)),
          ownEchosHz: samples.map(({ rangeRateMps }) =>
            rounded(dopplerHz(sked.frequencyMhz, rangeRateMps), 1),
          ),
        };
      }),
    },
    partners: stations.flatMap((partner, index) => {
      if (index === ownIndex) return [];
      const moment = momentOf([own, partner], sked, table);
      const margins = (way: 0 | 1) =>
        moment &&
        times.map((timeMs) => {
          moment.compute(timeMs);
          return rounded(moment.directions[way].marginDb, 2);
        });
      return [
        {
          callSign: partner.callSign,
          ownFirst: ownIndex < index,
          theyHearDb: margins(0),
          youHearDb: margins(1),
        },
      ];
    }),
  };
}

function rounded(value: number, decimals: number): number {
  return Number(value.toFixed(decimals));
}

/** Where the Moon stands; null outside the track. */
export interface LiveLook {
  azimuthDeg: number;
  elevationDeg: number;
  ownEchoHz: number;
}

export function lookAt({ track }: LiveData, callSign: string, timeMs: number): LiveLook | null {
  const sky = track.skies.find((one) => one.callSign === callSign);
  const at = sky && stepAt(track, timeMs, sky.azimuthsDeg.length);
  if (!at) return null;
  const from = sky.azimuthsDeg[at.index]!;
  const turn = ((((sky.azimuthsDeg[at.index + 1]! - from + 180) % 360) + 360) % 360) - 180;
  return {
    azimuthDeg: (from + at.share * turn + 360) % 360,
    elevationDeg: between(sky.elevationsDeg, at),
    ownEchoHz: between(sky.ownEchosHz, at),
  };
}

/** Margins towards a partner at an instant; null where there is no link or no track. */
export function marginsAt(
  { track }: LiveData,
  { theyHearDb, youHearDb }: LivePartner,
  timeMs: number,
): { theyHearDb: number; youHearDb: number } | null {
  const at = theyHearDb && stepAt(track, timeMs, theyHearDb.length);
  if (!at || !youHearDb) return null;
  return { theyHearDb: between(theyHearDb, at), youHearDb: between(youHearDb, at) };
}

/** The own dial towards a partner at an instant. */
export function dialAt(data: LiveData, partner: LivePartner, timeMs: number): DialShift | null {
  const own = lookAt(data, data.own, timeMs);
  const theirs = lookAt(data, partner.callSign, timeMs);
  return own && theirs
    ? dialTowards(data.convention, own.ownEchoHz, theirs.ownEchoHz, partner.ownFirst)
    : null;
}

interface Step {
  index: number;
  share: number;
}

function stepAt(
  track: { startMs: number; stepMs: number },
  timeMs: number,
  count: number,
): Step | null {
  const position = (timeMs - track.startMs) / track.stepMs;
  const index = Math.min(Math.floor(position), count - 2);
  return position >= 0 && position <= count - 1 ? { index, share: position - index } : null;
}

function between(values: readonly number[], { index, share }: Step): number {
  return values[index]! + share * (values[index + 1]! - values[index]!);
}

/** What happens at an instant. */
export interface LiveState {
  phase: 'before' | 'running' | 'over';
  /** Until the start, or until the end. */
  leftMs: number;
  /** Cut at the ends of the slot; null unless running. */
  period: (TrPeriod & { callSign: string }) | null;
  next: (TrPeriod & { callSign: string }) | null;
  /** Periods around now, for the strip: the one before, this one and those that follow. */
  strip: (TrPeriod & { callSign: string })[];
}

const STRIP_PERIODS = 6;

export function liveState({ plan }: LiveData, nowMs: number): LiveState {
  const phase = nowMs < plan.startMs ? 'before' : nowMs < plan.endMs ? 'running' : 'over';
  const named = (timeMs: number) => {
    if (timeMs < plan.startMs || timeMs >= plan.endMs) return null;
    const period = periodAt(plan, timeMs);
    return {
      turn: period.turn,
      startMs: Math.max(period.startMs, plan.startMs),
      endMs: Math.min(period.endMs, plan.endMs),
      callSign: plan.order[period.turn]!,
    };
  };
  const period = phase === 'running' ? named(nowMs) : null;
  const next = phase === 'before' ? named(plan.startMs) : period && named(period.endMs);
  const strip: LiveState['strip'] = [];
  if (phase !== 'over') {
    const first = period ? (named(period.startMs - 1) ?? period) : next!;
    for (
      let one: typeof period = first;
      one && strip.length < STRIP_PERIODS;
      one = named(one.endMs)
    ) {
      strip.push(one);
    }
  }
  return {
    phase,
    leftMs: Math.max(0, (phase === 'before' ? plan.startMs : plan.endMs) - nowMs),
    period,
    next,
    strip,
  };
}
