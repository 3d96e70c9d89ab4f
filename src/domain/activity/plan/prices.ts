import { rowFamilies, type RowFamily } from './families';
import type { PlanGrid } from './grid';
import type { DualBound } from './model';

/**
 * Prices for the hours of every station (Lagrange multipliers of the rows), found by the volume method of Barahona and
 * Anbil (Mathematical Programming 87, 2000). With any prices, what the wishes would be worth at them if each took its
 * best start, and what the hours cost, bound every plan from above; good prices bound it closely and say which
 * starts cannot be part of a better plan.
 */
export class Prices {
  readonly families: readonly RowFamily[];
  readonly #stride: number;
  readonly #pad: number;
  readonly #rows: number;
  /** Rows of all families, stations and steps; then one price per station for a contact. */
  readonly #best: Float64Array;
  readonly #tried: Float64Array;
  readonly #mean: Float64Array;
  readonly #use: Float64Array;
  /** Price of an hour by station, band and step. */
  readonly #cost: Float64Array;
  readonly #sums: Float64Array;
  readonly #chosen: Int32Array;
  readonly #contacts: Float64Array;
  #bestBound = Infinity;
  #started = false;
  #share = 0.1;
  #red = 0;
  #green = 0;
  /** Weight of the newest answer in the mean. */
  #newest = 0.1;

  constructor(readonly grid: PlanGrid) {
    this.families = rowFamilies(grid);
    const reach = Math.max(
      ...this.families.map(
        ({ offsets, length }) => length + Math.max(...offsets.map((offset) => Math.abs(offset)), 0),
      ),
    );
    this.#pad = reach;
    this.#stride = grid.steps + 2 * reach + 1;
    this.#rows = this.families.length * grid.stations * this.#stride;
    const length = this.#rows + grid.stations;
    this.#best = new Float64Array(length);
    this.#tried = new Float64Array(length);
    this.#mean = new Float64Array(length);
    this.#use = new Float64Array(length);
    this.#cost = new Float64Array(grid.stations * grid.bands.length * grid.steps);
    this.#sums = new Float64Array(this.#stride + 1);
    this.#chosen = new Int32Array(grid.wishes).fill(-1);
    this.#contacts = new Float64Array(grid.stations);
  }

  /** The least bound so far, in units. */
  get bound(): number {
    return this.#bestBound;
  }

  /** Betters the prices by so many rounds; `target`: value of the best plan known. Returns the bound. */
  improve(rounds: number, target: number): number {
    if (!this.#started) {
      this.#started = true;
      this.#bestBound = this.#evaluate(this.#best);
      this.#mean.set(this.#use);
    }
    for (let round = 0; round < rounds; round += 1) {
      if (this.#bestBound - target < 0.5) break;
      this.#step(target);
    }
    return this.#bestBound;
  }

  #step(target: number): void {
    const { grid } = this;
    const best = this.#best;
    const tried = this.#tried;
    const mean = this.#mean;
    const rows = this.#rows;
    let square = 0;
    for (let row = 0; row < rows; row += 1) {
      const slope = mean[row]!;
      if (slope < 0 || best[row]! > 0) square += slope * slope;
    }
    for (let row = rows; row < rows + grid.stations; row += 1) square += mean[row]! * mean[row]!;
    if (square < 1e-9) square = 1e-9;
    const step =
      (this.#share * Math.max(this.#bestBound - target, this.#bestBound * 1e-5)) / square;
    for (let row = 0; row < rows; row += 1) {
      const price = best[row]! - step * mean[row]!;
      tried[row] = price > 0 ? price : 0;
    }
    for (let row = rows; row < rows + grid.stations; row += 1) {
      tried[row] = best[row]! - step * mean[row]!;
    }
    const bound = this.#evaluate(tried);
    const use = this.#use;
    let along = 0;
    for (let row = 0; row < rows + grid.stations; row += 1) along += mean[row]! * use[row]!;
    const newest = this.#newest;
    for (let row = 0; row < rows + grid.stations; row += 1) {
      mean[row] = newest * use[row]! + (1 - newest) * mean[row]!;
    }
    if (bound < this.#bestBound) {
      const gain = this.#bestBound - bound;
      this.#bestBound = bound;
      best.set(tried);
      this.#red = 0;
      if (along > 0) {
        this.#green += 1;
        if (this.#green >= 2) {
          this.#share = Math.min(this.#share * 1.1, 1.9);
          this.#green = 0;
        }
      }
      if (gain < 1e-4 * this.#bestBound && this.#newest > 0.005) this.#slow += 1;
    } else {
      this.#green = 0;
      this.#red += 1;
      if (this.#red >= 12) {
        this.#share = Math.max(this.#share * 0.66, 1e-3);
        this.#red = 0;
        this.#slow += 4;
      }
    }
    if (this.#slow > 60) {
      this.#slow = 0;
      this.#newest = Math.max(this.#newest / 1.5, 0.005);
    }
  }
  #slow = 0;

  /** Bound at the prices; leaves what is free of each row (negative: asked too often) in `#use`. */
  #evaluate(prices: Float64Array): number {
    const { grid } = this;
    this.#costs(prices);
    let bound = this.#hours(prices);
    const use = this.#use;
    for (let wish = 0; wish < grid.wishes; wish += 1) {
      let best = grid.pinned[wish]! >= 0 ? -Infinity : 0;
      let option = -1;
      for (let at = grid.firsts[wish]!; at < grid.firsts[wish + 1]!; at += 1) {
        const value = grid.optionValue[at]! - this.#costOf(at);
        if (value > best) {
          best = value;
          option = at;
        }
      }
      this.#chosen[wish] = option;
      if (option < 0) continue;
      bound += best;
      this.#take(grid.wishA[wish]!, option, use);
      this.#take(grid.wishB[wish]!, option, use);
    }
    return bound;
  }

  /** The part of the bound that is the stations' own, and their rows as they are while nobody takes anything. */
  #hours(prices: Float64Array): number {
    const { grid, families } = this;
    const use = this.#use;
    let bound = 0;
    families.forEach(({ capacity }, family) => {
      const from = family * grid.stations * this.#stride;
      const to = from + grid.stations * this.#stride;
      let sum = 0;
      for (let row = from; row < to; row += 1) sum += prices[row]!;
      bound += capacity * sum;
      use.fill(capacity, from, to);
    });
    for (let station = 0; station < grid.stations; station += 1) {
      const price = prices[this.#rows + station]!;
      let most = 0;
      let contacts = 0;
      for (let n = 1; n <= grid.most[station]!; n += 1) {
        const value = grid.gain[n]! + price * n;
        if (value > most) {
          most = value;
          contacts = n;
        }
      }
      bound += most;
      this.#contacts[station] = contacts;
      use[this.#rows + station] = contacts;
    }
    return bound;
  }

  #take(station: number, option: number, use: Float64Array): void {
    const { grid, families } = this;
    const band = grid.optionBand[option]!;
    const step = grid.optionStep[option]! + this.#pad;
    for (let family = 0; family < families.length; family += 1) {
      const { offsets, length } = families[family]!;
      const base = (family * grid.stations + station) * this.#stride;
      const last = step - offsets[band]!;
      for (let p = last - length + 1; p <= last; p += 1) use[base + p] = use[base + p]! - 1;
    }
    use[this.#rows + station] = use[this.#rows + station]! - 1;
  }

  #costOf(option: number): number {
    const { grid } = this;
    const wish = grid.optionWish[option]!;
    const bands = grid.bands.length;
    const band = grid.optionBand[option]!;
    const step = grid.optionStep[option]!;
    return (
      this.#cost[(grid.wishA[wish]! * bands + band) * grid.steps + step]! +
      this.#cost[(grid.wishB[wish]! * bands + band) * grid.steps + step]!
    );
  }

  #costs(prices: Float64Array): void {
    const { grid, families } = this;
    const bands = grid.bands.length;
    const cost = this.#cost;
    const sums = this.#sums;
    const stride = this.#stride;
    for (let station = 0; station < grid.stations; station += 1) {
      const own = prices[this.#rows + station]!;
      cost.fill(own, station * bands * grid.steps, (station + 1) * bands * grid.steps);
      for (let family = 0; family < families.length; family += 1) {
        const { offsets, length } = families[family]!;
        const base = (family * grid.stations + station) * stride;
        let sum = 0;
        for (let p = 0; p < stride; p += 1) {
          sum += prices[base + p]!;
          sums[p + 1] = sum;
        }
        if (sum === 0) continue;
        for (let band = 0; band < bands; band += 1) {
          const at = (station * bands + band) * grid.steps;
          const shift = this.#pad - offsets[band]! + 1;
          for (let step = 0; step < grid.steps; step += 1) {
            cost[at + step] = cost[at + step]! + sums[step + shift]! - sums[step + shift - length]!;
          }
        }
      }
    }
  }

  /** What the best prices prove. */
  proof(): DualBound {
    const { grid } = this;
    this.#costs(this.#best);
    const loss = new Float64Array(grid.optionWish.length);
    for (let wish = 0; wish < grid.wishes; wish += 1) {
      let best = 0;
      for (let at = grid.firsts[wish]!; at < grid.firsts[wish + 1]!; at += 1) {
        loss[at] = grid.optionValue[at]! - this.#costOf(at);
        best = Math.max(best, loss[at]!);
      }
      for (let at = grid.firsts[wish]!; at < grid.firsts[wish + 1]!; at += 1) {
        loss[at] = best - loss[at]!;
      }
    }
    return { bound: this.#bestBound, loss };
  }
}
