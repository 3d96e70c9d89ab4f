import { expect, type Page } from '@playwright/test';
import type { RunningServer } from './server';

export interface NewStation {
  callSign: string;
  name: string;
  locator: string;
}

/**
 * Describes a station through its pages, beginning on the page for a new one: place, sky with a blocked sector
 * (in numbers, then moved by keyboard in the dome), equipment, hours. Returns its id.
 */
export async function describeStation(
  page: Page,
  server: RunningServer,
  station: NewStation,
): Promise<string> {
  await page.goto(`${server.url}/stations/new`);
  await page.getByLabel('Call sign').fill(station.callSign);
  await page.getByLabel('Name of the place').fill(station.name);
  await page.getByLabel('Locator', { exact: true }).fill(station.locator);
  await page.getByLabel('Height, m').fill('40');
  await page.getByRole('button', { name: 'Save and go on to the sky' }).click();
  await expect(page).toHaveURL(/\/stations\/[\w-]+\/sky/);
  const id = /stations\/([\w-]+)\/sky/.exec(page.url())![1]!;
  await describeSky(page);
  await describeEquipment(page);
  await page.goto(`${server.url}/stations/${id}/hours`);
  await page.getByRole('button', { name: 'Awake, 07:00–23:00' }).click();
  await page.getByRole('button', { name: 'Save the hours' }).click();
  await expect(page.getByText('The hours are saved.')).toBeVisible();
  return id;
}

async function describeSky(page: Page): Promise<void> {
  await page.getByLabel('Lowest elevation, °').fill('5');
  await page.getByLabel('Highest elevation, °').fill('85');
  await page.getByRole('button', { name: 'Add by numbers' }).click();
  const sector = page.getByRole('group', { name: /^Blocked sector|^sector|barn/i }).last();
  await sector.getByLabel('What stands there').fill('barn');
  const barn = page.getByRole('group', { name: /barn/ });
  await barn.getByLabel('Azimuth from, °').fill('250');
  await barn.getByLabel('Azimuth to, °').fill('270');
  await barn.getByLabel('Elevation to, °').fill('12');
  const inDome = page.getByRole('button', { name: /barn, azimuth 250/ });
  await inDome.focus();
  await page.keyboard.press('ArrowRight');
  await page.keyboard.press('Shift+ArrowRight');
  await expect(barn.getByLabel('Azimuth from, °')).toHaveValue('256');
  await expect(barn.getByLabel('Azimuth to, °')).toHaveValue('276');
  await page.getByRole('button', { name: 'Save and go on to the equipment' }).click();
  await expect(page).toHaveURL(/\/equipment/);
}

async function describeEquipment(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Add 1296 MHz' }).click();
  const band = page.getByRole('region', { name: '1296 MHz' });
  await band.getByLabel('Diameter, m').fill('3');
  await band.getByLabel('Power at the feed, W').fill('150');
  await band.getByLabel('System temperature, K').fill('65');
  await expect(
    page.getByText('RF exposure').or(page.getByText('Before you transmit')).first(),
  ).toBeVisible();
  await page.getByRole('button', { name: 'Save and finish' }).click();
  await expect(page).not.toHaveURL(/\/equipment/);
}
