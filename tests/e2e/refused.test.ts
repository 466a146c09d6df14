import pg from 'pg';
import { atLift, enrol, keyPin, keyReading, startRun } from './support/atTheBench';
import { phone, RealBrowser, until } from './support/chromium';
import { makeWorld, type World } from './support/world';

/* What a person meets when something is refused: it says what happened and what to do, and nothing is lost. */

let world: World;
let tablet: RealBrowser;
let admin: pg.Client;

beforeAll(async () => {
  world = await makeWorld({ liftUnit: 'mm' });
  tablet = new RealBrowser(phone);
  await world.server.start();
  admin = new pg.Client(world.db.adminUrl);
  await admin.connect();
});
afterAll(async () => {
  await tablet.dispose();
  await admin.end();
  await world.close();
});

test('a wrong code, a wrong PIN, a device that the shop forgot: the reading waits and is sent in the end', async () => {
  const page = await tablet.open();
  await page.goto(`${world.server.address}/bench`);
  await page.getByLabel('Code').fill('ABCD-2345');
  await page.getByLabel('Name of this device').fill('Shed phone');
  await page.getByRole('button', { name: 'Enrol this device' }).click();
  await page.getByText('That code is not valid any more').waitFor();
  expect(await page.getByLabel('Code').inputValue()).toBe('ABCD-2345');
  await enrol(page, world, 'Shed phone');

  await page.getByRole('button', { name: world.operator.name }).click();
  for (const digit of '000000') await page.getByRole('button', { name: digit, exact: true }).click();
  await page.getByText('That did not match').waitFor();
  await page.getByRole('button', { name: 'Back to the names' }).click();
  await keyPin(page, world.operator.name, world.operator.pin);
  await startRun(page, world.server.address, ['2', '4']);
  await until('the run to arrive', async () => (await admin.query('select id from runs')).rows.length === 1);

  await admin.query('delete from devices');
  await keyReading(page, '29.8', '28');
  await atLift(page, '4 mm');
  await page.goto(`${world.server.address}/bench/unsent`);
  const again = page.getByRole('button', { name: 'Enrol this device again' });
  await page.getByText('The shop no longer knows this device').first().waitFor();
  await page.getByText('29.8').first().waitFor();
  await again.click();
  await page.getByLabel('Code').fill(await world.enrolmentCode());
  await page.getByRole('button', { name: 'Enrol this device' }).click();
  await until('the reading to arrive', async () => {
    const { rows } = await admin.query<{ flow: string }>('select flow_text as flow from readings');
    return rows.map(({ flow }) => flow).join() === '29.8';
  });
  await page
    .getByText(/all sent/)
    .first()
    .waitFor();
}, 180_000);
