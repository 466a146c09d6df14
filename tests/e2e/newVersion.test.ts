import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import zlib from 'node:zlib';
import { atLift, enrol, keptForOffline, keyNumber, keyPin, keyReading, startRun } from './support/atTheBench';
import { phone, RealBrowser, until } from './support/chromium';
import { RealServer } from './support/realServer';
import { makeWorld, type World } from './support/world';

/* A new version is offered, never forced in mid-run. The new one is the same build under a new service worker. */

let world: World;
let tablet: RealBrowser;
const copy = fs.mkdtempSync(path.join(os.tmpdir(), 'inchwater-dist-'));

beforeAll(async () => {
  fs.cpSync(path.resolve(__dirname, '../../dist'), copy, { recursive: true });
  world = await makeWorld({ liftUnit: 'mm' });
  tablet = new RealBrowser(phone);
});
afterAll(async () => {
  await tablet.dispose();
  await world.close();
  fs.rmSync(copy, { recursive: true, force: true });
});

test('waits until it is taken, and then the run stands where it stood', async () => {
  const server = new RealServer(world.db.appUrl, world.server.port, { INCHWATER_DIST: copy });
  try {
    await server.start();
    const page = await tablet.open();
    await enrol(page, world, 'Shed phone');
    await keyPin(page, world.operator.name, world.operator.pin);
    await keptForOffline(page);
    await startRun(page, server.address, ['2', '4', '6']);
    await keyReading(page, '29.8', '28');
    await atLift(page, '4 mm');
    await keyNumber(page, '67');

    const worker = path.join(copy, 'sw.js');
    const next = `${fs.readFileSync(worker, 'utf8')}\n// another build`;
    fs.writeFileSync(worker, next);
    fs.writeFileSync(`${worker}.br`, zlib.brotliCompressSync(next));
    fs.writeFileSync(`${worker}.gz`, zlib.gzipSync(next));
    const hasWaiting = () =>
      page.evaluate(async () => {
        const registration = await navigator.serviceWorker.getRegistration();
        await registration?.update();
        return Boolean(registration?.waiting);
      });
    await until('the new version to wait', hasWaiting);
    // in mid-run nothing is said and nothing moves
    expect(await page.getByRole('button', { name: 'Use the new version' }).count()).toBe(0);
    await atLift(page, '4 mm');

    const run = page.url();
    await page.getByRole('button', { name: 'more' }).click();
    await page.getByRole('button', { name: 'Leave to the runs' }).click();
    await Promise.all([
      page.waitForEvent('load'),
      page.getByRole('button', { name: 'Use the new version' }).click(),
    ]);
    await page.goto(run);
    await atLift(page, '4 mm');
    // the digits that were half-keyed are on the display again
    await page.getByRole('button', { name: 'flow cfm 67' }).waitFor();
  } finally {
    await server.dispose();
  }
}, 180_000);
