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
