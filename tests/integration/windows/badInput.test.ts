import type { APIContext } from 'astro';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { POST as link } from '~/pages/api/v1/link';
import { POST as windows } from '~/pages/api/v1/windows';
import * as budget from '~/domain/link/budget';
import * as search from '~/server/windows/searchWindows';

vi.mock('~/server/services', () => ({
  services: () => ({ config: { calculatorRequestsPerMinute: 10_000 } }),
}));

const ANTENNA = { diameterM: 3, apertureEfficiency: 0.6 };
const SETUP = {
  antenna: ANTENNA,
  polarization: 'rightCircular',
  powerAtFeedW: 200,
  receive: { stages: [{ lossDb: 0.1 }, { gainDb: 30, noiseFigureDb: 0.3 }] },
};
const A = { callSign: 'QA1LUN', site: { locator: 'JO97ee' }, setup: SETUP };
const B = { callSign: 'QB7TID', site: { locator: 'FN43aa' }, setup: SETUP };
const RADIO = { frequencyMhz: 1296, mode: 'q65-60c' };

const GOOD = {
  link: { ...RADIO, stations: [A, B], time: '2027-01-20T22:00:00Z' },
  windows: {
    ...RADIO,
    stations: [A, B],
    from: '2027-01-18T00:00:00Z',
    to: '2027-01-21T00:00:00Z',
  },
};
type Calculator = keyof typeof GOOD;
const CALCULATORS: Calculator[] = ['link', 'windows'];

async function post(calculator: Calculator, body: unknown) {
  const request = new Request(`http://127.0.0.1/api/v1/${calculator}`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify(body),
  });
  const locals = { requestId: 'r1', viewer: null };
  const context = { request, locals, clientAddress: '127.0.0.1' } as unknown as APIContext;
  const response = await { link, windows }[calculator](context);
  const answer = (await response.json()) as {
    error?: { code: string; message: string; fields: { path: string; message: string }[] };
  };
  return { status: response.status, answer };
}

const first = (part: object) => [{ ...A, ...part }, B];
const setup = (part: object) => ({ stations: first({ setup: { ...SETUP, ...part } }) });
const sky = (part: object) => ({ stations: first({ sky: part }) });

/** Told to both calculators. */
const BAD: [what: string, change: object, path: string, sentence: RegExp][] = [
  ['negative power', setup({ powerAtFeedW: -100 }), 'stations.0.setup.powerAtFeedW', /power/i],
  ['no power', setup({ powerAtFeedW: 0 }), 'stations.0.setup.powerAtFeedW', /power/i],
  [
    'an efficiency over 1',
    setup({ antenna: { ...ANTENNA, apertureEfficiency: 1.05 } }),
    'stations.0.setup.antenna.apertureEfficiency',
    /efficiency/i,
  ],
  [
    'a negative efficiency',
    setup({ antenna: { ...ANTENNA, apertureEfficiency: -0.5 } }),
    'stations.0.setup.antenna.apertureEfficiency',
    /efficiency/i,
  ],
  [
    'an empty chain',
    setup({ receive: { stages: [] } }),
    'stations.0.setup.receive.stages',
    /at least one stage/,
  ],
  ['a frequency under 30 MHz', { frequencyMhz: 29.99 }, 'frequencyMhz', /frequency.* 30 /i],
  [
    'a frequency over 100 GHz',
    { frequencyMhz: 100_001 },
    'frequencyMhz',
    /frequency.* 100\D?000 MHz/i,
  ],
  ['a negative frequency', { frequencyMhz: -1296 }, 'frequencyMhz', /frequency/i],
  ['a frequency in words', { frequencyMhz: '23 cm' }, 'frequencyMhz', /frequency/i],
];

/** Skies matter to windows only. */
const BAD_SKIES: typeof BAD = [
  [
    'a horizon below −90°',
    sky({ horizon: [{ azimuthDeg: 10, elevationDeg: -90.5 }] }),
    'stations.0.sky.horizon.0.elevationDeg',
    /90/,
  ],
  [
    'a lowest elevation below −90°',
    sky({ elevationFromDeg: -91 }),
    'stations.0.sky.elevationFromDeg',
    /90/,
  ],
];

const spies = [vi.spyOn(budget, 'computeLink'), vi.spyOn(search, 'searchWindows')];
beforeEach(() => spies.forEach((spy) => spy.mockClear()));
const computed = () => spies.reduce((sum, spy) => sum + spy.mock.calls.length, 0);

const cases = [
  ...CALCULATORS.flatMap((calculator) => BAD.map((bad) => [calculator, ...bad] as const)),
  ...BAD_SKIES.map((bad) => ['windows' as const, ...bad] as const),
];

describe('bad input', () => {
  it.each(CALCULATORS)('/api/v1/%s computes what is sound', async (calculator) => {
    expect((await post(calculator, GOOD[calculator])).status).toBe(200);
    expect(computed()).toBeGreaterThan(0);
  });

  it.each(cases)(
    '/api/v1/%s refuses %s with a sentence, and computes nothing',
    async (calculator, _what, change, path, sentence) => {
      const { status, answer } = await post(calculator, { ...GOOD[calculator], ...change });
      expect(status).toBe(400);
      expect(answer.error!.code).toBe('invalidInput');
      const told = answer.error!.fields.find((field) => field.path === path);
      expect(told, JSON.stringify(answer.error)).toBeDefined();
      expect(told!.message).toMatch(/^[A-Z].+\.$/);
      expect(told!.message).toMatch(sentence);
      expect(computed()).toBe(0);
    },
  );
});
