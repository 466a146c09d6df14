import type { Page } from 'playwright-core';
import { enrol, keyNumber, keyPin } from './support/atTheBench';
import { phone, RealBrowser, wide, type Size } from './support/chromium';
import { demoWorld, type DemoWorld } from './support/demoWorld';
import { faultsOf, keepForReadme, picture } from './support/look';

/* Every screen of the demonstration shop, on a phone and wide, in both themes: no fault that axe-core can find, nothing
 * that sticks out, and a picture of each in artifacts/pictures for a person to look at. */

const sizes: [string, Size][] = [
  ['phone', phone],
  ['wide', wide],
];
const themes = ['daylight', 'shed'] as const;
let world: DemoWorld;

beforeAll(async () => {
  world = await demoWorld();
  await world.server.start();
}, 60_000);
afterAll(() => world.close());

/** Looks at the screen as it stands, in both themes. */
async function inBothThemes(
  page: Page,
  name: string,
  choose: (theme: string) => Promise<void>,
  faults: string[],
) {
  for (const theme of themes) {
    await choose(theme);
    await picture(page, `${name}-${theme}`);
    faults.push(...(await faultsOf(page)).map((fault) => `${name} ${theme}: ${fault}`));
  }
}

test.each(sizes)(
  'the bench, %s',
  async (sizeName, size) => {
    const browser = new RealBrowser(size);
    const faults: string[] = [];
    try {
      const page = await browser.open();
      const chooseAt = (path: string, there: () => Promise<void>) => async (theme: string) => {
        await page.emulateMedia({ colorScheme: theme === 'shed' ? 'dark' : 'light' });
        await page.evaluate(
          (chosen) =>
            localStorage.setItem(
              'inchwater.bench.preferences',
              JSON.stringify({ theme: chosen, bounceMs: 80 }),
            ),
          theme,
        );
        await page.goto(`${world.server.address}${path}`);
        await there();
      };
      const look = (name: string, path: string, there: () => Promise<void>) =>
        inBothThemes(page, `bench-${name}-${sizeName}`, chooseAt(path, there), faults);

      await page.goto(`${world.server.address}/`);
      await look('0-front', '/', () => page.getByText('Bench', { exact: true }).first().waitFor());
      await look('1-enrol', '/bench/enrol', () => page.getByLabel('Code').waitFor());
      await enrol(page, world, 'Picture tablet');
      await look('2-names', '/bench', () => page.getByText('Who is at the bench?').waitFor());
      await keyPin(page, world.operator.name, world.operator.pin);
      const halfWay = page.getByText('0-002').first();
      await look('3-sessions', '/bench', () => halfWay.waitFor());
      await look('4-start', '/bench/sessions/new', () => page.getByText('The lift plan').waitFor());
      await look('5-unsent', '/bench/unsent', () =>
        page.getByText('Where the readings are').first().waitFor(),
      );
      await look('6-device', '/bench/device', () =>
        page.getByRole('button', { name: 'Change person' }).waitFor(),
      );
      await look('7-unknown', '/bench/sessions/nothing', () =>
        page.getByText('not on this device').first().waitFor(),
      );

      await page.goto(`${world.server.address}/bench`);
      await halfWay.click();
      const read = page.getByRole('button', { name: 'Read. Go on' });
      await read.waitFor();
      const sessionPath = new URL(page.url()).pathname;
      await look('8-safety', sessionPath, () => read.waitFor());
      await read.click();
      const run = page.getByText(/Intake 1/).first();
      await look('9-session', sessionPath, () => run.waitFor());
      await chooseAt(sessionPath, () => run.waitFor())('daylight');
      await run.click();
      const place = page.getByText(/Intake 1 · \d+ of 11/);
      await place.waitFor();
      const runPath = new URL(page.url()).pathname;
      await keyNumber(page, '201');
      await page.getByRole('button', { name: 'On to the pressure' }).click();
      await keyNumber(page, '26.2');
      const before = (await place.textContent()) ?? '';
      await page.getByRole('button', { name: 'SAVE', exact: true }).click();
      await page.getByText(before, { exact: true }).waitFor({ state: 'hidden' });
      await keyNumber(page, '21');
      const shown = await picture(page, `bench-10-capture-${sizeName}-keyed`);
      if (sizeName === 'phone') keepForReadme(shown, 'capture-phone.png');
      await look('10-capture', runPath, () => place.waitFor());
      expect(await tooSmallKeys(page)).toEqual([]);
      expect(
        await page.evaluate(() => document.documentElement.scrollHeight - window.innerHeight),
      ).toBeLessThanOrEqual(0);
    } finally {
      await browser.dispose();
    }
    expect(faults).toEqual([]);
  },
  240_000,
);

/** Digit keys under 72 px of height or 76 of width, other controls of the capture screen under 64 by 44. */
function tooSmallKeys(page: Page): Promise<string[]> {
  return page.getByRole('button').evaluateAll((buttons) =>
    buttons.flatMap((button) => {
      const { width, height } = button.getBoundingClientRect();
      const name = button.getAttribute('aria-label') ?? button.textContent ?? '';
      const isDigit = /^\d$/.test(name);
      const isSmall = isDigit ? height < 72 || width < 76 : height < 40 || width < 56;
      return width > 0 && isSmall ? [`${name}: ${width} x ${height}`] : [];
    }),
  );
}

test('the capture screen fits a phone’s browser tab without scrolling', async () => {
  const browser = new RealBrowser({ width: 390, height: 664 });
  try {
    const page = await browser.open();
    await enrol(page, world, 'Small phone');
    await keyPin(page, world.operator.name, world.operator.pin);
    await page.getByText('0-002').first().click();
    await page.getByRole('button', { name: 'Read. Go on' }).click();
    await page
      .getByText(/Intake 1/)
      .first()
      .click();
    await page.getByRole('group', { name: 'Number pad' }).waitFor();
    await picture(page, 'bench-11-capture-tab');
    expect(await tooSmallKeys(page)).toEqual([]);
    const save = await page.getByRole('button', { name: /SAVE|On to the pressure/ }).boundingBox();
    expect((save?.y ?? 0) + (save?.height ?? 0)).toBeLessThanOrEqual(664);
    expect(save?.height).toBeGreaterThanOrEqual(80);
  } finally {
    await browser.dispose();
  }
}, 120_000);

test.each(sizes)(
  'the desk, %s',
  async (sizeName, size) => {
    const browser = new RealBrowser(size);
    const faults: string[] = [];
    try {
      const page = await browser.open();
      const choose = async (theme: string) => {
        await page.emulateMedia({ colorScheme: theme === 'shed' ? 'dark' : 'light' });
      };
      const look = (name: string) => inBothThemes(page, `desk-${name}-${sizeName}`, choose, faults);

      await page.goto(`${world.server.address}/desk`);
      await page.getByLabel('Mail address').fill(world.supervisor.mail);
      await page.getByLabel('Password').fill('not the password');
      await page.getByRole('button', { name: 'Sign in' }).click();
      await page.getByText('do not match').waitFor();
      await look('0-sign-in');
      await page.getByLabel('Password').fill(world.supervisor.password);
      await page.getByRole('button', { name: 'Sign in' }).click();
      const first = page.getByText('0-001').first();
      await first.waitFor();
      await look('1-sessions');
      await first.click();
      await page.getByRole('table').first().waitFor();
      await look('2-session');
      const places: [string, string, string][] = [
        ['3-plan', '/desk/sessions/plan', 'Plan a session'],
        ['4-devices', '/desk/devices', 'Shed tablet'],
        ['5-people', '/desk/people', 'Wanda Pike'],
        ['6-unknown', '/desk/sessions/01a00000-0000-7000-8000-000000000000', 'Session'],
      ];
      for (const [name, path, text] of places) {
        await page.goto(`${world.server.address}${path}`);
        await page.getByText(text).first().waitFor();
        await look(name);
      }
    } finally {
      await browser.dispose();
    }
    expect(faults).toEqual([]);
  },
  240_000,
);
