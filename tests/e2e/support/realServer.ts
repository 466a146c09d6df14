import { spawn, type ChildProcess } from 'node:child_process';
import fs from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { until } from './chromium';

/** A port that was free a moment ago; the address must stay the same over restarts, because storage belongs to it. */
export async function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = net.createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address();
      probe.close(() => resolve(typeof address === 'object' && address ? address.port : 0));
    });
  });
}

/** The product's server as its own process, on the built web app. */
export class RealServer {
  private child: ChildProcess | null = null;
  private readonly data = fs.mkdtempSync(path.join(os.tmpdir(), 'inchwater-server-'));
  readonly log: string[] = [];

  constructor(
    private readonly appUrl: string,
    readonly port: number,
    private readonly env: Record<string, string> = {},
  ) {}

  get address(): string {
    return `http://127.0.0.1:${this.port}`;
  }

  /** Starts and waits until it answers. */
  async start(): Promise<void> {
    const child = spawn(process.execPath, ['--import', 'tsx', 'server/index.ts'], {
      cwd: path.resolve(__dirname, '../../..'),
      env: {
        ...process.env,
        NODE_ENV: 'production',
        APP_DATABASE_URL: this.appUrl,
        JWT_SECRET: 'end-to-end tests only, thirty-two bytes or more',
        HOST: '127.0.0.1',
        PORT: String(this.port),
        INCHWATER_DATA: this.data,
        ...this.env,
      },
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    this.child = child;
    child.stdout.on('data', (chunk: Buffer) => this.log.push(chunk.toString()));
    child.stderr.on('data', (chunk: Buffer) => this.log.push(chunk.toString()));
    await until(
      'the server to answer',
      async () => {
        if (child.exitCode !== null) throw new Error(`server ended: ${this.log.join('').slice(-2000)}`);
        return fetch(`${this.address}/api/health`).then(
          (response) => response.ok,
          () => false,
        );
      },
      30_000,
    );
  }

  /** Stops it; by SIGKILL unless told otherwise, as when the plug is pulled. */
  async stop(signal: NodeJS.Signals = 'SIGKILL'): Promise<void> {
    const child = this.child;
    if (!child || child.exitCode !== null) return;
    const gone = new Promise((resolve) => child.once('exit', resolve));
    child.kill(signal);
    await gone;
    this.child = null;
  }

  /** Stops it and removes its folder. */
  async dispose(): Promise<void> {
    await this.stop();
    fs.rmSync(this.data, { recursive: true, force: true });
  }
}
