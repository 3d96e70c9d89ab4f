import type { Page } from '@playwright/test';
import { addStation, offerSked } from './support/byApi';
import { calendarIn, linkIn, mailsTo, waitForMail } from './support/mails';
import { PASSWORD, register, signIn } from './support/people';
import { expect, test } from './support/test';

test.use({ javaScriptEnabled: false });

test('registers, signs out and signs in without JavaScript', async ({ empty, page }) => {
  const who = { name: 'Ailo', email: 'ailo@qn1noj.example', timeZone: 'Europe/Oslo' };
  await register(page, empty, who);
  await page.goto(`${empty.url}/account`);
  await expect(page.getByLabel('Your name')).toHaveValue('Ailo');
  await expect(page.getByLabel('Your time zone')).toHaveValue('Europe/Oslo');
  await page.getByRole('button', { name: 'Sign out', exact: true }).first().click();
  await page.goto(`${empty.url}/account`);
  await expect(page).toHaveURL(/\/sign-in\?next=/);
  await signIn(page, empty, who.email, PASSWORD);
});

test('signs in by a mailed link that looking at it does not spend', async ({ empty, page }) => {
  const who = { name: 'Siv', email: 'siv@qn2noj.example', timeZone: 'UTC' };
  await register(page, empty, who);
  await page.context().clearCookies();
  await page.goto(`${empty.url}/sign-in/link`);
  await page.getByLabel('Mail address').fill(who.email);
  await page.locator('form').getByRole('button').last().click();
  const mail = await waitForMail(empty, who.email, /sign/i);
  const link = linkIn(empty, mail, /\/sign-in\/link\//);
  for (const method of ['HEAD', 'GET', 'GET']) {
    expect((await fetch(link, { method, redirect: 'manual' })).status, method).toBe(200);
  }
  await page.goto(link);
  await page.locator('main form').getByRole('button').click();
  await expect(page).toHaveURL(`${empty.url}/`);
  await page.context().clearCookies();
  await page.goto(link);
  await expect(page.getByRole('heading', { level: 1 })).toHaveText('This link was used already');
});

test('answers an offer from its mail without JavaScript', async ({ empty, browser }) => {
  const ines = { name: 'Ines', email: 'ines@qn4noj.example', timeZone: 'Europe/Madrid' };
  const jari = { name: 'Jari', email: 'jari@qn5noj.example', timeZone: 'Europe/Helsinki' };
  const [first, second] = await Promise.all(
    [ines, jari].map(async (who) => {
      const context = await browser.newContext({ javaScriptEnabled: false });
      const page = await context.newPage();
      await register(page, empty, who);
      return page;
    }),
  );
  const from = await addStation(first!, empty, { callSign: 'QN4NOJ', locator: 'IN80' });
  const to = await addStation(second!, empty, { callSign: 'QN5NOJ', locator: 'KP20' });
  await offerSked(first!, empty, from, to);

  const offer = await waitForMail(empty, jari.email, /QN4NOJ offers a sked/);
  const link = linkIn(empty, offer, /\/skeds\//);
  expect((await fetch(link, { method: 'HEAD', redirect: 'manual' })).status).toBeLessThan(400);
  await second!.goto(link);
  await second!.getByRole('button', { name: /^Accept / }).click();
  await expect(second!.getByText(/^Agreed\./)).toBeVisible();
  for (const { email } of [ines, jari]) {
    const mail = await waitForMail(empty, email, /agreed/i);
    expect(calendarIn(mail)).toMatchObject({ method: 'REQUEST', mimeMethod: 'REQUEST' });
  }
  await first!.context().close();
  await second!.context().close();
});

test('drops out of a sked of three, and subscribes to the others, without JavaScript', async ({
  empty,
  browser,
}) => {
  const people = ['tua', 'ulf', 'vera'].map((name, index) => ({
    name,
    email: `${name}@qn${index + 6}noj.example`,
    timeZone: 'UTC',
  }));
  const pages = await Promise.all(
    people.map(async (who) => {
      const context = await browser.newContext({ javaScriptEnabled: false });
      const page = await context.newPage();
      await register(page, empty, who);
      return page;
    }),
  );
  const stations = [];
  for (const [index, page] of pages.entries()) {
    const callSign = `QN${index + 6}NOJ`;
    stations.push(await addStation(page, empty, { callSign, locator: `JO5${index}` }));
  }
  const id = await offerSked(pages[0]!, empty, stations[0]!, stations[1]!, [stations[2]!]);
  for (const page of pages.slice(1)) {
    await page.goto(`${empty.url}/skeds/${id}`);
    await page.getByRole('button', { name: /^Accept / }).click();
  }
  const leaver = pages[2]!;
  await expect(leaver.getByText(/^Agreed\./)).toBeVisible();
  await leaver.getByRole('link', { name: 'Drop out' }).click();
  await leaver.getByLabel(/^Words for/).fill('The mast is down.');
  await leaver.getByRole('button', { name: 'Drop out' }).click();
  await expect(leaver.getByText(/^You dropped out\. The others get a mail/)).toBeVisible();
  await expect(leaver.getByText('QN6NOJ and QN7NOJ keep the slot.')).toBeVisible();

  const told = await waitForMail(empty, people[0]!.email, /QN8NOJ dropped out/);
  expect(told.text).toContain('The mast is down.');
  expect(calendarIn(told)).toMatchObject({ method: 'REQUEST', status: 'CONFIRMED' });
  const own = await waitForMail(empty, people[2]!.email, /You dropped out/);
  expect(calendarIn(own)).toMatchObject({ method: 'CANCEL', mimeMethod: 'CANCEL' });

  const [reader] = pages as [Page];
  await reader.goto(`${empty.url}/calendar`);
  await reader.getByRole('button', { name: 'Make an address: All your skeds' }).click();
  const address = await reader.getByLabel('Address of the calendar').inputValue();
  const feed = await fetch(address);
  expect(feed.headers.get('content-type')).toContain('text/calendar');
  expect(feed.headers.get('cache-control')).toContain('private');
  expect(feed.headers.get('referrer-policy')).toBe('no-referrer');
  expect(await feed.text()).toContain(`UID:${calendarIn(told).uid}`);
  const etag = feed.headers.get('etag')!;
  expect((await fetch(address, { headers: { 'if-none-match': etag } })).status).toBe(304);
  await reader.goto(`${empty.url}/calendar`);
  await expect(reader.getByLabel('Address of the calendar')).toHaveCount(0);
  await reader.getByRole('button', { name: 'End the address: All your skeds' }).click();
  await expect(reader.getByText('The address is ended.', { exact: false })).toBeVisible();
  expect((await fetch(address)).status).toBe(404);
  await Promise.all(pages.map((page) => page.context().close()));
});

test('keeps what was typed and says what is wrong, without telling whom it knows', async ({
  empty,
  page,
}) => {
  await page.goto(`${empty.url}/register`);
  await page.getByLabel('Your name').fill('Runi');
  await page.getByLabel('Mail address').fill('runi at home');
  await page.getByRole('button', { name: 'Register' }).click();
  await expect(page.getByLabel('Your name')).toHaveValue('Runi');
  await expect(page.getByLabel('Mail address')).toHaveValue('runi at home');
  await expect(page.getByLabel('Mail address')).toHaveAttribute('aria-invalid', 'true');
  await expect(
    page.getByText('That is not a mail address', { exact: false }).first(),
  ).toBeVisible();

  await page.goto(`${empty.url}/sign-in`);
  await page.getByLabel('Mail address').fill('nobody@qn3noj.example');
  await page.getByLabel('Password').fill('not the right one');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page.getByText('do not belong together', { exact: false }).first()).toBeVisible();
  await expect(page.getByLabel('Mail address')).toHaveValue('nobody@qn3noj.example');
  await expect(page.getByLabel('Password')).toHaveValue('');
  expect(await mailsTo(empty, 'runi at home')).toEqual([]);
});
