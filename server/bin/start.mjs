// npm start: from a fresh clone to the running program. Node built-ins only, because it runs before node_modules exists.
import { spawn } from 'node:child_process';
import { setTimeout as wait } from 'node:timers/promises';
import { openHouse, takeDataFolder } from './house.mjs';
import { checkNode, checkPort, checkRoom, wantedPort } from './machine.mjs';
import { inRoot, root } from './paths.mjs';
import { explain, numberedSteps, Obstacle, say, stopChildren } from './steps.mjs';
import { ensureWeb } from './webBuild.mjs';

const begun = Date.now();
const host = process.env.HOST || '127.0.0.1';
let server;
let cluster;
let giveDataFolder;
let leaving = false;

/** Server first, then the cluster, then the folder; once, whoever asks. */
async function leave(code) {
  if (leaving) return;
  leaving = true;
  stopChildren();
  if (server && server.exitCode === null && server.signalCode === null) {
    const gone = new Promise((resolve) => server.once('exit', resolve));
    server.kill('SIGTERM');
    const tooLong = setTimeout(() => server.kill('SIGKILL'), 10_000);
    await gone;
    clearTimeout(tooLong);
  }
  cluster?.stop();
  giveDataFolder?.();
  if (code === 0) say('stopped');
  process.exit(code);
}

function startServer(env) {
  const preload = ['--import', inRoot('server/bin/followParent.mjs'), '--import', 'tsx'];
  server = spawn(process.execPath, [...preload, 'server/index.ts'], {
    cwd: root,
    env: { ...process.env, NODE_ENV: 'production', ...env },
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
  });
  server.once('exit', (code, signal) => {
    if (leaving) return;
    console.error(`[inchwater] the server ended by itself (${code ?? signal}); its last lines above say why`);
    void leave(code || 1);
  });
}

async function untilHealthy(address) {
  for (let tries = 0; tries < 300; tries += 1) {
    const answer = await fetch(`${address}/api/health`).catch(() => null);
    if (answer?.ok) return;
    await wait(200);
  }
  throw new Obstacle(`The server did not answer at ${address}/api/health within a minute.`);
}

async function main() {
  checkNode();
  const port = wantedPort();
  await checkPort(host, port);
  checkRoom(root, 100);
  giveDataFolder = takeDataFolder();
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => void leave(0));

  const step = numberedSteps(7);
  const { env, welcome } = await openHouse(step, { host, port, onCluster: (started) => (cluster = started) });
  await step('web app', ensureWeb);
  const address = `http://${host.includes(':') ? `[${host}]` : host}:${port}`;
  await step(
    'server',
    async () => {
      startServer(env);
      await untilHealthy(address);
    },
    { talks: true },
  );
  if (welcome.trim()) console.log(welcome.trimEnd());
  say(`ready after ${((Date.now() - begun) / 1000).toFixed(1)} s: ${address}  (Ctrl-C stops it)`);
}

main().catch(async (error) => {
  if (leaving) return;
  explain(error);
  await leave(1);
});
