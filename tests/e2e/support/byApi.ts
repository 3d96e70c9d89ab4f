import { expect, type Page } from '@playwright/test';
import type { RunningServer } from './server';

export interface PlainStation {
  id: string;
  callSign: string;
  locator: string;
}

/** Registers a station of the signed-in person without the pages. */
export async function addStation(
  page: Page,
  server: RunningServer,
  { callSign, locator }: Omit<PlainStation, 'id'>,
): Promise<PlainStation> {
  const response = await page.request.post(`${server.url}/api/v1/stations`, {
    headers: { origin: server.url },
    data: {
      callSign,
      name: 'Somewhere',
      locator,
      heightM: 10,
      timeZone: 'UTC',
      publicLocatorLength: 6,
    },
  });
  expect(response.status()).toBe(201);
  const { id } = (await response.json()) as { id: string };
  return { id, callSign, locator };
}

/** Offers half an hour in the middle of the next long common window. Returns the id of the sked. */
export async function offerSked(
  page: Page,
  server: RunningServer,
  from: PlainStation,
  to: PlainStation,
  more: PlainStation[] = [],
): Promise<string> {
  const hourMs = 3_600_000;
  const nowMs = Date.now();
  const found = await page.request.post(`${server.url}/api/v1/windows`, {
    data: {
      stations: [from, to, ...more].map(({ callSign, locator }) => ({
        callSign,
        site: { locator },
      })),
      from: new Date(nowMs + hourMs).toISOString(),
      to: new Date(nowMs + 20 * 24 * hourMs).toISOString(),
      minimumMinutes: 120,
    },
  });
  expect(found.status()).toBe(200);
  const { windows } = (await found.json()) as { windows: { start: string; end: string }[] };
  const { start, end } = windows[0]!;
  const middleMs = Math.floor((Date.parse(start) + Date.parse(end)) / 2 / 60_000) * 60_000;
  const offered = await page.request.post(`${server.url}/api/v1/skeds`, {
    headers: { origin: server.url },
    data: {
      station: from.id,
      with: [to, ...more].map(({ id }) => id),
      band: '1296',
      mode: 'q65-60c',
      start: new Date(middleMs).toISOString(),
      end: new Date(middleMs + hourMs / 2).toISOString(),
    },
  });
  expect(offered.status()).toBe(201);
  return ((await offered.json()) as { id: string }).id;
}
