import { locatorToPosition } from '../locator/locator';
import type { SkyLimits } from '../sky/limits';
import { bandById, type BandId } from '../station/bands';
import type { StationHours } from '../station/hoursSchema';
import type { BandSetup, Polarization } from '../station/setup';
import type { Weekday } from '../time/weeklyHours';

/**
 * A partner without an account as somebody else describes them: enough to look for common windows. What is left out is
 * taken from `GUEST_DEFAULTS`. The mail address is no part of it: it is asked for when something is offered.
 */
export interface GuestPlace {
  callSign: string;
  locator: string;
  /** Absent: the zone of the longitude. */
  timeZone?: string | undefined;
  elevationFromDeg?: number | undefined;
  elevationToDeg?: number | undefined;
  azimuthFromDeg?: number | undefined;
  azimuthToDeg?: number | undefined;
  /** Clock times of every day; `to` not after `from` is on the next day. */
  hours?: { from: string; to: string } | undefined;
  dish?: GuestDish | undefined;
}

/** Diameter of the dish and power at its feed. */
export interface GuestDish {
  diameterM: number;
  powerAtFeedW: number;
}

export const GUEST_DEFAULTS = {
  elevationFromDeg: 5,
  hours: { from: '08:00', to: '23:00' },
} as const;

/** What is assumed of somebody who is not asked, as a sentence. */
export const GUEST_DEFAULTS_SENTENCE =
  'Left empty: the whole sky above 5°, usable hours 08–23 local, the time zone of the longitude, no equipment known.';

/** Zone of whole hours that fits the longitude, as "Etc/GMT-1" for an hour east of Greenwich (POSIX signs). */
export function zoneOfLongitude(longitudeDeg: number): string {
  const hours = Math.round(longitudeDeg / 15);
  if (hours === 0) return 'UTC';
  return `Etc/GMT${hours > 0 ? '-' : '+'}${Math.abs(hours)}`;
}

export function guestZone(place: Pick<GuestPlace, 'locator' | 'timeZone'>): string {
  return place.timeZone ?? zoneOfLongitude(locatorToPosition(place.locator).longitudeDeg);
}

export function guestSky(place: GuestPlace): SkyLimits {
  const { elevationToDeg, azimuthFromDeg, azimuthToDeg } = place;
  return {
    elevationFromDeg: place.elevationFromDeg ?? GUEST_DEFAULTS.elevationFromDeg,
    ...(elevationToDeg === undefined ? {} : { elevationToDeg }),
    ...(azimuthFromDeg === undefined || azimuthToDeg === undefined
      ? {}
      : { azimuthFromDeg, azimuthToDeg }),
  };
}

/** The same hours on every day of the week; all day where both ends are the same. */
export function guestHours(hours: GuestPlace['hours'] = GUEST_DEFAULTS.hours): StationHours {
  const { from, to } = hours;
  const allDay = from === to || (from === '00:00' && to === '24:00');
  return {
    weekly: allDay
      ? null
      : ([1, 2, 3, 4, 5, 6, 7] as Weekday[]).map((weekday) => ({ weekday, from, to })),
    daysOff: [],
  };
}

/** The hours as one stretch that every day shares, or null where the days differ or somebody is off. */
export function dailyHours({ weekly, daysOff }: StationHours): { from: string; to: string } | null {
  if (daysOff.length > 0) return null;
  if (weekly === null) return { from: '00:00', to: '24:00' };
  const [first] = weekly;
  const alike =
    first !== undefined &&
    weekly.length === 7 &&
    new Set(weekly.map(({ weekday }) => weekday)).size === 7 &&
    weekly.every(({ from, to }) => from === first.from && to === first.to);
  return alike ? { from: first.from, to: first.to } : null;
}

/**
 * Typical system temperatures on cold sky by lowest frequency, K: galactic noise rules below 1 GHz, the receiver above,
 * losses and atmosphere from 24 GHz on.
 */
const TYPICAL_SYSTEM_K: readonly (readonly [fromMhz: number, kelvin: number])[] = [
  [0, 3000],
  [100, 300],
  [300, 100],
  [800, 70],
  [4000, 90],
  [9000, 110],
  [20_000, 300],
  [40_000, 500],
];

/** Equipment with the dish and power that are known, and what is usual on the band for the rest. */
export function guestSetup(band: BandId, { diameterM, powerAtFeedW }: GuestDish): BandSetup {
  const { centreMhz } = bandById(band);
  return {
    antenna: { kind: 'dish', diameterM, apertureEfficiency: 0.55 },
    polarization: usualPolarization(centreMhz),
    powerAtFeedW,
    receive: { kind: 'measured', systemTemperatureK: typicalSystemTemperatureK(centreMhz) },
  };
}

export function typicalSystemTemperatureK(frequencyMhz: number): number {
  return TYPICAL_SYSTEM_K.findLast(([fromMhz]) => frequencyMhz >= fromMhz)![1];
}

/** What most stations of the band use. */
export function usualPolarization(frequencyMhz: number): Polarization {
  if (frequencyMhz < 1000) return 'horizontal';
  return frequencyMhz < 6000 ? 'rightCircular' : 'vertical';
}
