import type { PlanGrid } from './grid';

/** A plan in the making: which option each wish has, and what stands at each station at each step. */
export class Board {
  /** Option of each wish, −1: none. */
  readonly chosen: Int32Array;
  /** Contacts of each station. */
  readonly count: Int32Array;
  /** By station and first step of the slot: wish + 1, 0: nothing begins there. */
  readonly #begins: Int32Array;
  readonly #stride: number;
  /** Steps of margin on both sides, so that no look leaves the array. */
  readonly #pad: number;
  #value = 0;

  constructor(readonly grid: PlanGrid) {
    this.chosen = new Int32Array(grid.wishes).fill(-1);
    this.count = new Int32Array(grid.stations);
    this.#pad = grid.slot + Math.max(grid.change, grid.pause);
    this.#stride = grid.steps + 2 * this.#pad;
    this.#begins = new Int32Array(grid.stations * this.#stride);
  }

  /** Sum of option values and station gains, in units. */
  get value(): number {
    return this.#value;
  }

  /** Puts the pinned options on an empty board. */
  pin(): void {
    for (const option of this.grid.pinned) if (option >= 0) this.place(option);
  }

  place(option: number): void {
    const { grid } = this;
    const wish = grid.optionWish[option]!;
    this.chosen[wish] = option;
    this.#value += grid.optionValue[option]!;
    this.#mark(grid.wishA[wish]!, option, wish + 1, 1);
    this.#mark(grid.wishB[wish]!, option, wish + 1, 1);
  }

  remove(wish: number): void {
    const { grid } = this;
    const option = this.chosen[wish]!;
    this.chosen[wish] = -1;
    this.#value -= grid.optionValue[option]!;
    this.#mark(grid.wishA[wish]!, option, 0, -1);
    this.#mark(grid.wishB[wish]!, option, 0, -1);
  }

  #mark(station: number, option: number, mark: number, by: 1 | -1): void {
    const { grid } = this;
    this.#begins[station * this.#stride + this.#pad + grid.optionStep[option]!] = mark;
    const before = this.count[station]!;
    this.count[station] = before + by;
    this.#value += grid.gain[before + by]! - grid.gain[before]!;
  }

  /** Whether the option of a wish that is not placed can be put down as things stand. */
  fits(option: number): boolean {
    const { grid } = this;
    const wish = grid.optionWish[option]!;
    return this.#fitsAt(grid.wishA[wish]!, option) && this.#fitsAt(grid.wishB[wish]!, option);
  }

  #fitsAt(station: number, option: number): boolean {
    const { grid } = this;
    if (this.count[station]! >= grid.most[station]!) return false;
    return this.#clear(station, option) && this.rests(station, option);
  }

  #clear(station: number, option: number): boolean {
    const { grid } = this;
    const at = station * this.#stride + this.#pad + grid.optionStep[option]!;
    const begins = this.#begins;
    const reach = grid.slot + grid.change;
    for (let step = at - reach + 1; step < at + reach; step += 1) {
      const mark = begins[step]!;
      if (mark === 0) continue;
      if (Math.abs(step - at) < grid.slot) return false;
      if (grid.optionBand[this.chosen[mark - 1]!] !== grid.optionBand[option]) return false;
    }
    return true;
  }

  /** Adds the wishes that stand against the option at the station to `out` from `from` on; returns how many there are then. */
  against(station: number, option: number, out: Int32Array, from: number): number {
    const { grid } = this;
    const at = station * this.#stride + this.#pad + grid.optionStep[option]!;
    const begins = this.#begins;
    const reach = grid.slot + grid.change;
    let found = from;
    for (let step = at - reach + 1; step < at + reach; step += 1) {
      const mark = begins[step]!;
      if (mark === 0) continue;
      if (
        Math.abs(step - at) >= grid.slot &&
        grid.optionBand[this.chosen[mark - 1]!] === grid.optionBand[option]
      ) {
        continue;
      }
      out[found] = mark - 1;
      found += 1;
    }
    return found;
  }

  /** Whether the run of contacts that the option would be part of is no longer than allowed. */
  rests(station: number, option: number): boolean {
    const { inARow } = this.grid;
    return inARow === 0 || this.run(station, this.grid.optionStep[option]!) <= inARow;
  }

  /** How many contacts follow each other without a pause at the station with one (there or not) at the step. */
  run(station: number, step: number): number {
    const at = station * this.#stride + this.#pad + step;
    return 1 + this.#runOn(at, 1) + this.#runOn(at, -1);
  }

  #runOn(from: number, way: 1 | -1): number {
    const { slot, pause } = this.grid;
    const begins = this.#begins;
    let at = from;
    let found = 0;
    for (let apart = slot; apart < slot + pause; apart += 1) {
      const next = at + way * apart;
      if (next < 0 || next >= begins.length) break;
      if (begins[next] === 0) continue;
      found += 1;
      at = next;
      apart = slot - 1;
    }
    return found;
  }

  /** The wish whose slot begins at the station at the step, or −1. */
  wishAt(station: number, step: number): number {
    return this.#begins[station * this.#stride + this.#pad + step]! - 1;
  }

  /** Takes over another state of the same grid. */
  load(chosen: Int32Array): void {
    for (let wish = 0; wish < chosen.length; wish += 1) {
      if (this.chosen[wish]! >= 0 && this.chosen[wish] !== chosen[wish]) this.remove(wish);
    }
    for (let wish = 0; wish < chosen.length; wish += 1) {
      if (chosen[wish]! >= 0 && this.chosen[wish] !== chosen[wish]) this.place(chosen[wish]!);
    }
  }
}
