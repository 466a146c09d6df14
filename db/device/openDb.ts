import type { DeviceDb } from './deviceDb';
import { openExpoDriver } from './expoDriver';
import { prepareDeviceDb } from './prepareDb';

let opened: Promise<DeviceDb> | undefined;

/** Opens the device database once per page: expo-sqlite's worker must not see two opens before it is ready.
 * The tab lock must be held. */
export function openDeviceDb(): Promise<DeviceDb> {
  opened ??= openExpoDriver('inchwater.db').then(prepareDeviceDb);
  return opened;
}
