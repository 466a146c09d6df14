// npm run dev: the server restarts when its sources change (port 3000); the web app reloads by itself (port 8081, which
// passes /api on to the server). Node built-ins only.
import { spawn } from 'node:child_process';
import { writeGenerated } from './generated.mjs';
import { openHouse, takeDataFolder } from './house.mjs';
import { checkNode, checkPort, wantedPort } from './machine.mjs';
import { inRoot, root } from './paths.mjs';
import { explain, numberedSteps, say, stopChildren } from './steps.mjs';

const host = '127.0.0.1';
const webPort = wantedPort(process.env.WEB_PORT || '8081');
const programs = [];
let cluster;
let giveDataFolder;
let leaving = false;

async function leave(code) {
  if (leaving) return;
  leaving = true;
  stopChildren();
  const running = programs.filter((one) => one.exitCode === null && one.signalCode === null);
  const gone = running.map((one) => new Promise((resolve) => one.once('exit', resolve)));
  for (const one of running) one.kill('SIGTERM');
  const tooLong = setTimeout(() => running.forEach((one) => one.kill('SIGKILL')), 8_000);
  await Promise.all(gone);
  clearTimeout(tooLong);
  cluster?.stop();
  giveDataFolder?.();
  process.exit(code);
}

function begin(name, args, env) {
  // no terminal of its own: Expo would take the keyboard, and with it Ctrl-C
  const stdio = ['ignore', 'pipe', 'pipe'];
  const program = spawn(process.execPath, args, { cwd: root, env: { ...process.env, ...env }, stdio });
  program.stdout.pipe(process.stdout, { end: false });
  program.stderr.pipe(process.stderr, { end: false });
  programs.push(program);
  program.once('exit', (code, signal) => {
    if (leaving) return;
    console.error(`[inchwater] ${name} ended by itself (${code ?? signal})`);
    void leave(code || 1);
  });
}

async function main() {
  checkNode();
  const port = wantedPort();
  await checkPort(host, port);
  await checkPort(host, webPort);
  giveDataFolder = takeDataFolder();
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => void leave(0));
  const step = numberedSteps(5);
  const { env, welcome } = await openHouse(step, { host, port, onCluster: (started) => (cluster = started) });
  writeGenerated();
  begin(
    'the server',
    [inRoot('node_modules/tsx/dist/cli.mjs'), 'watch', '--clear-screen=false', 'server/index.ts'],
    {
      ...env,
      NODE_ENV: 'development',
    },
  );
  begin(
    'the web app',
    ['node_modules/expo/bin/cli', 'start', '--web', '--localhost', '--port', String(webPort)],
    {
      INCHWATER_API: `http://${host}:${port}`,
      EXPO_OFFLINE: '1',
      EXPO_NO_TELEMETRY: '1',
      EXPO_NO_DOTENV: '1',
      BROWSER: 'none',
      // "localhost" must be the IPv4 loopback, as everywhere else
      NODE_OPTIONS: `${process.env.NODE_OPTIONS ?? ''} --dns-result-order=ipv4first`.trim(),
    },
  );
  if (welcome.trim()) console.log(welcome.trimEnd());
  say(`web app: http://${host}:${webPort}   API: http://${host}:${port}/api   (Ctrl-C stops both)`);
}

main().catch(async (error) => {
  if (leaving) return;
  explain(error);
  await leave(1);
});
