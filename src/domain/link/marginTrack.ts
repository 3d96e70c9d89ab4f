import { DEG } from '../ephemeris/constants';
import type { MoonTable } from '../ephemeris/table';
import { MINUTE_MS } from '../time/interval';
import { linkModel, type LinkOptions } from './model';
import { LinkMoment } from './moment';
import type { LinkStation } from './setup';

const STEP_MS = 5 * MINUTE_MS;
/** Below this the Moon is far from any rise within a step. */
const OF_INTEREST_ABOVE_SIN = Math.sin(-4 * DEG);
/** What a margin is said to be with the Moon far below a horizon. */
const FAR_BELOW_DB = -1000;

/** The link at one instant, over the worst pair of all. */
export interface WorstLink {
  marginDb: number;
  /** Of the contact, for the pair where it is least. */
  chance: number;
}

/**
 * The lowest margin, dB, of all pairs and directions among stations over a table's span: at even nodes and at any
 * instant between. For searches: the window in which every pair has some margin is where this is at least that.
 * Throws LinkInputError.
 */
export class MarginTrack {
  readonly gridStartMs: number;
  readonly gridStepMs: number;
  readonly values: Float64Array;
  readonly #pairs: LinkMoment[] = [];

  constructor(
    table: MoonTable,
    stations: readonly LinkStation[],
    frequencyMhz: number,
    mode: string,
    options: LinkOptions = {},
  ) {
    stations.forEach((first, index) => {
      for (const second of stations.slice(index + 1)) {
        const model = linkModel([first, second], frequencyMhz, mode, options);
        this.#pairs.push(new LinkMoment(model, table));
      }
    });
    const steps = Math.ceil((table.endMs - table.startMs) / STEP_MS);
    this.gridStepMs = (table.endMs - table.startMs) / steps;
    this.gridStartMs = table.startMs;
    this.values = new Float64Array(steps + 1);
    for (let node = 0; node <= steps; node += 1) {
      this.values[node] = this.evaluate(this.gridStartMs + node * this.gridStepMs);
    }
  }

  /** Lowest margin, dB; −1000 with the Moon 4° or more below a horizon. */
  evaluate(timeMs: number): number {
    for (const pair of this.#pairs) {
      pair.look(timeMs);
      const { first, second } = pair.geometry;
      if (Math.min(first.sinElevation, second.sinElevation) < OF_INTEREST_ABOVE_SIN) {
        return FAR_BELOW_DB;
      }
    }
    let lowestDb = Infinity;
    for (const pair of this.#pairs) {
      pair.compute(timeMs);
      lowestDb = Math.min(lowestDb, pair.marginDb);
    }
    return lowestDb;
  }

  /** Zeros about a node with the Moon far down are of no interest. */
  skips(node: number): boolean {
    return this.values[node] === FAR_BELOW_DB;
  }

  worstAt(timeMs: number): WorstLink {
    const worst: WorstLink = { marginDb: Infinity, chance: 1 };
    for (const pair of this.#pairs) {
      pair.compute(timeMs);
      worst.marginDb = Math.min(worst.marginDb, pair.marginDb);
      worst.chance = Math.min(worst.chance, pair.contactChance);
    }
    return worst;
  }
}
