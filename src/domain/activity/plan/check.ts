import { computeLink } from '../../link/budget';
import { LinkInputError } from '../../link/inputError';
import { formatClock, formatNumber, formatUtc } from '../../time/format';
import { MINUTE_MS, overlaps } from '../../time/interval';
import type { PlanCheck, PlanViolation, ViolationKind } from './findings';
import type { PlanInput, PlanInputStation, PlanInputWish } from './input';
import { moonObstacle } from './moonObstacle';
import type { PlanSlot } from './types';
import { contacts } from './words';

/** What is to be checked. */
export interface ClaimedPlan {
  slots: readonly PlanSlot[];
  /** Absent where nobody claims one. */
  worth?: number | undefined;
}

/**
 * Looks at a plan with nothing but the stations' own data and the rules: the Moon at every minute of every slot straight
 * from the ephemeris, hours, equipment and chance, then each station's day. Shares no code with what made the plan.
 */
export function checkPlan(
  input: PlanInput,
  plan: ClaimedPlan,
  pinned: readonly PlanSlot[] = [],
): PlanCheck {
  return new Checker(input).check(plan, pinned);
}

/** Chances are kept in steps of 0.01 and computed from tables; a difference this small is none. */
const CHANCE_TOLERANCE = 0.015;

interface Placed {
  slot: PlanSlot;
  wish: PlanInputWish;
  stations: [PlanInputStation, PlanInputStation];
  endMs: number;
}

class Checker {
  readonly #violations: PlanViolation[] = [];
  readonly #wishes: Map<string, PlanInputWish>;
  readonly #stations: Map<string, PlanInputStation>;

  constructor(readonly input: PlanInput) {
    this.#wishes = new Map(input.wishes.map((wish) => [wish.id, wish]));
    this.#stations = new Map(input.stations.map((station) => [station.id, station]));
  }

  check({ slots, worth: claimed }: ClaimedPlan, pinned: readonly PlanSlot[]): PlanCheck {
    const placed = slots.flatMap((slot) => this.#place(slot) ?? []);
    this.#wishesOnce(placed);
    let worth = 0;
    for (const one of placed) {
      this.#grid(one);
      this.#moonAndHours(one);
      worth += one.wish.priority * this.#chance(one);
    }
    for (const station of this.input.stations) {
      this.#day(
        station,
        placed.filter(({ stations }) => stations.includes(station)),
      );
    }
    this.#pins(placed, pinned);
    const priorities = placed.reduce((sum, { wish }) => sum + wish.priority, 0);
    if (claimed !== undefined && Math.abs(claimed - worth) > CHANCE_TOLERANCE * priorities + 1e-6) {
      this.#add(
        'wrongWorth',
        `The plan says that it is worth ${formatNumber(claimed, 2)}, but its slots are worth ${formatNumber(worth, 2)}.`,
        [],
      );
    }
    return { violations: this.#violations, worth };
  }

  #add(kind: ViolationKind, sentence: string, slots: PlanSlot[]): void {
    this.#violations.push({ kind, sentence, slots });
  }

  #place(slot: PlanSlot): Placed | null {
    const wish = this.#wishes.get(slot.wishId);
    const a = wish && this.#stations.get(wish.a);
    const b = wish && this.#stations.get(wish.b);
    if (!wish || !a || !b || a === b) {
      this.#add('unknownWish', `A slot at ${formatUtc(slot.startMs)} belongs to no wish.`, [slot]);
      return null;
    }
    const endMs = slot.startMs + this.input.rules.slotMinutes * MINUTE_MS;
    const placed: Placed = { slot, wish, stations: [a, b], endMs };
    if (a.never.includes(b.id) || b.never.includes(a.id)) {
      this.#add('never', `${names(placed)} must not be put together.`, [slot]);
    }
    return placed;
  }

  #wishesOnce(placed: readonly Placed[]): void {
    const seen = new Map<string, Placed>();
    for (const one of placed) {
      const first = seen.get(one.wish.id);
      if (first) {
        this.#add('wishTwice', `${names(one)} have two slots for one wish.`, [
          first.slot,
          one.slot,
        ]);
      }
      seen.set(one.wish.id, one);
    }
  }

  #grid({ slot, endMs }: Placed): void {
    const { startMs, endMs: activityEndMs, rules } = this.input;
    if (slot.startMs < startMs || endMs > activityEndMs) {
      this.#add(
        'outsideActivity',
        `The slot at ${formatUtc(slot.startMs)} lies outside the activity.`,
        [slot],
      );
    }
    if ((slot.startMs - startMs) % (rules.gridMinutes * MINUTE_MS) !== 0) {
      this.#add(
        'offGrid',
        `The slot at ${formatUtc(slot.startMs)} does not begin on a step of ${rules.gridMinutes} min.`,
        [slot],
      );
    }
  }

  #moonAndHours(placed: Placed): void {
    const { slot, stations, endMs } = placed;
    for (const station of stations) {
      const obstacle = moonObstacle(station, this.input.rules, slot.startMs, endMs);
      if (obstacle) {
        this.#add('outsideWindow', `${title(placed)}: ${obstacle.sentence}`, [slot]);
      }
      const there =
        !station.usable ||
        station.usable.some((hours) => hours.startMs <= slot.startMs && hours.endMs >= endMs);
      if (!there) {
        this.#add(
          'usableHours',
          `${title(placed)}: nobody is there at ${station.callSign} for all of it.`,
          [slot],
        );
      }
    }
  }

  /** Mean chance over the grid's instants in the slot. */
  #chance(placed: Placed): number {
    const { slot, wish, stations } = placed;
    const { rules, bands } = this.input;
    const band = bands.find(({ id }) => id === slot.band);
    const setups = stations.map(({ setups: own }) => own[slot.band]);
    if (!band || !wish.bands.includes(slot.band) || !setups[0] || !setups[1]) {
      const label = band?.label ?? slot.band;
      this.#add('wrongBand', `${names(placed)} do not work each other on ${label}.`, [slot]);
      return 0;
    }
    const steps = Math.round(rules.slotMinutes / rules.gridMinutes);
    let sum = 0;
    try {
      for (let step = 0; step <= steps; step += 1) {
        sum += computeLink({
          stations: [
            { callSign: stations[0].callSign, site: stations[0].site, setup: setups[0] },
            { callSign: stations[1].callSign, site: stations[1].site, setup: setups[1] },
          ],
          frequencyMhz: band.frequencyMhz,
          mode: band.mode,
          timeMs: slot.startMs + step * rules.gridMinutes * MINUTE_MS,
          chance: { slotMinutes: rules.slotMinutes },
        }).contactChance;
      }
    } catch (error) {
      if (!(error instanceof LinkInputError)) throw error;
      this.#add('wrongBand', `${title(placed)}: ${error.message}`, [slot]);
      return 0;
    }
    const chance = sum / (steps + 1);
    if (chance < rules.leastChance - CHANCE_TOLERANCE) {
      this.#add(
        'lowChance',
        `${title(placed)}: the chance is ${percent(chance)}, less than ${percent(rules.leastChance)}.`,
        [slot],
      );
    }
    return chance;
  }

  #day(station: PlanInputStation, own: Placed[]): void {
    const { rules } = this.input;
    const { callSign } = station;
    if (own.length > station.most) {
      this.#add(
        'tooMany',
        `${callSign} has ${contacts(own.length)}, more than the ${station.most} it wants at most.`,
        own.map(({ slot }) => slot),
      );
    }
    const inTime = [...own].sort((one, other) => one.slot.startMs - other.slot.startMs);
    let run: Placed[] = [];
    inTime.forEach((one, at) => {
      const before = inTime[at - 1];
      const pauseMs = before ? one.slot.startMs - before.endMs : Infinity;
      if (before) this.#neighbours(callSign, before, one, pauseMs);
      run = pauseMs < rules.leastPauseMinutes * MINUTE_MS ? [...run, one] : [one];
      if (rules.mostInARow > 0 && run.length === rules.mostInARow + 1) {
        this.#add(
          'rest',
          `${callSign} has more than ${contacts(rules.mostInARow)} from ${formatUtc(run[0]!.slot.startMs)} on without a pause of ${rules.leastPauseMinutes} min.`,
          run.map(({ slot }) => slot),
        );
      }
    });
  }

  #neighbours(callSign: string, before: Placed, one: Placed, pauseMs: number): void {
    const { bandChangeMinutes } = this.input.rules;
    const both = [before.slot, one.slot];
    const times = `${formatUtc(before.slot.startMs)} and at ${formatClock(one.slot.startMs)} UTC`;
    const beforeSpan = { startMs: before.slot.startMs, endMs: before.endMs };
    if (overlaps(beforeSpan, { startMs: one.slot.startMs, endMs: one.endMs })) {
      this.#add('overlap', `${callSign} has two slots at once: at ${times}.`, both);
    } else if (before.slot.band !== one.slot.band && pauseMs < bandChangeMinutes * MINUTE_MS) {
      this.#add(
        'bandChange',
        `${callSign} cannot change band within ${Math.round(pauseMs / MINUTE_MS)} min between its slots at ${times}; it needs ${bandChangeMinutes} min.`,
        both,
      );
    }
  }

  #pins(placed: readonly Placed[], pinned: readonly PlanSlot[]): void {
    for (const pin of pinned) {
      const stands = placed.some(
        ({ slot }) =>
          slot.wishId === pin.wishId && slot.band === pin.band && slot.startMs === pin.startMs,
      );
      if (!stands) {
        this.#add(
          'pinMoved',
          `The slot fixed at ${formatUtc(pin.startMs)} does not stand in the plan.`,
          [pin],
        );
      }
    }
  }
}

function names({ stations: [a, b] }: Placed): string {
  return `${a.callSign} and ${b.callSign}`;
}

function title(placed: Placed): string {
  return `${names(placed)}, ${formatUtc(placed.slot.startMs)}`;
}

function percent(share: number): string {
  return `${formatNumber(100 * share)} %`;
}
