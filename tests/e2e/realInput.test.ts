import pg from 'pg';
import kamili from '@/tests/vectors/intakeKamili2017.json';
import { atLift, enrol, keptForOffline, keyPin, keyReading, startRun } from './support/atTheBench';
import { phone, RealBrowser, until, wide } from './support/chromium';
import { makeWorld, type World } from './support/world';

/* An intake of valve 40 mm at 28 inH2O, drawing; source of the figures: tests/vectors/intakeKamili2017.json.
 * Keyed on a phone without a network and without a server, killed half-way, finished, sent, read at the desk. */

const rows = kamili.rows.map((row) => [row.liftMm, row.flowCfm, kamili.pressureInH2O] as const);
let world: World;
let tablet: RealBrowser;
let desk: RealBrowser;

beforeAll(async () => {
  world = await makeWorld({ liftUnit: 'mm' });
  tablet = new RealBrowser(phone);
  desk = new RealBrowser(wide);
  await world.server.start();
});
afterAll(async () => {
  await tablet.dispose();
  await desk.dispose();
  await world.close();
});

test('a run keyed without a network, killed half-way, is what the supervisor and PostgreSQL hold', async () => {
  let page = await tablet.open();
  await enrol(page, world, 'Shed phone');
  await keyPin(page, world.operator.name, world.operator.pin);
  await page.getByText('No session yet').waitFor();
  await keptForOffline(page);

  // no server, no network, and the browser is gone: a cold start in the shed
  await world.server.stop();
  await tablet.kill();
  page = await tablet.open();
  await page.context().setOffline(true);
  await page.goto(`${world.server.address}/bench/sessions/new`);
  await keyPin(page, world.operator.name, world.operator.pin);
  await startRun(
    page,
    world.server.address,
    rows.map(([lift]) => lift),
  );
  for (const [lift, flow, pressure] of rows.slice(0, 2)) {
    await atLift(page, `${lift} mm`);
    await keyReading(page, flow, pressure);
  }
  const runAddress = page.url();
  // half of the third number is on the display when the battery dies
  await page.getByRole('button', { name: '9', exact: true }).click();
  await atLift(page, '6 mm');
  await tablet.kill();

  page = await tablet.open();
  await page.context().setOffline(true);
  await page.goto(runAddress);
  await keyPin(page, world.operator.name, world.operator.pin);
  await atLift(page, '6 mm');
  // the half-keyed digit is there again
  await page.getByRole('button', { name: 'Backspace' }).click();
  for (const [lift, flow, pressure] of rows.slice(2)) {
    await atLift(page, `${lift} mm`);
    await keyReading(page, flow, pressure);
  }
  await page
    .getByText(/saved on this device/i)
    .first()
    .waitFor();

  await world.server.start();
  await page.context().setOffline(false);
  await page
    .getByText(/all sent/)
    .first()
    .waitFor({ timeout: 90_000 });

  const admin = new pg.Client(world.db.adminUrl);
  await admin.connect();
  const stored = await admin.query(
    `select u.side, u.port, u.direction, r.reading_ordinal, r.lift_text, r.lift_unit, r.flow_text, r.flow_unit,
       r.pressure_text, r.pressure_unit from readings r join runs u on u.id = r.run_id and u.shop_id = r.shop_id
     where not r.deleted order by r.reading_ordinal`,
  );
  await admin.end();
  expect(stored.rows).toEqual(
    rows.map(([lift, flow, pressure], index) => ({
      side: 'intake',
      port: '1',
      direction: 'drawing',
      reading_ordinal: index + 1,
      lift_text: lift,
      lift_unit: 'mm',
      flow_text: flow,
      flow_unit: 'cfm',
      pressure_text: pressure,
      pressure_unit: 'inH2O',
    })),
  );

  const office = await desk.open();
  await office.goto(`${world.server.address}/desk`);
  await office.getByLabel('Mail address').fill(world.supervisor.mail);
  await office.getByLabel('Password').fill(world.supervisor.password);
  await office.getByRole('button', { name: 'Sign in' }).click();
  await office.getByText('1-001').first().click();
  const table = office.getByRole('table').first();
  await table.waitFor();
  const shown = await until('four rows at the desk', async () => {
    const found = await table
      .getByRole('row')
      .evaluateAll((all) =>
        all.map((row) =>
          Array.from(row.querySelectorAll('[role=cell]')).map((cell) => cell.textContent?.trim()),
        ),
      );
    const readings = found.filter((cells) => cells.length > 0);
    return readings.length === rows.length ? readings : undefined;
  });
  // at the standard pressure, on a bench that reads true, the corrected flow is the keyed one
  expect(shown.map((cells) => cells.slice(0, 4))).toEqual(
    rows.map(([lift, flow, pressure]) => [lift, flow, pressure, flow]),
  );
}, 240_000);
