import { prepareDeviceDb } from '@/db/device/prepareDb';
import type { DeviceDb } from '@/db/device/deviceDb';
import type { DeviceDriver } from '@/db/device/driver';
import { storePage } from '@/db/device/feed';
import { setFact } from '@/db/device/meta';
import { storeRoster } from '@/db/device/rosterStore';
import type { RosterPerson, ShopSettings } from '@/shared/schema/records';
import type { Fields, FeedItem } from '@/shared/sync/protocol';
import { setBenchDevice } from '@/stores/bench/benchDevice';
import { freshFile, openNodeSqlite } from './nodeSqlite';
import { newId } from './records';

export const noon = Date.parse('2026-12-01T12:00:00.000Z');

export const shopSettings: ShopSettings = {
  standardPressureText: '28',
  standardPressureUnit: 'inH2O',
  flowUnit: 'cfm',
  pressureUnit: 'inH2O',
  liftUnit: 'in',
  decimalMark: '.',
  referenceAir: 'dry20C',
  allowsSelfApproval: false,
};

export const benchFields: Fields = {
  name: 'Bench by the door',
  element: 'vane',
  elementPlace: 'afterPort',
  settingKind: 'area',
  settingText: '12.5',
  settingUnit: 'in2',
  settingStepText: '0.1',
  settingStepUnit: 'in2',
  flowResolutionText: '1',
  flowResolutionUnit: 'cfm',
  pressureResolutionText: '0.1',
  pressureResolutionUnit: 'inH2O',
  pressureLowText: null,
  pressureLowUnit: null,
  pressureHighText: null,
  pressureHighUnit: null,
  ranges: [],
  leakExponentText: '0.6',
  status: 'inUse',
  statusWhy: '',
};

/** A device that is enrolled and has read the shop's bench, without any server: for what happens on the device alone. */
export async function enrolledDevice(options: { people?: RosterPerson[]; driver?: DeviceDriver } = {}) {
  const db = await prepareDeviceDb(options.driver ?? (await openNodeSqlite(freshFile())));
  const ids = { device: newId(), shop: newId(), person: newId(), bench: newId() };
  const people = options.people ?? [{ id: ids.person, name: 'Ada Fell', roles: ['operator'], pinHash: null }];
  await db.tx(async (tx) => {
    await setFact(tx, 'device', { id: ids.device, deviceOrdinal: 3, name: 'Tablet' });
    await setFact(tx, 'token', 'a-token');
    await setFact(tx, 'standing', 'enrolled');
    await setFact(tx, 'epoch', 'first');
    await storeRoster(tx, {
      shop: { id: ids.shop, name: 'Fell & Daughter', settings: shopSettings },
      people,
    });
  });
  await feed(db, [item('benches', ids.bench, benchFields)]);
  return { db, ids };
}

let seq = 0;

/** A record as the feed would bring it. */
export const item = (
  table: string,
  id: string,
  fields: Fields,
  over: { version?: number; deleted?: boolean } = {},
): FeedItem => ({ table, id, version: 1, deleted: false, seq: ++seq, fields, ...over });

/** Stores items as the last page of a pull. */
export function feed(db: DeviceDb, items: FeedItem[], epoch = 'first'): Promise<void> {
  return db.tx((tx) =>
    storePage(tx, {
      epoch,
      cursor: items.at(-1)?.seq ?? seq,
      seen: '',
      more: false,
      now: new Date(noon).toISOString(),
      items,
    }),
  );
}

/** Puts a device under the verbs of the bench, with a person signed in. */
export function standAtBench(db: DeviceDb, personId: string | null, nowMs: () => number = () => noon): void {
  setBenchDevice({ db, nowMs, personId: () => personId, onRecorded: () => undefined });
}
