/** Always the same numbers for the same seed, whatever the machine: xorshift on 32 bits. */
export class Numbers {
  #state: number;

  constructor(seed: number) {
    this.#state = (Math.imul(seed | 0, 0x9e3779b1) ^ 0x2545f491) | 0 || 1;
    for (let warm = 0; warm < 8; warm += 1) this.word();
  }

  /** 32 bits. */
  word(): number {
    let x = this.#state;
    x ^= x << 13;
    x ^= x >>> 17;
    x ^= x << 5;
    this.#state = x;
    return x >>> 0;
  }

  /** 0 … below `count`. */
  below(count: number): number {
    return Math.floor((this.word() / 4_294_967_296) * count);
  }

  /** 0 … below 1. */
  share(): number {
    return this.word() / 4_294_967_296;
  }
}
