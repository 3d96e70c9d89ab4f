import ICAL from 'ical.js';
import type { Browser, Page } from '@playwright/test';
import { paths } from '../../src/paths';
import { calendarIn, linkIn, mailsTo, waitForMail } from './support/mails';
import { pageAs } from './support/people';
import type { RunningServer } from './support/server';
import { expect, test } from './support/test';
import { axeViolations, hydrated, sidewaysOverflow, watchPage } from './support/watch';

const TITLE = 'Tide table night';
const SLUG = 'tide-table-night';
const GUEST = 'pelle@qw2pla.example';

test('a plan is computed, changed by hand, published, given back in part and revised', async ({
  demo,
  browser,
}) => {
  const marit = await pageAs(browser, demo, 'Marit');
  marit.setDefaultTimeout(20_000);
  const { complaints } = watchPage(marit);
  const to = (path: string) => marit.goto(demo.url + path);
  await beginWithThree(marit, demo, browser);

  await test.step('the plan is computed', async () => {
    await to(paths.activityPlan(SLUG));
    await marit.getByRole('button', { name: 'Compute a plan' }).click();
    await expect(marit.getByText(/^Done\./)).toBeVisible({ timeout: 30_000 });
    await expect(marit.getByText('3 of 3')).toBeVisible();
  });

  let fixed = '';
  await test.step('one slot is dragged, and one is fixed', async () => {
    await to(paths.activityTimetable(SLUG));
    await hydrated(marit);
    const slot = marit.getByRole('button', { name: /^QA1LUN with QB7TID,/ });
    const before = (await slot.getAttribute('aria-label'))!;
    await dragToAnotherStretch(marit, slot);
    await expect(slot).not.toHaveAttribute('aria-label', before);
    const dragged = (await slot.getAttribute('aria-label'))!;
    await marit.getByRole('button', { name: 'Undo' }).click();
    await expect(slot).toHaveAttribute('aria-label', before);
    // The same with the keyboard: lift, step, drop; lift, step, put back.
    await slot.focus();
    for (const key of ['Enter', 'ArrowRight', 'Enter']) await marit.keyboard.press(key);
    await expect(slot).not.toHaveAttribute('aria-label', before);
    fixed = (await slot.getAttribute('aria-label'))!;
    for (const key of ['Enter', 'ArrowLeft', 'Escape']) await marit.keyboard.press(key);
    await expect(slot).toHaveAttribute('aria-label', fixed);
    expect(dragged).toContain('UTC');
    await slot.click();
    await marit.getByRole('button', { name: 'Fix it' }).click();
    fixed = `${fixed}, fixed`;
    await expect(slot).toHaveAttribute('aria-label', fixed);
    await looksRight(marit);
  });

  await test.step('planning again leaves it where it is', async () => {
    await to(paths.activityTimetable(SLUG));
    await marit.getByRole('button', { name: 'Plan again around fixed slots' }).click();
    await expect(marit.getByText(/^Done\./)).toBeVisible({ timeout: 30_000 });
    await to(paths.activityTimetable(SLUG));
    await expect(marit.getByRole('button', { name: fixed })).toBeVisible();
  });

  await test.step('it is published, with a mail for each and a calendar for all', async () => {
    await marit.getByRole('link', { name: 'Publish revision 1' }).click();
    await looksRight(marit);
    await marit.getByLabel('A note for everybody').fill('Stay warm.');
    await marit.getByRole('button', { name: 'Publish revision 1' }).click();
    await expect(marit.getByRole('status')).toContainText('Revision 1 is published.');
    for (const [address, callSign] of [
      ['ylva@qa1lun.example', 'QA1LUN'],
      ['edda@qb7tid.example', 'QB7TID'],
      [GUEST, 'QW2PLA'],
    ] as const) {
      const mail = await waitForMail(demo, address, new RegExp(`^${TITLE}: .*${callSign}$`));
      expect(mail.text).toContain('Stay warm.');
      expect(calendarIn(mail)).toMatchObject({ method: 'PUBLISH', mimeMethod: 'PUBLISH' });
    }
    expect(await feed(demo)).toEqual(['CONFIRMED 0', 'CONFIRMED 0', 'CONFIRMED 0']);
    await looksRight(marit);
    await marit.getByRole('link', { name: 'QB7TID' }).first().click();
    await expect(marit.getByRole('heading', { level: 1 })).toHaveText(TITLE);
    await looksRight(marit);
  });

  await test.step('Ylva gives one slot back', async () => {
    const ylva = await pageAs(browser, demo, 'Ylva');
    await ylva.goto(demo.url + paths.activityStation(SLUG, 'QA1LUN'));
    const line = ylva.getByRole('listitem').filter({ hasText: 'The slot with QB7TID' });
    await line.getByRole('link', { name: 'give it back' }).click();
    await ylva.getByRole('button', { name: 'Cancel the sked' }).click();
    await waitForMail(demo, 'marit@qk3osl.example', /QA1LUN gave a slot back/);
    await ylva.context().close();
    await to(paths.activity(SLUG));
    await expect(marit.getByRole('cell', { name: 'given back' })).toBeVisible();
    expect((await feed(demo)).sort()).toEqual(['CANCELLED 1', 'CONFIRMED 0', 'CONFIRMED 0']);
  });

  await test.step('the plan is revised, and only who is concerned hears of it', async () => {
    await marit.getByRole('link', { name: 'Revise the plan' }).click();
    await marit.getByRole('button', { name: 'Begin revision 2' }).click();
    const slot = marit.getByRole('button', { name: /^QB7TID with QW2PLA,/ });
    await slot.click();
    await expect(marit.getByRole('button', { name: /^QA1LUN with QB7TID,/ })).toHaveCount(0);
    await marit.getByLabel('Move it to').selectOption({ index: 1 });
    const before = (await slot.getAttribute('aria-label'))!;
    await marit.getByRole('button', { name: /^Move it \d/ }).click();
    await expect(slot).not.toHaveAttribute('aria-label', before);
    await to(paths.activityPublish(SLUG));
    await expect(marit.getByText('0 new, 1 moved, 0 taken out, 1 as they were.')).toBeVisible();
    await marit.getByRole('button', { name: 'Publish revision 2' }).click();
    for (const address of ['edda@qb7tid.example', GUEST]) {
      const mail = await waitForMail(demo, address, /revision 2: changed for/);
      expect(mail.text).toContain('Moved: ');
      expect(calendarIn(mail)).toMatchObject({ method: 'PUBLISH', sequence: 1 });
    }
    const others = (await mailsTo(demo, 'ylva@qa1lun.example')).map(({ subject }) => subject);
    expect(others.filter((subject) => /revision 2/.test(subject))).toEqual([]);
  });

  await test.step('everybody can read both revisions, the guest sees theirs', async () => {
    const context = await browser.newContext();
    const visitor = await context.newPage();
    await visitor.goto(demo.url + paths.activityRevision(SLUG, 1));
    await expect(visitor.getByText('This is revision 1, which was replaced.')).toBeVisible();
    await looksRight(visitor);
    expect(await visitor.content()).not.toMatch(/@qa1lun|@qw2pla/);
    const mail = await waitForMail(demo, GUEST, /revision 2/);
    await visitor.goto(linkIn(demo, mail, /\/roster\//));
    await expect(visitor.getByRole('heading', { name: 'Your slots, revision 2' })).toBeVisible();
    await visitor.getByText('If you cannot keep a slot').click();
    await visitor.getByRole('button', { name: /^Give the slot with QB7TID back/ }).click();
    await expect(visitor.getByRole('status')).toContainText('The slot is given back.');
    await looksRight(visitor);
    await context.close();
    await waitForMail(demo, 'marit@qk3osl.example', /QW2PLA gave a slot back/);
  });
  expect(complaints).toEqual([]);
});

/** Marit's activity with Ylva, Edda and somebody without an account, all of whom answer that they come. */
async function beginWithThree(marit: Page, demo: RunningServer, browser: Browser): Promise<void> {
  await test.step('Marit invites three, and they answer', async () => {
    await marit.goto(demo.url + paths.newActivity);
    await marit
      .getByRole('region', { name: 'Good weekends ahead' })
      .getByRole('link')
      .first()
      .click();
    await marit.getByLabel('Title').fill(TITLE);
    await marit.getByRole('button', { name: 'Begin the activity' }).click();
    for (const callSign of ['QA1LUN', 'QB7TID']) {
      await marit.goto(`${demo.url}${paths.activityRoster(SLUG)}?find=${callSign}`);
      await marit.getByRole('button', { name: `Invite ${callSign}` }).click();
    }
    await marit.getByLabel('Call sign', { exact: true }).fill('QW2PLA');
    await marit.getByLabel('Locator', { exact: true }).fill('JN58');
    await marit.getByLabel('Mail address').fill(GUEST);
    await marit.getByRole('button', { name: 'Invite by mail' }).click();
    await expect(marit.getByRole('row', { name: /QW2PLA/ })).toBeVisible();
    for (const name of ['Ylva', 'Edda'] as const) {
      const page = await pageAs(browser, demo, name);
      await page.goto(demo.url + paths.activityAnswer(SLUG));
      await comesAtAllHours(page);
      await page.context().close();
    }
    const context = await browser.newContext();
    const guest = await context.newPage();
    const mail = await waitForMail(demo, GUEST, /invited/);
    await guest.goto(linkIn(demo, mail, /\/roster\//));
    await comesAtAllHours(guest);
    await context.close();
  });
}

async function comesAtAllHours(page: Page): Promise<void> {
  await page.getByLabel('Coming', { exact: true }).check();
  await page.getByLabel(/^1296 MHz/).check();
  await page.getByLabel('The hours chosen here').check();
  await page.getByRole('checkbox', { name: /UTC/ }).evaluateAll((boxes) =>
    boxes.forEach((box) => {
      (box as HTMLInputElement).checked = true;
    }),
  );
  await page.getByRole('button', { name: 'Send the answer' }).click();
  await expect(page.getByRole('status')).toContainText('is coming');
}

/** Drags the slot by the mouse over the framed stretch that is farthest from it, and lets it go. */
async function dragToAnotherStretch(page: Page, slot: ReturnType<Page['getByRole']>) {
  await slot.scrollIntoViewIfNeeded();
  const box = (await slot.boundingBox())!;
  const y = box.y + box.height / 2;
  const fromX = box.x + box.width / 2;
  await page.mouse.move(fromX, y);
  await page.mouse.down();
  await page.mouse.move(fromX + 8, y, { steps: 2 });
  await expect(page.locator('.tt-stretch').first()).toBeVisible();
  const stretches = await page.locator('.tt-row--concerned').first().locator('.tt-stretch').all();
  let target = fromX;
  for (const stretch of stretches) {
    const at = (await stretch.boundingBox())!;
    for (const x of [at.x + 4, at.x + at.width - 4]) {
      if (Math.abs(x - fromX) > Math.abs(target - fromX) && Math.abs(x - fromX) < 400) target = x;
    }
  }
  await page.mouse.move(target, y, { steps: 5 });
  await page.mouse.up();
}

/** Status and SEQUENCE of each entry of the feed of the whole plan. */
async function feed(demo: RunningServer): Promise<string[]> {
  const response = await fetch(demo.url + paths.activityCalendar(SLUG));
  expect(response.headers.get('content-type')).toContain('text/calendar');
  const calendar = new ICAL.Component(ICAL.parse(await response.text()) as unknown[]);
  return calendar
    .getAllSubcomponents('vevent')
    .map(
      (event) =>
        `${String(event.getFirstPropertyValue('status'))} ${String(event.getFirstPropertyValue('sequence'))}`,
    );
}

async function looksRight(page: Page): Promise<void> {
  await hydrated(page);
  expect.soft(await axeViolations(page, { coloursOnly: false }), page.url()).toEqual([]);
  const size = page.viewportSize()!;
  await page.setViewportSize({ width: 360, height: 740 });
  expect.soft(await sidewaysOverflow(page), `${page.url()}, 360 px`).toEqual([]);
  await page.setViewportSize(size);
}
