import { describe, expect, it } from 'vitest';
import { MODE_FIGURES } from '~/domain/link/modes';
import { InvalidInput } from '~/server/errors';
import { openApiDocument } from '~/server/http/openapi';
import { checked } from '~/server/http/respond';
import { computeLinkAnswer } from '~/server/windows/computeLink';
import { linkAnswerSchema, linkRequestSchema } from '~/server/windows/linkSchemas';

const SETUP = {
  antenna: { diameterM: 3 },
  polarization: 'rightCircular',
  powerAtFeedW: 200,
  receive: {
    stages: [
      { lossDb: 0.1 },
      { gainDb: 30, noiseFigureDb: 0.3 },
      { lossDb: 4 },
      { gainDb: 0, noiseFigureDb: 6 },
    ],
    spilloverK: 15,
  },
};
const BODY = {
  stations: [
    { callSign: 'QA1LUN', site: { latitudeDeg: 50, longitudeDeg: 10 }, setup: SETUP },
    {
      site: { locator: 'FN20aa', heightM: 100 },
      setup: { ...SETUP, receive: { systemTemperatureK: 80 } },
    },
  ],
  frequencyMhz: 1296,
  mode: 'q65-60c',
  time: '2026-03-25T20:00:00Z',
};

type Change = (body: typeof BODY) => unknown;

const answerTo = (body: unknown) => computeLinkAnswer(checked(linkRequestSchema, body));

function refusal(change: Change): InvalidInput {
  try {
    answerTo(change(structuredClone(BODY)));
  } catch (error) {
    if (error instanceof InvalidInput) return error;
    throw error;
  }
  throw new Error('not refused');
}

const withSetup =
  (part: object): Change =>
  (body) => ({
    ...body,
    stations: [{ ...body.stations[0], setup: { ...SETUP, ...part } }, body.stations[1]],
  });

describe('POST /api/v1/link', () => {
  it('answers with what its schema promises', () => {
    const answer = answerTo(BODY);
    expect(linkAnswerSchema.parse(JSON.parse(JSON.stringify(answer)))).toEqual(answer);
    expect(answer.directions.map(({ from, to }) => [from, to])).toEqual([
      ['QA1LUN', 'B'],
      ['B', 'QA1LUN'],
    ]);
    expect(answer.directions[0].transmitGainDbi).toBeCloseTo(29.6047, 3);
    expect(answer.directions[1].ledger.noise[0]).toMatchObject({ key: 'receiver' });
    expect(answer.directions[0].ledger.noise[0]).toMatchObject({
      key: 'measuredSystem',
      value: 80,
    });
    expect(Object.keys(answer.dialShifts)).toEqual([
      'none',
      'constantAtMoon',
      'firstCorrectsAll',
      'secondCorrectsAll',
      'receiveOnly',
      'ownEchoOnFrequency',
    ]);
  });

  it('counts the chance for the slot it is given', () => {
    const [short, long] = [10, 120].map((slotMinutes) => answerTo({ ...BODY, slotMinutes }));
    expect(short!.periods).toBe(10);
    expect(long!.periods).toBe(120);
    expect(long!.contactChance).toBeGreaterThan(short!.contactChance);
  });

  it('takes the Sun’s flux', () => {
    const [quiet, active] = [65, 250].map((flux) => answerTo({ ...BODY, solarFlux10cmSfu: flux }));
    expect(active!.directions[0].sunTemperatureK).toBeGreaterThan(
      quiet!.directions[0].sunTemperatureK,
    );
  });

  it.each<[string, Change, string]>([
    [
      'an efficiency over 1',
      withSetup({ antenna: { diameterM: 3, apertureEfficiency: 1.2 } }),
      'stations.0.setup.antenna.apertureEfficiency',
    ],
    ['negative power', withSetup({ powerAtFeedW: -1 }), 'stations.0.setup.powerAtFeedW'],
    ['an empty chain', withSetup({ receive: { stages: [] } }), 'stations.0.setup.receive.stages'],
    [
      'a noise figure below 0',
      withSetup({ receive: { stages: [{ gainDb: 20, noiseFigureDb: -1 }] } }),
      'stations.0.setup.receive.stages.0.noiseFigureDb',
    ],
    [
      'a receiver of two kinds',
      withSetup({ receive: { systemTemperatureK: 80, receiverTemperatureK: 40 } }),
      'stations.0.setup.receive',
    ],
    ['a frequency too low', (body) => ({ ...body, frequencyMhz: 29 }), 'frequencyMhz'],
    ['a frequency too high', (body) => ({ ...body, frequencyMhz: 100_001 }), 'frequencyMhz'],
    ['an unknown mode', (body) => ({ ...body, mode: 'q65-15c' }), 'mode'],
    ['local time', (body) => ({ ...body, time: '2026-03-25T20:00:00' }), 'time'],
    ['one station', (body) => ({ ...body, stations: [body.stations[0]] }), 'stations'],
    [
      'no setup',
      (body) => ({ ...body, stations: [body.stations[0], { site: body.stations[1]!.site }] }),
      'stations.1.setup',
    ],
    ['a field nobody knows', (body) => ({ ...body, bandwidthHz: 50 }), ''],
  ])('refuses %s', (_name, change, path) => {
    const { fields, message } = refusal(change);
    expect(fields.map((field) => field.path)).toContain(path);
    expect(message).toMatch(/[A-Z“].{10,}\.$/);
  });

  it('stands in the OpenAPI document, with every mode, its threshold and source', () => {
    const text = JSON.stringify(openApiDocument());
    expect(text).toContain('/api/v1/link');
    for (const { id, thresholdDb } of MODE_FIGURES) {
      expect(text).toContain(`| ${id} | ${thresholdDb.toFixed(1)} dB |`);
    }
  });
});
