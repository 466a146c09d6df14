import type { Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import pg from 'pg';
import { v7 } from 'uuid';
import { schemaVersion } from '@/shared/sync/syncTables';
import { benchFields, chainChanges, deskChange, newChain, reading } from '../factories/shopRecords';
import { testDevice, testServer, testShop } from '../factories/shopWorld';
import { baselineServer } from './baselineServer';
import { line, median, quantile, timed } from './figures';

const batchSize = 500;
const rounds = 20;

async function serve(app: { listen: (port: number, host: string, ready: () => void) => Server }) {
  const server = await new Promise<Server>((resolve) => {
    const listening: Server = app.listen(0, '127.0.0.1', () => resolve(listening));
  });
  return { server, address: `http://127.0.0.1:${(server.address() as AddressInfo).port}` };
}

async function send(url: string, body: unknown, token = ''): Promise<void> {
  const answer = await fetch(url, {
    method: 'POST',
    headers: { 'content-type': 'application/json', authorization: `Bearer ${token}` },
    body: JSON.stringify(body),
  });
  if (!answer.ok) throw new Error(`${url} answered ${answer.status}: ${await answer.text()}`);
  await answer.arrayBuffer();
}

/** Push of readings against the baseline endpoint, batches of 500 and single readings, taken in turns. */
export async function pushBench(): Promise<void> {
  const world = await testServer();
  const pool = new pg.Pool({ connectionString: world.db.adminUrl });
  const ours = await serve(world.app);
  const bare = await serve(await baselineServer(pool));
  try {
    const shop = await testShop(world, 'alder');
    const device = await testDevice(world, shop);
    const benchId = v7();
    const made = [deskChange({ kind: 'create', table: 'benches', rid: benchId, set: benchFields('alder') })];
    await send(`${ours.address}/api/changes`, { changes: made }, shop.people.technician.token);
    const ids = newChain(benchId);
    await device.push(...chainChanges(device, 'alder', ids));

    let ordinal = 1;
    const readings = (count: number) =>
      Array.from({ length: count }, () =>
        device.change({
          kind: 'create',
          table: 'readings',
          rid: v7(),
          set: reading(device, ids, { readingOrdinal: (ordinal += 1) }),
        }),
      );
    const envelope = (changes: unknown[]) => ({
      device: device.id,
      sv: schemaVersion,
      now: new Date().toISOString(),
      pendingCount: changes.length,
      changes,
    });
    const rows = (count: number) =>
      Array.from({ length: count }, (_, index) => ({
        id: v7(),
        runId: ids.run,
        ordinal: index,
        liftText: '0.300',
        flowText: '166',
        pressureText: '27.0',
        at: '2026-12-01T10:00:00.000Z',
      }));
    const push = (changes: unknown[]) =>
      send(`${ours.address}/api/sync/push`, envelope(changes), device.token);
    const insert = (count: number) => send(`${bare.address}/baseline`, { rows: rows(count) });

    // warm both
    for (let i = 0; i < 3; i += 1) {
      await push(readings(batchSize));
      await insert(batchSize);
    }
    const pushed: number[] = [];
    const again: number[] = [];
    const inserted: number[] = [];
    for (let i = 0; i < rounds; i += 1) {
      const batch = readings(batchSize);
      pushed.push(await timed(() => push(batch)));
      inserted.push(await timed(() => insert(batchSize)));
      again.push(await timed(() => push(batch)));
    }
    const perSecond = (ms: number) => `${Math.round((batchSize / ms) * 1000)}/s`;
    line(
      'push, batches of 500, against the baseline',
      median(inserted) / median(pushed),
      'aim >= 0.4',
      `${perSecond(median(pushed))} against ${perSecond(median(inserted))}`,
    );
    line(
      'the same push again, against the first',
      median(pushed) / median(again),
      'aim >= 3',
      perSecond(median(again)),
    );

    const one: number[] = [];
    const bareOne: number[] = [];
    for (let i = 0; i < 300; i += 1) {
      const single = readings(1);
      one.push(await timed(() => push(single)));
      bareOne.push(await timed(() => insert(1)));
    }
    line(
      'push of one reading, p99, against the baseline',
      quantile(one, 0.99) / quantile(bareOne, 0.99),
      'aim <= 2',
      `p50 ${median(one).toFixed(1)} ms against ${median(bareOne).toFixed(1)} ms`,
    );
  } finally {
    ours.server.close();
    bare.server.close();
    await pool.end();
    await world.close();
  }
}
