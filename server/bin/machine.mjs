// What the machine must offer: Node, room on the disk, a free port, Debian's packages, npm's packages.
// Node built-ins only.
import fs from 'node:fs';
import net from 'node:net';
import { findPostgres } from './cluster.mjs';
import { oneAtATime } from './oneAtATime.mjs';
import { inRoot, root } from './paths.mjs';
import { Obstacle, run } from './steps.mjs';

/** Refuses a Node that the packages do not run on. */
export function checkNode(version = process.versions.node) {
  const [major, minor] = version.split('.').map(Number);
  if (major > 20 || (major === 20 && minor >= 19)) return;
  throw new Obstacle(`Node 20.19 or newer is needed; this is ${version}. Install it and start again.`);
}

/** Refuses to begin what the disk cannot hold. */
export function checkRoom(folder, neededMB) {
  const { bavail, bsize } = fs.statfsSync(folder);
  const freeMB = Math.floor((bavail * bsize) / 1024 / 1024);
  if (freeMB >= neededMB) return;
  throw new Obstacle(
    `Only ${freeMB} MB are free in ${folder}; about ${neededMB} MB are needed. Make room and start again.`,
  );
}

/** The port in the environment, 3000 if none. */
export function wantedPort(text = process.env.PORT || '3000') {
  const port = Number(text);
  if (/^\d+$/.test(text) && port >= 1 && port <= 65535) return port;
  throw new Obstacle(
    `PORT is "${text}"; it must be a number from 1 to 65535, for example PORT=3001 npm start`,
  );
}

/** Refuses a port that is taken: another one in its place would show an empty tablet. */
export function checkPort(host, port) {
  return new Promise((resolve, reject) => {
    const probe = net.createServer();
    probe.once('error', (error) => {
      const why =
        error.code === 'EADDRINUSE'
          ? `Port ${port} on ${host} is taken, perhaps by another Inchwater. Stop what uses it, or choose another port: ` +
            `PORT=${port === 3001 ? 3002 : 3001} npm start. A tablet keeps its readings under the address it was ` +
            'enrolled at; under another port it looks empty until you go back.'
          : `Port ${port} on ${host} cannot be used (${error.code}). Choose with HOST and PORT, e.g. PORT=3001 npm start.`;
      reject(new Obstacle(why));
    });
    probe.listen(port, host, () => probe.close(() => resolve()));
  });
}

/** Does node_modules hold exactly what the lock names? npm keeps its own list of what it has installed. */
export function arePackagesFresh(lock, installed) {
  if (!installed) return false;
  return Object.entries(lock.packages).every(
    ([place, { version, optional, devOptional, peer, link }]) =>
      place === '' ||
      link ||
      optional ||
      devOptional ||
      peer ||
      installed.packages[place]?.version === version,
  );
}

function readJson(file) {
  return fs.existsSync(file) ? JSON.parse(fs.readFileSync(file, 'utf8')) : null;
}

/** Is there anything for ensurePackages to do? */
export const needsPackages = () =>
  !arePackagesFresh(
    readJson(inRoot('package-lock.json')),
    readJson(inRoot('node_modules/.package-lock.json')),
  );

/** Installs the npm packages of the lock, if they are not there. */
export async function ensurePackages() {
  if (!needsPackages()) return;
  checkRoom(root, 1500);
  await oneAtATime(inRoot('artifacts/packages.lock'), async () => {
    if (needsPackages()) await run('npm', ['ci', '--include=dev', '--no-audit', '--no-fund']);
  });
}

const isOnPath = (name) =>
  (process.env.PATH ?? '').split(':').some((folder) => folder && fs.existsSync(`${folder}/${name}`));

/** Programs of Debian that we use: package, why, and whether it is there. */
export const postgresql = {
  name: 'postgresql',
  purpose: 'the database',
  isThere: () => findPostgres() !== null,
};
export const chromium = {
  name: 'chromium',
  purpose: 'the tests',
  isThere: () => fs.existsSync('/usr/bin/chromium'),
};

/** Installs what is missing of Debian's packages. */
export async function ensureDebianPackages(...wanted) {
  const missing = wanted.filter((one) => !one.isThere());
  if (missing.length === 0) return;
  const names = missing.map((one) => one.name);
  const byHand = `sudo apt-get install ${names.join(' ')}`;
  const what = missing.map((one) => `${one.name} (for ${one.purpose})`).join(', ');
  if (!isOnPath('apt-get')) {
    throw new Obstacle(
      `${what} is missing, and this is not a Debian with apt-get. Install PostgreSQL 15 or newer with initdb, pg_ctl and ` +
        'psql on the PATH, Chromium as /usr/bin/chromium, and start again.',
    );
  }
  const isRoot = process.getuid() === 0;
  if (!isRoot && !isOnPath('sudo'))
    throw new Obstacle(`${what} is missing. As root, run: apt-get install ${names.join(' ')}`);
  const apt = (...args) =>
    run(
      isRoot ? 'apt-get' : 'sudo',
      [...(isRoot ? [] : ['-n', 'apt-get']), '-o', 'DPkg::Lock::Timeout=120', ...args],
      {
        env: { DEBIAN_FRONTEND: 'noninteractive' },
      },
    );
  try {
    await apt('update', '-qq');
    await apt('install', '-y', '-qq', '--no-install-recommends', ...names);
  } catch (error) {
    throw new Obstacle(
      `${what} could not be installed. Run this yourself and start again: ${byHand}\n${error.message}`,
    );
  }
}
