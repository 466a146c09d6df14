import { v7 } from 'uuid';
import type { Calibration } from '@/shared/schema/records';
import { benchFields, chainChanges, deskChange, newChain, type Chain } from './shopRecords';
import { asPerson, testDevice, testShop, type TestDevice, type TestServer, type TestShop } from './shopWorld';

export const calibrationFields = (benchId: string, adoptedBy: string): Calibration => ({
  benchId,
  direction: 'drawing',
  grade: 'comparative',
  fit: { kind: 'factor', factorText: '1.02' },
  stepsOn: [],
  asFoundText: null,
  asFoundUnit: null,
  asLeftText: null,
  asLeftUnit: null,
  adoptedBy,
  fromAt: '2026-01-01T00:00:00.000Z',
  untilAt: null,
  withdrawnAt: null,
  note: '',
});

export type FullShop = TestShop & { device: TestDevice; ids: Chain; calibrationId: string };

/** A shop with a record of every kind: bench and calibration from the desk, a session from a device. */
export async function fullShop(server: TestServer, word: string): Promise<FullShop> {
  const shop = await testShop(server, word);
  const bench = v7();
  const calibrationId = v7();
  const technician = shop.people.technician;
  await asPerson(server, technician)
    .post('/api/changes')
    .send({
      changes: [
        deskChange({ kind: 'create', table: 'benches', rid: bench, set: benchFields(word) }),
        deskChange({
          kind: 'create',
          table: 'calibrations',
          rid: calibrationId,
          set: calibrationFields(bench, technician.id),
        }),
      ],
    })
    .expect(200);
  const device = await testDevice(server, shop, `${word} tablet`);
  const ids = newChain(bench);
  await device.push(...chainChanges(device, word, ids));
  return { ...shop, device, ids, calibrationId };
}
