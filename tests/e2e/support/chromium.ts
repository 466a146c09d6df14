import { spawn, type ChildProcess } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core';

const flags = [
  '--headless=new',
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--disable-dev-shm-usage',
  '--remote-debugging-port=0',
];

export type Size = { width: number; height: number };
export const phone: Size = { width: 390, height: 844 };
export const wide: Size = { width: 1280, height: 800 };

/** A browser as a person has it: a profile on disk that outlives the process, which can be killed like a phone's. */
export class RealBrowser {
  private child: ChildProcess | null = null;
  private browser: Browser | null = null;
  private readonly profile = fs.mkdtempSync(path.join(os.tmpdir(), 'inchwater-profile-'));

  constructor(
    private readonly size: Size,
    private readonly name = path.basename(expect.getState().testPath ?? 'browser', '.test.ts'),
    private readonly executable = '/usr/bin/chromium',
  ) {}

  /** Starts Chromium on the profile and returns its first page. */
  async open(): Promise<Page> {
    const portFile = path.join(this.profile, 'DevToolsActivePort');
    fs.rmSync(portFile, { force: true });
    const child = spawn(
      this.executable,
      [
        ...flags,
        `--window-size=${this.size.width},${this.size.height}`,
        `--user-data-dir=${this.profile}`,
        'about:blank',
      ],
      { stdio: 'ignore', detached: true },
    );
    this.child = child;
    const port = await until('Chromium to answer', () =>
      fs.existsSync(portFile) ? fs.readFileSync(portFile, 'utf8').split('\n')[0] : undefined,
    );
    this.browser = await chromium.connectOverCDP(`http://127.0.0.1:${port}`);
    return this.newPage();
  }

  get context(): BrowserContext {
    const context = this.browser?.contexts()[0];
    if (!context) throw new Error('the browser is not open');
    return context;
  }

  /** Another tab of the same browser. */
  async newPage(): Promise<Page> {
    const page = await this.context.newPage();
    await page.setViewportSize(this.size);
    page.setDefaultTimeout(20_000);
    return page;
  }

  /** SIGKILL for the whole process group, as when a battery dies. */
  async kill(): Promise<void> {
    const child = this.child;
    if (!child?.pid) return;
    const gone = new Promise((resolve) => child.once('exit', resolve));
    process.kill(-child.pid, 'SIGKILL');
    await gone;
    await this.browser?.close().catch(() => undefined);
    this.child = null;
    this.browser = null;
    for (const lock of ['SingletonLock', 'SingletonSocket', 'SingletonCookie'])
      fs.rmSync(path.join(this.profile, lock), { force: true });
  }

  /** Ends the browser and removes its profile. What stood on its last screen stays as a picture, for a test that failed. */
  async dispose(): Promise<void> {
    const file = path.resolve(__dirname, '../../../artifacts/pictures/last', `${this.name}.png`);
    // a tab in the background draws nothing, and waiting for it would hold the test up
    await this.browser
      ?.contexts()[0]
      ?.pages()
      .at(-1)
      ?.screenshot({ path: file, timeout: 3000 })
      .catch(() => undefined);
    await this.kill();
    fs.rmSync(this.profile, { recursive: true, force: true, maxRetries: 5, retryDelay: 200 });
  }
}

/** Waits for a condition of the outside world, polling it; fails with what was waited for. */
export async function until<T>(
  what: string,
  look: () => T | Promise<T>,
  forMs = 20_000,
): Promise<NonNullable<T>> {
  const end = Date.now() + forMs;
  for (;;) {
    const found = await look();
    if (found) return found;
    if (Date.now() > end) throw new Error(`waited ${forMs} ms for ${what}`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}
