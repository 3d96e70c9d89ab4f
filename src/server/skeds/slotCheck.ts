import { obstacleSentence, slotObstacle } from '../../domain/sked/obstacle';
import { formatUtcRange } from '../../domain/time/format';
import { subtractIntervals, type Interval } from '../../domain/time/interval';
import { expandUsableHours } from '../../domain/time/weeklyHours';
import type { Db } from '../db/connection';
import type { Tx } from '../db/transaction';
import type { PartyStation } from './load';
import { SlotTaken } from './refusals';
import { takenIntervals } from './takenIntervals';

/** Throws `SlotTaken` with the reason in words when the Moon is outside a station's limits in the slot. */
export function requireMoon(stations: readonly PartyStation[], slot: Interval): void {
  const obstacle = slotObstacle(stations, slot);
  if (obstacle) throw new SlotTaken(obstacleSentence(obstacle, slot));
}

/** Throws `SlotTaken` when a station has another agreed sked in the slot. */
export async function requireFree(
  tx: Tx,
  stations: readonly PartyStation[],
  slot: Interval,
  exceptSkedId: string,
): Promise<void> {
  for (const station of stations) {
    const [taken] = await takenIntervals(tx, [station.id], slot, exceptSkedId);
    if (taken) {
      throw new SlotTaken(`${station.callSign} has another agreed sked ${formatUtcRange(taken)}.`);
    }
  }
}

/** What is no obstacle but worth knowing: other agreed skeds and hours in which people sleep or are away. */
export async function slotWarnings(
  tx: Db | Tx,
  stations: readonly PartyStation[],
  slot: Interval,
  exceptSkedId: string,
): Promise<string[]> {
  const warnings: string[] = [];
  for (const station of stations) {
    for (const taken of await takenIntervals(tx, [station.id], slot, exceptSkedId)) {
      warnings.push(
        `${station.callSign} has another agreed sked ${formatUtcRange(taken)}. While that stands, this one cannot be agreed.`,
      );
    }
    const warning = hoursWarning(station, slot);
    if (warning) warnings.push(warning);
  }
  return warnings;
}

function hoursWarning(station: PartyStation, slot: Interval): string | null {
  const outside = subtractIntervals([slot], expandUsableHours(station.hours, slot));
  const first = outside[0];
  if (!first) return null;
  const whole = first.startMs === slot.startMs && first.endMs === slot.endMs;
  return whole
    ? `The slot is outside ${station.callSign}’s usable hours.`
    : `${formatUtcRange(first)} is outside ${station.callSign}’s usable hours.`;
}
