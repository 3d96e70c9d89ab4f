import { addStation } from './support/byApi';
import { register } from './support/people';
import { expect, test } from './support/test';

const CHAIN = [
  { kind: 'loss', name: 'Relay', lossDb: 0.1 },
  { kind: 'amplifier', name: 'Feed amplifier', gainDb: 30, noiseFigureDb: 0.3 },
  { kind: 'loss', name: 'Cable', lossDb: 4 },
  { kind: 'amplifier', name: 'Receiver', gainDb: 0, noiseFigureDb: 6 },
];

test('a chain is reordered by keys, measured, and the newest record goes into the budget', async ({
  page,
  empty: server,
}) => {
  await register(page, server, {
    name: 'Runa',
    email: 'runa@chain.example',
    timeZone: 'Europe/Stockholm',
  });
  const { id } = await addStation(page, server, { callSign: 'QR1UNA', locator: 'JO97ee' });
  const setup = {
    antenna: { kind: 'dish', diameterM: 3, apertureEfficiency: 0.55 },
    polarization: 'rightCircular',
    powerAtFeedW: 200,
    receive: { kind: 'stages', stages: CHAIN },
  };
  const equipped = await page.request.put(`${server.url}/api/v1/stations/${id}/equipment`, {
    headers: { origin: server.url },
    data: { version: 1, equipment: [{ band: '1296', setup }] },
  });
  expect(equipped.status()).toBe(200);
  await page.goto(`${server.url}/stations/${id}/equipment`);
  const band = page.getByRole('region', { name: '1296 MHz', exact: true });
  const names = () =>
    band
      .getByLabel(/^Stage \d/)
      .evaluateAll((fields) => fields.map((field) => (field as HTMLInputElement).value));
  await expect(band.getByRole('img', { name: /^The receive chain: Cold sky/ })).toBeVisible();
  expect(await names()).toEqual(['Relay', 'Feed amplifier', 'Cable', 'Receiver']);

  await expect(async () => {
    await band.getByLabel('Loss, dB').first().press('Alt+ArrowDown');
    expect((await names())[0]).toBe('Feed amplifier');
  }).toPass();
  await expect(band.getByLabel('Loss, dB').first()).toBeFocused();
  await band.getByRole('button', { name: 'Move stage 2 towards the feed' }).click();
  expect((await names())[0]).toBe('Relay');

  const noise = page.getByRole('region', { name: 'Measured noise' });
  await noise.getByLabel('Cold sky, K').fill('20');
  await noise.getByLabel('Step, dB').fill('13');
  await noise.getByRole('button', { name: 'Add the measurement' }).click();
  await expect(noise.getByRole('alert')).toContainText('step of only 11.61 dB');
  await expect(noise.getByLabel('Step, dB')).toHaveValue('13');
  await noise.getByLabel('Step, dB').fill('8.1');
  await noise.getByRole('button', { name: 'Add the measurement' }).click();
  await expect(noise.getByRole('row').nth(1)).toContainText('49.5');

  await band.getByLabel('Receiver', { exact: true }).selectOption('record');
  await page.getByRole('button', { name: 'Save the equipment' }).click();
  await expect(noise.getByRole('row').nth(1)).toContainText('in use');
  await page.reload();
  await expect(band).toContainText('49.5 K, measured on');
});
