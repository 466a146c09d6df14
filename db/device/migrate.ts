import type { DeviceDriver } from './driver';
import type { DeviceMigration } from './migrations.gen';

/** Pragmas of the device database, in this order: exclusive locking first, because a write-ahead log without shared
 * memory cannot be opened otherwise. `full` makes a commit durable before its promise resolves. */
export const devicePragmas =
  'pragma locking_mode = exclusive; pragma journal_mode = wal; pragma synchronous = full; pragma foreign_keys = on';

/** Brings the device database to the newest step, each step in a transaction of its own. */
export async function migrateDevice(
  driver: DeviceDriver,
  migrations: readonly DeviceMigration[],
): Promise<void> {
  await driver.exec(
    'create table if not exists __migrations (idx integer primary key, tag text not null, applied_at text not null)',
  );
  const done = new Set((await driver.all('select idx from __migrations', [])).map((row) => Number(row[0])));
  for (const migration of migrations) {
    if (done.has(migration.idx)) continue;
    await driver.exec('begin immediate');
    try {
      for (const statement of migration.sql) await driver.exec(statement);
      await driver.run('insert into __migrations values (?, ?, ?)', [
        migration.idx,
        migration.tag,
        new Date().toISOString(),
      ]);
      await driver.exec('commit');
    } catch (error) {
      await driver.exec('rollback').catch(() => undefined);
      throw error;
    }
  }
}
