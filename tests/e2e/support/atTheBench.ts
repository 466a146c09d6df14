import type { Page } from 'playwright-core';
import { until } from './chromium';
import type { RealServer } from './realServer';

/* What a person does at the bench, by the words on the screen. */

/** Enrols this browser with a fresh code, from the front door. */
export async function enrol(
  page: Page,
  world: { server: RealServer; enrolmentCode: () => Promise<string> },
  deviceName: string,
): Promise<void> {
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
  await page.getByText('Key your PIN').waitFor({ state: 'hidden' });
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

/** Keys flow and pressure and presses SAVE. What says that it is saved is the next lift, or the end of the run. */
export async function keyReading(page: Page, flow: string, pressure: string): Promise<void> {
  await keyNumber(page, flow);
  await page.getByRole('button', { name: 'On to the pressure' }).click();
  await keyNumber(page, pressure);
  await page.getByRole('button', { name: 'SAVE', exact: true }).click();
}

/** Waits until a lift stands on the screen as the one to set. */
export async function atLift(page: Page, lift: string): Promise<void> {
  await page.getByText(lift, { exact: true }).first().waitFor();
}

/** Starts a session on the head, stage and bench that the shop has, and a run of its first port. Works offline.
 * @param lifts texts in millimetres, where the shop's unit is that
 */
export async function startRun(page: Page, address: string, lifts: readonly string[]): Promise<void> {
  if (!page.url().endsWith('/bench/sessions/new')) await page.goto(`${address}/bench/sessions/new`);
  const choose = (name: string | RegExp) => page.getByRole('radio', { name }).click();
  await choose(/Alder customer/);
  await choose(/Alder head/);
  await choose(/Alder as received/);
  await choose('Typed one by one');
  await page.getByLabel('Lifts, with spaces between them').fill(lifts.join(' '));
  await page.getByRole('button', { name: 'Start the session' }).click();
  await page.getByRole('button', { name: 'Read. Go on' }).click();
  await page.getByRole('button', { name: 'New run: intake 1' }).click();
  await page.getByRole('button', { name: 'Start intake 1' }).click();
  await atLift(page, `${lifts[0]} mm`);
}
