import { buildMoonTable, moonSamples, type MoonSample } from '../ephemeris';
import { dopplerHz, type DialConvention, type DialShift } from '../link/doppler';
import { createLinkEvaluator } from '../link/evaluator';
import { LinkInputError } from '../link/inputError';
import type { LinkMoment } from '../link/moment';
import { parallacticFromSkyDeg } from '../link/polarization';
import type { LinkSetup } from '../link/setup';
import type { ModeId } from '../station/modes';
import { HOUR_MS, MINUTE_MS, type Interval } from '../time/interval';
import { middleOfSlot } from './link';
import { dialTowards } from './dial';
import { feedSentences, type PairAngles } from './feedSetting';
import type { SkedStation } from './obstacle';
import { transmitOrder, trPlan, type TrPlan } from './periods';

/** A party as the sheet of the hour needs it. */
export interface SheetStation extends SkedStation {
  setup: LinkSetup | null;
}

export interface SheetSked extends Interval {
  frequencyMhz: number;
  mode: ModeId;
  eastFirst: boolean;
  convention: DialConvention;
}

/** One line towards one partner. Margins null where there is no link to compute. */
export interface SheetRow {
  timeMs: number;
  own: { azimuthDeg: number; elevationDeg: number };
  partner: { azimuthDeg: number; elevationDeg: number };
  ownDial: DialShift;
  partnerDial: DialShift;
  ownEchoHz: number;
  /** Of the other's signal, the same both ways. */
  mutualHz: number;
  /** They hear you, you hear them, dB. */
  theyHearDb: number | null;
  youHearDb: number | null;
}

/** The sheet towards one partner. */
export interface PairSheet {
  partner: string;
  rows: SheetRow[];
  /** What to set at the feed. */
  feed: string[];
  /** In the middle of the slot. */
  middle: SheetRow;
  chance: number | null;
}

export interface HourSheet {
  own: string;
  plan: TrPlan;
  pairs: PairSheet[];
  /** Lowest and highest stand of the Moon at the own station in the slot. */
  elevationsDeg: { lowest: number; highest: number };
  /** In the middle of the slot. */
  rangeKm: number;
}

const STEPS_MIN = [2, 5, 10, 20, 30];
const MOST_STEPS = 20;

/** Every 2 minutes at first; in longer slots the step grows so that at most some 20 lines are left. */
export function sheetStepMs({ startMs, endMs }: Interval): number {
  const minutes = STEPS_MIN.find((step) => endMs - startMs <= MOST_STEPS * step * MINUTE_MS);
  return minutes === undefined ? HOUR_MS : minutes * MINUTE_MS;
}

/** Multiples of the step within the slot, with its start and end. */
export function sheetTimes(slot: Interval, stepMs = sheetStepMs(slot)): number[] {
  const times = [slot.startMs];
  const firstMs = Math.floor(slot.startMs / stepMs) * stepMs + stepMs;
  for (let timeMs = firstMs; timeMs < slot.endMs; timeMs += stepMs) times.push(timeMs);
  times.push(slot.endMs);
  return times;
}

/**
 * Everything for the hour itself, from one station towards each of the others. `stations` in the order of the sked's
 * parties, which decides who is first in the conventions that tell two apart.
 */
export function hourSheet(
  stations: readonly SheetStation[],
  ownCallSign: string,
  sked: SheetSked,
): HourSheet {
  const ownIndex = stations.findIndex(({ callSign }) => callSign === ownCallSign);
  const own = stations[ownIndex]!;
  const middleMs = middleOfSlot(sked);
  const times = sheetTimes(sked);
  const asked = [...times, middleMs];
  const table = buildMoonTable(sked);
  const samplesOf = ({ site }: SheetStation) => moonSamples(site, asked, table);
  const ownSamples = samplesOf(own);
  const elevations = ownSamples.map(({ elevationDeg }) => elevationDeg);
  return {
    own: own.callSign,
    plan: trPlan(sked, {
      mode: sked.mode,
      frequencyMhz: sked.frequencyMhz,
      order: orderOf(stations, sked.eastFirst),
    }),
    pairs: stations.flatMap((partner, index) => {
      if (index === ownIndex) return [];
      const partnerSamples = samplesOf(partner);
      const moment = momentOf([own, partner], sked, table);
      const rows = asked.map((timeMs, at) =>
        rowAt(timeMs, ownSamples[at]!, partnerSamples[at]!, sked, ownIndex < index, moment),
      );
      const middle = rows.pop()!;
      const angles = (at: number): PairAngles => ({
        ownParallacticDeg: parallacticOf(own, ownSamples[at]!),
        partnerParallacticDeg: parallacticOf(partner, partnerSamples[at]!),
      });
      return [
        {
          partner: partner.callSign,
          rows,
          middle,
          chance: chanceAt(moment, middleMs),
          feed: feedSentences(
            own.setup?.polarization ?? null,
            partner.setup?.polarization ?? null,
            partner.callSign,
            sked.frequencyMhz,
            { start: angles(0), middle: angles(times.length), end: angles(times.length - 1) },
          ),
        },
      ];
    }),
    elevationsDeg: { lowest: Math.min(...elevations), highest: Math.max(...elevations) },
    rangeKm: ownSamples.at(-1)!.rangeKm,
  };
}

/** The T/R order of the parties. */
export function orderOf(
  stations: readonly Pick<SkedStation, 'callSign' | 'site'>[],
  eastFirst: boolean,
): string[] {
  return transmitOrder(
    stations.map(({ callSign, site }) => ({ callSign, longitudeDeg: site.longitudeDeg })),
    eastFirst,
  );
}

function parallacticOf({ site }: SheetStation, { azimuthDeg, elevationDeg }: MoonSample): number {
  return parallacticFromSkyDeg(site.latitudeDeg, azimuthDeg, elevationDeg);
}

function rowAt(
  timeMs: number,
  own: MoonSample,
  partner: MoonSample,
  { frequencyMhz, convention }: SheetSked,
  ownFirst: boolean,
  moment: LinkMoment | null,
): SheetRow {
  const ownEchoHz = dopplerHz(frequencyMhz, own.rangeRateMps);
  const partnerEchoHz = dopplerHz(frequencyMhz, partner.rangeRateMps);
  moment?.compute(timeMs);
  return {
    timeMs,
    own: { azimuthDeg: own.azimuthDeg, elevationDeg: own.elevationDeg },
    partner: { azimuthDeg: partner.azimuthDeg, elevationDeg: partner.elevationDeg },
    ownDial: dialTowards(convention, ownEchoHz, partnerEchoHz, ownFirst),
    partnerDial: dialTowards(convention, partnerEchoHz, ownEchoHz, !ownFirst),
    ownEchoHz,
    mutualHz: (ownEchoHz + partnerEchoHz) / 2,
    theyHearDb: moment && moment.directions[0].marginDb,
    youHearDb: moment && moment.directions[1].marginDb,
  };
}

/** Null where a setup is missing or cannot be computed. */
export function momentOf(
  [own, partner]: readonly [SheetStation, SheetStation],
  sked: SheetSked,
  table: ReturnType<typeof buildMoonTable>,
): LinkMoment | null {
  if (!own.setup || !partner.setup) return null;
  try {
    return createLinkEvaluator(
      [
        { callSign: own.callSign, site: own.site, setup: own.setup },
        { callSign: partner.callSign, site: partner.site, setup: partner.setup },
      ],
      sked.frequencyMhz,
      sked.mode,
      { chance: { slotMinutes: (sked.endMs - sked.startMs) / MINUTE_MS } },
    ).over(table);
  } catch (error) {
    if (!(error instanceof LinkInputError)) throw error;
    return null;
  }
}

function chanceAt(moment: LinkMoment | null, timeMs: number): number | null {
  if (!moment) return null;
  moment.compute(timeMs);
  return moment.contactChance;
}
