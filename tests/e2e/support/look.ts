import fs from 'node:fs';
import path from 'node:path';
import axe from 'axe-core';
import type { Page } from 'playwright-core';

const root = path.resolve(__dirname, '../../..');
const folder = path.join(root, 'artifacts/pictures');

/** Takes a picture of what is on the screen, to be looked at by a person. */
export async function picture(page: Page, name: string): Promise<Buffer> {
  fs.mkdirSync(folder, { recursive: true });
  return page.screenshot({ path: path.join(folder, `${name}.png`), animations: 'disabled' });
}

/** Renews a picture that the README shows, when asked to: `UPDATE_PICTURES=1 npm test -- tests/e2e`. */
export function keepForReadme(bytes: Buffer, name: string): void {
  if (process.env.UPDATE_PICTURES === '1') fs.writeFileSync(path.join(root, 'assets', name), bytes);
}

/** What is wrong with a screen: rules of WCAG 2.2 A and AA it breaks, and what sticks out at the side. */
export async function faultsOf(page: Page): Promise<string[]> {
  await page.evaluate(axe.source);
  const broken = await page.evaluate(async () => {
    const { axe: tool } = window as unknown as {
      axe: {
        run: (
          where: Document,
          options: object,
        ) => Promise<{ violations: { id: string; nodes: { html: string }[] }[] }>;
      };
    };
    const { violations } = await tool.run(document, {
      runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'],
    });
    return violations.map(
      ({ id, nodes }) => `${id}: ${nodes.map((node) => node.html.slice(0, 160)).join(' | ')}`,
    );
  });
  const overhang = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
  return [...broken, ...(overhang > 0 ? [`sticks out by ${overhang} px`] : [])];
}
