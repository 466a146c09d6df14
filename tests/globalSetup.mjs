// One throwaway PostgreSQL cluster for all projects that need one. No top-level await: jest loads this with require().
import { execFileSync } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { databaseSql, startCluster } from '../server/bin/cluster.mjs';
import { writeGenerated } from '../server/bin/generated.mjs';

const fast = { fsync: 'off', synchronous_commit: 'off', full_page_writes: 'off', shared_buffers: '64MB' };

/** Starts the cluster, migrates the database that every test database is a copy of, and says where it is. */
export default async function globalSetup() {
  writeGenerated();
  if (globalThis.testCluster) return; // another project of this run has been here
  const wanted = fs.mkdtempSync(path.join(os.tmpdir(), 'inchwater-test-'));
  const password = () => randomBytes(12).toString('hex');
  const passwords = { adminPassword: password(), ownerPassword: password(), appPassword: password() };
  const cluster = await startCluster(wanted, passwords, { settings: fast, disposable: true });
  const discard = () => {
    if (!globalThis.testCluster) return;
    globalThis.testCluster = undefined;
    cluster.stop();
  };
  globalThis.testCluster = { discard };
  // jest skips globalTeardown when it is interrupted or when globalSetup fails
  process.on('exit', discard);
  for (const [signal, code] of [
    ['SIGINT', 130],
    ['SIGTERM', 143],
  ])
    process.on(signal, () => process.exit(code));

  cluster.psql(databaseSql('template_inchwater'));
  execFileSync(process.execPath, ['--import', 'tsx', 'server/bin/migrate.ts'], {
    cwd: path.resolve(path.dirname(new URL(import.meta.url).pathname), '..'),
    env: { ...process.env, OWNER_DATABASE_URL: cluster.urlFor('owner', 'template_inchwater') },
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  process.env.TEST_PG_ADMIN_URL = cluster.urlFor('admin', 'postgres');
  process.env.TEST_PG_OWNER_URL = cluster.urlFor('owner', 'postgres');
  process.env.TEST_PG_APP_URL = cluster.urlFor('app', 'postgres');
}
