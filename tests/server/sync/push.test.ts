import { v7 } from 'uuid';
import { PushWorld } from '@/tests/factories/pushWorld';
import { chainChanges, newChain, reading } from '@/tests/factories/shopRecords';
import { testDevice } from '@/tests/factories/shopWorld';

let world: PushWorld;

beforeAll(async () => {
  world = await PushWorld.make();
});
beforeEach(() => world.anotherDevice());
afterAll(() => world.close());

describe('applying', () => {
  test('a whole session is applied and stands in the feed as it was keyed', async () => {
    const ids = newChain(world.benchId);
    const changes = chainChanges(world.device, 'alder', ids);
    const answer = await world.device.push(...changes);
    expect(answer.last).toBe(8);
    expect(answer.verdicts).toEqual(changes.map(({ id }) => ({ id, verdict: 'applied', version: 1 })));
    const { items } = await world.device.pullAll();
    expect(items.find((item) => item.id === ids.reading)).toMatchObject({
      table: 'readings',
      version: 1,
      deleted: false,
      fields: reading(world.device, ids),
    });
  });

  test('pushed again after a lost answer, it gives the same verdicts and doubles nothing', async () => {
    const ids = newChain(world.benchId);
    const bad = {
      ...world.device.change({ kind: 'create', table: 'customers', rid: v7() }),
      set: { name: '' },
    };
    const changes = [bad, ...chainChanges(world.device, 'alder', ids)];
    const first = await world.device.push(...changes);
    const feed = await world.device.pullAll();
    const again = await world.device.push(...changes);
    expect(again.verdicts).toEqual(first.verdicts);
    expect(again.last).toBe(9);
    expect((await world.device.pullAll()).items).toEqual(feed.items);
    expect(await world.log(changes.map((change) => change.id))).toHaveLength(9);
  });

  test('an answer lost half-way of a queue: the known part is recognised, the rest goes on', async () => {
    const ids = await world.sentChain();
    const sent = [world.newReading(ids), world.newReading(ids)];
    const first = await world.device.push(...sent);
    const rest = [world.newReading(ids), world.newReading(ids)];
    const again = await world.device.push(...sent, ...rest);
    expect(again.verdicts.slice(0, 2)).toEqual(first.verdicts);
    expect(again.verdicts.map((one) => one.verdict)).toEqual(['applied', 'applied', 'applied', 'applied']);
  });

  test('the same change twice in one batch is one change', async () => {
    const ids = await world.sentChain();
    const one = world.newReading(ids);
    const { verdicts, last } = await world.device.push(one, one);
    expect(verdicts).toEqual([verdicts[0], verdicts[0]]);
    expect(last).toBe(9);
    expect(await world.log([one.id])).toHaveLength(1);
  });

  test('several changes of one batch to one record: every version counts, the last carries the number of the feed', async () => {
    const ids = await world.sentChain();
    const changes = [
      world.patch(ids.reading, { flowText: '166' }, { flowText: '167' }),
      world.patch(ids.reading, { flowText: '167' }, { flowText: '168' }),
    ];
    const { verdicts } = await world.device.push(...changes);
    expect(verdicts.map((one) => one.version)).toEqual([2, 3]);
    const [first, second] = await world.log(changes.map((change) => change.id));
    expect(first.seq).toBeNull();
    expect(second.seq).not.toBeNull();
    expect(first.old).toEqual({ flowText: '166' });
    const item = (await world.device.pullAll()).items.find((one) => one.id === ids.reading);
    expect(item).toMatchObject({ version: 3, seq: Number(second.seq), fields: { flowText: '168' } });
  });

  test('two devices that changed the same field: the record keeps its value, both stand in a dispute', async () => {
    const ids = await world.sentChain();
    const other = await testDevice(world.server, world.shop, 'second');
    await world.device.push(world.patch(ids.reading, { flowText: '166' }, { flowText: '170' }));
    const late = other.change({
      kind: 'patch',
      table: 'readings',
      rid: ids.reading,
      base: { flowText: '166' },
      set: { flowText: '160' },
    });
    const { verdicts } = await other.push(late);
    expect(verdicts).toEqual([{ id: late.id, verdict: 'dispute', why: 'differs' }]);
    const { rows } = await world.admin.query(
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
    const ids = await world.sentChain();
    const { verdicts } = await world.device.push(
      world.device.change({ kind: 'delete', table: 'readings', rid: ids.reading, base: { flowText: '166' } }),
      world.patch(ids.reading, { flowText: '166' }, { flowText: '1' }),
    );
    expect(verdicts.map(({ verdict, version }) => [verdict, version])).toEqual([
      ['applied', 2],
      ['dispute', undefined],
    ]);
  });
});

describe('order', () => {
  test('a gap is answered with where the server is, and nothing is taken', async () => {
    const ids = await world.sentChain();
    const skipped = world.newReading(ids);
    const after = world.newReading(ids);
    const answer = await world.device.send([after]).expect(409);
    expect(answer.body).toMatchObject({ code: 'gap', last: 8 });
    expect(await world.log([after.id])).toEqual([]);
    expect((await world.device.push(skipped, after)).last).toBe(10);
  });

  test('another change under a number that was used is a fork', async () => {
    const ids = await world.sentChain();
    world.device.n = 4;
    const answer = await world.device.send([world.newReading(ids)]).expect(409);
    expect(answer.body).toMatchObject({ code: 'forked', last: 8 });
  });

  test('a device enrolled anew sends all it has under new numbers: known ones are recognised, new ones follow', async () => {
    const ids = newChain(world.benchId);
    const changes = chainChanges(world.device, 'alder', ids);
    const first = await world.device.push(...changes);
    const anew = await testDevice(world.server, world.shop, 'anew');
    const renumbered = [...changes, world.newReading(ids)].map((change, index) => ({
      ...change,
      n: index + 1,
    }));
    const answer = await anew.push(...renumbered);
    expect(answer.last).toBe(9);
    expect(answer.verdicts.slice(0, 8)).toEqual(first.verdicts);
    expect(answer.verdicts[8]).toMatchObject({ verdict: 'applied' });
  });
});
