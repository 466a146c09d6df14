import pg from 'pg';
import { v7 } from 'uuid';
import { newRun } from '@/shared/session/startSession';
import type { Json } from '@/shared/sync/protocol';
import { benchFields, chainChanges, deskChange, newChain, reading, type Chain } from './shopRecords';
import {
  asPerson,
  testDevice,
  testServer,
  testShop,
  type TestDevice,
  type TestServer,
  type TestShop,
} from './shopWorld';

/** A shop with a bench and one device, and short words for what tests of push send. */
export class PushWorld {
  private constructor(
    readonly server: TestServer,
    readonly shop: TestShop,
    readonly admin: pg.Client,
    readonly benchId: string,
    public device: TestDevice,
  ) {}

  static async make(): Promise<PushWorld> {
    const server = await testServer();
    const shop = await testShop(server, 'alder');
    const benchId = v7();
    const bench = deskChange({ kind: 'create', table: 'benches', rid: benchId, set: benchFields('alder') });
    await asPerson(server, shop.people.technician)
      .post('/api/changes')
      .send({ changes: [bench] })
      .expect(200);
    const admin = new pg.Client({ connectionString: server.db.adminUrl });
    await admin.connect();
    return new PushWorld(server, shop, admin, benchId, await testDevice(server, shop));
  }

  async close(): Promise<void> {
    await this.admin.end();
    await this.server.close();
  }

  /** Goes on with a device that has sent nothing. */
  async anotherDevice(): Promise<void> {
    this.device = await testDevice(this.server, this.shop);
  }

  /** A session with one reading, sent and applied. */
  async sentChain(): Promise<Chain> {
    const ids = newChain(this.benchId);
    const { verdicts } = await this.device.push(...chainChanges(this.device, 'alder', ids));
    expect(verdicts.map((one) => one.verdict)).toEqual(Array.from({ length: 8 }, () => 'applied'));
    return ids;
  }

  newReading(ids: Chain, over: Parameters<typeof reading>[2] = {}) {
    const set = reading(this.device, ids, over);
    return this.device.change({ kind: 'create', table: 'readings', rid: v7(), set });
  }

  patch(rid: string, base: Record<string, Json>, set: Record<string, Json>, table = 'readings') {
    return this.device.change({ kind: 'patch', table, rid, base, set });
  }

  /** Lines of the log, by the ids of their changes. */
  async log(ids: string[]) {
    return (await this.admin.query('select * from changes where id = any($1::uuid[]) order by n', [ids]))
      .rows;
  }
}

/** The second run of a session. */
export const secondRun = (sessionId: string) =>
  newRun({ sessionId, runOrdinal: 2, side: 'intake', port: '2', valvesOpenCount: 1 });
