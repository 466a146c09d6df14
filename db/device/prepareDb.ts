import { createDeviceDb, type DeviceDb } from './deviceDb';
import type { DeviceDriver } from './driver';
import { devicePragmas, migrateDevice } from './migrate';
import { deviceMigrations } from './migrations.gen';
import { bringRowsUpToDate } from './workingRows';

/** Pragmas, migrations, and working rows that fit this build. */
export async function prepareDeviceDb(driver: DeviceDriver): Promise<DeviceDb> {
  await driver.exec(devicePragmas);
  await migrateDevice(driver, deviceMigrations);
  const db = createDeviceDb(driver);
  await bringRowsUpToDate(db);
  return db;
}
