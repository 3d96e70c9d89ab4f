import { pageAs } from './support/people';
import { expect, test } from './support/test';
import { hydrated, watchPage } from './support/watch';

test.describe('the year ahead', () => {
  test('of a chosen pair and band leads from its picture and weekends to the windows', async ({
    demo,
    browser,
  }) => {
    const page = await pageAs(browser, demo, null);
    const { complaints } = watchPage(page);
    await page.goto(`${demo.url}/windows`);
    await page.getByRole('link', { name: 'Which weekends of the year are good' }).click();
    await expect(page.getByRole('heading', { level: 1 })).toHaveText('The year ahead');
    await expect(page.getByText('Europe and North America:')).toBeVisible();
    await expect(page.getByRole('columnheader', { name: 'Look closer' })).toHaveCount(0);

    await page.getByLabel('Between').fill('qa1lun');
    await page.getByLabel('and', { exact: true }).fill('QB7TID');
    await page.getByLabel('on', { exact: true }).selectOption('432');
    await page.getByLabel('for a year from').fill('2027-03-01');
    await page.getByRole('button', { name: 'Show the year' }).click();
    await expect(page.getByText('QA1LUN and QB7TID:')).toBeVisible();
    await expect(page.getByLabel('on', { exact: true })).toHaveValue('432');

    const picture = page.getByRole('img', { name: /^Degradation, distance, declination/ });
    const whole = picture.filter({ visible: true });
    await expect(whole).toHaveCount(1);
    await expect(whole).toHaveAccessibleName(/from Mon 1 Mar 2027 to Mon 28 Feb 2028|2027.*2028/);
    await expect(whole.locator('.ribbon__line')).toHaveCount(3);
    await expect(whole.locator('.ribbon__weekend')).toHaveCount(12);

    const weekends = page.getByRole('region', { name: 'Best weekends' }).getByRole('row');
    await expect(weekends).toHaveCount(13);
    await page.getByText('The year by day, in figures').click();
    const days = page.getByRole('region', { name: 'The year by day' }).getByRole('row');
    await expect(days).toHaveCount(366);

    const best = weekends.nth(1);
    const name = await best.getByRole('rowheader').innerText();
    await best.getByRole('link', { name: `Windows of ${name}` }).click();
    await expect(page).toHaveURL(/\/windows\?.*band=432/);
    await hydrated(page);
    const address = new URL(page.url());
    expect(address.searchParams.getAll('station')).toHaveLength(2);
    expect(address.searchParams.get('from')).toMatch(/^202[78]-\d\d-\d\d$/);
    await expect(page.getByText(/\d+ common windows?/).first()).toBeVisible();
    await expect(page.getByRole('button', { name: 'First station: QA1LUN' })).toBeVisible();
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test('says what it cannot read, keeps it typed, and asks nobody for a script', async ({
    demo,
    browser,
  }) => {
    const page = await pageAs(browser, demo, null, { javaScriptEnabled: false });
    await page.goto(`${demo.url}/outlook?here=QZ9NIL&there=Africa&band=1296`);
    await expect(page.getByRole('alert')).toContainText('QZ9NIL');
    await expect(page.getByLabel('Between')).toHaveValue('QZ9NIL');
    await expect(page.getByRole('region', { name: 'Best weekends' })).toHaveCount(0);
    await page.getByLabel('Between').fill('JO97ee');
    await page.getByRole('button', { name: 'Show the year' }).click();
    await expect(page.getByText('JO97ee and Africa:')).toBeVisible();
    await expect(page.getByRole('region', { name: 'Best weekends' })).toBeVisible();
    await page.context().close();
  });
});
