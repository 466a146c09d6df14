// Stops a cluster when the process that started it is gone, even killed outright: then this program's stdin ends.
// Usage: node clusterKeeper.mjs <pg_ctl> <data folder> <uid or -> <gid or -> [folders to remove afterwards]
import { spawnSync } from 'node:child_process';
import fs from 'node:fs';

const [pgCtl, data, uid, gid, ...discard] = process.argv.slice(2);

function stop() {
  const asUser = uid === '-' ? {} : { uid: Number(uid), gid: Number(gid) };
  spawnSync(pgCtl, ['-D', data, '-m', 'fast', '-w', 'stop'], { cwd: '/', stdio: 'ignore', ...asUser });
  for (const folder of discard) fs.rmSync(folder, { recursive: true, force: true });
}

// an interrupt at the terminal is for the one who started us; he stops the cluster himself and then lets go of us
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => undefined);
process.stdin.once('close', stop);
process.stdin.resume();
