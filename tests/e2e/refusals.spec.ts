import { request as http } from 'node:http';
import type { APIRequestContext } from '@playwright/test';
import { databaseState } from './support/database';
import { pageAs } from './support/people';
import type { RunningServer } from './support/server';
import { expect, test } from './support/test';

const A = { callSign: 'QA1LUN', site: { locator: 'JO97ee' } };
const B = { callSign: 'QB7TID', site: { locator: 'FN43aa' } };
const span = { from: '2027-01-18T00:00:00Z', to: '2027-02-01T00:00:00Z' };

/** What the API must refuse with a sentence: the path of the field and a part of the sentence. */
const REFUSED: [what: string, endpoint: string, body: unknown, path: string][] = [
  [
    'a locator outside the world',
    'windows',
    { ...span, stations: [{ ...A, site: { locator: 'ZZ99' } }, B] },
    'stations.0.site.locator',
  ],
  [
    'latitude 91',
    'moon',
    { site: { latitudeDeg: 91, longitudeDeg: 0 }, times: ['2027-01-18T00:00:00Z'] },
    'site.latitudeDeg',
  ],
  [
    'an azimuth range of no width',
    'windows',
    { ...span, stations: [{ ...A, sky: { azimuthFromDeg: 90, azimuthToDeg: 90 } }, B] },
    'stations.0.sky.azimuthToDeg',
  ],
  ['dates reversed', 'windows', { from: span.to, to: span.from, stations: [A, B] }, 'to'],
  [
    '401 days',
    'windows',
    { from: '2027-01-01T00:00:00Z', to: '2028-02-06T00:00:00Z', stations: [A, B] },
    'to',
  ],
  [
    '17 stations',
    'windows',
    {
      ...span,
      stations: Array.from({ length: 17 }, (_, index) => ({
        ...A,
        callSign: `QA${index % 10}LU${String.fromCharCode(65 + index)}`,
      })),
    },
    'stations',
  ],
  ['a time that is none', 'moon', { site: { locator: 'JO97ee' }, times: ['yesterday'] }, 'times.0'],
];

async function refusal(response: Awaited<ReturnType<APIRequestContext['post']>>) {
  const { error } = (await response.json()) as {
    error: { code: string; message: string; fields: { path: string; message: string }[] };
  };
  return error;
}

test.describe('the open calculators refuse with a sentence', () => {
  for (const [what, endpoint, body, path] of REFUSED) {
    test(what, async ({ demo, request }) => {
      const response = await request.post(`${demo.url}/api/v1/${endpoint}`, {
        data: body as object,
      });
      expect(response.status()).toBe(400);
      const error = await refusal(response);
      expect(error.code).toBe('invalidInput');
      expect(error.fields.map((field) => field.path)).toContain(path);
      expect(error.message).toMatch(/\S+ .*\.$/s);
      expect(error.message).not.toMatch(/Invalid input|expected|undefined|NaN|zod/i);
    });
  }

  test('a body of 10 MB', async ({ demo }) => {
    const status = await rawStatus(demo, {
      method: 'POST',
      path: '/api/v1/windows',
      headers: { 'content-type': 'application/json', 'content-length': '10000000' },
      begins: '{"padding":"',
    });
    expect(status).toBe(413);
  });

  test('a body of 2 MB, which is more than a question needs', async ({ demo, request }) => {
    const response = await request.post(`${demo.url}/api/v1/windows`, {
      data: { ...span, stations: [A, B], padding: 'x'.repeat(2_000_000) },
    });
    expect(response.status()).toBe(413);
    expect((await refusal(response)).code).toBe('bodyTooLarge');
  });

  test('what is not JSON', async ({ demo, request }) => {
    const broken = await request.post(`${demo.url}/api/v1/moon`, {
      headers: { 'content-type': 'application/json' },
      data: Buffer.from('{"site":'),
    });
    expect(broken.status()).toBe(400);
    const form = await request.post(`${demo.url}/api/v1/moon`, { form: { site: 'JO97ee' } });
    expect(form.status()).toBe(415);
  });
});

test.describe('changes are refused', () => {
  test('to visitors, and to people without a part in it', async ({ demo, browser, request }) => {
    const before = databaseState(demo);
    const visitor = await request.post(`${demo.url}/api/v1/stations`, {
      headers: { origin: demo.url },
      data: {},
    });
    expect(visitor.status()).toBe(401);
    const edda = await pageAs(browser, demo, 'Edda');
    const stranger = await edda.request.get(`${demo.url}/api/v1/stations`);
    const { stations } = (await stranger.json()) as {
      stations: { id: string; callSign: string }[];
    };
    const other = stations.find(({ callSign }) => callSign === 'QA1LUN')!;
    const change = await edda.request.put(`${demo.url}/api/v1/stations/${other.id}/sky`, {
      headers: { origin: demo.url },
      data: { version: 1, sky: {} },
    });
    expect(change.status()).toBe(403);
    expect(databaseState(demo)).toEqual(before);
    await edda.context().close();
  });

  test('when a call sign is none, and nothing is saved', async ({ demo, browser }) => {
    const before = databaseState(demo);
    const ylva = await pageAs(browser, demo, 'Ylva');
    for (const callSign of ['🌕🌕🌕', '', 'QA1LUN', '<b>Q1A</b>', 'Q'.repeat(40)]) {
      const response = await ylva.request.post(`${demo.url}/api/v1/stations`, {
        headers: { origin: demo.url },
        data: {
          callSign,
          name: 'Somewhere',
          locator: 'JO97ee',
          heightM: 10,
          timeZone: 'Europe/Stockholm',
          publicLocatorLength: 6,
        },
      });
      expect(response.status(), callSign).toBeGreaterThanOrEqual(400);
      expect(response.status(), callSign).toBeLessThan(500);
      expect((await refusal(response)).fields.map((field) => field.path)).toContain('callSign');
    }
    expect(databaseState(demo)).toEqual(before);
    await ylva.context().close();
  });

  test('when they come from a page of somebody else', async ({ demo, browser }) => {
    const before = databaseState(demo);
    const ylva = await pageAs(browser, demo, 'Ylva');
    for (const origin of ['https://elsewhere.example', 'null']) {
      const json = await ylva.request.post(`${demo.url}/api/v1/stations`, {
        headers: { origin },
        data: { callSign: 'QZ9NEW' },
      });
      expect(json.status(), origin).toBe(403);
      const form = await ylva.request.post(`${demo.url}/sign-out`, {
        headers: { origin },
        form: {},
      });
      expect(form.status(), origin).toBe(403);
    }
    expect(databaseState(demo)).toEqual(before);
    await ylva.context().close();
  });

  test('under another name of the host', async ({ demo }) => {
    const answer = await rawStatus(demo, {
      method: 'GET',
      path: '/',
      headers: { host: 'elsewhere.example' },
    });
    expect(answer).toBe(421);
    const port = new URL(demo.url).port;
    const own = await rawStatus(demo, {
      method: 'GET',
      path: '/',
      headers: { host: `127.0.0.1:${port}` },
    });
    expect(own).toBe(200);
  });
});

interface RawRequest {
  method: string;
  path: string;
  headers: Record<string, string>;
  /** The first part of a body whose rest is never sent. */
  begins?: string;
}

/** The status of a request with headers that browsers and fetch do not let one choose. */
function rawStatus(
  server: RunningServer,
  { method, path, headers, begins }: RawRequest,
): Promise<number> {
  return new Promise((resolve, reject) => {
    const asked = http(`${server.url}${path}`, { method, headers }, (response) => {
      resolve(response.statusCode ?? 0);
      asked.destroy();
    });
    asked.once('error', reject);
    if (begins === undefined) asked.end();
    else asked.write(begins);
  });
}
