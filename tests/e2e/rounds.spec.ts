import type { Page } from '@playwright/test';
import { paths } from '../../src/paths';
import { addStation, offerSked, type PlainStation } from './support/byApi';
import { register } from './support/people';
import type { RunningServer } from './support/server';
import { expect, test } from './support/test';
import { axeViolations, hydrated, sidewaysOverflow, watchPage } from './support/watch';

const ROLF = { name: 'Rolf', email: 'rolf@qr1rnd.example', timeZone: 'Europe/Berlin' };
const PLACES = [
  { callSign: 'QR1RND', locator: 'JO62aa', powerAtFeedW: 300 },
  { callSign: 'QR2RND', locator: 'JN47aa', powerAtFeedW: 150 },
  { callSign: 'QR3RND', locator: 'IO81aa', powerAtFeedW: 40 },
];

test('a round of three sees every direction, and the ledger of any pair', async ({
  empty,
  browser,
}) => {
  test.setTimeout(150_000);
  const page = await (await browser.newContext()).newPage();
  const { complaints } = watchPage(page);
  await register(page, empty, ROLF);
  const stations: PlainStation[] = [];
  for (const { powerAtFeedW, ...place } of PLACES) {
    const station = await addStation(page, empty, place);
    await equip(page, empty, station, powerAtFeedW);
    stations.push(station);
  }
  const [first, second, third] = stations as [PlainStation, PlainStation, PlainStation];

  await test.step('on the page of a sked, without a script for it', async () => {
    const id = await offerSked(page, empty, first, second, [third]);
    await page.goto(`${empty.url}${paths.sked(id)}`);
    const matrix = page.getByRole('table', { name: /^Margins in dB at/ });
    await expect(matrix.getByRole('link')).toHaveCount(6);
    // The weakest transmitter makes the weakest direction, and its pair stands below at first.
    const weakest = matrix.getByRole('link', { name: /weakest/ });
    await expect(weakest).toHaveCount(1);
    await expect(weakest).toHaveAccessibleName(/^QR3RND to /);
    await expect(page.locator('#pair-heading')).toContainText('QR3RND');

    const asked = matrix.getByRole('link', { name: /^QR1RND to QR2RND: / });
    const margin = await asked.locator('.chip').innerText();
    await asked.click();
    await expect(page).toHaveURL(/\?pair=QR1RND/);
    await expect(page.locator('#pair-heading')).toHaveText('QR1RND and QR2RND');
    const ledger = page.locator('.ledger').first();
    await expect(ledger.locator('.ledger__way')).toHaveText(/^QR1RND\W+to QR2RND$/);
    await expect(ledger.locator('.ledger__sum .chip')).toHaveText(`${margin} dB`);
    expect(await axeViolations(page)).toEqual([]);
  });

  await test.step('and at the hand of a window', async () => {
    const ids = stations.map(({ id }) => id);
    await page.goto(`${empty.url}${paths.windowsWith(ids, '1296')}&mode=q65-60c`);
    await hydrated(page);
    await page.getByRole('region', { name: 'Best first' }).getByRole('button').first().click();
    await page.getByRole('button', { name: /^Links of every pair at \d\d:\d\d$/ }).click();
    const dialog = page.getByRole('dialog');
    await expect(dialog).toContainText('The weakest of 6 directions decides: QR3RND to ');
    const asked = dialog.getByRole('button', { name: /^QR2RND to QR1RND: / });
    await expect(asked).toHaveAttribute('aria-pressed', 'false');
    await asked.click();
    await expect(asked).toHaveAttribute('aria-pressed', 'true');
    await expect(dialog.getByRole('heading', { level: 3 }).first()).toHaveText('QR1RND and QR2RND');
    await expect(dialog.locator('.ledger').nth(1).locator('.ledger__sum .chip')).toHaveText(
      `${await asked.locator('.chip').innerText()} dB`,
    );
    expect(await axeViolations(page)).toEqual([]);
    await page.setViewportSize({ width: 360, height: 740 });
    expect(await sidewaysOverflow(page)).toEqual([]);
  });

  expect(complaints).toEqual([]);
  await page.context().close();
});

async function equip(
  page: Page,
  server: RunningServer,
  { id }: PlainStation,
  powerAtFeedW: number,
): Promise<void> {
  const response = await page.request.put(`${server.url}${paths.api.stationEquipment(id)}`, {
    headers: { origin: server.url },
    data: {
      version: 1,
      equipment: [
        {
          band: '1296',
          setup: {
            antenna: { kind: 'dish', diameterM: 3, apertureEfficiency: 0.55 },
            polarization: 'rightCircular',
            powerAtFeedW,
            receive: { kind: 'measured', systemTemperatureK: 65 },
          },
        },
      ],
    },
  });
  expect(response.status(), await response.text()).toBe(200);
}
