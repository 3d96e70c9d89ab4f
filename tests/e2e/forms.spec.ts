import { paths } from '../../src/paths';
import { databaseState } from './support/database';
import { pageAs } from './support/people';
import { expect, test } from './support/test';
import { hydrated } from './support/watch';

test('a station with wrong figures is not saved, and what was typed stays', async ({
  demo,
  browser,
}) => {
  const page = await pageAs(browser, demo, 'Ylva');
  const before = databaseState(demo);
  await page.goto(demo.url + paths.newStation);
  await hydrated(page);
  await page.getByLabel('Call sign').fill('🌕🌕');
  await page.getByLabel('Name of the place').fill('Nowhere');
  await page.getByLabel('Locator', { exact: true }).fill('ZZ99');
  await page.getByLabel('Height, m').fill('as high as a tree');
  await page.getByRole('button', { name: 'Save and go on to the sky' }).click();
  await expect(page.getByText(/“🌕” does not belong in it/).first()).toBeVisible();
  await expect(page.getByText(/first pair of the locator “ZZ99”/).first()).toBeVisible();
  await expect(page.getByText(/Height must be a number/).first()).toBeVisible();
  await expect(page.getByLabel('Call sign')).toHaveValue('🌕🌕');
  await expect(page.getByLabel('Locator', { exact: true })).toHaveValue('ZZ99');
  await expect(page.getByLabel('Height, m')).toHaveValue('as high as a tree');
  expect(databaseState(demo)).toEqual(before);
  await page.context().close();
});

test('a horizon file with letters in it is refused with its line', async ({ demo, browser }) => {
  const page = await pageAs(browser, demo, 'Edda');
  const before = databaseState(demo);
  const stations = await page.request.get(demo.url + paths.api.stations);
  const { id } = (
    (await stations.json()) as { stations: { id: string; callSign: string }[] }
  ).stations.find(({ callSign }) => callSign === 'QB7TID')!;
  await page.goto(demo.url + paths.stationSky(id));
  await hydrated(page);
  await page.getByLabel('Choose a CSV file').setInputFiles({
    name: 'horizon.csv',
    mimeType: 'text/csv',
    buffer: Buffer.from('azimuth,elevation\n0,2\n90,tree\n372,4\n'),
  });
  const refused = page.getByRole('alert');
  await expect(refused).toContainText('horizon.csv was not taken');
  await expect(refused).toContainText('Line 3:');
  await expect(refused).toContainText('Line 4:');
  await expect(refused).toContainText('372');
  expect(databaseState(demo)).toEqual(before);
  await page.context().close();
});

test('a sked is not moved to where the Moon is not, and other slots are named', async ({
  demo,
  browser,
}) => {
  const page = await pageAs(browser, demo, 'Ylva');
  const before = databaseState(demo);
  const answer = await page.request.get(`${demo.url}${paths.api.skeds}?state=offered`);
  const { skeds } = (await answer.json()) as {
    skeds: { id: string; start: string; waitsForViewer: boolean }[];
  };
  const { id, start } = skeds.find(({ waitsForViewer }) => waitsForViewer)!;
  // A whole day holds moonset at every station of the demo.
  await page.goto(demo.url + paths.skedMove(id));
  await hydrated(page);
  await page.getByLabel('Day, UTC').fill(start.slice(0, 10));
  await page.getByLabel('Start, UTC').fill('00:00');
  await page.getByLabel('Minutes').fill('1440');
  await page.getByLabel(/^Words for/).fill('All day long.');
  await page.getByRole('button', { name: /^Offer / }).click();
  await expect(page.getByRole('heading', { name: 'Nothing was changed' })).toBeVisible();
  await expect(page.getByText(/^The Moon|^The start has passed/).first()).toBeVisible();
  await expect(page.getByLabel('Minutes')).toHaveValue('1440');
  await expect(page.getByLabel(/^Words for/)).toHaveValue('All day long.');
  expect(databaseState(demo)).toEqual(before);
  await page.context().close();
});
