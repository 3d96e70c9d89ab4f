/** A smooth three-dimensional path kept at even steps and read by the cubic through four neighbours. */
export class SteppedPath {
  readonly #startMs: number;
  readonly #perMs: number;
  readonly #lastInterval: number;
  readonly #values: Float64Array;

  /** Asks `write` once for every step from `fromMs` to at least `toMs`. */
  constructor(
    fromMs: number,
    toMs: number,
    stepMs: number,
    write: (timeMs: number, out: Float64Array, at: number) => void,
  ) {
    const steps = Math.max(3, Math.ceil((toMs - fromMs) / stepMs));
    this.#startMs = fromMs;
    this.#perMs = 1 / stepMs;
    this.#lastInterval = steps - 2;
    this.#values = new Float64Array((steps + 1) * 3);
    for (let step = 0; step <= steps; step += 1) {
      write(fromMs + step * stepMs, this.#values, step * 3);
    }
  }

  /** Writes x, y, z at a time into `out` at `at`. Good from the second step to the last but one. */
  evaluate(timeMs: number, out: Float64Array, at: number): void {
    const values = this.#values;
    const position = (timeMs - this.#startMs) * this.#perMs;
    const interval = Math.min(Math.max(Math.floor(position), 1), this.#lastInterval);
    const t = position - interval;
    const before = (-t * (t - 1) * (t - 2)) / 6;
    const here = ((t + 1) * (t - 1) * (t - 2)) / 2;
    const next = (-(t + 1) * t * (t - 2)) / 2;
    const after = ((t + 1) * t * (t - 1)) / 6;
    const k = interval * 3;
    out[at] =
      before * values[k - 3]! + here * values[k]! + next * values[k + 3]! + after * values[k + 6]!;
    out[at + 1] =
      before * values[k - 2]! +
      here * values[k + 1]! +
      next * values[k + 4]! +
      after * values[k + 7]!;
    out[at + 2] =
      before * values[k - 1]! +
      here * values[k + 2]! +
      next * values[k + 5]! +
      after * values[k + 8]!;
  }
}
