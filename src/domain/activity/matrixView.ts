import type { MatrixPair } from './matrix';
import type { RosterStation, RosterWish } from './views';
import type { WishedPair } from './wishes';

/** What stands where two stations meet in the table. */
export interface MatrixCell {
  pair: MatrixPair | null;
  /** The priority of the wish between them; null: nobody wishes it. */
  priority: WishedPair['priority'] | null;
  /** One of them never wants the other. */
  never: boolean;
}

export interface MatrixView {
  /** Stations of the table, in the order of the roster. */
  stations: RosterStation[];
  cell: (one: string, other: string) => MatrixCell;
  /** Wishes on the band, and those of them that have no window in common. */
  wishes: number;
  unreachable: WishedPair[];
}

/** The table of one band. Stations that are not coming or do not have the band are left out. */
export function matrixView(given: {
  band: string;
  roster: readonly RosterStation[];
  wishes: readonly RosterWish[];
  pairs: readonly MatrixPair[];
  wished: readonly WishedPair[];
}): MatrixView {
  const { band, pairs, wishes } = given;
  const bands = (list: readonly string[]) => list.includes(band);
  const stations = given.roster.filter(
    (station) => station.answer !== 'notComing' && bands(station.bands),
  );
  const met = new Map(pairs.map((pair) => [keyOf(pair.a, pair.b), pair]));
  const onBand = given.wished.filter((wish) => bands(wish.bands));
  const wished = new Map(onBand.map((wish) => [keyOf(wish.a, wish.b), wish]));
  const never = new Set(
    wishes
      .filter(({ kind }) => kind === 'never')
      .map(({ stationId, partnerId }) => keyOf(stationId, partnerId)),
  );
  return {
    stations,
    cell: (one, other) => {
      const key = keyOf(one, other);
      return {
        pair: met.get(key) ?? null,
        priority: wished.get(key)?.priority ?? null,
        never: never.has(key),
      };
    },
    wishes: onBand.length,
    unreachable: onBand.filter((wish) => !met.has(keyOf(wish.a, wish.b))),
  };
}

function keyOf(one: string, other: string): string {
  return one < other ? `${one} ${other}` : `${other} ${one}`;
}
