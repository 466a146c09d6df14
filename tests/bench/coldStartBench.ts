import { enrol, keptForOffline } from '../e2e/support/atTheBench';
import { phone, RealBrowser } from '../e2e/support/chromium';
import { makeWorld } from '../e2e/support/world';
import { emptyShell } from './emptyShell';
import { line, median, timed } from './figures';

const starts = 5;

/** From a browser that was killed to the names at the bench, with no server and no network, against an empty page that
 * starts the same way. */
export async function coldStartBench(): Promise<void> {
  const world = await makeWorld();
  const shell = await emptyShell();
  const browser = new RealBrowser(phone, 'bench');
  try {
    await world.server.start();
    const first = await browser.open();
    await enrol(first, world, 'Bench phone');
    await keptForOffline(first);
    await first.goto(shell.address);
    await keptForOffline(first);
    await world.server.stop();
    shell.server.close();
    shell.server.closeAllConnections();

    const ours: number[] = [];
    const empty: number[] = [];
    for (let i = 0; i < starts; i += 1) {
      for (const [address, ready, figures] of [
        [`${world.server.address}/bench`, 'text=Who is at the bench?', ours],
        [shell.address, 'text=ready', empty],
      ] as const) {
        await browser.kill();
        const page = await browser.open();
        await page.context().setOffline(true);
        figures.push(
          await timed(async () => {
            await page.goto(address);
            await page.locator(ready).waitFor();
          }),
        );
      }
    }
    line(
      'cold start offline to the names, against an empty page',
      median(ours) / median(empty),
      '',
      `${Math.round(median(ours))} ms against ${Math.round(median(empty))} ms`,
    );
  } finally {
    await browser.dispose();
    await world.close();
  }
}
