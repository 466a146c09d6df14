import request from 'supertest';
import { v7 } from 'uuid';
import {
  benchFields,
  chainChanges,
  deskChange,
  newChain,
  reading,
  type Chain,
} from '@/tests/factories/shopRecords';
import {
  testDevice,
  testServer,
  testShop,
  type TestDevice,
  type TestServer,
  type TestShop,
} from '@/tests/factories/shopWorld';

let server: TestServer;
let shop: TestShop;
let device: TestDevice;
let benchId: string;

beforeAll(async () => {
  server = await testServer();
  shop = await testShop(server, 'alder');
  benchId = v7();
  await request(server.app)
    .post('/api/changes')
    .set('Authorization', `Bearer ${shop.people.technician.token}`)
    .send({
      changes: [deskChange({ kind: 'create', table: 'benches', rid: benchId, set: benchFields('alder') })],
    })
    .expect(200);
});
beforeEach(async () => {
  device = await testDevice(server, shop);
});
afterAll(() => server.close());

/** A session with one reading, sent and applied. */
async function sentChain(): Promise<Chain> {
  const ids = newChain(benchId);
  await device.push(...chainChanges(device, 'alder', ids));
  return ids;
}

test('a whole session is applied and stands in the feed as it was keyed', async () => {
  const ids = newChain(benchId);
  const changes = chainChanges(device, 'alder', ids);
  const answer = await device.push(...changes);
  expect(answer.last).toBe(8);
  expect(answer.verdicts).toEqual(changes.map(({ id }) => ({ id, verdict: 'applied', version: 1 })));
  const { items } = await device.pullAll();
  const found = items.find((item) => item.id === ids.reading);
  expect(found).toMatchObject({
    table: 'readings',
    version: 1,
    deleted: false,
    fields: reading(device, ids),
  });
});
