import { describe, expect, it } from 'vitest';
import { moonSampleDirect } from '../../src/domain/ephemeris/index';
import {
  LEAST_DISTANCE_KM,
  degradationDb,
  degradationModel,
  dialShifts,
  dopplerHz,
  echoDelayS,
  libration,
  pathLossDb,
  skyAndDegradation,
  skyBeam,
  skyTemperatureK,
  spreadHz,
} from '../../src/domain/link/index';

describe('path loss', () => {
  const TABLE_DB = 0.01;
  /** dB at 356 400, 384 400 and 406 700 km; computed for the project from the formula in another language. */
  it.each([
    [50, 241.6, 242.91, 243.89],
    [144, 250.79, 252.1, 253.08],
    [432, 260.33, 261.64, 262.62],
    [1296, 269.87, 271.18, 272.16],
    [2304, 274.87, 276.18, 277.16],
    [10368, 287.93, 289.25, 290.23],
    [24048, 295.24, 296.55, 297.53],
    [47088, 301.08, 302.39, 303.37],
  ])('%s MHz', (frequencyMhz, near, mean, far) => {
    expect(Math.abs(pathLossDb(frequencyMhz, 356_400) - near)).toBeLessThan(TABLE_DB);
    expect(Math.abs(pathLossDb(frequencyMhz, 384_400) - mean)).toBeLessThan(TABLE_DB);
    expect(Math.abs(pathLossDb(frequencyMhz, 406_700) - far)).toBeLessThan(TABLE_DB);
  });

  /** Berry, hamradio.engineering, "EME path loss": 252/261/271 dB at 144/432/1296 MHz (read in the source). */
  it.each([
    [144, 252],
    [432, 261],
    [1296, 271],
  ])('agrees with the published round figure at %s MHz', (frequencyMhz, published) => {
    expect(Math.abs(pathLossDb(frequencyMhz, 384_400) - published)).toBeLessThan(0.7);
  });

  /** MacCluer, Michigan State University, path-loss tutorial (read): he takes a reflectivity of 0.066. */
  it('agrees with a published example', () => {
    const reflectivity = 10 * Math.log10(0.065 / 0.066);
    expect(Math.abs(pathLossDb(432, 382_942) + reflectivity - 261.5)).toBeLessThan(0.03);
  });

  it('takes both ranges of a pair', () => {
    const pair = pathLossDb(1296, 360_000, 370_000);
    expect(pair).toBeCloseTo((pathLossDb(1296, 360_000) + pathLossDb(1296, 370_000)) / 2, 9);
  });

  it('delays an echo by 2.4 to 2.7 s', () => {
    expect(echoDelayS(356_400)).toBeGreaterThan(2.35);
    expect(echoDelayS(406_700)).toBeLessThan(2.71);
  });
});

/** Computed for the project; sites at height 0, airless. Ranges stem from the lunar theory without correction. */
const UNCORRECTED_RANGE_KM = 16;
const FIRST = { latitudeDeg: 50, longitudeDeg: 10, heightM: 0 };
const SECOND = { latitudeDeg: 40, longitudeDeg: -75, heightM: 0 };
const CASES = [
  {
    utc: '2026-03-25T20:00:00Z',
    first: [245.837, 53.785, 366_151.5, 181.75],
    second: [91.777, 48.316, 366_530.0, -199.53],
    dopplerHz: 76.9,
    spreads: [13.27, 17.36, 13.85],
  },
  {
    utc: '2026-09-03T06:00:00Z',
    first: [232.716, 55.256, 367_109.7, 104.86],
    second: [90.977, 40.612, 368_187.6, -284.72],
    dopplerHz: 777.5,
    spreads: [13.38, 15.27, 15.55],
  },
  {
    utc: '2027-02-15T18:00:00Z',
    first: [162.175, 66.218, 363_703.1, -83.34],
    second: [66.741, 14.221, 367_936.8, -351.98],
    dopplerHz: 1881.9,
    spreads: [5.26, 16.3, 13.23],
  },
] as const;

describe('three dated cases, 50° N 10° E with 40° N 75° W at 1296 MHz', () => {
  it.each(CASES.map((dated) => [dated.utc, dated] as const))('%s', (utc, dated) => {
    const timeMs = Date.parse(utc);
    const a = moonSampleDirect(FIRST, timeMs);
    const b = moonSampleDirect(SECOND, timeMs);
    for (const [sample, expected] of [
      [a, dated.first],
      [b, dated.second],
    ] as const) {
      expect(Math.abs(sample.azimuthDeg - expected[0])).toBeLessThan(0.003);
      expect(Math.abs(sample.elevationDeg - expected[1])).toBeLessThan(0.002);
      expect(Math.abs(sample.rangeKm - expected[2])).toBeLessThan(UNCORRECTED_RANGE_KM);
      expect(Math.abs(sample.rangeRateMps - expected[3])).toBeLessThan(0.05);
    }
    expect(
      Math.abs(dopplerHz(1296, a.rangeRateMps, b.rangeRateMps) - dated.dopplerHz),
    ).toBeLessThan(0.4);
    const seenA = libration(FIRST, timeMs);
    const seenB = libration(SECOND, timeMs);
    expect(Math.abs(spreadHz(1296, seenA, seenB) - dated.spreads[0])).toBeLessThan(0.05);
    expect(Math.abs(spreadHz(1296, seenA) - dated.spreads[1])).toBeLessThan(0.05);
    expect(Math.abs(spreadHz(1296, seenB) - dated.spreads[2])).toBeLessThan(0.05);
  });
});

describe('dial shifts', () => {
  /** 432 MHz newsletter, March 2000 (read): F 432 020.000 kHz, own shifts +0.800 and −0.471 kHz. */
  it('gives the published frequency at which the partner is heard', () => {
    const { receiveOnly } = dialShifts(800, -471);
    expect(432_020_000 + receiveOnly.first.receiveHz).toBeCloseTo(432_020_164.5, 6);
  });

  it('puts every convention on one path: what one sends, the other hears where it listens', () => {
    const [own, partner] = [812.5, -394.2];
    const mutual = (own + partner) / 2;
    const { none, ...tuned } = dialShifts(own, partner);
    for (const { first, second } of Object.values(tuned)) {
      expect(first.transmitHz + mutual).toBeCloseTo(second.receiveHz, 9);
      expect(second.transmitHz + mutual).toBeCloseTo(first.receiveHz, 9);
    }
    expect(none.first).toEqual({ transmitHz: 0, receiveHz: 0 });
  });

  it('a receding Moon lowers the echo', () => {
    expect(dopplerHz(144, 300)).toBeCloseTo((-144e6 * 600) / 299_792_458, 9);
  });
});

describe('sky along the ecliptic at 408 MHz', () => {
  /** Survey of Haslam et al. 1982 smoothed to 15°, ecliptic latitude 0, every 15° from longitude 0. */
  const SURVEY_K = [
    19.9, 21.8, 24.9, 26.9, 27.4, 34.1, 39.2, 29.0, 19.9, 15.3, 16.2, 17.6, 20.7, 24.5, 24.9, 32.1,
    40.6, 83.2, 192.9, 74.9, 32.3, 26.3, 22.5, 21.0,
  ];
  const SHARE = 0.2;

  it.each(SURVEY_K.map((kelvin, index) => [index * 15, kelvin]))(
    'at %s°: %s K',
    (longitude, kelvin) => {
      const found = skyTemperatureK(skyBeam(408, 15), longitude, 0);
      expect(Math.abs(found / kelvin - 1)).toBeLessThan(SHARE);
    },
  );

  /** The fit is known to give 348 K where the survey has 419 K: its worst place. */
  it('is hot at the galactic centre in a narrow beam', () => {
    expect(skyTemperatureK(skyBeam(408, 5), 266.84, -5.54)).toBeGreaterThan(330);
    expect(skyTemperatureK(skyBeam(408, 5), 266.84, -5.54)).toBeLessThan(440);
  });

  /** Crab nebula, 900 Jy at 408 MHz: +20, 5 and 2.3 K in beams of 5, 10 and 15° (computed for the project). */
  it.each([
    [5, 20],
    [10, 5],
    [15, 2.3],
  ])('adds the Crab nebula in a beam of %s°: %s K', (beamDeg, kelvin) => {
    const beam = skyBeam(408, beamDeg);
    const without = skyTemperatureK({ ...beam, crabPeakK: 0 }, 84.1, -1.3);
    const crab = skyTemperatureK(beam, 84.1, -1.3) - without;
    expect(Math.abs(crab - kelvin)).toBeLessThan(kelvin * 0.08);
  });
});

describe('degradation', () => {
  const CHECK_DB = 0.15;

  /** Both figures computed for the project from the published definition. */
  it('is 2.29 dB at apogee before the coldest sky', () => {
    const model = degradationModel(144);
    expect(Math.abs(degradationDb(model, 406_350, model.coldestK) - 2.29)).toBeLessThan(0.02);
  });

  it('is 11.8 dB at 144 MHz with the Moon at mean distance before the galactic centre', () => {
    const model = degradationModel(144);
    const skyK = skyTemperatureK(model.beam, 266.84, -5.54);
    expect(Math.abs(degradationDb(model, 384_400, skyK) - 11.8)).toBeLessThan(CHECK_DB);
  });

  it('is nothing at the least distance before the coldest sky', () => {
    const model = degradationModel(432);
    expect(degradationDb(model, LEAST_DISTANCE_KM, model.coldestK)).toBe(0);
  });

  /**
   * Best days of 2009 on 144 MHz: 1 May and 9 November (published; read in the source). The choice also weighed
   * declination and Sun; what degradation alone can confirm is that each is the best of its own month.
   */
  it.each([
    ['2009-05-01', Date.UTC(2009, 4, 1)],
    ['2009-11-09', Date.UTC(2009, 10, 9)],
  ])('is least of its lunation within a day of %s, a published best day', (_name, dayMs) => {
    const model = degradationModel(144);
    const hourMs = 3_600_000;
    let best = { timeMs: 0, db: Infinity };
    for (let hour = -13 * 24; hour <= 14 * 24; hour += 1) {
      const timeMs = dayMs + hour * hourMs;
      const db = skyAndDegradation(model, timeMs).degradationDb;
      if (db < best.db) best = { timeMs, db };
    }
    expect(Math.abs(best.timeMs - (dayMs + 12 * hourMs))).toBeLessThan(24 * hourMs);
    expect(best.db).toBeLessThan(1);
  });
});
