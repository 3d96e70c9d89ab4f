import {
  expect,
  type Browser,
  type BrowserContext,
  type BrowserContextOptions,
  type Page,
} from '@playwright/test';
import { DEMO_SIGN_INS } from '../../../db/seed/signIns';
import { linkIn, waitForMail } from './mails';
import type { RunningServer } from './server';

export const PASSWORD = 'a kettle on the roof';

export interface Newcomer {
  name: string;
  email: string;
  timeZone: string;
}

/** Registers through the pages and the mail; ends signed in on the page for a new station. */
export async function register(page: Page, server: RunningServer, who: Newcomer): Promise<void> {
  await page.goto(`${server.url}/register`);
  await page.getByLabel('Your name').fill(who.name);
  await page.getByLabel('Mail address').fill(who.email);
  await page.getByLabel('Your time zone').selectOption(who.timeZone);
  await page.getByRole('button', { name: 'Register' }).click();
  await expect(page.getByRole('heading', { level: 1 })).toHaveText('Check your mail');
  const mail = await waitForMail(server, who.email, /confirm/i);
  await page.goto(linkIn(server, mail, /\/confirm\//));
  await page.getByLabel('Password').fill(PASSWORD);
  await page.getByRole('button', { name: 'Confirm and sign in' }).click();
  await expect(page).toHaveURL(`${server.url}/stations/new`);
}

export async function signIn(
  page: Page,
  server: RunningServer,
  email: string,
  password: string,
): Promise<void> {
  await page.goto(`${server.url}/sign-in`);
  await page.getByLabel('Mail address').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page).toHaveURL(`${server.url}/`);
}

type DemoName = 'Ylva' | 'Edda' | 'Marit' | 'Osvin';
const sessions = new Map<string, Awaited<ReturnType<BrowserContext['storageState']>>>();

/** A page of a new browser context in which the demo person is signed in; null is a visitor. */
export async function pageAs(
  browser: Browser,
  server: RunningServer,
  name: DemoName | null,
  options: BrowserContextOptions = {},
): Promise<Page> {
  const key = `${server.url} ${name}`;
  let state = sessions.get(key);
  if (name && !state) {
    const { email, password } = DEMO_SIGN_INS.find((person) => person.name === name)!;
    const context = await browser.newContext();
    await signIn(await context.newPage(), server, email, password);
    state = await context.storageState();
    sessions.set(key, state);
    await context.close();
  }
  const context = await browser.newContext({
    ...options,
    ...(state ? { storageState: state } : {}),
  });
  return context.newPage();
}
