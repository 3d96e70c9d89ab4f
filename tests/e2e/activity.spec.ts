import { paths } from '../../src/paths';
import { linkIn, mailsTo, waitForMail } from './support/mails';
import { pageAs } from './support/people';
import { expect, test } from './support/test';

test('a coordinator begins an activity, invites a member and somebody without an account, and both answer', async ({
  demo,
  browser,
}) => {
  const marit = await pageAs(browser, demo, 'Marit');
  const roster = `${demo.url}${paths.activityRoster('quiet-moon-evening')}`;
  await test.step('Marit begins it', async () => {
    await marit.goto(`${demo.url}${paths.newActivity}`);
    const weekends = marit.getByRole('region', { name: 'Good weekends ahead' });
    await weekends.getByRole('link').first().click();
    await marit.getByLabel('Slots begin every').selectOption('30');
    await marit.getByRole('button', { name: 'Begin the activity' }).click();
    await expect(marit.getByRole('alert')).toContainText('The title is missing.');
    await expect(marit.getByLabel('Slots begin every')).toHaveValue('30');
    await marit.getByLabel('Title').fill('Quiet Moon evening');
    await marit.getByRole('button', { name: 'Begin the activity' }).click();
    await expect(marit).toHaveURL(`${roster}?done=created`);
  });

  await test.step('she invites both', async () => {
    await marit.getByLabel('Call sign, name or locator').fill('qb7');
    await marit.getByRole('button', { name: 'Find' }).click();
    await marit.getByRole('button', { name: 'Invite QB7TID' }).click();
    await expect(marit.getByRole('status')).toHaveText(/QB7TID is on the roster/);
    await marit.getByLabel('Call sign', { exact: true }).fill('qw1ses');
    await marit.getByLabel('Locator', { exact: true }).fill('JO9');
    await marit.getByLabel('Mail address').fill('sesse@qw1ses.example');
    await marit.getByRole('button', { name: 'Invite by mail' }).click();
    await expect(marit.getByRole('alert')).toContainText('it needs 4, 6, 8 or 10');
    await marit.getByLabel('Locator', { exact: true }).fill('JO97');
    await marit.getByRole('button', { name: 'Invite by mail' }).click();
    await expect(marit.getByRole('row', { name: /QW1SES/ })).toContainText('no answer yet');
  });

  await test.step('Edda answers on her page', async () => {
    const edda = await pageAs(browser, demo, 'Edda');
    await edda.goto(`${demo.url}${paths.activities}`);
    await edda
      .getByRole('row', { name: /Quiet Moon evening/ })
      .getByRole('link', { name: 'waits for your answer' })
      .click();
    await edda.getByLabel('Coming', { exact: true }).check();
    await edda.getByLabel(/^Your wish for QW1SES/).selectOption('3');
    // Pressing an hour means these hours.
    await edda
      .getByRole('checkbox', { name: /02:00–03:00 UTC/ })
      .first()
      .click();
    await expect(edda.getByLabel('The hours chosen here')).toBeChecked();
    await edda.getByRole('button', { name: 'Send the answer' }).click();
    await expect(edda.getByRole('status')).toHaveText(/QB7TID is coming/);
    await edda.context().close();
  });

  await test.step('the other answers from the mail, without JavaScript and without signing in', async () => {
    const mail = await waitForMail(demo, 'sesse@qw1ses.example', /invited/);
    const link = linkIn(demo, mail, /\/roster\//);
    for (const method of ['HEAD', 'GET']) expect((await fetch(link, { method })).status).toBe(200);
    const context = await browser.newContext({ javaScriptEnabled: false });
    const guest = await context.newPage();
    await guest.goto(link);
    await guest.getByLabel('Coming', { exact: true }).check();
    await guest.getByRole('button', { name: 'Send the answer' }).click();
    await expect(guest.getByRole('alert')).toContainText('Choose at least one band');
    await expect(guest.getByLabel('Coming', { exact: true })).toBeChecked();
    await guest.getByLabel(/^1296 MHz/).check();
    await guest.getByLabel('Note to the coordinator').fill('After sunset <only>');
    await guest.getByRole('button', { name: 'Send the answer' }).click();
    await expect(guest.getByRole('status')).toHaveText(/QW1SES is coming/);
    expect(guest.url()).not.toContain(link);
    expect(await context.cookies()).toEqual([]);

    await guest.goto(link);
    await expect(guest.getByText('This link was used already')).toBeVisible();
    await expect(guest.getByRole('button', { name: /the answer/ })).toHaveCount(0);
    await guest.getByRole('button', { name: 'Mail me a fresh link' }).click();
    await expect(guest.getByRole('status')).toContainText('A fresh link is on its way');
    const fresh = await waitForMail(demo, 'sesse@qw1ses.example', /your link/);
    await guest.goto(linkIn(demo, fresh, /\/roster\//));
    await expect(guest.getByRole('button', { name: 'Change the answer' })).toBeVisible();
    await context.close();
  });

  await test.step('Marit sees both, and who can meet whom', async () => {
    await marit.goto(roster);
    await expect(marit.getByText('2 stations, 2 coming, 0 without answer')).toBeVisible();
    await expect(marit.getByRole('row', { name: /QW1SES/ })).toContainText('After sunset <only>');
    await marit.getByRole('link', { name: 'Wishes' }).click();
    await expect(marit.getByRole('columnheader', { name: /QB7TID/ })).toBeVisible();
    await expect(marit.getByText(/1 wishes on 1296 MHz/)).toBeVisible();
    expect(await mailsTo(demo, 'edda@qb7tid.example')).not.toEqual([]);
  });

  await test.step('she takes them off again, so that the demo is as it was', async () => {
    for (const callSign of ['QB7TID', 'QW1SES']) {
      await marit.goto(roster);
      await marit.getByText('More', { exact: true }).first().click();
      await marit.getByRole('button', { name: `Take ${callSign} off the roster` }).click();
      await expect(marit.getByRole('status')).toHaveText(`${callSign} is off the roster.`);
    }
  });
});

test('a roster file is looked at line by line, and nothing of it is kept on cancelling', async ({
  demo,
  browser,
}) => {
  const page = await pageAs(browser, demo, 'Marit');
  await page.goto(`${demo.url}${paths.activityImport('two-tides-weekend')}`);
  await page.getByLabel('File, CSV').setInputFiles({
    name: 'roster.csv',
    mimeType: 'text/csv',
    buffer: Buffer.from('call sign;bands\nQH3VOR;1296\nQA1LUN;432\nQT2ZEP;50\n'),
  });
  await page.getByRole('button', { name: 'Look at the lines' }).click();
  await expect(page.getByRole('alert')).toContainText('Line 3: QA1LUN is on the roster already.');
  await expect(page.getByRole('alert')).toContainText('50 MHz is not a band of this activity.');
  await expect(page.getByRole('row', { name: /QH3VOR/ })).toContainText('registered');
  await page.getByRole('link', { name: 'Cancel' }).click();
  await expect(page.getByText('16 stations')).toBeVisible();

  await page.goto(`${demo.url}${paths.activityImport('two-tides-weekend')}`);
  await page.getByLabel('File, CSV').setInputFiles({
    name: 'roster.csv',
    mimeType: 'text/csv',
    buffer: Buffer.alloc(1_000_000, 'x'),
  });
  await page.getByRole('button', { name: 'Look at the lines' }).click();
  await expect(page.getByRole('alert')).toContainText('more than 300 kB');
});
