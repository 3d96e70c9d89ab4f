import type { Site } from '../sky/limits';
import { atmosphereAt, type Atmosphere } from './atmosphere';
import { CHANCE_PARAMETERS, ChanceModel, type ChanceParameters } from './chance';
import { checkFrequency, checkMode, checkSlot, checkSolarFlux, checkStation } from './check';
import { periodS, type ModeFigures } from './modes';
import { moonBrightness, type MoonBrightness } from './moonNoise';
import { polarizationMeeting, type PolarizationMeeting } from './polarization';
import type { LinkStation } from './setup';
import { halfPowerSpreadShare } from './spread';
import { DEFAULT_SOLAR_FLUX_SFU } from './sun';
import { terminalOf, type Terminal } from './terminal';

export interface LinkOptions {
  /** Flux of the Sun at 10.7 cm, SFU; absent: 120. */
  solarFlux10cmSfu?: number | undefined;
  /** Single figures of the chance model to replace. */
  chance?: Partial<ChanceParameters> | undefined;
}

/** One direction's constants. */
export interface WayModel {
  meeting: PolarizationMeeting;
  /** Power and both gains, dBW. */
  fixedDbw: number;
  /** Both antennas. */
  pointingLossDb: number;
}

/** Everything about a pair, a frequency and a mode that does not change with time. */
export interface LinkModel {
  callSigns: readonly [string, string];
  sites: readonly [Site, Site];
  frequencyMhz: number;
  mode: ModeFigures;
  periodS: number;
  terminals: readonly [Terminal, Terminal];
  /** First to second station, second to first. */
  ways: readonly [WayModel, WayModel];
  /** 90 where one feed is horizontal and the other vertical, else 0. */
  extraDeg: number;
  atmosphere: Atmosphere;
  moon: MoonBrightness;
  halfPowerShare: number;
  solarFlux10cmSfu: number;
  slotMinutes: number;
  chance: ChanceModel;
}

/** Checks a pair and works its constants out. Throws LinkInputError. */
export function linkModel(
  stations: readonly [LinkStation, LinkStation],
  frequencyMhz: number,
  modeId: string,
  options: LinkOptions = {},
): LinkModel {
  checkFrequency(frequencyMhz);
  const mode = checkMode(modeId);
  const solarFlux10cmSfu = options.solarFlux10cmSfu ?? DEFAULT_SOLAR_FLUX_SFU;
  checkSolarFlux(solarFlux10cmSfu);
  stations.forEach((station, index) => checkStation(station, `stations.${index}`));
  const [first, second] = stations;
  const terminals = [
    terminalOf(first.setup, frequencyMhz, solarFlux10cmSfu),
    terminalOf(second.setup, frequencyMhz, solarFlux10cmSfu),
  ] as const;
  const way = (from: 0 | 1, to: 0 | 1): WayModel => ({
    meeting: polarizationMeeting(
      stations[from].setup.polarization,
      stations[to].setup.polarization,
      frequencyMhz,
    ),
    fixedDbw: terminals[from].powerDbw + terminals[from].gainDbi + terminals[to].gainDbi,
    pointingLossDb: terminals[from].pointingLossDb + terminals[to].pointingLossDb,
  });
  const ways = [way(0, 1), way(1, 0)] as const;
  const chance = { ...CHANCE_PARAMETERS, ...options.chance };
  checkSlot(chance.slotMinutes);
  return {
    callSigns: [first.callSign ?? 'A', second.callSign ?? 'B'],
    sites: [first.site, second.site],
    frequencyMhz,
    mode,
    periodS: periodS(mode, frequencyMhz),
    terminals,
    ways,
    extraDeg: ways[0].meeting.kind === 'fixed' ? 0 : ways[0].meeting.extraDeg,
    atmosphere: atmosphereAt(frequencyMhz),
    moon: moonBrightness(frequencyMhz),
    halfPowerShare: halfPowerSpreadShare(frequencyMhz),
    solarFlux10cmSfu,
    slotMinutes: chance.slotMinutes,
    chance: chanceModel(periodS(mode, frequencyMhz), chance),
  };
}

const KEPT_CHANCE_MODELS = 32;
const chanceModels = new Map<string, ChanceModel>();

/** Chance tables are the same for every pair in a mode: kept, the oldest let go. */
function chanceModel(period: number, parameters: ChanceParameters): ChanceModel {
  const { slotMinutes, messagesEachWay, modelErrorDb } = parameters;
  const key = `${period} ${slotMinutes} ${messagesEachWay} ${modelErrorDb}`;
  let model = chanceModels.get(key);
  if (!model) {
    model = new ChanceModel(period, parameters);
    chanceModels.set(key, model);
    if (chanceModels.size > KEPT_CHANCE_MODELS) {
      chanceModels.delete(chanceModels.keys().next().value!);
    }
  }
  return model;
}
