// npm run db:generate -- --name what_it_is: writes the migrations that the two schemas ask for, then the device's as a
// module. With --check: says whether anything is missing, and changes nothing. Node built-ins only.
import fs from 'node:fs';
import path from 'node:path';
import { areDeviceMigrationsFresh, writeDeviceMigrations } from './generated.mjs';
import { inRoot, root } from './paths.mjs';
import { explain, Obstacle, run } from './steps.mjs';

const drizzleKit = 'node_modules/drizzle-kit/bin.cjs';
const isCheck = process.argv.includes('--check');
const rest = process.argv.slice(2).filter((one) => one !== '--check');

async function generate(target, out) {
  const env = { INCHWATER_DB: target, ...(out ? { INCHWATER_DRIZZLE_OUT: out } : {}) };
  return run(process.execPath, [drizzleKit, 'generate', ...rest], { env, show: !isCheck });
}

/** Generates into a copy: a new file there is a migration that somebody forgot. */
async function check(target) {
  const copy = inRoot('artifacts/drizzle-check', target);
  fs.rmSync(copy, { recursive: true, force: true });
  fs.cpSync(inRoot('drizzle', target), copy, { recursive: true });
  const before = fs.readdirSync(copy).length;
  await generate(target, `./${path.relative(root, copy)}`);
  const after = fs.readdirSync(copy).length;
  fs.rmSync(copy, { recursive: true, force: true });
  if (before !== after) {
    throw new Obstacle(
      `The ${target} schema has changed without a migration. Run: npm run db:generate -- --name what_it_is`,
    );
  }
}

async function main() {
  for (const target of ['server', 'device']) await (isCheck ? check(target) : generate(target));
  if (!isCheck) writeDeviceMigrations();
  else if (!areDeviceMigrationsFresh()) {
    throw new Obstacle('db/device/migrations.gen.ts does not match drizzle/device. Run: npm run db:generate');
  }
}

main().catch((error) => {
  explain(error);
  process.exitCode = 1;
});
