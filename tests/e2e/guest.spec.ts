import type { Page } from '@playwright/test';
import { databaseState } from './support/database';
import { calendarIn, linkIn, mailsTo, waitForMail, type CaughtMail } from './support/mails';
import { PASSWORD, register } from './support/people';
import type { RunningServer } from './support/server';
import { describeStation } from './support/station';
import { expect, test } from './support/test';
import { axeViolations, hydrated, sidewaysOverflow, watchPage } from './support/watch';

const SHOTS = process.env['GUEST_SHOTS'];

/** A picture for whoever wants to look, in both schemes and widths. */
async function picture(page: Page, name: string): Promise<void> {
  if (!SHOTS) return;
  const before = page.viewportSize()!;
  for (const width of [1440, 390]) {
    await page.setViewportSize({ width, height: 900 });
    for (const colorScheme of ['light', 'dark'] as const) {
      await page.emulateMedia({ colorScheme });
      await page.screenshot({
        path: `${SHOTS}/${name}-${width}-${colorScheme}.png`,
        fullPage: true,
      });
    }
  }
  await page.emulateMedia({ colorScheme: 'light' });
  await page.setViewportSize(before);
}

async function looksRight(page: Page): Promise<void> {
  await hydrated(page);
  expect.soft(await axeViolations(page)).toEqual([]);
  const before = page.viewportSize()!;
  await page.setViewportSize({ width: 360, height: 740 });
  expect.soft(await sidewaysOverflow(page)).toEqual([]);
  await page.setViewportSize(before);
}

/** Offers the best window to somebody not registered, from the windows page. */
async function offerToGuest(
  page: Page,
  server: RunningServer,
  guest: { callSign: string; email: string; locator: string },
): Promise<void> {
  await page.goto(`${server.url}/windows`);
  await page.getByRole('button', { name: 'a partner' }).click();
  await page.getByRole('button', { name: 'Somebody not registered' }).click();
  const form = page.getByRole('group', { name: 'Somebody not registered' });
  await form.getByLabel('Call sign').fill(guest.callSign);
  await form.getByLabel('Locator').fill(guest.locator);
  await picture(page, `windows-guest-${guest.callSign}`);
  await form.getByRole('button', { name: 'Look for windows' }).click();
  await expect(page.getByText(/\d+ common windows?/).first()).toBeVisible();
  await page.getByRole('table').getByRole('button').first().click();
  await page.getByLabel('Length, min').fill('30');
  await page.getByRole('button', { name: new RegExp(`^Offer .* to ${guest.callSign}$`) }).click();
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel(`Mail address of ${guest.callSign}`).fill(guest.email);
  await dialog.getByLabel(/^Words for/).fill('Shall we try?');
  await picture(page, `offer-guest-${guest.callSign}`);
  await dialog.getByRole('button', { name: /^Send the offer/ }).click();
  await expect(page.getByText(new RegExp(`^Offer sent to ${guest.callSign}`))).toBeVisible();
}

test('a partner without an account: from an offer to an account of their own', async ({
  empty,
  browser,
}) => {
  test.setTimeout(240_000);
  const guest = { callSign: 'QZ9NEW', email: 'bea@qz9new.example', locator: 'JO40aa' };
  const YLVA = { name: 'Ylva', email: 'ylva@qa8gue.example', timeZone: 'Europe/Stockholm' };
  const ylva = await (await browser.newContext()).newPage();
  const bea = await (await browser.newContext({ timezoneId: 'Europe/Helsinki' })).newPage();
  const complaints = [watchPage(ylva), watchPage(bea)].map((watched) => watched.complaints);

  await test.step('Ylva offers a slot to somebody not registered', async () => {
    await register(ylva, empty, YLVA);
    await describeStation(ylva, empty, {
      callSign: 'QA8GUE',
      name: 'Heron bog',
      locator: 'JO77aa',
    });
    await offerToGuest(ylva, empty, guest);
  });

  const offer = await waitForMail(empty, guest.email, /QA8GUE offers a sked/);
  const link = linkIn(empty, offer, /\/answer\//);

  await test.step('the mail says what this is, and carries a tentative entry', () => {
    expect(offer.text).toContain('Shall we try?');
    expect(offer.text).toMatch(/Echotide finds the hours/);
    expect(offer.source).toMatch(/^List-Unsubscribe:\s+<http.*\/no-more\//im);
    expect(offer.source).toMatch(/^List-Unsubscribe-Post: List-Unsubscribe=One-Click/im);
    expect(calendarIn(offer)).toMatchObject({ method: 'REQUEST', status: 'TENTATIVE' });
    return Promise.resolve();
  });

  await test.step('Bea opens it without an account', async () => {
    const response = await bea.goto(link);
    expect(response!.headers()).toMatchObject({
      'cache-control': 'no-store',
      'referrer-policy': 'no-referrer',
      'x-robots-tag': 'noindex, nofollow',
    });
    await expect(bea.getByText('“Shall we try?”')).toBeVisible();
    await expect(bea.getByText(/This browser is in Europe\/Helsinki/)).toBeVisible();
    await looksRight(bea);
    await picture(bea, 'answer');
  });

  await test.step('enters what her dish can see, and moves to another window', async () => {
    await bea.getByRole('link', { name: 'Choose another time' }).click();
    await looksRight(bea);
    await picture(bea, 'answer-move');
    await bea.getByLabel('Elevation from, °').fill('12');
    await bea.getByLabel('Usable from').fill('6');
    await bea.getByLabel('Usable to').fill('24:00');
    await bea.getByLabel('Your time zone').selectOption('Europe/Berlin');
    await bea.getByLabel('Your name').fill('Bea');
    await bea.getByRole('button', { name: 'Save and compute the windows' }).click();
    await expect(bea.getByText(/^Your limits are saved/)).toBeVisible();
    await expect(bea.getByLabel('Elevation from, °')).toHaveValue('12');
    await hydrated(bea);
    await bea
      .getByRole('link', { name: /^Take / })
      .nth(1)
      .click();
    await bea.getByLabel(/^Words for/).fill('My barn is in the way before.');
    await bea.getByRole('button', { name: /^Offer \d\d:\d\d–\d\d:\d\d/ }).click();
    await expect(bea.getByText(/^Moved\./)).toBeVisible();
    await picture(bea, 'answer-moved');
  });

  await test.step('Ylva accepts, and both get the entry', async () => {
    const moved = await waitForMail(empty, YLVA.email, /QZ9NEW moved your offer/);
    expect(moved.text).toContain('Bea, QZ9NEW,');
    expect(moved.text).toContain('My barn is in the way before.');
    await ylva.goto(linkIn(empty, moved, /\/skeds\//));
    await ylva.getByRole('button', { name: /^Accept \d\d:\d\d–\d\d:\d\d$/ }).click();
    await expect(ylva.getByText(/^Agreed\./)).toBeVisible();
    await picture(ylva, 'sked-with-guest');
    const entries = await Promise.all(
      [YLVA.email, guest.email].map(async (email) =>
        calendarIn(await waitForMail(empty, email, /^Agreed/)),
      ),
    );
    for (const entry of entries) {
      expect(entry).toMatchObject({ method: 'REQUEST', status: 'CONFIRMED', uid: entries[0]!.uid });
      expect(entry.startMs).toBe(entries[0]!.startMs);
    }
  });

  await test.step('Bea cancels behind the newest link', async () => {
    const agreed = await waitForMail(empty, guest.email, /^Agreed/);
    await bea.goto(linkIn(empty, agreed, /\/answer\//));
    await bea.getByText('Cancel the sked').first().click();
    await bea.getByLabel(/^Words for/).fill('Storm.');
    await bea.getByRole('button', { name: 'Cancel the sked' }).click();
    await expect(bea.getByText(/^Cancelled\./)).toBeVisible();
    const entry = calendarIn(await waitForMail(empty, YLVA.email, /cancelled/i));
    expect(entry).toMatchObject({ method: 'CANCEL', status: 'CANCELLED' });
    expect(await bea.context().cookies()).toEqual([]);
  });

  await test.step('a link that was used says so, and brings a fresh one', async () => {
    const agreed = await waitForMail(empty, guest.email, /^Agreed/);
    await bea.goto(linkIn(empty, agreed, /\/answer\//));
    await expect(bea.getByRole('heading', { level: 1 })).toHaveText('This link was used already');
    await looksRight(bea);
    await picture(bea, 'answer-spent');
    await bea.getByRole('button', { name: 'Mail me a fresh link' }).click();
    await expect(bea.getByText(/A fresh link is on its way/)).toBeVisible();
    const fresh = await waitForMail(empty, guest.email, /^A fresh link/);
    await bea.goto(linkIn(empty, fresh, /\/answer\//));
    await expect(bea.getByText('cancelled').first()).toBeVisible();
  });

  await test.step('Bea registers with the same address and finds the sked', async () => {
    await bea.getByRole('link', { name: 'Register with this address' }).click();
    await expect(bea.getByLabel('Mail address')).toHaveValue(guest.email);
    await bea.getByLabel('Your name').fill('Bea');
    await bea.getByRole('button', { name: 'Register' }).click();
    await expect(bea.getByRole('heading', { level: 1 })).toHaveText('Check your mail');
    const mail = await waitForMail(empty, guest.email, /confirm/i);
    await bea.goto(linkIn(empty, mail, /\/confirm\//));
    await bea.getByLabel('Password').fill(PASSWORD);
    await bea.getByRole('button', { name: 'Confirm and sign in' }).click();
    await expect(bea.getByText(/Your account is open/)).toBeVisible();
    await picture(bea, 'taken-over');
    await bea.getByRole('link', { name: 'QA8GUE' }).first().click();
    await expect(bea.getByText('Storm.').first()).toBeVisible();
    await bea.goto(`${empty.url}/stations`);
    await expect(bea.getByText('QZ9NEW').first()).toBeVisible();
  });

  expect(complaints.flat()).toEqual([]);
  await ylva.context().close();
  await bea.context().close();
});

test('a link from a mail acts only when its holder presses a button here', async ({
  empty,
  browser,
  request,
}) => {
  test.setTimeout(180_000);
  const guest = { callSign: 'QZ8SAF', email: 'safe@qz8saf.example', locator: 'JO50bb' };
  const page = await (await browser.newContext()).newPage();
  await register(page, empty, {
    name: 'Signe',
    email: 'signe@qa7gue.example',
    timeZone: 'Europe/Stockholm',
  });
  await describeStation(page, empty, { callSign: 'QA7GUE', name: 'Fen', locator: 'JO66aa' });
  await offerToGuest(page, empty, guest);
  await page.context().close();
  const offer = await waitForMail(empty, guest.email, /offers a sked/);
  const link = linkIn(empty, offer, /\/answer\//);
  const before = databaseState(empty);
  const mailCount = (await mailsTo(empty, guest.email)).length;

  await test.step('a scanner that follows every link and every form that only asks', async () => {
    const seen = new Set<string>();
    const waiting = [...linksOf(empty, offer)];
    expect(waiting.length).toBeGreaterThanOrEqual(2);
    for (let next = waiting.shift(); next; next = waiting.shift()) {
      if (seen.has(next) || seen.size > 40) continue;
      seen.add(next);
      await request.head(next);
      const response = await request.get(next);
      expect(response.status(), next).toBeLessThan(500);
      expect(response.headers()['set-cookie'], next).toBeUndefined();
      if (!new URL(next).pathname.startsWith('/answer/')) continue;
      waiting.push(...asked(await response.text(), next));
    }
    expect(seen.size).toBeGreaterThan(8);
    expect(databaseState(empty)).toEqual(before);
  });

  const { id, version } = await hiddenFields(request, link);
  const form = { secret: secretOf(link), id, version };
  const post = (origin: string | null, to = link, fields: Record<string, string> = form) =>
    request.post(`${to}?_action=guests.accept`, {
      form: fields,
      maxRedirects: 0,
      headers: origin === null ? {} : { origin },
    });

  await test.step('posts that no page of ours sent are refused', async () => {
    expect((await post(null)).status()).toBe(403);
    expect((await post('https://elsewhere.example')).status()).toBe(403);
    const foreign = await request.post(`${link}?_action=guests.accept`, {
      form,
      maxRedirects: 0,
      headers: { origin: 'null', 'sec-fetch-site': 'cross-site' },
    });
    expect(foreign.status()).toBe(403);
    expect(databaseState(empty)).toEqual(before);
  });

  await test.step('a tampered secret, another sked, an older page', async () => {
    const letter = form.secret.startsWith('A') ? 'B' : 'A';
    const tampered = letter + form.secret.slice(1);
    const bad = `${empty.url}/answer/${tampered}`;
    expect((await request.get(bad)).status()).toBe(404);
    expect((await post(empty.url, bad, { ...form, secret: tampered })).status()).toBe(404);
    expect((await post(empty.url, link, { ...form, id: 'another' })).status()).toBe(404);
    const stale = await post(empty.url, link, { ...form, version: '7' });
    expect(stale.status()).toBe(409);
    expect(await stale.text()).toContain('The sked changed since you opened it.');
    expect(databaseState(empty)).toEqual(before);
  });

  await test.step('the press of the holder counts once and signs nobody in', async () => {
    const taken = await post(empty.url);
    expect(taken.status()).toBe(303);
    expect(taken.headers()['set-cookie']).toBeUndefined();
    expect(taken.headers()['location']).toMatch(/^\/answer\/[\w-]{40,}\?done=accepted$/);
    const again = await post(empty.url);
    expect(again.status()).toBe(409);
    expect(await again.text()).toContain('This link was used already');
    const account = await request.get(`${empty.url}/account`, { maxRedirects: 0 });
    expect(account.status()).toBe(303);
    await expect.poll(async () => (await mailsTo(empty, guest.email)).length).toBe(mailCount + 1);
  });

  await test.step('a mail program ends all mail with one post of its own', async () => {
    const end = linkIn(empty, offer, /\/no-more\//);
    const shown = await request.get(end);
    expect(await shown.text()).toContain('Write to me no more');
    const pressed = await request.post(end, { form: { 'List-Unsubscribe': 'One-Click' } });
    expect(pressed.status()).toBe(200);
    expect(await (await request.get(end)).text()).toContain(`No more mail to ${guest.email}`);
    expect((await request.post(`${end}x`, { form: {} })).status()).toBe(404);
  });
});

test('the offer as one plain form, and the answer, without JavaScript', async ({
  empty,
  browser,
}) => {
  test.setTimeout(180_000);
  const guest = { callSign: 'QZ7PLN', email: 'plain@qz7pln.example' };
  const scripted = await (await browser.newContext()).newPage();
  await register(scripted, empty, {
    name: 'Tove',
    email: 'tove@qa6gue.example',
    timeZone: 'Europe/Stockholm',
  });
  await describeStation(scripted, empty, { callSign: 'QA6GUE', name: 'Mire', locator: 'JO67aa' });
  const state = await scripted.context().storageState();
  await scripted.context().close();
  const options = { javaScriptEnabled: false };
  const tove = await (await browser.newContext({ ...options, storageState: state })).newPage();
  const plain = await (await browser.newContext(options)).newPage();

  await tove.goto(`${empty.url}/skeds/new-guest`);
  await tove.getByLabel('Call sign').fill(guest.callSign);
  await tove.getByLabel('Locator').fill('nowhere');
  await tove.getByLabel('Mail address').fill(guest.email);
  await tove.getByLabel('Usable from').fill('0');
  await tove.getByLabel('Usable to').fill('24:00');
  await tove.getByRole('button', { name: 'Send the offer' }).click();
  await expect(tove.getByRole('alert')).toContainText('Nothing was offered');
  await expect(tove.getByLabel('Mail address')).toHaveValue(guest.email);
  await tove.getByLabel('Locator').fill('JO50bb');
  const slot = await goodSlot(empty);
  await tove.getByLabel('Day, UTC').fill(slot.slice(0, 10));
  await tove.getByLabel('Start, UTC').fill(slot.slice(11, 16));
  await tove.getByLabel('Minutes').fill('20');
  await picture(tove, 'new-guest');
  await tove.getByRole('button', { name: 'Send the offer' }).click();
  await expect(tove.getByText(/^Your offer is on its way/)).toBeVisible();

  const offer = await waitForMail(empty, guest.email, /offers a sked/);
  await plain.goto(linkIn(empty, offer, /\/answer\//));
  await plain.getByText('Decline', { exact: true }).click();
  await plain.getByLabel(/^Words for/).fill('Away that day.');
  await plain.getByRole('button', { name: 'Decline it' }).click();
  await expect(plain.getByText(/^Declined\./)).toBeVisible();
  await plain.getByRole('link', { name: 'Offer another time' }).click();
  await plain
    .getByRole('link', { name: /^Take / })
    .first()
    .click();
  await plain.getByRole('button', { name: /^Offer \d\d:\d\d–\d\d:\d\d/ }).click();
  await expect(plain.getByText(/^Moved\./)).toBeVisible();
  await plain.getByText('Withdraw my offer').click();
  await plain.getByRole('button', { name: 'Withdraw it' }).click();
  await expect(plain.getByText(/^Your offer is taken back/)).toBeVisible();
  await tove.context().close();
  await plain.context().close();
});

/** The start of a common window of the two plain stations, in ISO 8601. */
async function goodSlot(server: RunningServer): Promise<string> {
  const from = new Date(Date.now() + 3_600_000).toISOString();
  const to = new Date(Date.now() + 14 * 86_400_000).toISOString();
  const response = await fetch(`${server.url}/api/v1/windows`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({
      from,
      to,
      minimumMinutes: 90,
      stations: ['JO67aa', 'JO50bb'].map((locator, index) => ({
        callSign: `Q${index}ABC`,
        site: { locator },
        sky: { elevationFromDeg: 12 },
      })),
    }),
  });
  const { windows } = (await response.json()) as { windows: { start: string }[] };
  return new Date(Date.parse(windows[0]!.start) + 30 * 60_000).toISOString();
}

function secretOf(link: string): string {
  return new URL(link).pathname.split('/')[2]!;
}

/** Every address of this server in the mail: text, HTML and calendar entry. */
function linksOf(server: RunningServer, mail: CaughtMail): string[] {
  const all = `${mail.text}\n${mail.html}`.match(/https?:\/\/[^\s<>"']+/g) ?? [];
  return [...new Set(all)].filter((address) => address.startsWith(server.url));
}

/** What a page links to, and where its forms that only ask lead. */
function asked(html: string, from: string): string[] {
  const links = [...html.matchAll(/<a\b[^>]*\bhref="(\/[^"#]*)/g)].map(([, address]) => address!);
  const forms = [...html.matchAll(/<form\b([^>]*)>/g)]
    .map(([, attributes]) => attributes!)
    .filter((attributes) => !/method="post"/i.test(attributes))
    .map((attributes) => /action="([^"]*)"/.exec(attributes)?.[1] ?? '');
  return [...links, ...forms]
    .map((address) => new URL(address.replaceAll('&amp;', '&'), from).toString())
    .filter((address) => !address.includes('/sign-out'));
}

async function hiddenFields(
  request: { get: (url: string) => Promise<{ text: () => Promise<string> }> },
  link: string,
): Promise<{ id: string; version: string }> {
  const html = await (await request.get(link)).text();
  const value = (name: string) =>
    new RegExp(`name="${name}" value="([^"]+)"`).exec(html)?.[1] ?? '';
  return { id: value('id'), version: value('version') };
}
