import pg from 'pg';
import { v7 } from 'uuid';
import type { FeedItem, PullResponse } from '@/shared/sync/protocol';
import {
  benchFields,
  chainChanges,
  deskChange,
  newChain,
  reading,
  type Chain,
} from '@/tests/factories/shopRecords';
import {
  asPerson,
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
let ids: Chain;
let admin: pg.Client;

beforeAll(async () => {
  server = await testServer({ oldestSchemaVersion: 1 });
  shop = await testShop(server, 'birch');
  const bench = v7();
  await asPerson(server, shop.people.technician)
    .post('/api/changes')
    .send({
      changes: [deskChange({ kind: 'create', table: 'benches', rid: bench, set: benchFields('birch') })],
    })
    .expect(200);
  device = await testDevice(server, shop);
  ids = newChain(bench);
  await device.push(...chainChanges(device, 'birch', ids));
  admin = new pg.Client({ connectionString: server.db.adminUrl });
  await admin.connect();
});
afterAll(async () => {
  await admin.end();
  await server.close();
});

const newReading = (from: TestDevice) =>
  from.change({ kind: 'create', table: 'readings', rid: v7(), set: reading(from, ids) });

test('pages of any size carry the same records in the same order, and end at the newest number', async () => {
  const whole = await device.pullAll();
  const bit = await device.pullAll(1);
  expect(bit.items).toEqual(whole.items);
  expect(bit).toMatchObject({ cursor: whole.cursor, seen: whole.seen, more: false });
  expect(whole.items.map((item) => item.seq)).toEqual(
    [...whole.items.map((item) => item.seq)].sort((a, b) => a - b),
  );
  const { rows } = await admin.query('select seq from feeds where shop_id = $1', [shop.id]);
  expect(whole.cursor).toBe(Number(rows[0].seq));
});

test('a record that moved while it was pulled comes again, further on', async () => {
  const before = await device.pullAll();
  const change = newReading(device);
  await device.push(change);
  const { epoch, cursor, seen } = before;
  const page = (await device.pullPage({ after: cursor, epoch, seen }).expect(200)).body as PullResponse;
  expect(page.items.map((item) => item.id)).toEqual([change.rid]);
});

test('eight devices write while two readers poll: the feed has no holes and the readers miss nothing', async () => {
  const writers = await Promise.all(
    Array.from({ length: 8 }, (_, index) => testDevice(server, shop, `writer ${index}`)),
  );
  let isWriting = true;
  const sent: string[] = [];
  const write = async (writer: TestDevice) => {
    for (let batch = 0; batch < 12; batch += 1) {
      const changes = Array.from({ length: 5 }, () => newReading(writer));
      const { verdicts } = await writer.push(...changes);
      expect(verdicts.every((one) => one.verdict === 'applied')).toBe(true);
      sent.push(...changes.map((change) => change.rid));
    }
  };
  const read = async (limit: number) => {
    const got = new Map<string, FeedItem>();
    let place = { after: 0, epoch: '', seen: '' };
    for (let isLast = false; ;) {
      const page = (await device.pullPage({ ...place, limit }).expect(200)).body as PullResponse;
      for (const item of page.items) got.set(item.id, item);
      place = { after: page.cursor, epoch: page.epoch, seen: page.seen };
      if (page.more) continue;
      if (isLast) return got;
      isLast = !isWriting;
    }
  };
  const readers = [read(7), read(500)];
  await Promise.all(writers.map(write));
  isWriting = false;
  for (const got of await Promise.all(readers)) expect(sent.filter((id) => !got.has(id))).toEqual([]);
  const { rows } = await admin.query(
    `select array_agg(seq::int order by seq) as seqs from changes where shop_id = $1 and seq is not null`,
    [shop.id],
  );
  const seqs = rows[0].seqs as number[];
  expect(seqs).toEqual(Array.from({ length: seqs.length }, (_, index) => index + 1));
});

test('fifty devices push at the same moment: none is refused, none is lost, and reading goes on meanwhile', async () => {
  const many = await Promise.all(
    Array.from({ length: 50 }, (_, n) => testDevice(server, shop, `of fifty ${n}`)),
  );
  const changes = many.map((one) => newReading(one));
  const pushes = many.map((one, index) => one.push(changes[index]));
  await device.pullPage({ limit: 1 }).expect(200);
  const answers = await Promise.all(pushes);
  expect(answers.map(({ verdicts }) => verdicts[0]?.verdict)).toEqual(many.map(() => 'applied'));
  const got = new Set((await device.pullAll()).items.map((item) => item.id));
  expect(changes.filter((change) => !got.has(change.rid))).toEqual([]);
});

test('a write to a synced table outside the one function is refused by the database', async () => {
  const app = new pg.Client({ connectionString: server.db.appUrl });
  await app.connect();
  const insert = `insert into customers (shop_id, id, version, deleted, seq, name, note)
                  values ($1, $2, 1, false, 1, 'a', '')`;
  await app.query('begin');
  await app.query(`select set_config('app.shop_id', $1, true)`, [shop.id]);
  await expect(app.query(insert, [shop.id, v7()])).rejects.toThrow(/outside withShopWrite/);
  await app.query('rollback');
  await app.query('begin');
  await app.query(`select set_config('app.shop_id', $1, true), set_config('app.feed_lock', $1, true)`, [
    shop.id,
  ]);
  await expect(app.query(insert, [shop.id, v7()])).rejects.toThrow(/without a number of its feed/);
  await app.query('rollback');
  await app.query('begin');
  await app.query(`select set_config('app.shop_id', $1, true)`, [shop.id]);
  await expect(app.query('select draw_feed(1)')).rejects.toThrow(/outside withShopWrite/);
  await app.query('rollback');
  await app.end();
});

test('history cannot be changed or removed by the role that serves requests', async () => {
  const app = new pg.Client({ connectionString: server.db.appUrl });
  await app.connect();
  await app.query(`select set_config('app.shop_id', $1, false)`, [shop.id]);
  for (const table of ['changes', 'audit']) {
    await expect(app.query(`update ${table} set shop_id = shop_id`)).rejects.toThrow(/permission denied/);
    await expect(app.query(`delete from ${table}`)).rejects.toThrow(/permission denied/);
    await expect(app.query(`truncate ${table}`)).rejects.toThrow(/permission denied/);
  }
  await app.end();
});

describe('a server that was set back', () => {
  const place = async () => {
    const { cursor, epoch, seen } = await device.pullAll();
    return { after: cursor, epoch, seen };
  };
  const refused = (answer: { status: number; body: { code: string } }) => [answer.status, answer.body.code];

  test('is known by a cursor beyond its end, by another change at the cursor, by another epoch', async () => {
    const here = await place();
    for (const other of [
      { ...here, after: here.after + 1 },
      { ...here, seen: v7() },
      { ...here, seen: '' },
      { ...here, epoch: '1.1' },
      { after: 0, epoch: '', seen: v7() },
    ])
      expect(refused(await device.pullPage(other))).toEqual([409, 'server_restored']);
    await device.pullPage(here).expect(200);
  });

  test('a raised bump makes a new epoch, which the refusal names', async () => {
    const here = await place();
    await admin.query('insert into epochs (bump) select max(bump) + 1 from epochs');
    const answer = await device.pullPage(here);
    expect(refused(answer)).toEqual([409, 'server_restored']);
    expect(answer.body.epoch).not.toBe(here.epoch);
    await device.pullPage({ ...here, epoch: answer.body.epoch }).expect(200);
  });
});

test('a device too old to read the feed is asked to update, and may still push', async () => {
  server.deps.oldestSchemaVersion = 2;
  const old = await device.pullPage({ sv: 1 });
  expect([old.status, old.body.code]).toEqual([426, 'update_needed']);
  await device.send([newReading(device)], { sv: 1 }).expect(200);
  server.deps.oldestSchemaVersion = 1;
});

test.each([
  ['after', 'abc'],
  ['after', '-1'],
  ['after', '1.5'],
  ['limit', '0'],
  ['limit', '501'],
  ['limit', 'all'],
  ['seen', 'nobody'],
  ['sv', ''],
  ['epoch', 'e'.repeat(100)],
  ['epoch', '\u0000'],
  ['more', '1'],
])('a pull with %s=%s is 422', async (name, value) => {
  const answer = await device.pullPage({ [name]: value });
  expect([answer.status, answer.body.code]).toEqual([422, 'invalid']);
});

describe('a connection that is killed', () => {
  /** Backends of the server that wait for the shop's feed lock. */
  const waiting = async () =>
    (
      await admin.query<{ pid: number }>(
        `select pid from pg_stat_activity where datname = $1 and usename = 'app' and wait_event_type = 'Lock'`,
        [server.db.name],
      )
    ).rows;
  const untilOneWaits = async () => {
    for (;;) {
      const [first] = await waiting();
      if (first) return first.pid;
    }
  };
  const lock = `select pg_advisory_xact_lock(hashtextextended('feed:' || $1, 0))`;

  test('in the middle of a push: 503 and when to come back; pushed again, it is there once', async () => {
    const change = newReading(device);
    await admin.query('begin');
    await admin.query(lock, [shop.id]);
    const pushing = device.send([change]).then((answer) => answer);
    await admin.query('select pg_terminate_backend($1)', [await untilOneWaits()]);
    await admin.query('rollback');
    const answer = await pushing;
    expect([answer.status, answer.body.code, answer.get('Retry-After')]).toEqual([503, 'busy', '2']);
    expect((await device.push(change)).verdicts).toMatchObject([{ verdict: 'applied' }]);
    const { rows } = await admin.query('select count(*)::int as n from readings where id = $1', [change.rid]);
    expect(rows).toEqual([{ n: 1 }]);
  });

  test('all of them, and none let in for a while, as when PostgreSQL restarts: 503, and then it goes on', async () => {
    const other = new pg.Client({ connectionString: process.env.TEST_PG_ADMIN_URL });
    await other.connect();
    await admin.end();
    await other.query(`alter database ${server.db.name} allow_connections false`);
    await other.query('select pg_terminate_backend(pid) from pg_stat_activity where datname = $1', [
      server.db.name,
    ]);
    const change = newReading(device);
    for (const answer of await Promise.all([
      device.send([change]),
      device.pullPage({}),
      device.send([change]),
    ]))
      expect([answer.status, answer.body.code]).toEqual([503, 'busy']);
    await other.query(`alter database ${server.db.name} allow_connections true`);
    await other.end();
    admin = new pg.Client({ connectionString: server.db.adminUrl });
    await admin.connect();
    expect((await device.push(change)).verdicts).toMatchObject([{ verdict: 'applied' }]);
  });
});
