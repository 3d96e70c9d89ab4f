import { computeLink } from '../link/budget';
import { LinkInputError } from '../link/inputError';
import { MINUTE_MS } from '../time/interval';
import { middleOfSlot } from '../sked/link';
import type { PlanInput } from './plan/input';
import type { PlanProblem, PlanSlot } from './plan/types';
import { optionAt } from './timetable';

/** Chance of the contact in its slot as the plan counted it, or null where the sky does not allow it any more. */
export function chanceOf(problem: PlanProblem, slot: PlanSlot): number | null {
  return optionAt(problem, slot)?.chance ?? null;
}

/** Margin of the weaker direction in the middle of a slot, in dB; null where it cannot be computed. */
export function marginOf(input: PlanInput, slot: PlanSlot): number | null {
  const wish = input.wishes.find(({ id }) => id === slot.wishId);
  const band = input.bands.find(({ id }) => id === slot.band);
  const stations = [wish?.a, wish?.b].map((id) => input.stations.find((one) => one.id === id));
  const [first, second] = stations;
  const setups = stations.map((station) => station?.setups[slot.band]);
  if (!band || !first || !second || !setups[0] || !setups[1]) return null;
  const startMs = slot.startMs;
  const endMs = startMs + input.rules.slotMinutes * MINUTE_MS;
  try {
    const { directions } = computeLink({
      stations: [
        { callSign: first.callSign, site: first.site, setup: setups[0] },
        { callSign: second.callSign, site: second.site, setup: setups[1] },
      ],
      frequencyMhz: band.frequencyMhz,
      mode: band.mode,
      timeMs: middleOfSlot({ startMs, endMs }),
    });
    return Math.round(10 * Math.min(...directions.map(({ marginDb }) => marginDb))) / 10;
  } catch (error) {
    if (error instanceof LinkInputError) return null;
    throw error;
  }
}
