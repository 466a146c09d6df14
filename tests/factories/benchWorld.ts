import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import pg from 'pg';
import request from 'supertest';
import { v7 } from 'uuid';
import type { DeviceDb } from '@/db/device/deviceDb';
import { getFact } from '@/db/device/meta';
import { prepareDeviceDb } from '@/db/device/prepareDb';
import { record, type Draft } from '@/db/device/recordChange';
import { AppError } from '@/shared/errors';
import type { Fields } from '@/shared/sync/protocol';
import { enrolDevice } from '@/stores/bench/enrolDevice';
import { callApi, type ApiRequest } from '@/stores/http/apiClient';
import { createSyncEngine, type SyncReport } from '@/stores/sync/syncEngine';
import { deskBatchOf } from './deskBatch';
import { manualClock } from './manualClock';
import { mortal, type MortalDriver } from './mortalDriver';
import { copyFiles, freshFile, openNodeSqlite } from './nodeSqlite';
import { benchFields } from './shopRecords';
import { testServer, testShop, type TestServer, type TestShop } from './shopWorld';

/* Bench devices of the product (their database, queue and engine) against the product's server on a real PostgreSQL,
 * over real HTTP in this process. Networks fail and both sides are killed where a test says. */

/** What happens to a device's requests. */
export type Network = (request: { path: string; count: number }) => 'ok' | 'loseRequest' | 'loseAnswer';

const fine: Network = () => 'ok';

export type BenchWorld = {
  server: TestServer;
  shop: TestShop;
  benchId: string;
  device: (name?: string) => Promise<WorldDevice>;
  newCode: () => Promise<string>;
  admin: pg.Client;
  /** everything in the database, to be put back later */
  backup: () => Promise<Backup>;
  /** puts a backup back, by the restore command (a new life) or by hand (nobody said anything) */
  restore: (backup: Backup, how: 'newLife' | 'sameLife') => Promise<void>;
  close: () => Promise<void>;
};

type Backup = { name: string; rows: string }[];

/** A shop with a bench, and a server that listens. */
export async function benchWorld(): Promise<BenchWorld> {
  const server = await testServer();
  const shop = await testShop(server, 'fell');
  const benchId = v7();
  await deskBatchOf(server, shop, [
    { kind: 'create', table: 'benches', rid: benchId, set: benchFields('fell') as unknown as Fields },
  ]);
  const http = createServer(server.app);
  await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
  const stopFetch = sendFetchTo(http);
  const admin = new pg.Client({ connectionString: server.db.adminUrl });
  await admin.connect();
  const newCode = async () => {
    const made = await request(server.app)
      .post('/api/devices/enrolment-codes')
      .set('Authorization', `Bearer ${shop.people.supervisor.token}`)
      .expect(200);
    return String(made.body.code);
  };
  const tables = async () => {
    const { rows } = await admin.query<{ name: string }>(
      `select quote_ident(tablename) as name from pg_tables where schemaname = 'public' order by 1`,
    );
    return rows.map((row) => row.name);
  };
  return {
    server,
    shop,
    benchId,
    admin,
    newCode,
    device: async (name = 'tablet') => {
      const device = new WorldDevice(await freshDevice(), shop.people.operator.id);
      await device.enrol(await newCode(), name);
      return device;
    },
    backup: async () => {
      const all: Backup = [];
      for (const name of await tables()) {
        const { rows } = await admin.query<{ rows: string }>(
          `select coalesce(json_agg(t), '[]')::text as rows from ${name} t`,
        );
        all.push({ name, rows: rows[0]?.rows ?? '[]' });
      }
      return all;
    },
    restore: async (backup, how) => {
      await admin.query('begin');
      await admin.query('set local session_replication_role = replica');
      for (const { name } of backup) await admin.query(`delete from ${name}`);
      for (const { name, rows } of backup)
        await admin.query(`insert into ${name} select * from json_populate_recordset(null::${name}, $1)`, [
          rows,
        ]);
      if (how === 'newLife') await admin.query('insert into epochs (bump) select max(bump) + 1 from epochs');
      await admin.query('commit');
    },
    close: async () => {
      stopFetch();
      await admin.end();
      http.closeAllConnections();
      await new Promise<void>((resolve) => http.close(() => resolve()));
      await server.close();
    },
  };
}

/** The app's own requests name no host: here they go to the server of this test. */
function sendFetchTo(http: Server): () => void {
  const { port } = http.address() as AddressInfo;
  const original = globalThis.fetch;
  globalThis.fetch = (input, init) => original(new URL(String(input), `http://127.0.0.1:${port}`), init);
  return () => {
    globalThis.fetch = original;
  };
}

async function freshDevice(): Promise<{ file: string; driver: MortalDriver; db: DeviceDb }> {
  return openDevice(freshFile());
}

async function openDevice(file: string) {
  const driver = mortal(await openNodeSqlite(file));
  return { file, driver, db: await prepareDeviceDb(driver) };
}

/** A bench device: what a browser holds on its disk, and what it loses when it is killed. */
export class WorldDevice {
  network: Network = fine;
  reports: SyncReport[] = [];
  private requestCount = 0;

  constructor(
    private parts: { file: string; driver: MortalDriver; db: DeviceDb },
    readonly personId: string,
  ) {}

  get db(): DeviceDb {
    return this.parts.db;
  }
  get driver(): MortalDriver {
    return this.parts.driver;
  }

  /** The product's client, over this device's network. */
  call: typeof callApi = async <T>(asked: ApiRequest<T>): Promise<T> => {
    this.requestCount += 1;
    const fate = this.network({ path: asked.path.split('?')[0] ?? '', count: this.requestCount });
    if (fate === 'loseRequest') throw new AppError('offline');
    const answer = await callApi(asked);
    if (fate === 'loseAnswer') throw new AppError('timeout');
    return answer;
  };

  enrol(code: string, name = 'tablet'): Promise<void> {
    return enrolDevice({ db: this.db, call: this.call }, code, name);
  }

  /** One round of the engine, as on opening the app. @returns what it said at its end */
  async sync(): Promise<SyncReport | undefined> {
    const clock = manualClock(Date.now());
    const engine = createSyncEngine({
      db: this.db,
      call: this.call,
      nowMs: () => Date.now(),
      random: () => 0.5,
      setTimer: clock.setTimer,
      clearTimer: clock.clearTimer,
      isVisible: () => true,
      report: (report) => this.reports.push(report),
    });
    engine.start();
    await engine.syncNow();
    await engine.stop();
    return this.reports.at(-1);
  }

  record(...drafts: Draft[]) {
    return this.db.tx((tx) =>
      record(tx, drafts, { personId: this.personId, atIso: new Date().toISOString() }),
    );
  }

  /** The browser was killed; it is opened again on what lies on the disk. */
  async reopen(): Promise<void> {
    this.parts = await openDevice(this.parts.file);
  }

  /** A copy of the disk as it is now. */
  image(): Promise<string> {
    return copyFiles(this.parts.file);
  }

  /** The disk is as it was when the image was made. */
  async rollBackTo(image: string): Promise<void> {
    this.parts = await openDevice(await copyFiles(image));
  }

  async id(): Promise<string> {
    return (await getFact(this.db.read, 'device'))?.id ?? '';
  }
}
