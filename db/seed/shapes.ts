import type { SkyLimits } from '../../src/domain/sky/limits';
import type { BandId } from '../../src/domain/station/bands';
import type {
  Antenna,
  BandSetup,
  Polarization,
  ReceiveChain,
  ReceiveStage,
} from '../../src/domain/station/setup';
import type { Weekday, WeeklyStretch } from '../../src/domain/time/weeklyHours';

/** A station of the demo. Its place is a round point chosen at random, not anybody's house. */
export interface DemoStation {
  callSign: string;
  name: string;
  latitudeDeg: number;
  longitudeDeg: number;
  heightM: number;
  timeZone: string;
  publicLocatorLength: 4 | 6;
  listed: boolean;
  note: string;
  sky: SkyLimits;
  /** Null: always. */
  weekly: WeeklyStretch[] | null;
  /** Days off, counted from the day on which the demo is loaded. */
  daysOffAhead: number[];
  bands: Partial<Record<BandId, BandSetup>>;
  noise?: DemoNoise[];
}

/** A measurement, made so many days before the demo is loaded. */
export type DemoNoise = { daysAgo: number } & Record<string, unknown>;

const WORKDAYS: Weekday[] = [1, 2, 3, 4, 5];
const WEEKEND: Weekday[] = [6, 7];

export function onDays(weekdays: Weekday[], from: string, to: string): WeeklyStretch[] {
  return weekdays.map((weekday) => ({ weekday, from, to }));
}

export const everyDay = (from: string, to: string) => onDays([...WORKDAYS, ...WEEKEND], from, to);

/** Evenings and early mornings on workdays, longer at the weekend. */
export function workingLife(
  evening: [string, string],
  weekend: [string, string],
  morning?: [string, string],
): WeeklyStretch[] {
  return [
    ...onDays(WORKDAYS, ...evening),
    ...(morning ? onDays(WORKDAYS, ...morning) : []),
    ...onDays(WEEKEND, ...weekend),
  ];
}

export function dish(diameterM: number, apertureEfficiency = 0.55): Antenna {
  return { kind: 'dish', diameterM, apertureEfficiency };
}

export function array(gainDbi: number, beamwidthDeg?: number): Antenna {
  return { kind: 'gain', gainDbi, ...(beamwidthDeg === undefined ? {} : { beamwidthDeg }) };
}

export function measured(systemTemperatureK: number): ReceiveChain {
  return { kind: 'measured', systemTemperatureK };
}

export const amplifier = (gainDb: number, noiseFigureDb: number, name?: string): ReceiveStage => ({
  kind: 'amplifier',
  ...(name ? { name } : {}),
  gainDb,
  noiseFigureDb,
});
export const loss = (lossDb: number, name?: string): ReceiveStage => ({
  kind: 'loss',
  ...(name ? { name } : {}),
  lossDb,
  physicalTemperatureK: 290,
});

/** Feed loss, amplifier at the feed, cable, receiver; spillover from the ground. */
export function chain(stages: ReceiveStage[], spilloverK: number): ReceiveChain {
  return { kind: 'stages', stages, spilloverK };
}

export function setup(
  antenna: Antenna,
  polarization: Polarization,
  powerAtFeedW: number,
  receive: ReceiveChain,
): BandSetup {
  return { antenna, polarization, powerAtFeedW, receive };
}
