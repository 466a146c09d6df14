import { execFileSync } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { databaseSql, startCluster } from '../../server/bin/cluster.mjs';
import { root } from '../../server/bin/paths.mjs';

const template = 'template_inchwater';

/**
 * A throwaway cluster with a migrated database to copy, announced in the environment for `testDb`. It goes away when
 * this process does, however it ends.
 * @param settings PostgreSQL settings by name
 * @returns how to stop and remove it earlier
 */
export async function startTestCluster(settings = {}) {
  const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'inchwater-test-'));
  let cluster;
  const discard = () => {
    cluster?.stop();
    cluster = undefined;
    fs.rmSync(folder, { recursive: true, force: true });
  };
  process.on('exit', discard);
  const interrupts = { SIGINT: 130, SIGTERM: 143, SIGHUP: 129 };
  for (const [signal, code] of Object.entries(interrupts)) process.on(signal, () => process.exit(code));

  const password = () => randomBytes(12).toString('hex');
  const passwords = { adminPassword: password(), ownerPassword: password(), appPassword: password() };
  cluster = await startCluster(folder, passwords, { settings, disposable: true });
  cluster.psql(databaseSql(template));
  execFileSync(process.execPath, ['--import', 'tsx', 'server/bin/migrate.ts'], {
    cwd: root,
    env: { ...process.env, OWNER_DATABASE_URL: cluster.urlFor('owner', template) },
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  process.env.TEST_PG_ADMIN_URL = cluster.urlFor('admin', 'postgres');
  process.env.TEST_PG_OWNER_URL = cluster.urlFor('owner', 'postgres');
  process.env.TEST_PG_APP_URL = cluster.urlFor('app', 'postgres');
  return discard;
}
