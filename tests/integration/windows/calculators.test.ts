import { describe, expect, it } from 'vitest';
import { InvalidInput } from '../../../src/server/errors';
import { openApiDocument } from '../../../src/server/http/openapi';
import { checked } from '../../../src/server/http/respond';
import {
  moonAnswerSchema,
  windowsAnswerSchema,
} from '../../../src/server/windows/calculatorAnswers';
import {
  moonRequestSchema,
  windowsRequestSchema,
} from '../../../src/server/windows/calculatorSchemas';
import { computeMoonSamples } from '../../../src/server/windows/moonSamples';
import { searchWindows } from '../../../src/server/windows/searchWindows';
import { moonRecords } from '../../reference/fixtures';

const A = { callSign: 'QA1LUN', site: { locator: 'JO30' } };
const B = { callSign: 'QB2MOO', site: { latitudeDeg: 40, longitudeDeg: -75 } };
const SEARCH = {
  stations: [A, B],
  from: '2027-01-01T00:00:00Z',
  to: '2027-01-08T00:00:00Z',
};
const MOON = { site: B.site, times: ['2027-01-20T22:00:00Z'] };

const moon = (request: unknown) => computeMoonSamples(checked(moonRequestSchema, request));
const windows = (request: unknown) => searchWindows(checked(windowsRequestSchema, request));

function refusal(ask: () => unknown): { path: string; message: string }[] {
  try {
    ask();
  } catch (error) {
    expect(error).toBeInstanceOf(InvalidInput);
    return (error as InvalidInput).fields;
  }
  throw new Error('The request was not refused.');
}

describe('POST /api/v1/moon', () => {
  it('answers what the reference says, in the order asked', () => {
    const site = moonRecords[0]!.site;
    const records = moonRecords.filter((record) => record.site.lat_deg === site.lat_deg);
    const { samples } = moon({
      site: { latitudeDeg: site.lat_deg, longitudeDeg: site.lon_deg, heightM: site.height_m },
      times: records.map((record) => record.utc),
    });
    expect(samples.map(({ time }) => time)).toEqual(records.map(({ utc }) => utc));
    samples.forEach((sample, index) => {
      expect(Math.abs(sample.elevationDeg - records[index]!.el_deg)).toBeLessThan(0.002);
      expect(Math.abs(sample.rangeKm - records[index]!.topo_range_km)).toBeLessThan(6);
      expect(sample.refractedElevationDeg).toBeGreaterThanOrEqual(sample.elevationDeg);
    });
  });

  it('adds the radio figures only with a frequency, and keeps its own contract', () => {
    const bare = moonAnswerSchema.strict().parse(moon(MOON)).samples[0]!;
    expect(bare.pathLossDb).toBeUndefined();
    const full = moonAnswerSchema.strict().parse(moon({ ...MOON, frequencyMhz: 1296 })).samples[0]!;
    expect(full.pathLossDb).toBeGreaterThan(269);
    expect(full.pathLossDb).toBeLessThan(273);
    expect(full.ownEchoDopplerHz).toBeCloseTo((-2 * 1296e6 * full.rangeRateMps) / 299_792_458, 1);
    expect(full.ownEchoSpreadHz).toBeGreaterThan(1);
    expect(full.skyTemperatureK).toBeGreaterThan(2.7);
    expect(full.degradationDb).toBeGreaterThan(0);
  });

  it('gives the same by table as one by one', () => {
    const times = Array.from({ length: 200 }, (_, index) =>
      new Date(Date.UTC(2027, 0, 1) + index * 600_000).toISOString(),
    );
    const together = moon({ site: A.site, times, frequencyMhz: 144 }).samples;
    const alone = [3, 77, 199].map(
      (index) => moon({ site: A.site, times: [times[index]], frequencyMhz: 144 }).samples[0]!,
    );
    alone.forEach((sample, index) => {
      const same = together[[3, 77, 199][index]!]!;
      expect(Math.abs(same.azimuthDeg - sample.azimuthDeg)).toBeLessThan(1e-5);
      expect(Math.abs(same.rangeKm - sample.rangeKm)).toBeLessThan(0.1);
      expect(Math.abs(same.ownEchoSpreadHz! - sample.ownEchoSpreadHz!)).toBeLessThan(0.01);
    });
  });

  it.each([
    ['an unknown locator', { ...MOON, site: { locator: 'ZZ99' } }, 'site.locator'],
    ['latitude 91', { ...MOON, site: { latitudeDeg: 91, longitudeDeg: 0 } }, 'site.latitudeDeg'],
    ['no site', { times: MOON.times }, 'site'],
    ['half a position', { ...MOON, site: { latitudeDeg: 9 } }, 'site.longitudeDeg'],
    ['an infinite height', { ...MOON, site: { ...B.site, heightM: Infinity } }, 'site.heightM'],
    ['no instant', { ...MOON, times: [] }, 'times'],
    ['a local time', { ...MOON, times: ['2027-01-20 22:00'] }, 'times.0'],
    ['the year 9999', { ...MOON, times: ['9999-01-20T22:00:00Z'] }, 'times.0'],
    ['2001 instants', { ...MOON, times: Array(2001).fill(MOON.times[0]) }, 'times'],
    ['a frequency of 0', { ...MOON, frequencyMhz: 0 }, 'frequencyMhz'],
    ['an unknown field', { ...MOON, frequency: 144 }, ''],
    ['text', 'moon', ''],
  ])('refuses %s with a sentence', (_name, request, path) => {
    const fields = refusal(() => moon(request));
    expect(fields.map((field) => field.path)).toContain(path);
    for (const { message } of fields) expect(message).toMatch(/^[A-Z].+\.$/);
  });
});

describe('POST /api/v1/windows', () => {
  it('accounts for every hour and keeps its own contract', () => {
    const answer = windowsAnswerSchema.strict().parse(windows(SEARCH));
    expect(answer.windows.length).toBeGreaterThan(4);
    const hours =
      answer.lost.reduce((sum, lost) => sum + lost.hours, 0) +
      answer.windows.reduce((sum, window) => sum + window.minutes / 60, 0);
    expect(hours).toBeCloseTo(7 * 24, 4);
    expect(answer.windows[0]!.stations.map(({ callSign }) => callSign)).toEqual([
      'QA1LUN',
      'QB2MOO',
    ]);
  });

  it('takes every limit of a sky', () => {
    const sky = {
      elevationFromDeg: 5,
      elevationToDeg: 80,
      azimuthFromDeg: 300,
      azimuthToDeg: 225,
      blocked: [
        { azimuthFromDeg: 190, azimuthToDeg: 200, elevationFromDeg: 0, elevationToDeg: 60 },
      ],
      horizon: [
        { azimuthDeg: 0, elevationDeg: 2 },
        { azimuthDeg: 200, elevationDeg: 9 },
        { azimuthDeg: 360, elevationDeg: 2 },
      ],
      transmitElevationFromDeg: 7,
    };
    const limited = windows({ ...SEARCH, stations: [{ ...A, sky }, B], frequencyMhz: 432 });
    const reasons = new Set(limited.lost.map(({ reason }) => reason));
    for (const reason of ['horizon', 'horizonProfile', 'azimuthLimit', 'blockedSector'] as const) {
      expect(reasons).toContain(reason);
    }
    expect(limited.windows[0]!.best.degradationDb).toBeGreaterThan(0);
  });

  it('takes a setup and a mode', () => {
    const setup = {
      antenna: { diameterM: 3 },
      polarization: 'vertical',
      powerAtFeedW: 200,
      receive: { stages: [{ lossDb: 0.1 }, { gainDb: 30, noiseFigureDb: 0.3 }] },
    };
    const answer = windows({ ...SEARCH, stations: [{ ...A, setup }, B], mode: 'q65-60c' });
    expect(answer.windows.length).toBeGreaterThan(4);
  });

  const withSky = (sky: unknown) => ({ ...SEARCH, stations: [{ ...A, sky }, B] });
  const point = (azimuthDeg: number, elevationDeg: number) => ({ azimuthDeg, elevationDeg });

  it.each([
    ['one station', { ...SEARCH, stations: [A] }, 'stations'],
    [
      '17 stations',
      { ...SEARCH, stations: Array.from({ length: 17 }, (_, n) => ({ ...B, callSign: `Q${n}A` })) },
      'stations',
    ],
    [
      'a call sign twice',
      { ...SEARCH, stations: [A, { ...B, callSign: 'qa1lun' }] },
      'stations.1.callSign',
    ],
    [
      'a call sign with a picture',
      { ...SEARCH, stations: [A, { ...B, callSign: 'QB2🌙' }] },
      'stations.1.callSign',
    ],
    [
      'an unknown locator',
      { ...SEARCH, stations: [{ ...A, site: { locator: 'ZZ99' } }, B] },
      'stations.0.site.locator',
    ],
    [
      'latitude 91',
      { ...SEARCH, stations: [A, { ...B, site: { ...B.site, latitudeDeg: 91 } }] },
      'stations.1.site.latitudeDeg',
    ],
    ['reversed dates', { ...SEARCH, to: '2026-12-01T00:00:00Z' }, 'to'],
    ['401 days', { ...SEARCH, to: '2028-02-06T00:00:00Z' }, 'to'],
    [
      'a degradation without a frequency',
      { ...SEARCH, maximumDegradationDb: 3 },
      'maximumDegradationDb',
    ],
    ['a search by margin', { ...SEARCH, minimumMarginDb: 3 }, 'minimumMarginDb'],
    ['an unknown mode', { ...SEARCH, mode: 'semaphore' }, 'mode'],
    [
      'azimuth from = to',
      withSky({ azimuthFromDeg: 90, azimuthToDeg: 90 }),
      'stations.0.sky.azimuthToDeg',
    ],
    ['half an azimuth range', withSky({ azimuthFromDeg: 90 }), 'stations.0.sky.azimuthToDeg'],
    [
      'a horizon below the nadir',
      withSky({ horizon: [point(10, -91)] }),
      'stations.0.sky.horizon.0.elevationDeg',
    ],
    [
      'a horizon of two minds',
      withSky({ horizon: [point(10, 1), point(10, 2)] }),
      'stations.0.sky.horizon.1.azimuthDeg',
    ],
    ['a misspelt limit', withSky({ elevationMin: 10 }), 'stations.0.sky'],
    [
      'elevations reversed',
      withSky({ elevationFromDeg: 40, elevationToDeg: 30 }),
      'stations.0.sky.elevationToDeg',
    ],
    [
      'a setup without an antenna',
      { ...SEARCH, stations: [{ ...A, setup: { polarization: 'vertical' } }, B] },
      'stations.0.setup.antenna',
    ],
  ])('refuses %s with a sentence', (_name, request, path) => {
    const fields = refusal(() => windows(request));
    expect(fields.map((field) => field.path)).toContain(path);
    for (const { message } of fields) expect(message).toMatch(/^[A-Z].+\.$/);
  });
});

describe('the OpenAPI document', () => {
  const document = openApiDocument() as {
    openapi: string;
    paths: Record<string, { post: { requestBody: object; responses: Record<string, object> } }>;
  };

  it('is of version 3.1 and has both calculators', () => {
    expect(document.openapi).toBe('3.1.0');
    expect(Object.keys(document.paths)).toEqual(
      expect.arrayContaining(['/api/v1/moon', '/api/v1/windows']),
    );
  });

  it('describes the input in full', () => {
    const text = JSON.stringify(document.paths['/api/v1/windows']!.post.requestBody);
    for (const field of [
      'callSign',
      'locator',
      'horizon',
      'blocked',
      'diameterM',
      'maximumDegradationDb',
    ]) {
      expect(text).toContain(`"${field}"`);
    }
    expect(JSON.stringify(document)).toContain('"ownEchoSpreadHz"');
  });
});
