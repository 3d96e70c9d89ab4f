import { MINUTE_MS } from '../../time/interval';
import type { PlanInput, PlanRules } from './input';
import type { PlanSlot } from './types';

/** What keeps a slot from being put down at a station: the wish whose slot is in the way, where it is one. */
export interface StandingObstacle {
  kind: 'overlap' | 'bandChange' | 'rest' | 'tooMany';
  stationId: string;
  /** Null for `rest` and `tooMany`. */
  wishId: string | null;
}

interface StandingSlot {
  wishId: string;
  band: string;
  startMs: number;
}

/** The slots of a plan station by station: says what stands against one more, or against one that moves. */
export class Standing {
  readonly #rules: PlanRules;
  readonly #most: Map<string, number>;
  readonly #own = new Map<string, StandingSlot[]>();

  constructor(input: PlanInput, slots: readonly PlanSlot[]) {
    this.#rules = input.rules;
    this.#most = new Map(input.stations.map(({ id, most }) => [id, most]));
    const wishes = new Map(input.wishes.map((wish) => [wish.id, wish]));
    for (const slot of slots) {
      const wish = wishes.get(slot.wishId);
      if (!wish) continue;
      for (const station of [wish.a, wish.b]) {
        const own = this.#own.get(station);
        if (own) own.push(slot);
        else this.#own.set(station, [slot]);
      }
    }
    for (const own of this.#own.values()) own.sort((one, other) => one.startMs - other.startMs);
  }

  count(stationId: string): number {
    return this.#own.get(stationId)?.length ?? 0;
  }

  /**
   * Everything against a slot of the two stations then and there. @param except wishes to leave out of account, such
   * as the one that moves.
   */
  against(
    stationIds: readonly string[],
    band: string,
    startMs: number,
    except: readonly string[] = [],
  ): StandingObstacle[] {
    return stationIds.flatMap((stationId) => this.#at(stationId, band, startMs, except));
  }

  #at(
    stationId: string,
    band: string,
    startMs: number,
    except: readonly string[],
  ): StandingObstacle[] {
    const own = (this.#own.get(stationId) ?? []).filter(({ wishId }) => !except.includes(wishId));
    const slotMs = this.#rules.slotMinutes * MINUTE_MS;
    const found: StandingObstacle[] = [];
    for (const other of own) {
      const pauseMs = Math.abs(other.startMs - startMs) - slotMs;
      const { wishId } = other;
      if (pauseMs < 0) found.push({ kind: 'overlap', stationId, wishId });
      else if (other.band !== band && pauseMs < this.#rules.bandChangeMinutes * MINUTE_MS) {
        found.push({ kind: 'bandChange', stationId, wishId });
      }
    }
    if (own.length >= (this.#most.get(stationId) ?? 0)) {
      found.push({ kind: 'tooMany', stationId, wishId: null });
    }
    if (found.every(({ kind }) => kind !== 'overlap') && !this.#rests(own, startMs)) {
      found.push({ kind: 'rest', stationId, wishId: null });
    }
    return found;
  }

  #rests(own: readonly StandingSlot[], startMs: number): boolean {
    const { mostInARow, leastPauseMinutes, slotMinutes } = this.#rules;
    if (mostInARow === 0) return true;
    const reachMs = (slotMinutes + leastPauseMinutes) * MINUTE_MS;
    const starts = [...own.map((slot) => slot.startMs), startMs].sort((a, b) => a - b);
    const at = starts.indexOf(startMs);
    let first = at;
    while (first > 0 && starts[first]! - starts[first - 1]! < reachMs) first -= 1;
    let last = at;
    while (last + 1 < starts.length && starts[last + 1]! - starts[last]! < reachMs) last += 1;
    return last - first + 1 <= mostInARow;
  }
}
