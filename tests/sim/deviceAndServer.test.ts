import { and, asc, eq, isNull } from 'drizzle-orm';
import { v7 } from 'uuid';
import { outbox } from '@/db/device/schema/deviceTables';
import { readings } from '@/db/device/schema/working';
import type { Fields } from '@/shared/sync/protocol';
import { startSession } from '@/stores/bench/startSession';
import { addRun, handInSession } from '@/stores/bench/verbs';
import { readSession } from '@/stores/queries/benchReads';
import { benchWorld, type BenchWorld, type Network, type WorldDevice } from '../factories/benchWorld';
import { deskBatchOf } from '../factories/deskBatch';
import { standAtBench } from '../factories/deviceFixture';
import { readingFields } from '../factories/records';

let world: BenchWorld;
beforeAll(async () => {
  world = await benchWorld();
});
afterAll(() => world.close());

/** A device with a session and a run on it that the shop has. */
async function deviceWithRun() {
  const device = await world.device();
  await device.sync();
  standAtBench(device.db, device.personId, () => Date.now());
  const sessionId = await startSession({
    customer: { name: 'Harrow Lane' },
    head: {
      name: 'Iron four',
      casting: '77',
      cylinderCount: 4,
      ports: [{ side: 'intake', port: '1' }],
      intakeValveCount: 1,
      exhaustValveCount: 1,
    },
    stage: { name: 'As received' },
    benchId: world.benchId,
    liftPlan: [{ text: '0.100', unit: 'in' }],
  });
  const runId = await addRun({ sessionId, side: 'intake', port: '1' });
  expect(await device.sync()).toEqual({ state: 'idle' });
  return { device, sessionId, runId };
}

async function key(device: WorldDevice, runId: string, flowText: string): Promise<string> {
  const rid = v7();
  const set = readingFields({ runId, flowText, byPersonId: device.personId, deviceId: await device.id() });
  await device.record({ kind: 'create', table: 'readings', rid, set });
  return rid;
}

const patchFlow = (device: WorldDevice, rid: string, from: string, to: string) =>
  device.record({ kind: 'patch', table: 'readings', rid, base: { flowText: from }, set: { flowText: to } });

const flowsOn = async (device: WorldDevice, runId: string) =>
  (
    await device.db.read
      .select({ flow: readings.flowText, mark: readings.mark, version: readings.version })
      .from(readings)
      .where(and(eq(readings.runId, runId), eq(readings.deleted, false)))
      .orderBy(asc(readings.id))
  ).map(({ flow, mark }) => `${flow} ${mark}`);

const flowsInShop = async (runId: string) => {
  const { rows } = await world.admin.query<{ flow: string }>(
    'select flow_text as flow from readings where run_id = $1 and not deleted order by id',
    [runId],
  );
  return rows.map((row) => row.flow);
};

const verdictsOf = async (device: WorldDevice) =>
  (
    await device.db.read
      .select({ verdict: outbox.verdict, why: outbox.why })
      .from(outbox)
      .orderBy(asc(outbox.n))
  ).map(({ verdict, why }) => (why ? `${String(verdict)} ${why}` : String(verdict)));

/** Every place of a device's order is in the log once, without a hole. */
async function expectUnbroken(device: WorldDevice): Promise<void> {
  const { rows } = await world.admin.query<{ n: number }>(
    'select n from changes where device_id = $1 order by n',
    [await device.id()],
  );
  expect(rows.map((row) => row.n)).toEqual(rows.map((_, index) => index + 1));
}

const nth =
  (wanted: number, fate: 'loseRequest' | 'loseAnswer'): Network =>
  ({ count }) =>
    count === wanted ? fate : 'ok';

it('brings what one device keyed to the shop and to another device, exactly as keyed', async () => {
  const { device, sessionId, runId } = await deviceWithRun();
  await key(device, runId, '029.80');
  await key(device, runId, '67,3');
  expect(await flowsOn(device, runId)).toEqual(['029.80 onDevice', '67,3 onDevice']);
  await device.sync();
  expect(await flowsOn(device, runId)).toEqual(['029.80 sent', '67,3 sent']);
  expect(await flowsInShop(runId)).toEqual(['029.80', '67,3']);
  const other = await world.device('second');
  await other.sync();
  const here = await readSession(device.db.read, sessionId);
  expect(await readSession(other.db.read, sessionId)).toEqual(here);
  expect(here?.people.map(({ name }) => name)).toContain('fell operator');
});

it('applies once what was sent again after a lost answer, and gives the same verdicts', async () => {
  const { device, runId } = await deviceWithRun();
  await key(device, runId, '100');
  device.network = ({ path }) => (path === '/api/sync/push' ? 'loseAnswer' : 'ok');
  expect(await device.sync()).toMatchObject({ state: 'waiting' });
  expect(await flowsInShop(runId)).toEqual(['100']);
  expect(await flowsOn(device, runId)).toEqual(['100 onDevice']);
  await key(device, runId, '101');
  device.network = () => 'ok';
  await device.sync();
  expect(await flowsInShop(runId)).toEqual(['100', '101']);
  expect(await flowsOn(device, runId)).toEqual(['100 sent', '101 sent']);
  await expectUnbroken(device);
});

it('loses and doubles nothing when the device is killed at any statement of a round', async () => {
  const { device, runId } = await deviceWithRun();
  let keyed = 0;
  for (let step = 0; ; step += 1) {
    await key(device, runId, String(++keyed));
    device.driver.dieAt(step);
    const before = device.driver.callCount();
    const report = await device.sync().catch(() => undefined);
    const wasFinished = report?.state === 'idle' && device.driver.callCount() - before < step;
    await device.reopen();
    if (step % 7 === 0) await device.sync();
    if (wasFinished) break;
  }
  await device.sync();
  const all = Array.from({ length: keyed }, (_, index) => String(index + 1));
  expect(keyed).toBeGreaterThan(20);
  expect(await flowsInShop(runId)).toEqual(all);
  expect(await flowsOn(device, runId)).toEqual(all.map((flow) => `${flow} sent`));
  await expectUnbroken(device);
}, 120_000);

it('loses and doubles nothing when the server is killed at any statement of a push', async () => {
  const { device, runId } = await deviceWithRun();
  const kill = killableServer();
  let keyed = 0;
  for (let step = 1; ; step += 1) {
    await key(device, runId, String(++keyed));
    kill.before(step);
    const report = await device.sync();
    const wasSpared = kill.wasSpared();
    kill.never();
    if (wasSpared && report?.state === 'idle') break;
  }
  await device.sync();
  expect(keyed).toBeGreaterThan(8);
  const all = Array.from({ length: keyed }, (_, index) => String(index + 1));
  expect(await flowsInShop(runId)).toEqual(all);
  expect(await flowsOn(device, runId)).toEqual(all.map((flow) => `${flow} sent`));
  await expectUnbroken(device);
}, 120_000);

it.each(['newLife', 'sameLife'] as const)(
  'sends everything retained again to a server that was set back (%s)',
  async (how) => {
    const { device, runId, sessionId } = await deviceWithRun();
    const other = await world.device('second');
    await other.sync();
    await key(device, runId, '1');
    await device.sync();
    const backup = await world.backup();
    const lost = await key(device, runId, '2');
    await device.sync();
    await patchFlow(device, lost, '2', '2.5');
    await device.sync();
    await other.sync();
    await key(other, runId, '3');
    await other.sync();
    await key(device, runId, '4');
    await world.restore(backup, how);
    expect(await flowsInShop(runId)).toEqual(['1']);
    for (const one of [device, other, device, other]) expect(await one.sync()).toEqual({ state: 'idle' });
    expect((await flowsInShop(runId)).sort()).toEqual(['1', '2.5', '3', '4']);
    expect((await flowsOn(device, runId)).sort()).toEqual(['1 sent', '2.5 sent', '3 sent', '4 sent']);
    expect(await readSession(other.db.read, sessionId)).toEqual(await readSession(device.db.read, sessionId));
    await expectUnbroken(device);
    await expectUnbroken(other);
  },
);

it('keeps everything of a device that the shop forgot, and sends it after it is enrolled again', async () => {
  const { device, runId } = await deviceWithRun();
  await key(device, runId, '1');
  // the server has it, the device does not know
  device.network = ({ path }) => (path === '/api/sync/push' ? 'loseAnswer' : 'ok');
  await device.sync();
  device.network = () => 'ok';
  await world.admin.query('set session_replication_role = replica');
  await world.admin.query('delete from devices where id = $1', [await device.id()]);
  await world.admin.query('set session_replication_role = origin');
  await key(device, runId, '2');
  expect(await device.sync()).toMatchObject({ state: 'enrolAgain' });
  expect(await flowsOn(device, runId)).toEqual(['1 onDevice', '2 onDevice']);
  await key(device, runId, '3');
  const before = await device.id();
  await device.enrol(await world.newCode());
  expect(await device.id()).not.toBe(before);
  expect(await device.sync()).toEqual({ state: 'idle' });
  expect(await flowsInShop(runId)).toEqual(['1', '2', '3']);
  expect(await flowsOn(device, runId)).toEqual(['1 sent', '2 sent', '3 sent']);
});

it('notices that its disk was set back, and loses nothing of either side', async () => {
  const { device, runId } = await deviceWithRun();
  await key(device, runId, '1');
  const image = await device.image();
  await key(device, runId, '2');
  await device.sync();
  await device.rollBackTo(image);
  await key(device, runId, '3');
  expect(await device.sync()).toMatchObject({ state: 'enrolAgain' });
  await device.enrol(await world.newCode());
  expect(await device.sync()).toEqual({ state: 'idle' });
  expect((await flowsInShop(runId)).sort()).toEqual(['1', '2', '3']);
  expect((await flowsOn(device, runId)).sort()).toEqual(['1 sent', '2 sent', '3 sent']);
});

it('shows both values of a dispute to nobody’s loss: the shop’s on the screen, mine in the queue', async () => {
  const { device, runId } = await deviceWithRun();
  const rid = await key(device, runId, '166');
  await device.sync();
  await patchFlow(device, rid, '166', '170');
  await deskBatchOf(world.server, world.shop, [
    { kind: 'patch', table: 'readings', rid, base: { flowText: '166' }, set: { flowText: '186' } },
  ]);
  await device.sync();
  expect(await flowsOn(device, runId)).toEqual(['186 dispute']);
  expect((await verdictsOf(device)).at(-1)).toBe('dispute differs');
  const { rows } = await world.admin.query<{ mine: Fields; theirs: Fields }>(
    'select mine, theirs from disputes',
  );
  expect(rows).toEqual([{ mine: { flowText: '170' }, theirs: { flowText: '186' } }]);
});

it('merges changes of different fields and disputes nothing of a device’s own chain', async () => {
  const { device, runId } = await deviceWithRun();
  const rid = await key(device, runId, '166');
  await device.sync();
  await deskBatchOf(world.server, world.shop, [
    { kind: 'patch', table: 'readings', rid, base: { pressureText: '27.0' }, set: { pressureText: '26.0' } },
  ]);
  await patchFlow(device, rid, '166', '167');
  await patchFlow(device, rid, '167', '168');
  await device.sync();
  expect(await flowsOn(device, runId)).toEqual(['168 sent']);
  const { rows } = await world.admin.query('select flow_text, pressure_text from readings where id = $1', [
    rid,
  ]);
  expect(rows).toEqual([{ flow_text: '168', pressure_text: '26.0' }]);
});

it('holds what was keyed into a session that another device had handed in, and keeps it on the screen', async () => {
  const { device, sessionId, runId } = await deviceWithRun();
  const other = await world.device('second');
  await other.sync();
  await key(device, runId, '1');
  await handInSession(sessionId);
  await device.sync();
  expect((await readSession(device.db.read, sessionId))?.session).toMatchObject({
    state: 'handedIn',
    mark: 'sent',
  });
  await key(other, runId, '2');
  await other.sync();
  expect(await flowsOn(other, runId)).toEqual(['1 sent', '2 held']);
  expect(await verdictsOf(other)).toEqual(['held session_closed']);
  expect(await flowsInShop(runId)).toEqual(['1']);
});

it('does not hand in what changed since it was looked at', async () => {
  const { device, sessionId, runId } = await deviceWithRun();
  const other = await world.device('second');
  await other.sync();
  await key(device, runId, '1');
  await device.sync();
  standAtBench(other.db, other.personId);
  await handInSession(sessionId);
  await other.sync();
  const view = await readSession(other.db.read, sessionId);
  expect(view?.session).toMatchObject({ state: 'open', mark: 'setAside' });
  expect(await verdictsOf(other)).toEqual(['rejected changed_since_seen']);
  // looked at again, it goes
  await handInSession(sessionId);
  await other.sync();
  expect((await readSession(other.db.read, sessionId))?.session).toMatchObject({
    state: 'handedIn',
    mark: 'sent',
  });
});

it('gives a device that was shut out its verdicts: held, and never wiped', async () => {
  const { device, runId } = await deviceWithRun();
  await world.admin.query('update devices set revoked_at = now() where id = $1', [await device.id()]);
  await key(device, runId, '1');
  expect(await device.sync()).toMatchObject({ state: 'revoked' });
  expect(await flowsOn(device, runId)).toEqual(['1 held']);
  expect((await verdictsOf(device)).at(-1)).toBe('held device_revoked');
  expect(await device.db.read.select().from(outbox).where(isNull(outbox.verdict))).toEqual([]);
});

it('undoes before and after sending alike', async () => {
  const { device, runId } = await deviceWithRun();
  const undo = (rid: string, flowText: string) =>
    device.record({ kind: 'delete', table: 'readings', rid, base: { flowText } });
  await undo(await key(device, runId, '1'), '1');
  const sent = await key(device, runId, '2');
  device.network = nth(Infinity, 'loseRequest');
  await device.sync();
  await undo(sent, '2');
  await device.sync();
  expect(await flowsInShop(runId)).toEqual([]);
  expect(await flowsOn(device, runId)).toEqual([]);
});

it('reads a long feed page by page and goes on where it was cut off', async () => {
  const { device, runId } = await deviceWithRun();
  const drafts = Array.from({ length: 1100 }, (_, index) => ({
    kind: 'create' as const,
    table: 'readings' as const,
    rid: v7(),
    set: readingFields({ runId, flowText: String(index + 1), byPersonId: device.personId }),
  }));
  await device.record(...drafts);
  expect(await device.sync()).toEqual({ state: 'idle' });
  const other = await world.device('second');
  const afters: string[] = [];
  const call = other.call;
  other.call = (asked) => {
    const url = new URL(asked.path, 'http://x');
    if (url.pathname === '/api/sync/pull') afters.push(url.searchParams.get('after') ?? '');
    return call(asked);
  };
  let pulls = 0;
  other.network = ({ path }) => (path === '/api/sync/pull' && ++pulls === 2 ? 'loseAnswer' : 'ok');
  expect(await other.sync()).toMatchObject({ state: 'waiting' });
  const arrived = (await flowsOn(other, runId)).length;
  expect(arrived > 0 && arrived < 1100).toBe(true);
  await other.reopen();
  await other.sync();
  expect(afters[0]).toBe('0');
  expect(afters[2]).toBe(afters[1]);
  expect(Number(afters[1])).toBeGreaterThan(0);
  expect((await flowsOn(other, runId)).length).toBe(1100);
}, 60_000);

/** Cuts the server's connection to PostgreSQL just before a statement, as the death of its process does: what is open is
 * rolled back, and the request gets no proper answer. */
function killableServer() {
  let left = Infinity;
  const watched = new WeakSet<object>();
  world.server.deps.db.pool.on('acquire', (client) => {
    if (watched.has(client)) return;
    watched.add(client);
    const query = client.query.bind(client);
    client.query = ((...args: Parameters<typeof query>) => {
      left -= 1;
      if (left === 0) socketOf(client).destroy();
      return query(...args);
    }) as typeof client.query;
  });
  return {
    before: (statement: number) => {
      left = statement;
    },
    never: () => {
      left = Infinity;
    },
    wasSpared: () => left > 0,
  };
}

const socketOf = (client: object) =>
  (client as { connection: { stream: { destroy: () => void } } }).connection.stream;
