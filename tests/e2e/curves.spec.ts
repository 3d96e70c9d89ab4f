import type { Page } from '@playwright/test';
import { paths } from '../../src/paths';
import { pageAs } from './support/people';
import { expect, test } from './support/test';
import { axeViolations, hydrated, sidewaysOverflow, watchPage } from './support/watch';

const PAIR = ['QA1LUN', 'QB7TID'];
const PANELS = ['Elevation', 'Degradation', 'Doppler', 'Spread', 'Margin'];

/** The windows of some stations on 1296 MHz with the best one opened. */
async function bestWindow(page: Page, url: string, stations: string[]): Promise<void> {
  await page.goto(`${url}${paths.windowsWith(stations, '1296')}&mode=q65-60c`);
  await hydrated(page);
  await page.getByRole('region', { name: 'Best first' }).getByRole('button').first().click();
  await expect(page.getByRole('slider', { name: 'Time cursor' })).toBeVisible();
}

/** Every figure beside the curves, in their order. */
const shownFigures = (page: Page) => page.locator('.curves__panels .curve__value').allInnerTexts();

async function clockOfCursor(page: Page): Promise<string> {
  const text = await page
    .getByRole('slider', { name: 'Time cursor' })
    .getAttribute('aria-valuetext');
  return text!.replace(' UTC', '');
}

test.describe('curves through a window', () => {
  test('open, follow the time cursor, and say what their table says', async ({ demo, browser }) => {
    const page = await pageAs(browser, demo, null);
    const { complaints } = watchPage(page);
    await bestWindow(page, demo.url, PAIR);
    await expect(page.locator('.curves__panels')).toHaveCount(0);
    await page.getByText('Curves through the window').click();
    const titles = page.locator('.curve__title');
    for (const title of PANELS) await expect(titles.filter({ hasText: title })).not.toHaveCount(0);
    const panels = await titles.count();
    await expect(page.locator('.curve canvas')).toHaveCount(panels);
    await expect(page.locator('.curve__hand')).toHaveCount(panels);

    const cursor = page.getByRole('slider', { name: 'Time cursor' });
    const before = { clock: await clockOfCursor(page), figures: await shownFigures(page) };
    const handBefore = await page.locator('.curve__hand').first().boundingBox();
    await cursor.focus();
    await cursor.press('PageDown');
    await expect(cursor).not.toHaveAttribute('aria-valuetext', `${before.clock} UTC`);
    await expect.poll(() => shownFigures(page)).not.toEqual(before.figures);
    const handAfter = await page.locator('.curve__hand').first().boundingBox();
    expect(handAfter!.x).toBeLessThan(handBefore!.x - 5);

    for (let press = 0; press < 3; press += 1) {
      if (/:(00|15|30|45)$/.test(await clockOfCursor(page))) break;
      await cursor.press('ArrowRight');
    }
    const clock = await clockOfCursor(page);
    expect(clock).toMatch(/:(00|15|30|45)$/);
    await expect(page.getByText(`figures at ${clock} UTC`)).toBeVisible();
    await page.getByText('The same in figures, every 15 minutes').click();
    const table = page.getByRole('region', { name: 'The curves in figures' });
    const row = table.getByRole('row').filter({
      has: page.getByRole('rowheader', { name: new RegExp(`(^| )${clock}$`) }),
    });
    await expect(row).toHaveCount(1);
    const inTable = await row.getByRole('cell').allInnerTexts();
    expect(inTable.length).toBeGreaterThan(6);
    expect(inTable).toEqual(await shownFigures(page));
    expect(new Set(inTable).size).toBeGreaterThan(3);

    expect(await axeViolations(page)).toEqual([]);
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test('are dragged by hand: the cursor of the tide and every figure follow', async ({
    demo,
    browser,
  }) => {
    const page = await pageAs(browser, demo, null);
    await bestWindow(page, demo.url, PAIR);
    await page.getByText('Curves through the window').click();
    const plot = page.locator('.curve .u-over').first();
    await plot.scrollIntoViewIfNeeded();
    const box = (await plot.boundingBox())!;
    const clocks: string[] = [];
    const rows: string[][] = [];
    for (const share of [0.2, 0.7]) {
      await page.mouse.move(box.x + box.width * share, box.y + box.height / 2);
      await page.mouse.down();
      await page.mouse.up();
      await expect.poll(() => clockOfCursor(page)).not.toBe(clocks.at(-1) ?? '');
      clocks.push(await clockOfCursor(page));
      await expect(page.getByText(`figures at ${clocks.at(-1)} UTC`)).toBeVisible();
      rows.push(await shownFigures(page));
    }
    expect(rows[1]).not.toEqual(rows[0]);
    await page.context().close();
  });

  test('fit a phone', async ({ demo, browser }) => {
    const page = await pageAs(browser, demo, null, { viewport: { width: 360, height: 740 } });
    await bestWindow(page, demo.url, PAIR);
    await page.getByText('Curves through the window').click();
    await expect(page.locator('.curve canvas').first()).toBeVisible();
    await page.getByText('The same in figures, every 15 minutes').click();
    expect(await sidewaysOverflow(page)).toEqual([]);
    await page.context().close();
  });
});
