import pg from 'pg';
import request from 'supertest';
import { v7 } from 'uuid';
import { newRun } from '@/shared/session/startSession';
import type { Json } from '@/shared/sync/protocol';
import {
  benchFields,
  chainChanges,
  customerFields,
  deskChange,
  headFields,
  newChain,
  reading,
  rungFields,
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
let benchId: string;
let owner: pg.Client;

beforeAll(async () => {
  server = await testServer();
  shop = await testShop(server, 'alder');
  benchId = v7();
  await asPerson(server, shop.people.technician)
    .post('/api/changes')
    .send({
      changes: [deskChange({ kind: 'create', table: 'benches', rid: benchId, set: benchFields('alder') })],
    })
    .expect(200);
  owner = new pg.Client({ connectionString: server.db.adminUrl });
  await owner.connect();
});
beforeEach(async () => {
  device = await testDevice(server, shop);
});
afterAll(async () => {
  await owner.end();
  await server.close();
});

/** A session with one reading, sent and applied. */
async function sentChain(): Promise<Chain> {
  const ids = newChain(benchId);
  const { verdicts } = await device.push(...chainChanges(device, 'alder', ids));
  expect(verdicts.map((one) => one.verdict)).toEqual(Array.from({ length: 8 }, () => 'applied'));
  return ids;
}

const newReading = (ids: Chain, over: Parameters<typeof reading>[2] = {}) =>
  device.change({ kind: 'create', table: 'readings', rid: v7(), set: reading(device, ids, over) });

const patch = (rid: string, base: Record<string, Json>, set: Record<string, Json>, table = 'readings') =>
  device.change({ kind: 'patch', table, rid, base, set });

const seen = (ids: Chain, over: Record<string, string> = {}) => ({
  readingId: ids.reading,
  liftText: '0.300',
  flowText: '166',
  pressureText: '27.0',
  ...over,
});

const handIn = (ids: Chain, expectSeen: unknown) =>
  ({
    ...device.change({ kind: 'handIn', table: 'sessions', rid: ids.session }),
    expect: expectSeen,
  }) as never;

const log = async (ids: string[]) =>
  (await owner.query('select * from changes where id = any($1::uuid[]) order by n', [ids])).rows;

describe('applying', () => {
  test('a whole session is applied and stands in the feed as it was keyed', async () => {
    const ids = newChain(benchId);
    const changes = chainChanges(device, 'alder', ids);
    const answer = await device.push(...changes);
    expect(answer.last).toBe(8);
    expect(answer.verdicts).toEqual(changes.map(({ id }) => ({ id, verdict: 'applied', version: 1 })));
    const { items } = await device.pullAll();
    expect(items.find((item) => item.id === ids.reading)).toMatchObject({
      table: 'readings',
      version: 1,
      deleted: false,
      fields: reading(device, ids),
    });
  });

  test('pushed again after a lost answer, it gives the same verdicts and doubles nothing', async () => {
    const ids = newChain(benchId);
    const bad = { ...device.change({ kind: 'create', table: 'customers', rid: v7() }), set: { name: '' } };
    const changes = [bad, ...chainChanges(device, 'alder', ids)];
    const first = await device.push(...changes);
    const feed = await device.pullAll();
    const again = await device.push(...changes);
    expect(again.verdicts).toEqual(first.verdicts);
    expect(again.last).toBe(9);
    expect((await device.pullAll()).items).toEqual(feed.items);
    expect(await log(changes.map((change) => change.id))).toHaveLength(9);
  });

  test('an answer lost half-way of a queue: the known part is recognised, the rest goes on', async () => {
    const ids = await sentChain();
    const sent = [newReading(ids), newReading(ids)];
    const first = await device.push(...sent);
    const rest = [newReading(ids), newReading(ids)];
    const again = await device.push(...sent, ...rest);
    expect(again.verdicts.slice(0, 2)).toEqual(first.verdicts);
    expect(again.verdicts.map((one) => one.verdict)).toEqual(['applied', 'applied', 'applied', 'applied']);
  });

  test('the same change twice in one batch is one change', async () => {
    const ids = await sentChain();
    const one = newReading(ids);
    const { verdicts, last } = await device.push(one, one);
    expect(verdicts).toEqual([verdicts[0], verdicts[0]]);
    expect(last).toBe(9);
    expect(await log([one.id])).toHaveLength(1);
  });

  test('several changes of one batch to one record: every version counts, the last carries the number of the feed', async () => {
    const ids = await sentChain();
    const changes = [
      patch(ids.reading, { flowText: '166' }, { flowText: '167' }),
      patch(ids.reading, { flowText: '167' }, { flowText: '168' }),
    ];
    const { verdicts } = await device.push(...changes);
    expect(verdicts.map((one) => one.version)).toEqual([2, 3]);
    const [first, second] = await log(changes.map((change) => change.id));
    expect(first.seq).toBeNull();
    expect(second.seq).not.toBeNull();
    expect(first.old).toEqual({ flowText: '166' });
    const item = (await device.pullAll()).items.find((one) => one.id === ids.reading);
    expect(item).toMatchObject({ version: 3, seq: Number(second.seq), fields: { flowText: '168' } });
  });

  test('two devices that changed the same field: the record keeps its value, both stand in a dispute', async () => {
    const ids = await sentChain();
    const other = await testDevice(server, shop, 'second');
    await device.push(patch(ids.reading, { flowText: '166' }, { flowText: '170' }));
    const late = other.change({
      kind: 'patch',
      table: 'readings',
      rid: ids.reading,
      base: { flowText: '166' },
      set: { flowText: '160' },
    });
    const { verdicts } = await other.push(late);
    expect(verdicts).toEqual([{ id: late.id, verdict: 'dispute', why: 'differs' }]);
    const { rows } = await owner.query(
      'select field_group, base, theirs, mine from disputes where change_id = $1',
      [late.id],
    );
    expect(rows).toEqual([
      {
        field_group: 'flow',
        base: { flowText: '166' },
        theirs: { flowText: '170' },
        mine: { flowText: '160' },
      },
    ]);
  });

  test('a delete is a version, and a change to what is deleted is a dispute about it', async () => {
    const ids = await sentChain();
    const { verdicts } = await device.push(
      device.change({ kind: 'delete', table: 'readings', rid: ids.reading, base: { flowText: '166' } }),
      patch(ids.reading, { flowText: '166' }, { flowText: '1' }),
    );
    expect(verdicts.map(({ verdict, version }) => [verdict, version])).toEqual([
      ['applied', 2],
      ['dispute', undefined],
    ]);
  });
});

describe('order', () => {
  test('a gap is answered with where the server is, and nothing is taken', async () => {
    const ids = await sentChain();
    const skipped = newReading(ids);
    const after = newReading(ids);
    const answer = await device.send([after]).expect(409);
    expect(answer.body).toMatchObject({ code: 'gap', last: 8 });
    expect(await log([after.id])).toEqual([]);
    expect((await device.push(skipped, after)).last).toBe(10);
  });

  test('another change under a number that was used is a fork', async () => {
    const ids = await sentChain();
    device.n = 4;
    const answer = await device.send([newReading(ids)]).expect(409);
    expect(answer.body).toMatchObject({ code: 'forked', last: 8 });
  });

  test('a device enrolled anew sends all it has under new numbers: known ones are recognised, new ones follow', async () => {
    const ids = newChain(benchId);
    const changes = chainChanges(device, 'alder', ids);
    const first = await device.push(...changes);
    const anew = await testDevice(server, shop, 'anew');
    const renumbered = [...changes, newReading(ids)].map((change, index) => ({ ...change, n: index + 1 }));
    const answer = await anew.push(...renumbered);
    expect(answer.last).toBe(9);
    expect(answer.verdicts.slice(0, 8)).toEqual(first.verdicts);
    expect(answer.verdicts[8]).toMatchObject({ verdict: 'applied' });
  });
});

describe('what can never be right is set aside alone', () => {
  test.each<[string, (change: Record<string, unknown>) => unknown]>([
    ['of no known kind', (change) => ({ ...change, kind: 'explode' })],
    ['with a field too many', (change) => ({ ...change, extra: 1 })],
    ['without its author', ({ by: _by, ...change }) => change],
    [
      'with a NUL character',
      (change) => ({ ...change, set: { ...(change.set as object), notUsedWhy: 'a\u0000b' } }),
    ],
    [
      'with half a surrogate pair',
      (change) => ({ ...change, set: { ...(change.set as object), notUsedWhy: 'a\ud800' } }),
    ],
    ['with a NUL in its kind', (change) => ({ ...change, kind: 'cre\u0000ate' })],
    [
      'nested without end',
      (change) => ({ ...change, set: JSON.parse(`${'{"a":'.repeat(2000)}1${'}'.repeat(2000)}`) }),
    ],
    [
      'with a flow of two decimal marks',
      (change) => ({ ...change, set: { ...(change.set as object), flowText: '1.2.3' } }),
    ],
    ['without a flow', (change) => ({ ...change, set: { ...(change.set as object), flowText: '' } })],
    [
      'absurdly long',
      (change) => ({ ...change, set: { ...(change.set as object), flowText: '9'.repeat(5000) } }),
    ],
    ['of a table nobody knows', (change) => ({ ...change, table: 'shoes' })],
    ['with __proto__ in it', (change) => ({ ...change, set: JSON.parse('{"__proto__":{"a":1}}') })],
    ['with a date that is none', (change) => ({ ...change, at: 'yesterday' })],
    ['of a version beyond reason', (change) => ({ ...change, sv: 9_007_199_254_740_991 })],
  ])('a change %s', async (_, spoil) => {
    const ids = await sentChain();
    const bad = spoil(newReading(ids)) as { id: string };
    const good = newReading(ids);
    const { verdicts, last } = await device.push(bad, good);
    expect(verdicts[0]).toMatchObject({ id: bad.id, verdict: 'rejected' });
    expect(verdicts[1]).toMatchObject({ id: good.id, verdict: 'applied' });
    expect(last).toBe(10);
    expect(await log([bad.id])).toMatchObject([{ verdict: 'rejected', n: 9 }]);
  });

  test('what the database itself refuses is set aside alone, and the rest of the batch is kept', async () => {
    const ids = await sentChain();
    await owner.query(`alter table readings add constraint no_666 check (flow_text <> '666')`);
    const [before, bad, after] = [newReading(ids), newReading(ids, { flowText: '666' }), newReading(ids)];
    const { verdicts, last } = await device.push(before, bad, after);
    await owner.query('alter table readings drop constraint no_666');
    expect(verdicts).toMatchObject([
      { id: before.id, verdict: 'applied' },
      { id: bad.id, verdict: 'rejected', why: 'invalid' },
      { id: after.id, verdict: 'applied' },
    ]);
    expect(last).toBe(11);
    expect((await device.push(before, bad, after)).verdicts).toEqual(verdicts);
  });

  test('a parent that is not there, also one named by a patch', async () => {
    const ids = await sentChain();
    const nowhere = v7();
    const { verdicts } = await device.push(
      newReading({ ...ids, run: nowhere }),
      patch(nowhere, { flowText: '1' }, { flowText: '2' }),
      patch(ids.head, { customerId: ids.customer }, { customerId: nowhere }, 'heads'),
      device.change({ kind: 'create', table: 'runs', rid: v7(), set: newRunOf('not an id') }),
    );
    expect(verdicts.map((one) => one.why)).toEqual([
      'unknown_parent',
      'unknown_record',
      'unknown_parent',
      'invalid',
    ]);
  });

  test('children of a refused create share its fate, in the same batch and in later ones', async () => {
    const customer = v7();
    const head = v7();
    const create = (table: string, rid: string, set: object) =>
      device.change({ kind: 'create', table, rid, set: set as Record<string, Json> });
    const first = await device.push(
      create('customers', customer, { ...customerFields('alder'), name: '' }),
      create('heads', head, headFields('alder', customer)),
      patch(head, { name: 'alder head' }, { name: 'other' }, 'heads'),
    );
    expect(first.verdicts.map((one) => one.why)).toEqual(['invalid', 'parent_rejected', 'parent_rejected']);
    const later = await device.push(create('heads', v7(), headFields('alder', customer)));
    expect(later.verdicts[0]).toMatchObject({ verdict: 'rejected', why: 'parent_rejected' });
  });

  test('what a device may not do, a person nobody knows, a reading under another name', async () => {
    const ids = await sentChain();
    const { verdicts } = await device.push(
      device.change({ kind: 'create', table: 'benches', rid: v7(), set: benchFields('alder') }),
      { ...newReading(ids), by: v7() },
      newReading(ids, { byPersonId: shop.people.owner.id }),
    );
    expect(verdicts.map((one) => one.why)).toEqual(['not_by_device', 'unknown_person', 'invalid']);
  });
});

const newRunOf = (sessionId: string) =>
  newRun({ sessionId, runOrdinal: 2, side: 'intake', port: '2', valvesOpenCount: 1 });

describe('closed doors', () => {
  test('a hand in is done while the readings are those that were seen, and not otherwise', async () => {
    const ids = await sentChain();
    const wrong = await device.push(handIn(ids, [seen(ids, { flowText: '160' })]));
    expect(wrong.verdicts[0]).toMatchObject({ verdict: 'rejected', why: 'changed_since_seen' });
    expect((await device.push(handIn(ids, []))).verdicts[0]).toMatchObject({ why: 'changed_since_seen' });
    const together = await device.push(
      patch(ids.reading, { flowText: '166' }, { flowText: '160' }),
      handIn(ids, [seen(ids, { flowText: '160' })]),
    );
    expect(together.verdicts.map((one) => one.verdict)).toEqual(['applied', 'applied']);
    const item = (await device.pullAll()).items.find((one) => one.id === ids.session);
    expect(item?.fields.state).toBe('handedIn');
  });

  test('a deleted reading, and those of a deleted run, are not part of what is handed in', async () => {
    const ids = await sentChain();
    const run = v7();
    await device.push(
      device.change({ kind: 'create', table: 'runs', rid: run, set: newRunOf(ids.session) }),
      newReading({ ...ids, run }),
      device.change({ kind: 'delete', table: 'runs', rid: run }),
    );
    const { verdicts } = await device.push(handIn(ids, [seen(ids)]));
    expect(verdicts[0]).toMatchObject({ verdict: 'applied' });
  });

  test('what is keyed into a session that was handed in is held, with all that hangs on it', async () => {
    const ids = await sentChain();
    const run = v7();
    const rung = rungFields(run);
    const { verdicts } = await device.push(
      handIn(ids, [seen(ids)]),
      newReading(ids),
      patch(ids.reading, { flowText: '166' }, { flowText: '1' }),
      device.change({ kind: 'create', table: 'runs', rid: run, set: newRunOf(ids.session) }),
      device.change({ kind: 'create', table: 'rungs', rid: v7(), set: rung }),
    );
    expect(verdicts.map(({ verdict, why }) => why ?? verdict)).toEqual([
      'applied',
      'session_closed',
      'session_closed',
      'session_closed',
      'parent_held',
    ]);
    const later = await device.push(device.change({ kind: 'create', table: 'rungs', rid: v7(), set: rung }));
    expect(later.verdicts[0]).toMatchObject({ verdict: 'held', why: 'parent_held' });
  });

  test('what comes under a closed account is held', async () => {
    const ids = await sentChain();
    const gone = (await owner.query(`select id from people where name = 'alder technician'`)).rows[0]
      .id as string;
    await owner.query('update people set closed_at = now() where id = $1', [gone]);
    const { verdicts } = await device.push({ ...newReading(ids, { byPersonId: gone }), by: gone });
    await owner.query('update people set closed_at = null where id = $1', [gone]);
    expect(verdicts[0]).toMatchObject({ verdict: 'held', why: 'account_closed' });
  });

  test('a device that was shut out: what it sends is kept as held, nothing is read, and it is told so', async () => {
    const ids = await sentChain();
    await asPerson(server, shop.people.supervisor).post(`/api/devices/${device.id}/revoke`).expect(204);
    const change = newReading(ids);
    for (let times = 0; times < 2; times += 1) {
      const answer = await device.send([change]).expect(403);
      expect(answer.body).toMatchObject({
        code: 'device_revoked',
        last: 9,
        verdicts: [{ id: change.id, verdict: 'held', why: 'device_revoked' }],
      });
    }
    expect(await log([change.id])).toMatchObject([{ verdict: 'held', device_id: device.id, n: 9 }]);
    await device.pullPage({}).expect(403);
    const roster = await request(server.app)
      .get('/api/sync/roster')
      .set('Authorization', `Bearer ${device.token}`);
    expect(roster.body.code).toBe('device_revoked');
  });
});

describe('the envelope', () => {
  const code = (answer: request.Response) => [answer.status, answer.body.code];

  test('an unknown token is 401 device_unknown, with or without a body', async () => {
    const answer = await request(server.app)
      .post('/api/sync/push')
      .set('Authorization', 'Bearer nobody')
      .send({ changes: 'whatever' });
    expect(code(answer)).toEqual([401, 'device_unknown']);
    expect(code(await request(server.app).get('/api/sync/pull'))).toEqual([401, 'device_unknown']);
    const person = await asPerson(server, shop.people.owner).get('/api/sync/pull');
    expect(code(person)).toEqual([401, 'device_unknown']);
  });

  test('a change without id or place, another device, a strange envelope are 422 and nothing is taken', async () => {
    const ids = await sentChain();
    const good = newReading(ids);
    for (const [changes, over] of [
      [[good, { n: 10 }], {}],
      [[good, { ...newReading(ids), n: -1 }], {}],
      [[good, null], {}],
      [[good, 'text'], {}],
      [[], {}],
      [[good], { device: v7() }],
      [[good], { extra: true }],
      [[good], { pendingCount: -1 }],
      [[good], { now: '\u0000' }],
      [Array.from({ length: 501 }, () => good), {}],
    ] as [unknown[], Record<string, unknown>][]) {
      expect(code(await device.send(changes, over))).toEqual([422, 'invalid']);
    }
    expect(await log([good.id])).toEqual([]);
  });

  test('what the device says is waiting beyond all reason is no fault of the server', async () => {
    const ids = await sentChain();
    await device.send([newReading(ids)], { pendingCount: 9_007_199_254_740_991 }).expect(200);
  });

  test('more than a mebibyte is 413', async () => {
    const answer = await device.send([{ text: 'x'.repeat(1024 * 1024) }]);
    expect(code(answer)).toEqual([413, 'too_large']);
  });
});
