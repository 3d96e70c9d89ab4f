import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  CHANCE_PARAMETERS,
  ChanceModel,
  contactProbability,
  directionProbability,
  periodProbability,
  periodsInSlot,
} from '~/domain/link/chance';
import { linearLossDb } from '~/domain/link/polarization';

/** Small deterministic generator, so that a failure can be repeated. */
function generator(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 1_664_525 + 1_013_904_223) % 2 ** 32;
    return state / 2 ** 32;
  };
}

function normal(random: () => number): number {
  return Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
}

/** Plays contacts period by period: messages in turn, each repeated until it is read. */
function playedShare(
  periods: number,
  draws: number,
  marginsDb: (random: () => number) => [there: number, back: number],
): number {
  const random = generator(20_260_901);
  let completed = 0;
  for (let draw = 0; draw < draws; draw += 1) {
    const [there, back] = marginsDb(random);
    let step = 0;
    for (let period = 0; period < periods && step < 4; period += 1) {
      if (period % 2 !== step % 2) continue;
      const powerDb = 10 * Math.log10(-Math.log(1 - random()));
      if ((step % 2 === 0 ? there : back) + powerDb > 0) step += 1;
    }
    if (step === 4) completed += 1;
  }
  return completed / draws;
}

/** Three standard errors of 20 000 draws and the table's interpolation. */
const PLAYED = 0.015;

describe('the chance of a contact', () => {
  it.each([
    [10, 10, 30],
    [0, 0, 30],
    [-3, 1, 30],
    [-5, -5, 12],
    [3, -2, 6],
  ])('is what playing it gives: margins %s and %s dB, %s periods', (there, back, periods) => {
    const model = new ChanceModel(1800 / periods);
    expect(model.periods).toBe(periods);
    const played = playedShare(periods, 20_000, (random) => {
      const error = CHANCE_PARAMETERS.modelErrorDb * normal(random);
      return [there + error, back + error];
    });
    expect(Math.abs(model.contact(there, back) - played)).toBeLessThan(PLAYED);
  });

  it.each([
    [5, 5, 0],
    [5, 5, 45],
    [2, 4, 60],
  ])('also at an unknown Faraday angle: %s and %s dB, offset %s°', (there, back, offsetDeg) => {
    const model = new ChanceModel(60);
    const played = playedShare(30, 20_000, (random) => {
      const error = CHANCE_PARAMETERS.modelErrorDb * normal(random);
      const angle = 180 * random();
      return [
        there + error - linearLossDb(angle + offsetDeg),
        back + error - linearLossDb(angle - offsetDeg),
      ];
    });
    const found = model.contactAtUnknownAngle(there, true, back, true, offsetDeg);
    expect(Math.abs(found - played)).toBeLessThan(PLAYED);
  });

  it('is worse at an offset of 45°, where one direction is crossed when the other is aligned', () => {
    const model = new ChanceModel(60);
    const at = (offset: number) => model.contactAtUnknownAngle(4, true, 4, true, offset);
    expect(at(45)).toBeLessThan(at(0));
    expect(at(90)).toBeCloseTo(at(0), 2);
  });

  it('grows with margins and periods and stays between 0 and 1', () => {
    const margin = fc.double({ min: -40, max: 60, noNaN: true });
    const models = [30, 60, 120, 300].map((period) => new ChanceModel(period));
    fc.assert(
      fc.property(
        margin,
        margin,
        fc.double({ min: 0, max: 20, noNaN: true }),
        (there, back, more) => {
          let fewer = 1;
          for (const model of models) {
            const chance = model.contact(there, back);
            expect(chance).toBeGreaterThanOrEqual(0);
            expect(chance).toBeLessThanOrEqual(fewer + 1e-9);
            expect(model.contact(there + more, back)).toBeGreaterThanOrEqual(chance - 1e-9);
            expect(model.contact(there, back + more)).toBeGreaterThanOrEqual(chance - 1e-9);
            expect(model.direction(there)).toBeGreaterThanOrEqual(chance - 0.02);
            fewer = chance;
          }
        },
      ),
    );
  });
});

describe('its parts', () => {
  it('one period at a margin of 0 dB is read with 1/e', () => {
    expect(periodProbability(0)).toBeCloseTo(Math.exp(-1), 12);
    expect(periodProbability(30)).toBeGreaterThan(0.998);
    expect(periodProbability(-20)).toBeLessThan(1e-40);
  });

  it('two of n periods', () => {
    expect(directionProbability(0.5, 2, 2)).toBeCloseTo(0.25, 12);
    expect(directionProbability(0.5, 3, 2)).toBeCloseTo(0.5, 12);
    expect(directionProbability(1, 15, 2)).toBe(1);
    expect(directionProbability(0.9, 1, 2)).toBe(0);
  });

  it('a contact needs four periods at least', () => {
    expect(contactProbability(1, 1, 4, 2)).toBe(1);
    expect(contactProbability(1, 1, 3, 2)).toBe(0);
    expect(contactProbability(0.5, 0.5, 4, 2)).toBeCloseTo(1 / 16, 12);
    expect(contactProbability(0, 1, 100, 2)).toBe(0);
  });

  it('counts whole periods', () => {
    expect(periodsInSlot(30, 60)).toBe(30);
    expect(periodsInSlot(30, 150)).toBe(12);
    expect(periodsInSlot(4, 150)).toBe(1);
  });
});
