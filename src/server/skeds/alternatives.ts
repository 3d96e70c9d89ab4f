import { nearestSlots } from '../../domain/sked/nearestSlots';
import { slotObstacle } from '../../domain/sked/obstacle';
import {
  DAY_MS,
  HOUR_MS,
  MINUTE_MS,
  subtractIntervals,
  type Interval,
} from '../../domain/time/interval';
import { expandUsableHours } from '../../domain/time/weeklyHours';
import { findCommonWindows } from '../../domain/window';
import { Conflict } from '../errors';
import type { Services } from '../services';
import type { PartyStation } from './load';
import type { SlotTaken } from './refusals';
import { takenIntervals } from './takenIntervals';

const COUNT = 3;
const LOOK_BACK_MS = 3 * DAY_MS;
/** Tried one after the other until there are enough. */
const LOOK_AHEAD_MS = [7 * DAY_MS, 35 * DAY_MS];

/**
 * Up to three slots of the wished length near the wished one: the Moon inside every station's limits, everybody
 * awake, nobody taken, and not the slot in which the sked stands now. Reads and computes outside any transaction, because it only advises.
 */
export async function alternativeSlots(
  services: Services,
  stations: readonly PartyStation[],
  wished: Interval,
  standing?: { skedId: string } & Interval,
): Promise<Interval[]> {
  const lengthMs = wished.endMs - wished.startMs;
  const nowMs = services.now();
  let slots: Interval[] = [];
  for (const aheadMs of LOOK_AHEAD_MS) {
    const span = {
      startMs: Math.max(nowMs + MINUTE_MS, wished.startMs - LOOK_BACK_MS),
      endMs: wished.endMs + aheadMs,
    };
    const { windows } = findCommonWindows({
      ...span,
      stations: stations.map((station) => ({
        callSign: station.callSign,
        site: station.site,
        sky: station.sky,
        usable: expandUsableHours(station.hours, span),
      })),
      minimumMinutes: lengthMs / MINUTE_MS,
    });
    const taken = await takenIntervals(
      services.db,
      stations.map((station) => station.id),
      { startMs: span.startMs - DAY_MS, endMs: span.endMs },
      standing?.skedId,
    );
    const free = subtractIntervals(windows, taken).filter(
      (stretch) => stretch.endMs - stretch.startMs >= lengthMs,
    );
    slots = nearestSlots(free, wished, COUNT * 2)
      .filter((slot) => slot.startMs !== standing?.startMs || slot.endMs !== standing.endMs)
      .filter((slot) => slotObstacle(stations, slot) === null)
      .slice(0, COUNT);
    if (slots.length === COUNT) break;
  }
  return slots;
}

/** The reason why a slot cannot be had, as a conflict that offers others. */
export async function withAlternatives(
  services: Services,
  taken: SlotTaken,
  stations: readonly PartyStation[],
  wished: Interval,
  standing?: { skedId: string } & Interval,
): Promise<Conflict> {
  const tooLong = wished.endMs - wished.startMs > 24 * HOUR_MS;
  const slots = tooLong ? [] : await alternativeSlots(services, stations, wished, standing);
  return new Conflict(taken.message, {
    reason: taken.message,
    alternatives: slots.map((slot) => ({
      start: new Date(slot.startMs).toISOString(),
      end: new Date(slot.endMs).toISOString(),
    })),
  });
}
