// The cluster, the database and the demonstration shop: what `npm start` and `npm run dev` have in common.
// Node built-ins only.
import fs from 'node:fs';
import path from 'node:path';
import { databaseSql, startCluster } from './cluster.mjs';
import { checkRoom, ensureDebianPackages, ensurePackages, postgresql } from './machine.mjs';
import { giveFile, takeFile } from './oneAtATime.mjs';
import { dataFolder, inRoot } from './paths.mjs';
import { readSecrets } from './secrets.mjs';
import { Obstacle, run } from './steps.mjs';

const database = 'inchwater';

/** Takes the data folder for this process, so that two of us never run one cluster. @returns how to give it back */
export function takeDataFolder() {
  const folder = dataFolder();
  const file = path.join(folder, 'in-use');
  fs.mkdirSync(folder, { recursive: true });
  checkRoom(folder, 150);
  const holder = takeFile(file);
  if (holder !== null) {
    throw new Obstacle(
      `Inchwater already runs with the data folder ${folder} (process ${holder}). Stop it first, or give this one a ` +
        'data folder of its own: INCHWATER_DATA=/another/folder npm start',
    );
  }
  return () => giveFile(file);
}

/**
 * Packages, PostgreSQL, roles, migrations, demonstration shop: five steps.
 * @returns {stop, env: what the server is started with, welcome: what the demonstration shop has to say}
 */
export async function openHouse(step, { host, port, onCluster }) {
  await step('npm packages', ensurePackages);
  await step('PostgreSQL programs', () => ensureDebianPackages(postgresql));
  const folder = dataFolder();
  const { jwtSecret, ...passwords } = readSecrets(folder);
  const cluster = await step('PostgreSQL cluster', () =>
    startCluster(path.join(folder, 'postgresql'), passwords),
  );
  onCluster(cluster);
  await step('database', async () => {
    cluster.psql(databaseSql(database));
    await run(process.execPath, ['--import', 'tsx', 'server/bin/migrate.ts'], {
      env: { OWNER_DATABASE_URL: cluster.urlFor('owner', database) },
    });
  });
  const env = {
    APP_DATABASE_URL: cluster.urlFor('app', database),
    JWT_SECRET: jwtSecret,
    HOST: host,
    PORT: String(port),
    INCHWATER_DATA: folder,
  };
  const demo = 'server/bin/demo.ts';
  const welcome = await step('demonstration shop', async () =>
    fs.existsSync(inRoot(demo)) ? run(process.execPath, ['--import', 'tsx', demo], { env }) : '',
  );
  return { env, welcome };
}
