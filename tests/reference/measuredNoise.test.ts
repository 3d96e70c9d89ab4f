import { describe, expect, it } from 'vitest';
import { antennaFigures, dishBeamwidthDeg, dishGainDbi } from '../../src/domain/link/antenna';
import { chainHints } from '../../src/domain/link/chainHints';
import { chainReport, coldSkyK } from '../../src/domain/link/chainReport';
import { toDb } from '../../src/domain/link/decibel';
import {
  noiseFigures,
  systemKForTenthDb,
  systemOutOfRange,
  type NoiseMeasurement,
} from '../../src/domain/link/measuredNoise';
import { solarFluxSfu, sunOnAxisK } from '../../src/domain/link/sun';
import type { ReceiveStage } from '../../src/domain/station/setup';

const hotCold = (yDb: number, hotK = 290, coldK = 15): NoiseMeasurement => ({
  method: 'hotCold',
  yDb,
  hotK,
  coldK,
});

describe('hot load and cold sky of 15 K', () => {
  /** Y = (290 + T_rx)/(T_cold + T_rx), computed for the project in another language; not used to build. */
  it.each([
    [8.52, 30],
    [7.19, 50],
    [5.9, 80],
  ])('a step of %s dB is a receiver of %s K', (yDb, receiverK) => {
    const figures = noiseFigures(hotCold(yDb), 1296);
    expect(Math.abs(figures.receiverTemperatureK! / receiverK - 1)).toBeLessThan(0.005);
    expect(figures.systemTemperatureK).toBeCloseTo(figures.receiverTemperatureK! + 15, 9);
    expect(figures.gainOverTemperatureDb).toBeNull();
  });

  it('knows the noise figure: 50 K is 0.69 dB', () => {
    const exact = toDb((290 + 50) / (15 + 50));
    expect(noiseFigures(hotCold(exact), 1296).noiseFigureDb).toBeCloseTo(toDb(1 + 50 / 290), 9);
  });

  it('refuses a step beyond that of a receiver without noise, 12.86 dB, and takes one just under it', () => {
    expect(() => noiseFigures(hotCold(12.87), 1296)).toThrow(/step of only 12\.86 dB/);
    expect(noiseFigures(hotCold(12.86), 1296).receiverTemperatureK).toBeGreaterThanOrEqual(0);
  });

  it.each([
    [hotCold(0), /more than 0 dB/],
    [hotCold(-3), /more than 0 dB/],
    [hotCold(5, 15, 15), /colder than the hot load/],
    [hotCold(5, 15, 290), /colder than the hot load/],
  ])('refuses %j', (measurement, sentence) => {
    expect(() => noiseFigures(measurement, 1296)).toThrow(sentence);
  });

  it('says how much 0.1 dB matters: by the step put in 0.1 dB smaller', () => {
    const wrong = noiseFigures(hotCold(7.09), 1296).systemTemperatureK;
    const right = noiseFigures(hotCold(7.19), 1296).systemTemperatureK;
    expect(systemKForTenthDb(hotCold(7.19), 1296)).toBeCloseTo(wrong - right, 9);
    expect(systemKForTenthDb(hotCold(0.1), 1296)).toBe(Infinity);
  });
});

describe('the Sun in a 3 m dish at 1296 MHz', () => {
  const antenna = {
    gainDbi: dishGainDbi(3, 0.55, 1296),
    beamwidthDeg: dishBeamwidthDeg(3, 1296),
  };
  const sun = (yDb: number, fluxSfu: number, fluxAt: '10cm' | 'band'): NoiseMeasurement => ({
    method: 'sun',
    yDb,
    fluxSfu,
    fluxAt,
    ...antenna,
  });

  /** Worked budget, computed for the project in another language: 61.9 K, G/T 11.68 dB/K; not used to build. */
  it.each([
    [11.96, 65],
    [14.77, 128],
  ])('a step of %s dB at %s SFU is a system of 61.9 K', (yDb, sfu) => {
    const figures = noiseFigures(sun(yDb, sfu, 'band'), 1296);
    expect(Math.abs(figures.systemTemperatureK - 61.9)).toBeLessThan(0.3);
    expect(Math.abs(figures.gainOverTemperatureDb! - 11.68)).toBeLessThan(0.03);
    expect(figures.receiverTemperatureK).toBeNull();
  });

  it('gives back the system behind the step that the Sun’s model makes, for wide and narrow beams', () => {
    for (const [diameterM, mhz] of [
      [3, 1296],
      [3, 10_368],
      [9, 10_368],
    ] as const) {
      const figures = antennaFigures({ kind: 'dish', diameterM, apertureEfficiency: 0.5 }, mhz);
      const yDb = toDb(1 + sunOnAxisK(figures, mhz, solarFluxSfu(mhz, 140)) / 77);
      const found = noiseFigures(
        { method: 'sun', yDb, fluxSfu: 140, fluxAt: '10cm', ...figures },
        mhz,
      );
      expect(found.systemTemperatureK).toBeCloseTo(77, 6);
    }
  });

  it('carries the 10.7 cm flux to the band: 72 SFU there are about 50 at 1296 MHz', () => {
    const carried = noiseFigures(sun(11, 72.2, '10cm'), 1296);
    const there = noiseFigures(sun(11, solarFluxSfu(1296, 72.2), 'band'), 1296);
    expect(carried).toEqual(there);
    expect(solarFluxSfu(1296, 72.2)).toBeGreaterThan(45);
    expect(solarFluxSfu(1296, 72.2)).toBeLessThan(55);
  });

  it('names the gain when the system comes out impossible', () => {
    const measurement = sun(35, 65, 'band');
    expect(systemOutOfRange(measurement, noiseFigures(measurement, 1296))).toMatch(
      /outside 3 to 30.000 K\. That is with the antenna’s gain of 29\.6 dBi/,
    );
    const good = sun(11.96, 65, 'band');
    expect(systemOutOfRange(good, noiseFigures(good, 1296))).toBeNull();
  });
});

const loss = (lossDb: number, name?: string): ReceiveStage => ({ kind: 'loss', lossDb, name });
const amplifier = (noiseFigureDb: number, gainDb: number): ReceiveStage => ({
  kind: 'amplifier',
  noiseFigureDb,
  gainDb,
});

/** Computed for the project in another language: 30.65 K and 101.5 K; not used to build. */
const BURIED = [loss(0.1), amplifier(0.3, 30), loss(4, 'Cable'), amplifier(6, 0)];
const UNBURIED = [loss(0.1), amplifier(0.35, 18), loss(4, 'Cable'), amplifier(8, 0)];

describe('a chain’s report', () => {
  it('adds up: shares to one, temperatures to the system', () => {
    const report = chainReport(UNBURIED, 7, 14);
    const parts = [report.sky, report.ground, ...report.stages];
    expect(parts.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(1, 12);
    expect(parts.reduce((sum, { kelvin }) => sum + kelvin, 0)).toBeCloseTo(report.systemK, 9);
    expect(Math.abs(report.systemK - (101.5 + 21))).toBeLessThan(0.05);
    expect(Math.abs(report.noiseFigureDb - 1.303)).toBeLessThan(0.001);
  });

  /** Sky of about 3.3 K through the air, and the air’s own 3.9 K at 30° (ITU-R P.676-12); not used to build. */
  it('has a cold sky of about 7 K at 1296 MHz', () => {
    const skyK = coldSkyK({ kind: 'dish', diameterM: 3, apertureEfficiency: 0.55 }, 1296);
    expect(skyK).toBeGreaterThan(6.5);
    expect(skyK).toBeLessThan(8);
  });
});

describe('hints', () => {
  it('a second amplifier buries what follows, by as much as the changed chain is colder', () => {
    const hint = chainHints(UNBURIED, 21)[0]!;
    expect(hint.words).toMatch(/^Another amplifier of 18 dB .* behind stage 2 would bury stage 4$/);
    const changed = chainReport(
      [...UNBURIED.slice(0, 2), amplifier(0.5, 18), ...UNBURIED.slice(2)],
      0,
      21,
    );
    expect(hint.savedK).toBeCloseTo(chainReport(UNBURIED, 0, 21).systemK - changed.systemK, 9);
    expect(hint.savedK).toBeGreaterThan(60);
    expect(hint.savedDb).toBeGreaterThan(2);
  });

  it('is not said where it gains nothing', () => {
    expect(chainHints(BURIED, 21).some(({ words }) => words.startsWith('Another'))).toBe(false);
    expect(chainHints([amplifier(0.05, 40)], 20)).toEqual([]);
  });

  it('wants an amplifier where there is none, and the amplifier in front of a long cable', () => {
    expect(chainHints([loss(3), amplifier(5, 0)], 20)[0]!.words).toMatch(/at the feed would bury/);
    const swapped = chainHints([loss(3, 'Cable'), amplifier(0.5, 30), amplifier(5, 0)], 20)[0]!;
    expect(swapped.words).toBe('Stage 2 in front of “Cable”');
    expect(swapped.savedK).toBeGreaterThan(250);
  });
});
