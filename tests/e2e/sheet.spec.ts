import type { Browser, Page } from '@playwright/test';
import { paths } from '../../src/paths';
import { pageAs, signIn } from './support/people';
import type { RunningServer } from './support/server';
import { expect, test } from './support/test';
import { hydrated } from './support/watch';
import { DEMO_SIGN_INS } from '../../db/seed/signIns';

interface Row {
  id: string;
  state: string;
  start: string;
  end: string;
  parties: { callSign: string; mine: boolean }[];
}

/** An agreed sked of Ylva's with one partner, in a browser of its own. */
async function agreedSked(
  browser: Browser,
  demo: RunningServer,
): Promise<{ page: Page; sked: Row }> {
  const page = await pageAs(browser, demo, 'Ylva');
  const { skeds } = (await (await page.request.get(demo.url + paths.api.skeds)).json()) as {
    skeds: Row[];
  };
  const sked = skeds.find(({ state, parties }) => state === 'agreed' && parties.length === 2);
  return { page, sked: sked! };
}

async function keepSheet(page: Page, demo: RunningServer, id: string): Promise<void> {
  await page.goto(demo.url + paths.skedSheet(id));
  await expect(page.getByText('Kept on this device', { exact: false })).toBeVisible({
    timeout: 25_000,
  });
}

/** Whether the address opens; what the browser shows on its own counts as not. */
async function opens(page: Page, address: string): Promise<boolean> {
  return page.goto(address).then(
    () => true,
    () => false,
  );
}

test('a sheet that was opened opens again without a connection, and nothing else does', async ({
  demo,
  browser,
}) => {
  const { page, sked } = await agreedSked(browser, demo);
  const sheet = demo.url + paths.skedSheet(sked.id);
  await keepSheet(page, demo, sked.id);
  await expect(page.getByText('Saved copy of', { exact: false })).toBeHidden();
  const rows = await page.locator('.sheet__track tbody tr').allTextContents();

  await page.context().setOffline(true);
  await page.reload();
  await expect(page.getByText('Saved copy of', { exact: false })).toBeVisible();
  expect(await page.locator('.sheet__track tbody tr').allTextContents()).toEqual(rows);
  // With its style and its font, which come from the kept files.
  expect(
    await page.evaluate(async () => {
      await document.fonts.ready;
      return [
        getComputedStyle(document.querySelector('.periods')!).display,
        document.fonts.check('400 15px "Source Sans 3"'),
      ];
    }),
  ).toEqual(['grid', true]);
  for (const path of [paths.sked(sked.id), paths.skedLive(sked.id), paths.skeds, paths.home]) {
    expect(await opens(page, demo.url + path), path).toBe(false);
  }

  await page.context().setOffline(false);
  await page.goto(sheet);
  await expect(page.getByText('Saved copy of', { exact: false })).toBeHidden();
  const kept = await page.evaluate(async () => {
    const urls: string[] = [];
    for (const name of await caches.keys()) {
      for (const { url } of await (await caches.open(name)).keys()) urls.push(url);
    }
    return urls.map((url) => new URL(url).pathname);
  });
  expect(kept.length).toBeGreaterThan(3);
  expect(
    kept.filter((path) => !path.startsWith('/_astro/') && path !== paths.skedSheet(sked.id)),
  ).toEqual([]);
  await page.context().close();
});

test('signing out takes the kept sheets away', async ({ demo, browser }) => {
  const { page, sked } = await agreedSked(browser, demo);
  await keepSheet(page, demo, sked.id);
  await page.goto(demo.url + paths.account);
  await page.getByRole('button', { name: 'Sign out', exact: true }).first().click();
  await page.goto(demo.url + paths.stations);
  await page.context().setOffline(true);
  expect(await opens(page, demo.url + paths.skedSheet(sked.id))).toBe(false);
  await page.context().close();
});

test('a kept sheet is not shown to the next person at the same browser', async ({
  demo,
  browser,
}) => {
  const { page, sked } = await agreedSked(browser, demo);
  await keepSheet(page, demo, sked.id);
  // The session is over without anybody having signed out.
  await page.context().clearCookies({ name: /session-token/ });
  const { email, password } = DEMO_SIGN_INS.find(({ name }) => name === 'Marit')!;
  await signIn(page, demo, email, password);
  await page.context().setOffline(true);
  expect(await opens(page, demo.url + paths.skedSheet(sked.id))).toBe(false);
  await page.context().close();
});

test('a sheet fits on one or two pages of either paper', async ({ demo, browser }) => {
  const { page, sked } = await agreedSked(browser, demo);
  await page.goto(demo.url + paths.skedSheet(sked.id));
  for (const format of ['A4', 'Letter']) {
    const pdf = (await page.pdf({ format })).toString('latin1');
    const pages = pdf.match(/\/Type\s*\/Page\b(?!s)/g)?.length ?? 0;
    expect(pages, format).toBeGreaterThanOrEqual(1);
    expect(pages, format).toBeLessThanOrEqual(2);
  }
  await page.context().close();
});

test('what all parties see alike is set without JavaScript', async ({ demo, browser }) => {
  const { page: finder, sked } = await agreedSked(browser, demo);
  await finder.context().close();
  const page = await pageAs(browser, demo, 'Ylva', { javaScriptEnabled: false });
  await page.goto(demo.url + paths.skedSheet(sked.id));
  const first = await page.locator('.periods__one .periods__who').first().textContent();
  const choose = async (who: 'east' | 'west', convention: string) => {
    await page.getByText('Change who transmits first').click();
    await page.getByLabel('Transmits first').selectOption(who);
    await page.getByLabel('Doppler on the dials').selectOption(convention);
    await page.getByRole('button', { name: 'Set for everybody' }).click();
    await expect(page.getByText('Set. Every party’s sheet says the same.')).toBeVisible();
  };
  await choose('west', 'receiveOnly');
  await expect(page.locator('.periods__one .periods__who').first()).not.toHaveText(first!);
  await expect(page.getByText('Correction on receive only', { exact: true }).first()).toBeVisible();
  await choose('east', 'constantAtMoon');
  await expect(page.locator('.periods__one .periods__who').first()).toHaveText(first!);
  await page.context().close();
});

test('the settings, by JSON, are for parties only', async ({ demo, browser }) => {
  const { page, sked } = await agreedSked(browser, demo);
  const put = (of: Page, data: unknown) =>
    of.request.put(demo.url + paths.api.skedSheet(sked.id), {
      headers: { origin: demo.url },
      data,
    });
  const wrong = await put(page, { eastFirst: 'yes', convention: 'constantAtMoon' });
  expect(wrong.status()).toBe(400);
  const stranger = await pageAs(browser, demo, 'Osvin');
  const settings = { eastFirst: true, convention: 'constantAtMoon' };
  expect((await put(stranger, settings)).status()).toBe(404);
  const taken = await put(page, settings);
  expect([taken.status(), await taken.json()]).toEqual([200, settings]);
  for (const path of [
    paths.skedSheet(sked.id),
    paths.skedLive(sked.id),
    paths.skedTrack(sked.id),
  ]) {
    expect((await stranger.request.get(demo.url + path)).status(), path).toBe(404);
  }
  const csv = await page.request.get(demo.url + paths.skedTrack(sked.id, undefined, 60));
  expect(csv.headers()['content-type']).toContain('text/csv');
  const minutes = (Date.parse(sked.end) - Date.parse(sked.start)) / 60_000;
  expect((await csv.text()).trim().split('\r\n')).toHaveLength(minutes + 2);
  await page.context().close();
  await stranger.context().close();
});

test('the live view counts down, changes hands, keeps the ticks and ends', async ({
  demo,
  browser,
}) => {
  const { page, sked } = await agreedSked(browser, demo);
  await page.setViewportSize({ width: 390, height: 844 });
  const startMs = Date.parse(sked.start);
  await page.clock.install({ time: startMs - 5000 });
  await page.goto(demo.url + paths.skedLive(sked.id));
  await hydrated(page);
  await expect(page.getByText('Not begun yet')).toBeVisible();
  // The clock of the test is not the server's, and the view says so.
  await expect(page.getByRole('alert')).toContainText('clock');

  await page.clock.pauseAt(startMs + 30_000);
  const turn = page.locator('.live__who');
  const firstTurn = await turn.textContent();
  expect(firstTurn).toMatch(/ transmits?$/);
  await expect(page.locator('.live__seconds')).toContainText('30');
  await expect(page.locator('.live__time')).toHaveText(
    new Date(startMs + 30_000)
      .toISOString()
      .slice(11, 19)
      .replace(/:(\d\d)$/, '$1'),
  );
  await page.getByRole('button', { name: 'Call signs' }).click();

  await page.clock.runFor(29_000);
  await expect(page.locator('.live__seconds')).toContainText('1');
  await expect(turn).toHaveText(firstTurn!);
  await page.clock.runFor(1000);
  await expect(turn).not.toHaveText(firstTurn!);
  await expect(page.locator('.live__seconds')).toContainText('60');
  const [mine, other] = (await turn.textContent()) === 'You transmit' ? [turn, null] : [null, turn];
  if (mine) await expect(mine).toHaveClass(/transmit/);
  if (other) await expect(other).not.toHaveClass(/transmit/);

  await page.reload();
  await hydrated(page);
  await expect(page.getByRole('button', { name: 'Call signs' })).toHaveAttribute(
    'aria-pressed',
    'true',
  );
  await page.clock.pauseAt(Date.parse(sked.end) + 1000);
  await expect(turn).toHaveText('The sked is over');
  await expect(page.getByRole('link', { name: 'How did it go?' })).toHaveAttribute(
    'href',
    paths.skedReport(sked.id),
  );
  await page.context().close();
});
