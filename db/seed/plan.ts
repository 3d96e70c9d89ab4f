import { bandById } from '../../src/domain/station/bands';
import {
  HOUR_MS,
  MINUTE_MS,
  intersectIntervals,
  subtractIntervals,
  unionIntervals,
  type Interval,
} from '../../src/domain/time/interval';
import { expandUsableHours, type WeeklyHours } from '../../src/domain/time/weeklyHours';
import { WindowCache, findCommonWindows } from '../../src/domain/window';
import { DEMO_STATIONS, type DemoStation } from './stations';
import type { SkedStory, StepTime, StoryStep } from './stories';

const GRID_MS = 15 * MINUTE_MS;

/** A story with its stations and its time found. `slot` is the one first offered. */
export interface PlannedSked {
  story: SkedStory;
  stations: DemoStation[];
  slot: Interval;
  offeredAtMs: number;
  steps: { step: StoryStep; atMs: number; slot: Interval }[];
}

/** Weekly hours and days off of a demo station, its days off counted from the given instant. */
export function demoHours(station: DemoStation, nowMs: number): WeeklyHours {
  const daysOff = station.daysOffAhead.map((days) =>
    new Date(nowMs + days * 24 * HOUR_MS).toISOString().slice(0, 10),
  );
  return { timeZone: station.timeZone, weekly: station.weekly, daysOff: daysOff.sort() };
}

/**
 * Gives each story a slot that lies in a true common window with everybody awake, and that no station of it
 * has for another story. A story for which the Moon leaves no such slot is left out.
 */
export function planSkeds(stories: readonly SkedStory[], nowMs: number): PlannedSked[] {
  const cache = new WindowCache();
  const taken = new Map<string, Interval[]>();
  const planned: PlannedSked[] = [];
  for (const story of stories) {
    const found = findPlace(story, nowMs, taken, cache);
    if (!found) continue;
    const { stations, slot } = found;
    const whole = { startMs: slot.startMs, endMs: slot.endMs + latestMoveMs(story) };
    for (const { callSign } of stations) {
      taken.set(callSign, unionIntervals([...(taken.get(callSign) ?? []), whole]));
    }
    planned.push({
      story,
      stations,
      slot,
      offeredAtMs: instantOf(story.offeredAt, slot, nowMs),
      steps: timedSteps(story, slot, nowMs),
    });
  }
  return planned;
}

/** Moved slots follow from the first one; each step knows the slot that it leaves behind. */
function timedSteps(story: SkedStory, first: Interval, nowMs: number): PlannedSked['steps'] {
  let slot = first;
  return story.steps.map((step) => {
    if (step.do === 'move') slot = shifted(slot, step.laterMin * MINUTE_MS);
    return { step, slot, atMs: instantOf(step.when, slot, nowMs) };
  });
}

function latestMoveMs(story: SkedStory): number {
  const moves = story.steps.map((step) => (step.do === 'move' ? step.laterMin : 0));
  return MINUTE_MS * moves.reduce((sum, laterMin) => sum + laterMin, 0);
}

function shifted({ startMs, endMs }: Interval, byMs: number): Interval {
  return { startMs: startMs + byMs, endMs: endMs + byMs };
}

function instantOf(when: StepTime, slot: Interval, nowMs: number): number {
  if ('inHours' in when) return nowMs + when.inHours * HOUR_MS;
  if ('afterStartMin' in when) return slot.startMs + when.afterStartMin * MINUTE_MS;
  return slot.endMs + when.afterEndMin * MINUTE_MS;
}

function findPlace(
  story: SkedStory,
  nowMs: number,
  taken: ReadonlyMap<string, Interval[]>,
  cache: WindowCache,
): { stations: DemoStation[]; slot: Interval } | null {
  const choices = [story.stations];
  for (const other of story.insteadOf ?? []) choices.push([...story.stations.slice(0, -1), other]);
  const near = hoursFrom(nowMs, story.fromHours, story.toHours);
  const far = hoursFrom(nowMs, story.untilHours, story.toHours);
  for (const span of [near, far]) {
    for (const callSigns of choices) {
      const stations = callSigns.map(stationOf);
      if (!stations.every((station) => station.bands[story.band])) continue;
      const slot = findSlot(story, stations, span, nowMs, taken, cache);
      if (slot) return { stations, slot };
    }
  }
  return null;
}

function hoursFrom(nowMs: number, oneHours: number, otherHours: number): Interval {
  const hourMs = Math.floor(nowMs / HOUR_MS) * HOUR_MS;
  return {
    startMs: hourMs + Math.min(oneHours, otherHours) * HOUR_MS,
    endMs: hourMs + Math.max(oneHours, otherHours) * HOUR_MS,
  };
}

function stationOf(callSign: string): DemoStation {
  const station = DEMO_STATIONS.find((one) => one.callSign === callSign);
  if (!station) throw new Error(`The demo has no station ${callSign}.`);
  return station;
}

/** In the window with the least degradation that has room, around its best moment, on a quarter of an hour. */
function findSlot(
  story: SkedStory,
  stations: readonly DemoStation[],
  span: Interval,
  nowMs: number,
  taken: ReadonlyMap<string, Interval[]>,
  cache: WindowCache,
): Interval | null {
  const lengthMs = story.minutes * MINUTE_MS;
  const needsMs = lengthMs + latestMoveMs(story);
  const { windows } = findCommonWindows(
    {
      ...span,
      stations: stations.map((station) => ({
        callSign: station.callSign,
        site: station,
        sky: station.sky,
        usable: expandUsableHours(demoHours(station, nowMs), span),
      })),
      frequencyMhz: bandById(story.band).centreMhz,
      minimumMinutes: needsMs / MINUTE_MS,
    },
    cache,
  );
  const busy = unionIntervals(stations.flatMap(({ callSign }) => taken.get(callSign) ?? []));
  const ranked = [...windows].sort(
    (a, b) => (a.best.degradationDb ?? 0) - (b.best.degradationDb ?? 0) || a.startMs - b.startMs,
  );
  for (const window of ranked) {
    const free = subtractIntervals(intersectIntervals([window], [span]), busy);
    for (const stretch of free) {
      const firstMs = Math.ceil(stretch.startMs / GRID_MS) * GRID_MS;
      const lastMs = Math.floor((stretch.endMs - needsMs) / GRID_MS) * GRID_MS;
      if (lastMs < firstMs) continue;
      const wishedMs = Math.round((window.best.timeMs - needsMs / 2) / GRID_MS) * GRID_MS;
      const startMs = Math.min(Math.max(wishedMs, firstMs), lastMs);
      return { startMs, endMs: startMs + lengthMs };
    }
  }
  return null;
}
