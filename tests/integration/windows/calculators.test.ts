import { describe, expect, it } from 'vitest';
import { computeLink } from '../../../src/domain/link/budget';
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
  it('accounts for every hour and keeps its own contract', async () => {
    const answer = windowsAnswerSchema.strict().parse(await windows(SEARCH));
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

  it('takes every limit of a sky', async () => {
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
    const limited = await windows({ ...SEARCH, stations: [{ ...A, sky }, B], frequencyMhz: 432 });
    const reasons = new Set(limited.lost.map(({ reason }) => reason));
    for (const reason of ['horizon', 'horizonProfile', 'azimuthLimit', 'blockedSector'] as const) {
      expect(reasons).toContain(reason);
    }
    expect(limited.windows[0]!.best.degradationDb).toBeGreaterThan(0);
  });

  const setup = {
    antenna: { diameterM: 3 },
    polarization: 'rightCircular',
    powerAtFeedW: 200,
    receive: { stages: [{ lossDb: 0.1 }, { gainDb: 30, noiseFigureDb: 0.3 }] },
  };
  const EQUIPPED = {
    ...SEARCH,
    stations: [
      { ...A, setup },
      { ...B, setup },
    ],
    frequencyMhz: 1296,
    mode: 'q65-60c',
  };

  it('tells margin and chance where every station told its setup', async () => {
    const { windows: found } = await windows(EQUIPPED);
    for (const { best } of found) {
      expect(Math.abs(best.marginDb!)).toBeLessThan(40);
      expect(best.chance).toBeGreaterThanOrEqual(0);
      expect(best.chance).toBeLessThanOrEqual(1);
    }
    const alone = await windows({ ...EQUIPPED, stations: [EQUIPPED.stations[0], B] });
    expect(alone.windows[0]!.best.marginDb).toBeUndefined();
  });

  it('limits the margin: it holds inside and is met at the edges that it makes', async () => {
    const plain = await windows(EQUIPPED);
    const margins = plain.windows.map(({ best }) => best.marginDb!).sort((a, b) => a - b);
    const minimumMarginDb = margins[margins.length >> 1]!;
    const limited = await windows({ ...EQUIPPED, minimumMarginDb });
    const hours = (answer: typeof limited) =>
      answer.windows.reduce((sum, { minutes }) => sum + minutes / 60, 0);
    expect(limited.windows.length).toBeGreaterThan(0);
    expect(hours(limited)).toBeLessThan(hours(plain));
    const lost = limited.lost.reduce((sum, one) => sum + one.hours, 0);
    expect(hours(limited) + lost).toBeCloseTo(7 * 24, 4);
    expect(limited.lost.find(({ reason }) => reason === 'margin')!.callSign).toBeNull();
    const [first, second] = checked(windowsRequestSchema, EQUIPPED).stations;
    const marginAt = (timeMs: number) => {
      const link = computeLink({
        stations: [
          { site: first!.site, setup: first!.setup! },
          { site: second!.site, setup: second!.setup! },
        ],
        frequencyMhz: EQUIPPED.frequencyMhz,
        mode: EQUIPPED.mode,
        timeMs,
      });
      return Math.min(...link.directions.map(({ marginDb }) => marginDb));
    };
    let edges = 0;
    for (const { start, end, opens } of limited.windows) {
      const [startMs, endMs] = [Date.parse(start), Date.parse(end)];
      for (const share of [0, 0.3, 0.6, 1]) {
        const timeMs = startMs + (endMs - startMs) * share;
        expect(marginAt(timeMs)).toBeGreaterThan(minimumMarginDb - 0.01);
      }
      if (opens.reason !== 'margin') continue;
      edges += 1;
      expect(Math.abs(marginAt(startMs) - minimumMarginDb)).toBeLessThan(0.01);
    }
    expect(edges).toBeGreaterThan(0);
  });

  const rough = {
    horizon: Array.from({ length: 700 }, (_, n) => ({ azimuthDeg: n / 2, elevationDeg: n % 9 })),
  };
  const tooMuch = {
    ...SEARCH,
    to: '2028-01-31T00:00:00Z',
    stations: Array.from({ length: 16 }, (_, n) => ({ ...B, callSign: `Q${n}A`, sky: rough })),
  };
  const withSky = (sky: unknown) => ({ ...SEARCH, stations: [{ ...A, sky }, B] });
  const point = (azimuthDeg: number, elevationDeg: number) => ({ azimuthDeg, elevationDeg });
  const withSetup = (part: object) => ({
    ...EQUIPPED,
    stations: [{ ...EQUIPPED.stations[0], setup: { ...setup, ...part } }, EQUIPPED.stations[1]],
  });

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
    ['a margin without setups', { ...SEARCH, minimumMarginDb: 3 }, 'stations.0.setup'],
    ['more limits than one request may ask', tooMuch, 'to'],
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
      'a lowest elevation below the nadir',
      withSky({ elevationFromDeg: -90.1 }),
      'stations.0.sky.elevationFromDeg',
    ],
    ['negative power', withSetup({ powerAtFeedW: -5 }), 'stations.0.setup.powerAtFeedW'],
    [
      'an efficiency over 1',
      withSetup({ antenna: { diameterM: 3, apertureEfficiency: 1.01 } }),
      'stations.0.setup.antenna.apertureEfficiency',
    ],
    ['an empty chain', withSetup({ receive: { stages: [] } }), 'stations.0.setup.receive.stages'],
    ['a frequency under 30 MHz', { ...EQUIPPED, frequencyMhz: 29.9 }, 'frequencyMhz'],
    ['a frequency over 100 GHz', { ...EQUIPPED, frequencyMhz: 100_000.1 }, 'frequencyMhz'],
    [
      'a setup without an antenna',
      { ...SEARCH, stations: [{ ...A, setup: { polarization: 'vertical' } }, B] },
      'stations.0.setup.antenna',
    ],
  ])('refuses %s with a sentence', (_name, request, path) => {
    const fields = refusal(() => checked(windowsRequestSchema, request));
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
