import type { PlanGrid } from './grid';

/**
 * One kind of row, the same for every station and every step p: of the slots whose band is b and whose start lies in
 * p + offset[b] … p + offset[b] + length − 1, at most `capacity` stand in a plan.
 */
export interface RowFamily {
  readonly offsets: readonly number[];
  readonly length: number;
  readonly capacity: number;
}

/**
 * The rows that every plan obeys. Cliques: any two of their slots stand against each other, on one band because they
 * overlap, on two because the band could not be changed between; together they forbid every such pair. Rest: so many
 * slots so close together leave no pause (see `restCut` for those that are not so close).
 */
export function rowFamilies(grid: PlanGrid): RowFamily[] {
  const { slot, change, inARow, pause } = grid;
  const bands = grid.bands.length;
  const families: RowFamily[] = [
    { offsets: new Array<number>(bands).fill(0), length: slot, capacity: 1 },
  ];
  if (bands > 1) {
    for (const shift of shifts(change, slot)) {
      // With two bands, one shifted against the other is the other shifted back.
      for (let band = 0; band < (bands === 2 ? 1 : bands); band += 1) {
        for (const offset of [shift, -shift]) {
          const offsets = new Array<number>(bands).fill(0);
          offsets[band] = offset;
          families.push({ offsets, length: slot, capacity: 1 });
        }
      }
    }
  }
  if (inARow > 0) {
    families.push({
      offsets: new Array<number>(bands).fill(0),
      length: inARow * slot + pause,
      capacity: inARow,
    });
  }
  return families;
}

/** 1 … change in steps no longer than a slot, the last of them `change`. */
function shifts(change: number, slot: number): number[] {
  const found: number[] = [];
  for (let shift = change; shift > 0; shift -= slot) found.push(shift);
  return found;
}
