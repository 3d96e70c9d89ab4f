import { describe, expect, it } from 'vitest';
import { toDb } from '../../src/domain/link/decibel';
import {
  chainTemperatureK,
  noiseFigureDb,
  noiseTemperatureK,
  receiverFromYFactorK,
  stageSharesK,
  yFactorDb,
} from '../../src/domain/link/receiveChain';
import type { ReceiveStage } from '../../src/domain/station/setup';

const loss = (lossDb: number): ReceiveStage => ({ kind: 'loss', lossDb });
const amplifier = (noiseFigure: number, gainDb: number): ReceiveStage => ({
  kind: 'amplifier',
  noiseFigureDb: noiseFigure,
  gainDb,
});

/** Computed for the project in another language; none used to build. */
const CHAINS: { name: string; stages: ReceiveStage[]; figureDb: number; kelvin: number }[] = [
  {
    name: 'two-stage gain before the cable',
    stages: [loss(0.1), amplifier(0.3, 30), loss(4), amplifier(6, 0)],
    figureDb: 0.436,
    kelvin: 30.65,
  },
  {
    name: 'too little gain before the cable',
    stages: [loss(0.1), amplifier(0.35, 18), loss(4), amplifier(8, 0)],
    figureDb: 1.303,
    kelvin: 101.5,
  },
];

describe('Friis’ formula', () => {
  it.each(CHAINS)('$name: $figureDb dB, $kelvin K', ({ stages, figureDb, kelvin }) => {
    const found = chainTemperatureK(stages);
    expect(Math.abs(found - kelvin)).toBeLessThan(0.05);
    expect(Math.abs(noiseFigureDb(found) - figureDb)).toBeLessThan(0.001);
    expect(stageSharesK(stages).reduce((sum, share) => sum + share)).toBeCloseTo(found, 9);
  });

  /** 0.2 dB: read in the source; the others computed for the project. None used to build. */
  it.each([
    [0.2, 13.67],
    [0.5, 35.39],
    [1.0, 75.09],
    [3, 288.6],
  ])('a noise figure of %s dB is %s K', (figureDb, kelvin) => {
    expect(Math.abs(noiseTemperatureK(figureDb) - kelvin)).toBeLessThan(0.05);
  });
});

describe('Y factor from a 290 K load to cold sky of 15 K', () => {
  /** Computed for the project; none used to build. */
  it.each([
    [30, 8.52],
    [50, 7.19],
    [80, 5.9],
  ])('a receiver of %s K gives %s dB', (receiverK, yDb) => {
    expect(Math.abs(yFactorDb(290, 15, receiverK) - yDb)).toBeLessThan(0.006);
    expect(receiverFromYFactorK(yFactorDb(290, 15, receiverK), 290, 15)).toBeCloseTo(receiverK, 8);
  });

  /** 2.0 dB measured at 47 GHz (read in the source): with the cold sky of 52 K a receiver of 3 to 4 dB. */
  it('makes sense of the step measured at 47 GHz', () => {
    const figure = noiseFigureDb(receiverFromYFactorK(2.0, 290, 52));
    expect(figure).toBeGreaterThan(3);
    expect(figure).toBeLessThan(4);
  });
});

describe('thermal noise of 290 K', () => {
  const BOLTZMANN = 1.380649e-23;
  it('is −173.975 dBm/Hz and −139.996 dBm in 2500 Hz', () => {
    expect(toDb(BOLTZMANN * 290 * 1000)).toBeCloseTo(-173.975, 3);
    expect(toDb(BOLTZMANN * 290 * 1000 * 2500)).toBeCloseTo(-139.996, 3);
  });
});
