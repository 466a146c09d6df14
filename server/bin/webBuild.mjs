// The web app in dist/, rebuilt only when its sources changed. Built beside and moved into place, so that a running
// server never sees half a build. Node built-ins only.
import fs from 'node:fs';
import path from 'node:path';
import { promisify } from 'node:util';
import zlib from 'node:zlib';
import { writeBuildId, writeDeviceMigrations } from './generated.mjs';
import { checkRoom } from './machine.mjs';
import { oneAtATime } from './oneAtATime.mjs';
import { dist, inRoot, root } from './paths.mjs';
import { sourceHash } from './sourceHash.mjs';
import { run } from './steps.mjs';

const brotli = promisify(zlib.brotliCompress);
const gzip = promisify(zlib.gzip);
const next = inRoot('artifacts/web-next');
const previous = inRoot('artifacts/web-previous');
const compressible = /\.(html|js|css|wasm|svg|json|webmanifest|ttf|ico)$/;

function isFresh(hash) {
  const stamp = path.join(dist, '.source-hash');
  return fs.existsSync(stamp) && fs.readFileSync(stamp, 'utf8') === hash;
}

/** Puts a .br and a .gz beside each file that gains by it; the server sends those. */
async function compressBeside(folder) {
  const files = fs.readdirSync(folder, { recursive: true, withFileTypes: true });
  for (const file of files.filter((one) => one.isFile() && compressible.test(one.name))) {
    const full = path.join(file.parentPath ?? file.path, file.name);
    const content = fs.readFileSync(full);
    if (content.length < 1024) continue;
    const [br, gz] = await Promise.all([
      brotli(content, { params: { [zlib.constants.BROTLI_PARAM_SIZE_HINT]: content.length } }),
      gzip(content, { level: 9 }),
    ]);
    if (br.length < content.length) fs.writeFileSync(`${full}.br`, br);
    if (gz.length < content.length) fs.writeFileSync(`${full}.gz`, gz);
  }
}

async function build(hash) {
  checkRoom(root, 300);
  writeBuildId(hash.slice(0, 12));
  writeDeviceMigrations();
  fs.rmSync(next, { recursive: true, force: true });
  await run(
    process.execPath,
    ['node_modules/expo/bin/cli', 'export', '--platform', 'web', '--output-dir', path.relative(root, next)],
    {
      env: {
        EXPO_OFFLINE: '1',
        CI: '1',
        EXPO_NO_TELEMETRY: '1',
        EXPO_NO_DOTENV: '1',
        NODE_ENV: 'production',
      },
    },
  );
  await run(process.execPath, ['server/bin/serviceWorker.mjs', path.relative(root, next)]);
  await compressBeside(next);
  fs.writeFileSync(path.join(next, '.source-hash'), hash);
  fs.rmSync(previous, { recursive: true, force: true });
  if (fs.existsSync(dist)) fs.renameSync(dist, previous);
  fs.renameSync(next, dist);
  fs.rmSync(previous, { recursive: true, force: true });
}

/** Brings dist/ up to date. Two processes that want it at once build it once. */
export async function ensureWeb() {
  if (isFresh(sourceHash())) return;
  await oneAtATime(inRoot('artifacts/web.lock'), async () => {
    const hash = sourceHash();
    if (!isFresh(hash)) await build(hash);
  });
}
