import pg from 'pg';
import type { Page } from 'playwright-core';
import { enrol, keyPin, startRun } from './support/atTheBench';
import { phone, RealBrowser, until } from './support/chromium';
import { makeWorld, type World } from './support/world';

/* One tab owns the device's database; another says so, and can take over without losing what was keyed. */

let world: World;
let tablet: RealBrowser;

beforeAll(async () => {
  world = await makeWorld({ liftUnit: 'mm' });
  tablet = new RealBrowser(phone);
  await world.server.start();
});
afterAll(async () => {
  await tablet.dispose();
  await world.close();
});

test('a second tab says that the first has the bench, and takes over with everything keyed', async () => {
  const first = await tablet.open();
  await enrol(first, world, 'Shed phone');
  await keyPin(first, world.operator.name, world.operator.pin);
  await first.getByText('No session yet').waitFor();
  await startRun(first, world.server.address, ['2', '4', '6']);
  await first.getByText('Intake 1 · 1 of 3').waitFor();
  await keyOnKeyboard(first, '29.8');
  await first.getByText('Intake 1 · 2 of 3').waitFor();

  const second = await tablet.newPage();
  await second.goto(first.url());
  await second.getByRole('button', { name: 'Use it here' }).click();
  // the first one hands over: it reloads and stands second now
  await first.getByRole('button', { name: 'Use it here' }).waitFor();
  await keyPin(second, world.operator.name, world.operator.pin);
  await second.getByText('Intake 1 · 2 of 3').waitFor();
  await keyOnKeyboard(second, '67.3');
  const admin = new pg.Client(world.db.adminUrl);
  await admin.connect();
  await until('both readings to be in the shop', async () => {
    const { rows } = await admin.query<{ flow: string }>(
      'select flow_text as flow from readings order by reading_ordinal',
    );
    return rows.map(({ flow }) => flow).join(' ') === '29.8 67.3';
  });
  await admin.end();
}, 180_000);

/** Flow, pressure and SAVE on a hardware keyboard, as fast as hands are: quicker is taken for bounce. */
async function keyOnKeyboard(page: Page, flow: string): Promise<void> {
  for (const key of [...flow, 'Enter', '2', '7', 'Enter']) await page.keyboard.press(key, { delay: 60 });
}
