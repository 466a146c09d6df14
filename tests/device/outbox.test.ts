import { asc, eq, isNull } from 'drizzle-orm';
import { getFact, setFact } from '@/db/device/meta';
import {
  nextBatch,
  pruneOutbox,
  renumberWaiting,
  resendAfter,
  setAsideUnsendable,
  storeVerdicts,
} from '@/db/device/outbox';
import type { DeviceDb } from '@/db/device/deviceDb';
import { record } from '@/db/device/recordChange';
import { outbox } from '@/db/device/schema/deviceTables';
import { readings } from '@/db/device/schema/working';
import { AppError } from '@/shared/errors';
import { maxBatchBytes, type Verdict } from '@/shared/sync/protocol';
import { enrolledDevice, feed, item, noon } from '../factories/deviceFixture';
import { newId, readingFields } from '../factories/records';

const atIso = new Date(noon).toISOString();

async function deviceWith(count: number) {
  const { db, ids } = await enrolledDevice();
  const rids = Array.from({ length: count }, newId);
  for (const rid of rids) await keyReading(db, ids.person, rid);
  return { db, ids, rids };
}

const keyReading = (db: DeviceDb, personId: string, rid: string) =>
  db.tx((tx) =>
    record(tx, [{ kind: 'create', table: 'readings', rid, set: readingFields({ byPersonId: personId }) }], {
      personId,
      atIso,
    }),
  );
const answerFirst = async (db: DeviceDb, count: number, verdict: Verdict = 'applied') => {
  const batch = await nextBatch(db.read, count);
  await db.tx((tx) =>
    storeVerdicts(
      tx,
      batch.map(({ id }) => ({ id, verdict, ...(verdict === 'applied' ? { version: 1 } : {}) })),
      atIso,
    ),
  );
};
const waitingRids = async (db: DeviceDb) => (await nextBatch(db.read, 500)).map(({ n, rid }) => [n, rid]);

it('sends in the order of keying, and an answered change no more', async () => {
  const { db, rids } = await deviceWith(3);
  expect(await waitingRids(db)).toEqual([
    [1, rids[0]],
    [2, rids[1]],
    [3, rids[2]],
  ]);
  await answerFirst(db, 2);
  expect(await waitingRids(db)).toEqual([[3, rids[2]]]);
});

it('leaves the first verdict standing when another answer comes later', async () => {
  const { db } = await deviceWith(1);
  const [change] = await nextBatch(db.read, 1);
  const id = change?.id ?? '';
  await db.tx((tx) => storeVerdicts(tx, [{ id, verdict: 'held', why: 'session_closed' }], atIso));
  await db.tx((tx) => storeVerdicts(tx, [{ id, verdict: 'applied', version: 4 }], atIso));
  const [row] = await db.read.select().from(outbox);
  expect(row).toMatchObject({ verdict: 'held', why: 'session_closed', appliedVersion: null, tryCount: 1 });
  const [shown] = await db.read.select({ mark: readings.mark }).from(readings);
  expect(shown?.mark).toBe('held');
});

it('ends a batch before 256 KiB, but never holds back a single large change', async () => {
  const { db, ids } = await enrolledDevice();
  const note = 'w'.repeat(4000);
  await db.tx((tx) =>
    record(
      tx,
      Array.from({ length: 80 }, () => ({
        kind: 'create' as const,
        table: 'customers' as const,
        rid: newId(),
        set: { name: 'A', mail: null, phone: null, note },
      })),
      { personId: ids.person, atIso },
    ),
  );
  const batch = await nextBatch(db.read, 500);
  expect(batch.length).toBeLessThan(80);
  expect(JSON.stringify(batch).length).toBeLessThanOrEqual(maxBatchBytes);
  expect(JSON.stringify(batch).length).toBeGreaterThan(maxBatchBytes - 5000);
});

it('gives waiting changes new places from 1 on, in their order, again and again', async () => {
  const { db, ids, rids } = await deviceWith(5);
  await answerFirst(db, 2);
  for (let times = 0; times < 3; times += 1) {
    await db.tx((tx) => renumberWaiting(tx, 1));
    expect(await waitingRids(db)).toEqual([
      [1, rids[2]],
      [2, rids[3]],
      [3, rids[4]],
    ]);
  }
  const all = await db.read.select({ rid: outbox.recordId }).from(outbox).orderBy(asc(outbox.n));
  expect(all.map(({ rid }) => rid)).toEqual(rids);
  const next = newId();
  await keyReading(db, ids.person, next);
  expect((await waitingRids(db)).at(-1)).toEqual([4, next]);
});

it('sends again what the server does not hold', async () => {
  const { db, rids } = await deviceWith(5);
  await answerFirst(db, 4);
  await db.tx((tx) => resendAfter(tx, 2));
  expect(await waitingRids(db)).toEqual([
    [3, rids[2]],
    [4, rids[3]],
    [5, rids[4]],
  ]);
  expect(await getFact(db.read, 'isReplaying')).not.toBe(true);
});

it('sends everything retained again when places are missing', async () => {
  const { db, rids } = await deviceWith(4);
  await answerFirst(db, 3);
  await db.tx((tx) => renumberWaiting(tx, 7));
  await db.tx((tx) => resendAfter(tx, 2));
  expect(await waitingRids(db)).toEqual(rids.map((rid, index) => [3 + index, rid]));
  expect(await getFact(db.read, 'nextN')).toBe(7);
});

it('deletes only what was applied more than 35 days ago and has come back by the feed', async () => {
  const { db, ids, rids } = await deviceWith(4);
  await answerFirst(db, 2);
  await answerFirst(db, 1, 'held');
  await feed(db, [item('readings', rids[0] ?? '', readingFields({ byPersonId: ids.person }))]);
  const days = (count: number) => noon + count * 24 * 60 * 60 * 1000;
  await db.tx((tx) => pruneOutbox(tx, days(34)));
  expect(await db.read.select().from(outbox)).toHaveLength(4);
  await db.tx((tx) => setFact(tx, 'isReplaying', true));
  await db.tx((tx) => pruneOutbox(tx, days(36)));
  expect(await db.read.select().from(outbox)).toHaveLength(4);
  await db.tx((tx) => setFact(tx, 'isReplaying', false));
  await db.tx((tx) => pruneOutbox(tx, days(36)));
  const left = await db.read.select({ rid: outbox.recordId }).from(outbox).orderBy(asc(outbox.n));
  expect(left.map(({ rid }) => rid)).toEqual(rids.slice(1));
});

it('sets a change aside that is too large to send, and lets the others take its place', async () => {
  const { db, rids } = await deviceWith(3);
  const [first] = await nextBatch(db.read, 1);
  await db.tx((tx) => setAsideUnsendable(tx, first?.id ?? '', atIso));
  expect(await waitingRids(db)).toEqual([
    [1, rids[1]],
    [2, rids[2]],
  ]);
  const [shown] = await db.read
    .select({ mark: readings.mark })
    .from(readings)
    .where(eq(readings.id, rids[0] ?? ''));
  expect(shown?.mark).toBe('setAside');
});

it('writes nothing at all of a reading that is not one', async () => {
  const { db, ids } = await enrolledDevice();
  const set = { ...readingFields({ byPersonId: ids.person }), flowText: '1.2.3', pressureText: '' };
  const refusal = await db
    .tx((tx) =>
      record(tx, [{ kind: 'create', table: 'readings', rid: newId(), set }], { personId: ids.person, atIso }),
    )
    .catch((error: unknown) => error);
  expect(refusal).toBeInstanceOf(AppError);
  expect((refusal as AppError).fields.map(({ path }) => path)).toEqual(['flowText', 'pressureText']);
  expect(await db.read.select().from(outbox).where(isNull(outbox.verdict))).toEqual([]);
  expect(await db.read.select().from(readings)).toEqual([]);
});
