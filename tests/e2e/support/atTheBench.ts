import type { Page } from 'playwright-core';
import { until } from './chromium';
import type { World } from './world';

/* What a person does at the bench, by the words on the screen. */

/** Enrols this browser with a fresh code, from the front door. */
export async function enrol(page: Page, world: World, deviceName: string): Promise<void> {
  await page.goto(`${world.server.address}/bench`);
  await page.getByLabel('Code').fill(await world.enrolmentCode());
  await page.getByLabel('Name of this device').fill(deviceName);
  await page.getByRole('button', { name: 'Enrol this device' }).click();
  await page.getByText('Who is at the bench?').waitFor();
}

/** Picks a name and keys the PIN on the pad. */
export async function keyPin(page: Page, name: string, pin: string): Promise<void> {
  await page.getByRole('button', { name }).click();
  for (const digit of pin) await page.getByRole('button', { name: digit, exact: true }).click();
}

/** Waits until the app's files are kept for working without a network. */
export async function keptForOffline(page: Page): Promise<void> {
  await page.evaluate(async () => {
    await navigator.serviceWorker.ready;
  });
  await until('the service worker to be in charge', () =>
    page.evaluate(() => navigator.serviceWorker.controller !== null),
  );
}

/** Keys one number on the pad. */
export async function keyNumber(page: Page, text: string): Promise<void> {
  for (const letter of text) {
    const name = letter === '.' ? 'Decimal point' : letter === ',' ? 'Decimal comma' : letter;
    await page.getByRole('button', { name, exact: true }).click();
  }
}

/** Keys flow and pressure and presses SAVE, and waits for the screen to say that it is saved. */
export async function keyReading(page: Page, flow: string, pressure: string): Promise<void> {
  await keyNumber(page, flow);
  await page.getByRole('button', { name: 'On to the pressure' }).click();
  await keyNumber(page, pressure);
  await page.getByRole('button', { name: 'SAVE', exact: true }).click();
  await page.getByText('Saved on this device').first().waitFor();
}

/** Waits until a lift stands on the screen as the one to set. */
export async function atLift(page: Page, lift: string): Promise<void> {
  await page.getByText(lift, { exact: true }).first().waitFor();
}
