import { describe, expect, it } from 'vitest';
import { solarFluxSfu } from '~/domain/link/sun';
import { calibrationSteps } from '~/domain/sked/calibration';
import { formatDial } from '~/domain/sked/dial';
import { hourSheet } from '~/domain/sked/hourSheet';
import { MINUTE_MS } from '~/domain/time/interval';
import { NORTH, SKED, WEST } from '../unit/sked/stations';

/**
 * Sites 50° N 10° E and 40° N 75° W, height 0, airless, 1296 MHz: azimuth and elevation of both, own echoes from the
 * range rates, mutual Doppler. Computed for the project from JPL DE405 with the IAU 2006/2000A models.
 */
const CASES = [
  {
    utc: '2026-03-25T20:00Z',
    own: [245.837, 53.785],
    partner: [91.777, 48.316],
    rates: [181.75, -199.53],
    mutualHz: 76.9,
  },
  {
    utc: '2026-09-03T06:00Z',
    own: [232.716, 55.256],
    partner: [90.977, 40.612],
    rates: [104.86, -284.72],
    mutualHz: 777.5,
  },
  {
    utc: '2027-02-15T18:00Z',
    own: [162.175, 66.218],
    partner: [66.741, 14.221],
    rates: [-83.34, -351.98],
    mutualHz: 1881.9,
  },
] as const;

const LIGHT_MPS = 299_792_458;
const ownEchoHz = (rateMps: number) => (-2 * 1296e6 * rateMps) / LIGHT_MPS;

describe('the sheet of the hour at three dated cases', () => {
  it.each(CASES)('$utc', ({ utc, own, partner, rates, mutualHz }) => {
    const atMs = Date.parse(utc);
    const slot = { ...SKED, startMs: atMs, endMs: atMs + 30 * MINUTE_MS };
    const row = hourSheet([NORTH, WEST], 'QA1LUN', slot).pairs[0]!.rows[0]!;
    expect(row.own.azimuthDeg).toBeCloseTo(own[0], 2);
    expect(row.own.elevationDeg).toBeCloseTo(own[1], 2);
    expect(row.partner.azimuthDeg).toBeCloseTo(partner[0], 2);
    expect(row.partner.elevationDeg).toBeCloseTo(partner[1], 2);
    expect(Math.abs(row.mutualHz - mutualHz)).toBeLessThan(0.5);
    // Constant at the Moon: half of the own echo off when transmitting, on when listening.
    expect(Math.abs(row.ownDial.transmitHz + ownEchoHz(rates[0]) / 2)).toBeLessThan(0.5);
    expect(Math.abs(row.ownDial.receiveHz - ownEchoHz(rates[0]) / 2)).toBeLessThan(0.5);
    expect(Math.abs(row.partnerDial.transmitHz + ownEchoHz(rates[1]) / 2)).toBeLessThan(0.5);
  });
});

describe('the dial', () => {
  /** Published arithmetic of a 432 MHz newsletter, March 2000 (read in the source): heard at 432 020.1645. */
  it('shows the published example to 1 Hz', () => {
    expect(formatDial(432.02, (800 - 471) / 2)).toBe('432\u00a0020.165');
  });
});

describe('steps to expect when calibrating', () => {
  const dish = (systemTemperatureK: number) => ({
    antenna: { kind: 'dish' as const, diameterM: 3, apertureEfficiency: 0.55 },
    polarization: 'rightCircular' as const,
    powerAtFeedW: 200,
    receive: { kind: 'measured' as const, systemTemperatureK },
  });

  /** 3 m at 10 GHz with an 80 K system: +2.2 dB (computed for the project); about 2 dB is reported. */
  it('to the Moon', () => {
    const { moonDb } = calibrationSteps(dish(80), 10_368, 384_400);
    expect(Math.abs(moonDb - 2.2)).toBeLessThan(0.1);
  });

  /** The 10.7 cm index with which the Sun has this flux on the band. */
  function indexFor(fluxSfu: number): number {
    let [low, high] = [40, 400];
    while (high - low > 1e-6) {
      const middle = (low + high) / 2;
      if (solarFluxSfu(1296, middle) < fluxSfu) low = middle;
      else high = middle;
    }
    return low;
  }

  /** 3 m at 1296 MHz with 61.9 K: 11.96 dB at 65 SFU on the band, 14.77 at 128 (computed for the project). */
  it.each([
    [65, 11.96],
    [128, 14.77],
  ])('to the Sun at %s SFU', (fluxSfu, expected) => {
    const { sunDb } = calibrationSteps(dish(61.9), 1296, 384_400, indexFor(fluxSfu));
    expect(Math.abs(sunDb - expected)).toBeLessThan(0.05);
  });

  /** Y = (290 + T_rx)/(T_cold + T_rx): 8.52 dB for a sky of 15 K and a receiver of 30 K (computed for the project). */
  it('to a load', () => {
    const steps = calibrationSteps(
      { ...dish(0), receive: { kind: 'receiver', receiverTemperatureK: 30 } },
      1296,
      384_400,
    );
    const coldK = steps.coldSystemK - 30;
    expect(steps.loadDb).toBeCloseTo(10 * Math.log10((290 + 30) / (coldK + 30)), 9);
    // The sky of the coldest part of the path with the air at 45° is some 8 K here, so the step is larger than with 15 K.
    expect(coldK).toBeGreaterThan(4);
    expect(coldK).toBeLessThan(15);
    expect(steps.loadDb).toBeGreaterThan(8.52);
  });
});
