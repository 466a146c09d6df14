import request from 'supertest';
import { v7 } from 'uuid';
import type { Json } from '@/shared/sync/protocol';
import { PushWorld, secondRun } from '@/tests/factories/pushWorld';
import { benchFields, customerFields, headFields } from '@/tests/factories/shopRecords';
import { asPerson } from '@/tests/factories/shopWorld';

let world: PushWorld;

beforeAll(async () => {
  world = await PushWorld.make();
});
beforeEach(() => world.anotherDevice());
afterAll(() => world.close());

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
    const ids = await world.sentChain();
    const bad = spoil(world.newReading(ids)) as { id: string };
    const good = world.newReading(ids);
    const { verdicts, last } = await world.device.push(bad, good);
    expect(verdicts[0]).toMatchObject({ id: bad.id, verdict: 'rejected' });
    expect(verdicts[1]).toMatchObject({ id: good.id, verdict: 'applied' });
    expect(last).toBe(10);
    expect(await world.log([bad.id])).toMatchObject([{ verdict: 'rejected', n: 9 }]);
  });

  test('what the database itself refuses is set aside alone, and the rest of the batch is kept', async () => {
    const ids = await world.sentChain();
    await world.admin.query(`alter table readings add constraint no_666 check (flow_text <> '666')`);
    const [before, bad, after] = [
      world.newReading(ids),
      world.newReading(ids, { flowText: '666' }),
      world.newReading(ids),
    ];
    const { verdicts, last } = await world.device.push(before, bad, after);
    await world.admin.query('alter table readings drop constraint no_666');
    expect(verdicts).toMatchObject([
      { id: before.id, verdict: 'applied' },
      { id: bad.id, verdict: 'rejected', why: 'invalid' },
      { id: after.id, verdict: 'applied' },
    ]);
    expect(last).toBe(11);
    expect((await world.device.push(before, bad, after)).verdicts).toEqual(verdicts);
  });

  test('a parent that is not there, also one named by a patch', async () => {
    const ids = await world.sentChain();
    const nowhere = v7();
    const { verdicts } = await world.device.push(
      world.newReading({ ...ids, run: nowhere }),
      world.patch(nowhere, { flowText: '1' }, { flowText: '2' }),
      world.patch(ids.head, { customerId: ids.customer }, { customerId: nowhere }, 'heads'),
      world.device.change({ kind: 'create', table: 'runs', rid: v7(), set: secondRun('not an id') }),
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
      world.device.change({ kind: 'create', table, rid, set: set as Record<string, Json> });
    const first = await world.device.push(
      create('customers', customer, { ...customerFields('alder'), name: '' }),
      create('heads', head, headFields('alder', customer)),
      world.patch(head, { name: 'alder head' }, { name: 'other' }, 'heads'),
    );
    expect(first.verdicts.map((one) => one.why)).toEqual(['invalid', 'parent_rejected', 'parent_rejected']);
    const later = await world.device.push(create('heads', v7(), headFields('alder', customer)));
    expect(later.verdicts[0]).toMatchObject({ verdict: 'rejected', why: 'parent_rejected' });
  });

  test('what a device may not do, a person nobody knows, a reading under another name', async () => {
    const ids = await world.sentChain();
    const { verdicts } = await world.device.push(
      world.device.change({ kind: 'create', table: 'benches', rid: v7(), set: benchFields('alder') }),
      { ...world.newReading(ids), by: v7() },
      world.newReading(ids, { byPersonId: world.shop.people.owner.id }),
    );
    expect(verdicts.map((one) => one.why)).toEqual(['not_by_device', 'unknown_person', 'invalid']);
  });
});

describe('the envelope', () => {
  const code = (answer: request.Response) => [answer.status, answer.body.code];

  test('an unknown token is 401 device_unknown, with or without a body', async () => {
    const answer = await request(world.server.app)
      .post('/api/sync/push')
      .set('Authorization', 'Bearer nobody')
      .send({ changes: 'whatever' });
    expect(code(answer)).toEqual([401, 'device_unknown']);
    expect(code(await request(world.server.app).get('/api/sync/pull'))).toEqual([401, 'device_unknown']);
    const person = await asPerson(world.server, world.shop.people.owner).get('/api/sync/pull');
    expect(code(person)).toEqual([401, 'device_unknown']);
  });

  test('a change without id or place, another device, a strange envelope are 422 and nothing is taken', async () => {
    const ids = await world.sentChain();
    const good = world.newReading(ids);
    for (const [changes, over] of [
      [[good, { n: 10 }], {}],
      [[good, { ...world.newReading(ids), n: -1 }], {}],
      [[good, null], {}],
      [[good, 'text'], {}],
      [[], {}],
      [[good], { device: v7() }],
      [[good], { extra: true }],
      [[good], { pendingCount: -1 }],
      [[good], { now: '\u0000' }],
      [Array.from({ length: 501 }, () => good), {}],
    ] as [unknown[], Record<string, unknown>][]) {
      expect(code(await world.device.send(changes, over))).toEqual([422, 'invalid']);
    }
    expect(await world.log([good.id])).toEqual([]);
  });

  test('what the device says is waiting beyond all reason is no fault of the server', async () => {
    const ids = await world.sentChain();
    await world.device.send([world.newReading(ids)], { pendingCount: 9_007_199_254_740_991 }).expect(200);
  });

  test('more than a mebibyte is 413', async () => {
    const answer = await world.device.send([{ text: 'x'.repeat(1024 * 1024) }]);
    expect(code(answer)).toEqual([413, 'too_large']);
  });
});
