import type { MoonTable } from '../../domain/ephemeris';
import { createLinkEvaluator } from '../../domain/link/evaluator';
import { LinkInputError } from '../../domain/link/inputError';
import type { LinkMoment } from '../../domain/link/moment';
import type { LinkStation } from '../../domain/link/setup';
import { MINUTE_MS } from '../../domain/time/interval';
import type { InnerLimit } from '../../domain/window';
import { InvalidInput } from '../errors';
import type { WindowsRequest } from './calculatorSchemas';
import { rounded } from './figures';

/** Nulls of linear polarisation last some ten minutes. */
const STEP_MS = 5 * MINUTE_MS;

/** The links of all pairs of a search; what counts is the weakest. */
export class RoundLink {
  constructor(readonly moments: readonly LinkMoment[]) {}

  /** Least margin over every pair and direction, dB. */
  marginDb(timeMs: number): number {
    let least = Infinity;
    for (const moment of this.moments) {
      moment.compute(timeMs);
      least = Math.min(least, moment.marginDb);
    }
    return least;
  }

  /** Least margin, and the chance of the least likely pair in a slot that begins then. */
  at(timeMs: number): { marginDb: number; chance: number } {
    const marginDb = this.marginDb(timeMs);
    const chance = Math.min(...this.moments.map((moment) => moment.contactChance));
    return { marginDb: rounded(marginDb, 4), chance: rounded(chance, 5) };
  }

  limit(minimumMarginDb: number): InnerLimit {
    return {
      cause: { callSign: null, reason: 'margin' },
      stepMs: STEP_MS,
      evaluate: (timeMs) => this.marginDb(timeMs) - minimumMarginDb,
    };
  }
}

/**
 * The links of a search in which every station told its setup, or null where something for them is missing.
 * Throws `InvalidInput` for a setup that cannot be computed.
 */
export function roundLink(request: WindowsRequest, table: MoonTable): RoundLink | null {
  const { frequencyMhz, mode } = request;
  if (frequencyMhz === undefined || mode === undefined) return null;
  const equipped: LinkStation[] = [];
  for (const { callSign, site, setup } of request.stations) {
    if (!setup) return null;
    equipped.push({ callSign, site, setup });
  }
  const moments = equipped.flatMap((first, index) =>
    equipped.slice(index + 1).map((second, offset) => {
      const indices = [index, index + 1 + offset] as const;
      return linkMoment([first, second], indices, frequencyMhz, mode, table);
    }),
  );
  return new RoundLink(moments);
}

function linkMoment(
  pair: readonly [LinkStation, LinkStation],
  indices: readonly [number, number],
  frequencyMhz: number,
  mode: string,
  table: MoonTable,
): LinkMoment {
  try {
    return createLinkEvaluator(pair, frequencyMhz, mode).over(table);
  } catch (error) {
    if (!(error instanceof LinkInputError)) throw error;
    const path = error.path.replace(
      /^stations\.([01])/,
      (_, at) => `stations.${indices[at === '0' ? 0 : 1]}`,
    );
    throw new InvalidInput(error.message, [{ path, message: error.message }]);
  }
}
