// One throwaway PostgreSQL cluster for all projects that need one. No top-level await: jest loads this with require().
import { execFileSync } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { databaseSql, startCluster } from '../server/bin/cluster.mjs';
import { writeGenerated } from '../server/bin/generated.mjs';
import { root } from '../server/bin/paths.mjs';

const fast = { fsync: 'off', synchronous_commit: 'off', full_page_writes: 'off', shared_buffers: '64MB' };
const template = 'template_inchwater';

/** Starts the cluster, migrates the database that every test database is a copy of, and says where it is. */
export default async function globalSetup() {
  if (globalThis.discardTestCluster) return; // another project of this run has been here
  writeGenerated();
  const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'inchwater-test-'));
  let cluster;
  globalThis.discardTestCluster = () => {
    cluster?.stop();
    cluster = undefined;
    fs.rmSync(folder, { recursive: true, force: true });
  };
  // jest skips globalTeardown when it is interrupted or when globalSetup fails
  process.on('exit', globalThis.discardTestCluster);
  const interrupts = { SIGINT: 130, SIGTERM: 143, SIGHUP: 129 };
  for (const [signal, code] of Object.entries(interrupts)) process.on(signal, () => process.exit(code));

  const password = () => randomBytes(12).toString('hex');
  const passwords = { adminPassword: password(), ownerPassword: password(), appPassword: password() };
  cluster = await startCluster(folder, passwords, { settings: fast, disposable: true });
  cluster.psql(databaseSql(template));
  execFileSync(process.execPath, ['--import', 'tsx', 'server/bin/migrate.ts'], {
    cwd: root,
    env: { ...process.env, OWNER_DATABASE_URL: cluster.urlFor('owner', template) },
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  process.env.TEST_PG_ADMIN_URL = cluster.urlFor('admin', 'postgres');
  process.env.TEST_PG_OWNER_URL = cluster.urlFor('owner', 'postgres');
  process.env.TEST_PG_APP_URL = cluster.urlFor('app', 'postgres');
}
