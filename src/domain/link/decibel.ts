/** 10 log10 of a ratio of powers; −Infinity for 0. */
export function toDb(ratio: number): number {
  return 10 * Math.log10(ratio);
}

const NEPER_PER_DB = Math.LN10 / 10;

export function fromDb(db: number): number {
  return Math.exp(db * NEPER_PER_DB);
}
