import type { BandId } from '../station/bands';
import type { PlanPriority } from './plan/types';

/** What a wish says of a partner. */
export type WishKind = 'want' | 'never';

export const PRIORITY_WORDS: Record<PlanPriority, string> = {
  3: 'most wanted',
  2: 'wanted',
  1: 'if there is room',
};

export interface WishingStation {
  id: string;
  /** Number on the roster. */
  place: number;
  coming: boolean;
  bands: readonly BandId[];
  wants: 'everyone' | 'list';
  /** Of a wish for everyone. */
  priority: PlanPriority;
}

export interface StatedWish {
  stationId: string;
  partnerId: string;
  kind: WishKind;
  priority: PlanPriority;
}

/** Two stations of whom at least one wants the other; `a` comes first on the roster. */
export interface WishedPair {
  a: string;
  b: string;
  priority: PlanPriority;
  /** Bands of both. Empty: they have none in common. */
  bands: BandId[];
}

/**
 * The pairs for which a contact is wished: both are coming, one side wants the other and neither says never. The
 * priority is the higher of those who want. In the order of the roster.
 */
export function wishedPairs(
  stations: readonly WishingStation[],
  wishes: readonly StatedWish[],
): WishedPair[] {
  const stated = new Map(wishes.map((wish) => [`${wish.stationId} ${wish.partnerId}`, wish]));
  const coming = stations.filter((station) => station.coming).sort((a, b) => a.place - b.place);
  const pairs: WishedPair[] = [];
  coming.forEach((a, index) => {
    for (const b of coming.slice(index + 1)) {
      const there = wantOf(a, stated.get(`${a.id} ${b.id}`));
      const back = wantOf(b, stated.get(`${b.id} ${a.id}`));
      if (there === 'never' || back === 'never') continue;
      const priority = Math.max(there, back);
      if (priority === 0) continue;
      pairs.push({
        a: a.id,
        b: b.id,
        priority: priority as PlanPriority,
        bands: a.bands.filter((band) => b.bands.includes(band)),
      });
    }
  });
  return pairs;
}

/** The priority with which a station wants a partner, 0 for not at all. */
function wantOf(station: WishingStation, wish: StatedWish | undefined): number | 'never' {
  if (wish?.kind === 'never') return 'never';
  if (wish) return wish.priority;
  return station.wants === 'everyone' ? station.priority : 0;
}
