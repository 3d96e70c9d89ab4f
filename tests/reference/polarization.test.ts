import { describe, expect, it } from 'vitest';
import { buildMoonTable, moonSampleDirect } from '../../src/domain/ephemeris/index';
import { PairGeometry } from '../../src/domain/link/geometry';
import {
  CROSSED_LOSS_DB,
  HALF_POWER_DB,
  faradayOneWayDeg,
  linearLossDb,
  parallacticAngleDeg,
  parallacticFromSkyDeg,
  polarizationMeeting,
  polarizationOffsetDeg,
  typicalFaraday,
} from '../../src/domain/link/polarization';

const DEG = Math.PI / 180;
const FIRST = { latitudeDeg: 50, longitudeDeg: 10, heightM: 0 };
const SECOND = { latitudeDeg: 40, longitudeDeg: -75, heightM: 0 };

/** Parallactic angles computed for the project in another language from DE405; not used to build the formula. */
const CASES: [utc: string, first: number, second: number][] = [
  ['2026-03-25T20:00:00Z', 41.41, -59.82],
  ['2026-09-03T06:00:00Z', 34.06, -57.05],
  ['2027-02-15T18:00:00Z', -12.76, -52.05],
];
const ANGLE_DEG = 0.01;

function geometryAt(timeMs: number) {
  const table = buildMoonTable({ startMs: timeMs - 3_600_000, endMs: timeMs + 3_600_000 });
  const geometry = new PairGeometry(table, FIRST, SECOND);
  geometry.computeElevations(timeMs);
  geometry.computeRest(timeMs);
  return geometry;
}

describe('parallactic angle', () => {
  it.each(CASES)('%s: %s° and %s°', (utc, first, second) => {
    const { first: a, second: b } = geometryAt(Date.parse(utc));
    expect(Math.abs(a.parallacticDeg - first)).toBeLessThan(ANGLE_DEG);
    expect(Math.abs(b.parallacticDeg - second)).toBeLessThan(ANGLE_DEG);
  });

  it.each(CASES)('%s: the same from azimuth and elevation', (utc, first, second) => {
    for (const [site, expected] of [
      [FIRST, first],
      [SECOND, second],
    ] as const) {
      const { azimuthDeg, elevationDeg } = moonSampleDirect(site, Date.parse(utc));
      const found = parallacticFromSkyDeg(site.latitudeDeg, azimuthDeg, elevationDeg);
      expect(Math.abs(found - expected)).toBeLessThan(ANGLE_DEG);
    }
  });

  /**
   * Marchi & Egano, EME 2016 proceedings (read in the source): offset P1 − P2 with
   * P = atan[(sin φ cos el − cos φ cos az sin el)/(cos φ sin az)]. Their formula, not ours.
   */
  it.each(CASES)('%s: the offset agrees with the published formula', (utc, first, second) => {
    const published = (site: typeof FIRST) => {
      const { azimuthDeg, elevationDeg } = moonSampleDirect(site, Date.parse(utc));
      const [phi, az, el] = [site.latitudeDeg * DEG, azimuthDeg * DEG, elevationDeg * DEG];
      const above = Math.sin(phi) * Math.cos(el) - Math.cos(phi) * Math.cos(az) * Math.sin(el);
      return Math.atan(above / (Math.cos(phi) * Math.sin(az))) / DEG;
    };
    const offset = (((published(FIRST) - published(SECOND)) % 180) + 180) % 180;
    expect(Math.abs(offset - polarizationOffsetDeg(first, second))).toBeLessThan(2 * ANGLE_DEG);
  });

  /** Meeus' form needs hour angle and declination; on the meridian south of the zenith it is 0. */
  it('is 0 on the meridian and takes the sign of the hour angle', () => {
    expect(parallacticAngleDeg(50, 0, 20)).toBeCloseTo(0, 12);
    expect(parallacticAngleDeg(50, 30, 20)).toBeGreaterThan(0);
    expect(parallacticAngleDeg(50, -30, 20)).toBeCloseTo(-parallacticAngleDeg(50, 30, 20), 12);
  });
});

describe('linear feeds', () => {
  /** 20 log|cos θ| (read in the source). */
  it.each([
    [0, 0],
    [30, 1.249],
    [45, 3.0103],
    [60, 6.0206],
    [120, 6.0206],
    [180, 0],
  ])('at %s° lose %s dB', (angle, loss) => {
    expect(linearLossDb(angle)).toBeCloseTo(loss, 3);
  });

  it('still hear 20 to 25 dB down when crossed', () => {
    expect(linearLossDb(90)).toBe(CROSSED_LOSS_DB);
    expect(CROSSED_LOSS_DB).toBeGreaterThanOrEqual(20);
    expect(CROSSED_LOSS_DB).toBeLessThanOrEqual(25);
  });

  it('lose 3 dB to a circular one', () => {
    expect(polarizationMeeting('horizontal', 'rightCircular', 1296)).toEqual({
      kind: 'fixed',
      lossDb: HALF_POWER_DB,
    });
    expect(HALF_POWER_DB).toBeCloseTo(3.0103, 4);
  });
});

describe('Faraday rotation overhead, one way', () => {
  /** Read in the source: 380° at 100 MHz (used to build), 95° at 200 MHz (not used). */
  it.each([
    [100, 380],
    [200, 95],
  ])('at %s MHz: %s°', (mhz, degrees) => {
    expect(typicalFaraday(mhz).typical).toBeCloseTo(degrees, 6);
  });

  /** Scaled from it, computed for the project. */
  it.each([
    [144, 183, 0.5],
    [432, 20, 0.5],
    [1296, 2.3, 0.05],
  ])('at %s MHz: %s°', (mhz, degrees, tolerance) => {
    expect(Math.abs(typicalFaraday(mhz).typical - degrees)).toBeLessThan(tolerance);
  });

  /** The physical formula with 1e17 electrons/m² and a field of 28 µT along the path, usual at middle latitudes. */
  it('follows from 2.365e4 · B · TEC / f²', () => {
    expect(Math.abs(faradayOneWayDeg(100, 28e-6, 1e17) - 380)).toBeLessThan(2);
  });
});
