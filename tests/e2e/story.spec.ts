import type { Page } from '@playwright/test';
import { calendarIn, linkIn, waitForMail, type CalendarEntry } from './support/mails';
import { register } from './support/people';
import { describeStation } from './support/station';
import { expect, test } from './support/test';
import { watchPage } from './support/watch';

const ASTA = { name: 'Asta', email: 'asta@qa9sto.example', timeZone: 'Europe/Stockholm' };
const BRAM = { name: 'Bram', email: 'bram@qb9sto.example', timeZone: 'Europe/London' };
const QA9STO = { callSign: 'QA9STO', name: 'Alder marsh', locator: 'JO77aa' };
const QB9STO = { callSign: 'QB9STO', name: 'Slate hill', locator: 'IO92aa' };

test('two operators meet on the Moon: from registering to a cancelled calendar entry', async ({
  empty,
  browser,
}) => {
  test.setTimeout(180_000);
  const asta = await (await browser.newContext()).newPage();
  const bram = await (await browser.newContext({ timezoneId: 'Europe/London' })).newPage();
  const complaints = [watchPage(asta), watchPage(bram)].map((watched) => watched.complaints);

  await test.step('both register and describe their stations', async () => {
    await Promise.all([
      register(asta, empty, ASTA).then(() => describeStation(asta, empty, QA9STO)),
      register(bram, empty, BRAM).then(() => describeStation(bram, empty, QB9STO)),
    ]);
  });

  await test.step('Asta finds a common window and offers a slot of it', async () => {
    await asta.goto(`${empty.url}/windows`);
    await expect(asta.getByRole('button', { name: 'First station: QA9STO' })).toBeVisible();
    await choosePartner(asta, 'QB9STO');
    await expect(asta.getByText(/\d+ common windows?/).first()).toBeVisible();
    const raster = asta.getByRole('group', { name: /Common windows of QA9STO, QB9STO/ });
    await expect(raster).toBeVisible();
    await asta.getByRole('table').getByRole('button').first().click();
    await asta.getByLabel('Length, min').fill('30');
    await asta.getByRole('button', { name: /^Offer \d\d:\d\d–\d\d:\d\d to QB9STO$/ }).click();
    const dialog = asta.getByRole('dialog');
    await dialog.getByLabel(/^Words for QB9STO/).fill('Shall we try?');
    await dialog.getByRole('button', { name: /^Send the offer/ }).click();
    await expect(asta.getByText(/^Offer sent to QB9STO/)).toBeVisible();
  });

  const offer = await waitForMail(empty, BRAM.email, /QA9STO offers a sked/);
  expect(offer.text).toContain('Shall we try?');
  const link = linkIn(empty, offer, /\/skeds\//);
  const first = await slotShown(asta, link);

  await test.step('Bram opens the link of the mail and moves the sked', async () => {
    await bram.goto(link);
    await expect(bram.getByText('Shall we try?').first()).toBeVisible();
    await bram.getByRole('link', { name: 'Move it' }).click();
    const earlier = new Date(first.startMs + 10 * 60_000);
    await bram.getByLabel('Start, UTC').fill(earlier.toISOString().slice(11, 16));
    await bram.getByLabel('Minutes').fill('20');
    await bram.getByLabel(/^Words for/).fill('Ten minutes later, please.');
    await bram.getByRole('button', { name: /^Offer \d\d:\d\d–\d\d:\d\d/ }).click();
    await expect(bram.getByText(/^Moved\./)).toBeVisible();
  });

  await test.step('Asta reads of it and accepts', async () => {
    const moved = await waitForMail(empty, ASTA.email, /moved your offer/);
    expect(moved.text).toContain('Ten minutes later, please.');
    await asta.goto(linkIn(empty, moved, /\/skeds\//));
    await asta.getByRole('button', { name: /^Accept \d\d:\d\d–\d\d:\d\d$/ }).click();
    await expect(asta.getByText(/^Agreed\./)).toBeVisible();
  });

  let agreed: CalendarEntry | undefined;
  await test.step('both get a calendar entry that says the agreed time', async () => {
    for (const { email } of [ASTA, BRAM]) {
      const mail = await waitForMail(empty, email, /agreed/i);
      const entry = calendarIn(mail);
      expect(entry).toMatchObject({ method: 'REQUEST', mimeMethod: 'REQUEST' });
      expect(entry.startMs).toBe(first.startMs + 10 * 60_000);
      expect(entry.endMs).toBe(first.startMs + 30 * 60_000);
      if (agreed) {
        expect(entry.uid).toBe(agreed.uid);
        expect(entry.sequence).toBe(agreed.sequence);
      }
      agreed = entry;
    }
  });

  await test.step('both find it in their calendar', async () => {
    for (const [page, partner] of [
      [asta, 'QB9STO'],
      [bram, 'QA9STO'],
    ] as const) {
      await page.goto(`${empty.url}/calendar`);
      const list = page.getByRole('region', { name: 'The next four weeks as a list' });
      await expect(list.getByText(partner).first()).toBeVisible();
      await expect(page.locator('.fc')).toBeVisible();
    }
  });

  await test.step('Bram cancels, and the entry is withdrawn from both calendars', async () => {
    await bram.goto(link);
    await bram.getByRole('link', { name: 'Cancel the sked' }).click();
    await bram.getByLabel(/^Words for/).fill('Storm.');
    await bram.getByRole('button', { name: 'Cancel the sked' }).click();
    await expect(bram.getByText(/^Cancelled\./)).toBeVisible();
    for (const { email } of [ASTA, BRAM]) {
      const entry = calendarIn(await waitForMail(empty, email, /cancelled/i));
      expect(entry).toMatchObject({ method: 'CANCEL', mimeMethod: 'CANCEL', uid: agreed!.uid });
      expect(entry.sequence).toBeGreaterThan(agreed!.sequence);
      expect(entry.startMs).toBe(agreed!.startMs);
    }
  });

  expect(complaints.flat()).toEqual([]);
  await asta.context().close();
  await bram.context().close();
});

/** Puts the partner into the question, by its call sign. */
async function choosePartner(page: Page, callSign: string): Promise<void> {
  await page.getByRole('button', { name: 'a partner' }).click();
  await page.getByLabel('Call sign, name or locator').fill(callSign);
  await page.getByRole('button', { name: new RegExp(`^${callSign}`) }).click();
}

/** The slot as the API gives it to a party of the sked that the link leads to. */
async function slotShown(page: Page, link: string): Promise<{ startMs: number; endMs: number }> {
  const { origin, pathname } = new URL(link);
  const response = await page.request.get(`${origin}/api/v1${pathname}`);
  const { start, end } = (await response.json()) as { start: string; end: string };
  return { startMs: Date.parse(start), endMs: Date.parse(end) };
}
