import { linearLossDb } from './polarization';

/**
 * Everything the chance of a contact is tuned by. To calibrate it, compare the predicted chances with logged results
 * and change these figures, nothing else.
 */
export interface ChanceParameters {
  /** Standard deviation of the budget against reality, dB; the same error for both directions. */
  modelErrorDb: number;
  /** Messages that must be read in each direction: call signs and report, then acknowledgement. */
  messagesEachWay: number;
  /** Length of the slot, minutes. */
  slotMinutes: number;
}

export const CHANCE_PARAMETERS: ChanceParameters = {
  modelErrorDb: 2,
  messagesEachWay: 2,
  slotMinutes: 30,
};

/** T/R periods of both stations together that fit into the slot. */
export function periodsInSlot(slotMinutes: number, periodS: number): number {
  return Math.floor((slotMinutes * 60) / periodS + 1e-9);
}

/**
 * Probability that one period is read, 0 … 1: under Rayleigh fading the power of a period is exponentially
 * distributed about its mean, so P(power > threshold) = exp(−10^(−margin/10)); 0.37 at a margin of 0 dB.
 */
export function periodProbability(marginDb: number): number {
  return Math.exp(-Math.exp(-marginDb * (Math.LN10 / 10)));
}

/** Probability that at least `needed` of `tries` periods are read. */
export function directionProbability(p: number, tries: number, needed: number): number {
  if (tries < needed) return 0;
  let missing = 0;
  for (let read = 0; read < needed; read += 1) {
    missing += binomial(tries, read) * p ** read * (1 - p) ** (tries - read);
  }
  return Math.min(Math.max(1 - missing, 0), 1);
}

function binomial(n: number, k: number): number {
  let value = 1;
  for (let i = 1; i <= k; i += 1) value = (value * (n - k + i)) / i;
  return value;
}

/**
 * Probability that a whole contact fits into `periods` alternating periods, 0 … 1, when single periods are read with
 * `p` one way and `q` the other. Messages go in turn, each repeated until read: with G tries for each of 2m messages
 * the contact takes 2ΣG − 2m periods, so ΣG ≤ (periods + 2m)/2.
 */
export function contactProbability(
  p: number,
  q: number,
  periods: number,
  messagesEachWay: number,
): number {
  const m = messagesEachWay;
  const triesInAll = Math.floor((periods + 2 * m) / 2);
  if (triesInAll < 2 * m || p <= 0 || q <= 0) return 0;
  let total = 0;
  let there = p ** m;
  let back = q ** m;
  let backWithin = 0;
  const backTerms: number[] = [];
  for (let tries = m; tries <= triesInAll - m; tries += 1) {
    backWithin += back;
    backTerms.push(backWithin);
    back *= ((1 - q) * tries) / (tries - m + 1);
  }
  for (let tries = m; tries <= triesInAll - m; tries += 1) {
    total += there * backTerms[triesInAll - m - tries]!;
    there *= ((1 - p) * tries) / (tries - m + 1);
  }
  return Math.min(total, 1);
}

const LOWEST_DB = -20;
const HIGHEST_DB = 30;
const STEP_DB = 0.5;
const SIZE = (HIGHEST_DB - LOWEST_DB) / STEP_DB + 1;
const ANGLES = 30;

/**
 * Chances from margins, quick: tables in steps of 0.5 dB with the model error averaged in, read bilinearly (within
 * 0.003 of the sums they stand for).
 */
export class ChanceModel {
  readonly periods: number;
  readonly #contact = new Float64Array(SIZE * SIZE);
  readonly #direction = new Float64Array(SIZE);
  readonly #directionAtUnknownAngle = new Float64Array(SIZE);

  constructor(periodS: number, parameters: ChanceParameters = CHANCE_PARAMETERS) {
    const { slotMinutes, messagesEachWay, modelErrorDb } = parameters;
    this.periods = periodsInSlot(slotMinutes, periodS);
    const read = Array.from({ length: SIZE }, (_, i) => periodProbability(LOWEST_DB + i * STEP_DB));
    const sharp = new Float64Array(SIZE * SIZE);
    for (let i = 0; i < SIZE; i += 1) {
      for (let j = 0; j < SIZE; j += 1) {
        sharp[i * SIZE + j] = contactProbability(read[i]!, read[j]!, this.periods, messagesEachWay);
      }
    }
    const tries = Math.floor(this.periods / 2);
    const single = read.map((p) => directionProbability(p, tries, messagesEachWay));
    const clamp = (index: number) => Math.min(Math.max(index, 0), SIZE - 1);
    for (const { steps, weight } of normalWeights(modelErrorDb)) {
      for (let i = 0; i < SIZE; i += 1) {
        const row = clamp(i + steps) * SIZE;
        this.#direction[i] = this.#direction[i]! + weight * single[clamp(i + steps)]!;
        for (let j = 0; j < SIZE; j += 1) {
          const at = i * SIZE + j;
          this.#contact[at] = this.#contact[at]! + weight * sharp[row + clamp(j + steps)]!;
        }
      }
    }
    for (let i = 0; i < SIZE; i += 1) {
      let sum = 0;
      for (let k = 0; k < ANGLES; k += 1) {
        sum += between(this.#direction, LOWEST_DB + i * STEP_DB - linearLossDb((k * 180) / ANGLES));
      }
      this.#directionAtUnknownAngle[i] = sum / ANGLES;
    }
  }

  /** Chance that one direction's messages are read within the slot. */
  direction(marginDb: number): number {
    return between(this.#direction, marginDb);
  }

  /** Chance of the whole contact within the slot. */
  contact(marginThereDb: number, marginBackDb: number): number {
    const x = position(marginThereDb);
    const y = position(marginBackDb);
    const i = Math.min(Math.floor(x), SIZE - 2);
    const j = Math.min(Math.floor(y), SIZE - 2);
    const at = i * SIZE + j;
    const table = this.#contact;
    const low = table[at]! + (y - j) * (table[at + 1]! - table[at]!);
    const high = table[at + SIZE]! + (y - j) * (table[at + SIZE + 1]! - table[at + SIZE]!);
    return low + (x - i) * (high - low);
  }

  /** `direction` for a linear feed at an unknown angle; the margin is that of aligned feeds. */
  directionAtUnknownAngle(alignedMarginDb: number): number {
    return between(this.#directionAtUnknownAngle, alignedMarginDb);
  }

  /**
   * `contact` for linear feeds below 500 MHz: the Faraday angle is unknown but the same both ways and adds to the
   * geometric offset in one direction and takes from it in the other. A direction that is not `unknown` keeps its
   * margin at every angle. Margins are those of aligned feeds where the angle is unknown.
   */
  contactAtUnknownAngle(
    thereDb: number,
    thereUnknown: boolean,
    backDb: number,
    backUnknown: boolean,
    offsetDeg: number,
  ): number {
    const offset = Math.round(offsetDeg * FINE) % FINE_SIZE;
    let sum = 0;
    for (let angle = 0; angle < FINE_SIZE; angle += FINE_SIZE / ANGLES) {
      const plus = (angle + offset + FINE_SIZE) % FINE_SIZE;
      const minus = (angle - offset + FINE_SIZE) % FINE_SIZE;
      const there = thereUnknown ? thereDb - FINE_LOSS_DB[plus]! : thereDb;
      const back = backUnknown ? backDb - FINE_LOSS_DB[minus]! : backDb;
      sum += this.contact(there, back);
    }
    return sum / ANGLES;
  }
}

function between(table: Float64Array, marginDb: number): number {
  const x = position(marginDb);
  const i = Math.min(Math.floor(x), SIZE - 2);
  return table[i]! + (x - i) * (table[i + 1]! - table[i]!);
}

function position(marginDb: number): number {
  const x = (marginDb - LOWEST_DB) / STEP_DB;
  return x > 0 ? Math.min(x, SIZE - 1) : 0;
}

/** Steps of the table and their share in a normal distribution, out to 3 σ. */
function normalWeights(sigmaDb: number): { steps: number; weight: number }[] {
  if (sigmaDb <= 0) return [{ steps: 0, weight: 1 }];
  const reach = Math.ceil((3 * sigmaDb) / STEP_DB);
  const weights: { steps: number; weight: number }[] = [];
  let sum = 0;
  for (let steps = -reach; steps <= reach; steps += 1) {
    const weight = Math.exp(-0.5 * ((steps * STEP_DB) / sigmaDb) ** 2);
    weights.push({ steps, weight });
    sum += weight;
  }
  return weights.map(({ steps, weight }) => ({ steps, weight: weight / sum }));
}

const FINE = 4;
const FINE_SIZE = 180 * FINE;

/** `linearLossDb` at every quarter of a degree from 0 to 180. */
const FINE_LOSS_DB = Float64Array.from({ length: FINE_SIZE }, (_, k) => linearLossDb(k / FINE));
