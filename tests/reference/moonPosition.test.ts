import { Body, Equator, Horizon, Observer } from 'astronomy-engine';
import { describe, expect, it } from 'vitest';
import { DEG, wrap180 } from '../../src/domain/ephemeris/constants';
import { astroTime } from '../../src/domain/ephemeris/engine';
import { buildMoonTable, moonSampleDirect } from '../../src/domain/ephemeris/index';
import { moonRecords, siteOf, type MoonRecord } from './fixtures';

/** Named tolerances against DE405 + IAU 2006/2000A. */
const MOON_ANGLE_DEG = 0.002;
const SUN_ANGLE_DEG = 0.001;
const RA_DEC_DEG = 0.001;
const RANGE_KM = 6;
const RANGE_RATE_MPS = 0.05;

function worst(of: (record: MoonRecord) => number): number {
  return Math.max(...moonRecords.map((record) => Math.abs(of(record))));
}

const sampleOf = (record: MoonRecord) =>
  moonSampleDirect(siteOf(record.site), Date.parse(record.utc));

describe('Moon and Sun against JPL DE405, 160 records', () => {
  it('has all the records', () => {
    expect(moonRecords).toHaveLength(160);
  });

  it('azimuth (times cosine of elevation) and elevation', () => {
    const azimuth = worst((record) => {
      const sample = sampleOf(record);
      return wrap180(sample.azimuthDeg - record.az_deg) * Math.cos(record.el_deg * DEG);
    });
    const elevation = worst((record) => sampleOf(record).elevationDeg - record.el_deg);
    expect(azimuth).toBeLessThan(MOON_ANGLE_DEG);
    expect(elevation).toBeLessThan(MOON_ANGLE_DEG);
  });

  it('topocentric and geocentric distance, and range rate', () => {
    expect(worst((record) => sampleOf(record).rangeKm - record.topo_range_km)).toBeLessThan(
      RANGE_KM,
    );
    expect(
      worst((record) => sampleOf(record).geocentricDistanceKm - record.geo_range_km),
    ).toBeLessThan(RANGE_KM);
    expect(worst((record) => sampleOf(record).rangeRateMps - record.range_rate_m_s)).toBeLessThan(
      RANGE_RATE_MPS,
    );
  });

  it('right ascension and declination', () => {
    const rightAscension = worst((record) => {
      const sample = sampleOf(record);
      return wrap180(sample.rightAscensionDeg - record.ra_deg) * Math.cos(record.dec_deg * DEG);
    });
    expect(rightAscension).toBeLessThan(RA_DEC_DEG);
    expect(worst((record) => sampleOf(record).declinationDeg - record.dec_deg)).toBeLessThan(
      RA_DEC_DEG,
    );
  });

  it('the Sun', () => {
    const azimuth = worst((record) => {
      const sample = sampleOf(record);
      return wrap180(sample.sunAzimuthDeg - record.sun_az_deg) * Math.cos(record.sun_el_deg * DEG);
    });
    expect(azimuth).toBeLessThan(SUN_ANGLE_DEG);
    expect(worst((record) => sampleOf(record).sunElevationDeg - record.sun_el_deg)).toBeLessThan(
      SUN_ANGLE_DEG,
    );
  });
});

describe('our own geometry against the library that gives the geocentric positions', () => {
  /** The library's ellipsoid differs from WGS 84 by less than a metre. */
  const GEOMETRY_DEG = 1e-5;

  it.each([Body.Moon, Body.Sun])('agrees with its topocentric angles of the %s', (body) => {
    const difference = worst((record) => {
      const site = siteOf(record.site);
      const time = astroTime(Date.parse(record.utc));
      const observer = new Observer(site.latitudeDeg, site.longitudeDeg, site.heightM);
      const equator = Equator(body, time, observer, true, true);
      const horizon = Horizon(time, observer, equator.ra, equator.dec);
      const sample = sampleOf(record);
      const ours = body === Body.Moon ? sample.elevationDeg : sample.sunElevationDeg;
      return horizon.altitude - ours;
    });
    const distanceFactorDeg = body === Body.Moon ? 3e-5 : 0;
    expect(difference).toBeLessThan(GEOMETRY_DEG + distanceFactorDeg);
  });
});

describe('the Moon table against the direct path', () => {
  const TABLE_ANGLE_DEG = 1e-5;
  const TABLE_RANGE_KM = 0.1;
  const TABLE_RATE_MPS = 0.005;

  it.each([
    ['three hours', 0.125, 40],
    ['three days', 3, 80],
    ['thirty days', 30, 400],
    ['four hundred days', 400, 400],
  ])('stays within 1e-5° and 0.1 km over %s', (_name, days, count) => {
    const startMs = Date.UTC(2028, 1, 27, 3, 17);
    const endMs = startMs + days * 86_400_000;
    const table = buildMoonTable({ startMs, endMs });
    const site = { latitudeDeg: 47.3, longitudeDeg: -122.9, heightM: 350 };
    let angle = 0;
    let range = 0;
    let rate = 0;
    for (let index = 0; index <= count; index += 1) {
      const timeMs = startMs + ((endMs - startMs) * index) / count;
      const direct = moonSampleDirect(site, timeMs);
      const quick = table.sample(site, timeMs);
      const across = Math.cos(direct.elevationDeg * DEG);
      const sunAcross = Math.cos(direct.sunElevationDeg * DEG);
      angle = Math.max(
        angle,
        Math.abs(wrap180(quick.azimuthDeg - direct.azimuthDeg)) * across,
        Math.abs(quick.elevationDeg - direct.elevationDeg),
        Math.abs(wrap180(quick.sunAzimuthDeg - direct.sunAzimuthDeg)) * sunAcross,
        Math.abs(quick.sunElevationDeg - direct.sunElevationDeg),
        Math.abs(wrap180(quick.rightAscensionDeg - direct.rightAscensionDeg)),
        Math.abs(quick.declinationDeg - direct.declinationDeg),
      );
      range = Math.max(range, Math.abs(quick.rangeKm - direct.rangeKm));
      rate = Math.max(rate, Math.abs(quick.rangeRateMps - direct.rangeRateMps));
    }
    expect(angle).toBeLessThan(TABLE_ANGLE_DEG);
    expect(range).toBeLessThan(TABLE_RANGE_KM);
    expect(rate).toBeLessThan(TABLE_RATE_MPS);
  });

  it('refuses an instant outside its span', () => {
    const table = buildMoonTable({ startMs: 0, endMs: 86_400_000 });
    const site = { latitudeDeg: 0, longitudeDeg: 0, heightM: 0 };
    expect(() => table.sample(site, -1)).toThrow(RangeError);
    expect(() => buildMoonTable({ startMs: 5, endMs: 5 })).toThrow(RangeError);
  });
});
