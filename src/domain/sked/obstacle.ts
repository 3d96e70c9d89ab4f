import { buildMoonTable, lookAngles, observerAt } from '../ephemeris';
import { compileSky, compiledSkyCause, type Site, type SkyCause, type SkyLimits } from '../sky';
import { formatClock, formatDay } from '../time/format';
import { HOUR_MS, MINUTE_MS, type Interval } from '../time/interval';

export interface SkedStation {
  callSign: string;
  site: Site;
  sky: SkyLimits;
}

/** What stands between a slot and a contact: the first whole minute at which a station cannot see the Moon. */
export interface Obstacle extends SkyCause {
  callSign: string;
  fromMs: number;
  /** When the same station sees the Moon again; null when that is not within 48 hours. */
  untilMs: number | null;
  /** Whether it is this one limit all the time until then. */
  same: boolean;
}

const LOOK_AHEAD_MS = 48 * HOUR_MS;

/**
 * The first obstacle in the slot, or null when the Moon stands inside every station's limits at every whole
 * minute from the start to the end, both included. Elevations are airless. Of several stations that
 * lose the Moon in the same minute the one that waits longest for it is named.
 */
export function slotObstacle(stations: readonly SkedStation[], slot: Interval): Obstacle | null {
  const table = buildMoonTable({ startMs: slot.startMs, endMs: slot.endMs + LOOK_AHEAD_MS });
  const moon = new Float64Array(3);
  const skies = stations.map((station) => {
    const observer = observerAt(station.site);
    const sky = compileSky(station.sky);
    return {
      callSign: station.callSign,
      causeAt: (timeMs: number): SkyCause | null => {
        table.moonEarthFixed(timeMs, moon);
        const angles = lookAngles(observer, [moon[0]!, moon[1]!, moon[2]!]);
        return compiledSkyCause(sky, angles.azimuthDeg, angles.elevationDeg);
      },
    };
  });
  for (const timeMs of minutesOf(slot)) {
    const blocked = skies.flatMap(({ callSign, causeAt }) => {
      const cause = causeAt(timeMs);
      if (!cause) return [];
      let untilMs: number | null = null;
      let same = true;
      for (let at = timeMs + MINUTE_MS; at <= slot.endMs + LOOK_AHEAD_MS; at += MINUTE_MS) {
        const later = causeAt(at);
        if (!later) {
          untilMs = at;
          break;
        }
        if (later.reason !== cause.reason || later.name !== cause.name) same = false;
      }
      return [{ ...cause, callSign, fromMs: timeMs, untilMs, same }];
    });
    if (blocked.length > 0) {
      return blocked.reduce((worst, one) =>
        (one.untilMs ?? Infinity) > (worst.untilMs ?? Infinity) ? one : worst,
      );
    }
  }
  return null;
}

function* minutesOf(slot: Interval): Generator<number> {
  for (let timeMs = slot.startMs; timeMs < slot.endMs; timeMs += MINUTE_MS) yield timeMs;
  yield slot.endMs;
}

/**
 * The obstacle in words: "The Moon is behind QA1LUN's barn until 16:20 UTC." where it hides the start of the
 * slot (where another limit follows: "The Moon is below QA1LUN's horizon. QA1LUN can use it from 16:20 UTC."), else "The
 * Moon goes behind QA1LUN's barn at 16:20 UTC."
 */
export function obstacleSentence(obstacle: Obstacle, slot: Interval): string {
  const { is, goes } = phrases(obstacle);
  if (obstacle.fromMs > slot.startMs) {
    return `The Moon ${goes} at ${clockOn(obstacle.fromMs, slot.startMs)}.`;
  }
  if (obstacle.untilMs === null) return `The Moon ${is}, and stays out of reach for two days.`;
  const again = clockOn(obstacle.untilMs, slot.startMs);
  return obstacle.same
    ? `The Moon ${is} until ${again}.`
    : `The Moon ${is}. ${obstacle.callSign} can use it from ${again}.`;
}

function clockOn(timeMs: number, slotStartMs: number): string {
  const day = formatDay(timeMs);
  const clock = `${formatClock(timeMs)} UTC`;
  return day === formatDay(slotStartMs) ? clock : `${day} ${clock}`;
}

function phrases({ callSign, reason, name }: Obstacle): { is: string; goes: string } {
  switch (reason) {
    case 'horizon':
      return { is: `is below ${callSign}’s horizon`, goes: `sets for ${callSign}` };
    case 'horizonProfile':
      return behind(`${callSign}’s skyline`);
    case 'elevationLimit':
      return outside(`the elevations ${callSign}’s dish can reach`);
    case 'azimuthLimit':
      return outside(`the azimuths ${callSign}’s dish can reach`);
    case 'transmitElevation': {
      const limit = `below ${callSign}’s lowest elevation for transmitting`;
      return { is: `stands ${limit}`, goes: `falls ${limit}` };
    }
    case 'blockedSector':
      return behind(name ? `${callSign}’s ${name}` : `a blocked sector of ${callSign}`);
  }
}

function behind(what: string) {
  return { is: `is behind ${what}`, goes: `goes behind ${what}` };
}

function outside(what: string) {
  return { is: `is outside ${what}`, goes: `leaves ${what}` };
}
