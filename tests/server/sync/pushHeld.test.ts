import request from 'supertest';
import { v7 } from 'uuid';
import { PushWorld, secondRun } from '@/tests/factories/pushWorld';
import { rungFields, type Chain } from '@/tests/factories/shopRecords';
import { asPerson } from '@/tests/factories/shopWorld';

let world: PushWorld;

beforeAll(async () => {
  world = await PushWorld.make();
});
beforeEach(() => world.anotherDevice());
afterAll(() => world.close());

const seen = (ids: Chain, over: Record<string, string> = {}) => ({
  readingId: ids.reading,
  liftText: '0.300',
  flowText: '166',
  pressureText: '27.0',
  ...over,
});

const handIn = (ids: Chain, expectSeen: unknown) =>
  ({
    ...world.device.change({ kind: 'handIn', table: 'sessions', rid: ids.session }),
    expect: expectSeen,
  }) as never;

describe('closed doors', () => {
  test('a hand in is done while the readings are those that were seen, and not otherwise', async () => {
    const ids = await world.sentChain();
    const wrong = await world.device.push(handIn(ids, [seen(ids, { flowText: '160' })]));
    expect(wrong.verdicts[0]).toMatchObject({ verdict: 'rejected', why: 'changed_since_seen' });
    expect((await world.device.push(handIn(ids, []))).verdicts[0]).toMatchObject({
      why: 'changed_since_seen',
    });
    const together = await world.device.push(
      world.patch(ids.reading, { flowText: '166' }, { flowText: '160' }),
      handIn(ids, [seen(ids, { flowText: '160' })]),
    );
    expect(together.verdicts.map((one) => one.verdict)).toEqual(['applied', 'applied']);
    const item = (await world.device.pullAll()).items.find((one) => one.id === ids.session);
    expect(item?.fields.state).toBe('handedIn');
  });

  test('a deleted reading, and those of a deleted run, are not part of what is handed in', async () => {
    const ids = await world.sentChain();
    const run = v7();
    await world.device.push(
      world.device.change({ kind: 'create', table: 'runs', rid: run, set: secondRun(ids.session) }),
      world.newReading({ ...ids, run }),
      world.device.change({ kind: 'delete', table: 'runs', rid: run }),
    );
    const { verdicts } = await world.device.push(handIn(ids, [seen(ids)]));
    expect(verdicts[0]).toMatchObject({ verdict: 'applied' });
  });

  test('what is keyed into a session that was handed in is held, with all that hangs on it', async () => {
    const ids = await world.sentChain();
    const run = v7();
    const rung = rungFields(run);
    const { verdicts } = await world.device.push(
      handIn(ids, [seen(ids)]),
      world.newReading(ids),
      world.patch(ids.reading, { flowText: '166' }, { flowText: '1' }),
      world.device.change({ kind: 'create', table: 'runs', rid: run, set: secondRun(ids.session) }),
      world.device.change({ kind: 'create', table: 'rungs', rid: v7(), set: rung }),
    );
    expect(verdicts.map(({ verdict, why }) => why ?? verdict)).toEqual([
      'applied',
      'session_closed',
      'session_closed',
      'session_closed',
      'parent_held',
    ]);
    const later = await world.device.push(
      world.device.change({ kind: 'create', table: 'rungs', rid: v7(), set: rung }),
    );
    expect(later.verdicts[0]).toMatchObject({ verdict: 'held', why: 'parent_held' });
  });

  test('what comes under a closed account is held', async () => {
    const ids = await world.sentChain();
    const gone = (await world.admin.query(`select id from people where name = 'alder technician'`)).rows[0]
      .id as string;
    await world.admin.query('update people set closed_at = now() where id = $1', [gone]);
    const { verdicts } = await world.device.push({
      ...world.newReading(ids, { byPersonId: gone }),
      by: gone,
    });
    await world.admin.query('update people set closed_at = null where id = $1', [gone]);
    expect(verdicts[0]).toMatchObject({ verdict: 'held', why: 'account_closed' });
  });

  test('a device that was shut out: what it sends is kept as held, nothing is read, and it is told so', async () => {
    const ids = await world.sentChain();
    await asPerson(world.server, world.shop.people.supervisor)
      .post(`/api/devices/${world.device.id}/revoke`)
      .expect(204);
    const change = world.newReading(ids);
    for (let times = 0; times < 2; times += 1) {
      const answer = await world.device.send([change]).expect(403);
      expect(answer.body).toMatchObject({
        code: 'device_revoked',
        last: 9,
        verdicts: [{ id: change.id, verdict: 'held', why: 'device_revoked' }],
      });
    }
    expect(await world.log([change.id])).toMatchObject([
      { verdict: 'held', device_id: world.device.id, n: 9 },
    ]);
    await world.device.pullPage({}).expect(403);
    const roster = await request(world.server.app)
      .get('/api/sync/roster')
      .set('Authorization', `Bearer ${world.device.token}`);
    expect(roster.body.code).toBe('device_revoked');
  });
});
