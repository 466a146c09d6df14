import { nextBatch, waitingOf } from '@/db/device/outbox';
import { getFact } from '@/db/device/meta';
import { record } from '@/db/device/recordChange';
import { outbox } from '@/db/device/schema/deviceTables';
import { AppError, type ErrorCode } from '@/shared/errors';
import type { Change } from '@/shared/sync/protocol';
import type { ApiRequest, callApi } from '@/stores/http/apiClient';
import { createSyncEngine, type SyncReport } from '@/stores/sync/syncEngine';
import { enrolledDevice, noon, shopSettings } from '../factories/deviceFixture';
import { manualClock } from '../factories/manualClock';
import { newId, readingFields } from '../factories/records';

/* The engine's manners towards a server that is late, busy, gone or strict. The answers are written out here; what the
 * real server answers is in tests/sim. */

type Asked = { path: string; changes: Change[] };
type Answer = (asked: Asked) => unknown;

async function engineOver(answer: Answer) {
  const { db, ids } = await enrolledDevice();
  const clock = manualClock(noon);
  const asked: Asked[] = [];
  const reports: SyncReport[] = [];
  const call: typeof callApi = async <T>(request: ApiRequest<T>): Promise<T> => {
    const body = request.body as { changes: Change[] } | undefined;
    const one = { path: request.path.split('?')[0] ?? '', changes: body?.changes ?? [] };
    asked.push(one);
    const given = answer(one);
    if (given instanceof AppError) throw given;
    if (request.schema === null) throw new Error('no shape');
    return request.schema.parse(given ?? usual(one, ids.shop, ids.person));
  };
  const engine = createSyncEngine({
    db,
    call,
    nowMs: clock.nowMs,
    random: () => 0.5,
    setTimer: clock.setTimer,
    clearTimer: clock.clearTimer,
    isVisible: () => true,
    report: (report) => reports.push(report),
  });
  const key = (count = 1) =>
    db.tx((tx) =>
      record(
        tx,
        Array.from({ length: count }, () => ({
          kind: 'create' as const,
          table: 'readings' as const,
          rid: newId(),
          set: readingFields({ byPersonId: ids.person }),
        })),
        { personId: ids.person, atIso: new Date(clock.nowMs()).toISOString() },
      ),
    );
  const pushes = () => asked.filter(({ path }) => path === '/api/sync/push');
  return { db, clock, engine, key, asked, pushes, reports, last: () => reports.at(-1) };
}

/** What a server in good health answers. */
function usual({ path, changes }: Asked, shopId: string, personId: string): unknown {
  const now = new Date(noon).toISOString();
  if (path === '/api/sync/push')
    return {
      epoch: 'first',
      last: changes.at(-1)?.n ?? 0,
      now,
      verdicts: changes.map(({ id }) => ({ id, verdict: 'applied', version: 1 })),
    };
  if (path === '/api/sync/pull') return { epoch: 'first', cursor: 0, seen: '', more: false, now, items: [] };
  return {
    shop: { id: shopId, name: 'Fell & Daughter', settings: shopSettings },
    people: [{ id: personId, name: 'Ada Fell', roles: ['operator'], pinHash: null }],
  };
}

const pushRefused =
  (code: ErrorCode, extra: Record<string, unknown> = {}, times = Infinity): Answer =>
  ({ path }) => {
    if (path !== '/api/sync/push' || times <= 0) return undefined;
    times -= 1;
    return new AppError(code, { extra });
  };

it('sends one second after a save, and is idle when all is answered', async () => {
  const { clock, engine, key, pushes, last, db } = await engineOver(() => undefined);
  engine.start();
  await clock.advance(0);
  await key();
  engine.saved();
  await clock.advance(999);
  expect(pushes()).toHaveLength(0);
  await clock.advance(1);
  expect(pushes()).toHaveLength(1);
  expect((await waitingOf(db.read)).count).toBe(0);
  expect(last()).toEqual({ state: 'idle' });
  await engine.stop();
});

it('looks every minute while the page is visible', async () => {
  const { clock, engine, asked } = await engineOver(() => undefined);
  engine.start();
  await clock.advance(0);
  const before = asked.length;
  await clock.advance(59_999);
  expect(asked).toHaveLength(before);
  await clock.advance(1);
  expect(asked.length).toBeGreaterThan(before);
  await engine.stop();
});

it('tries for ever with a pause that grows to a minute, and keeps every change', async () => {
  const { clock, engine, key, db, last } = await engineOver(() => new AppError('offline'));
  await key(3);
  engine.start();
  await clock.advance(0);
  const pauses: (number | null)[] = [];
  for (let time = 0; time < 9; time += 1) {
    pauses.push(clock.nextInMs());
    await clock.advance(clock.nextInMs() ?? 0);
  }
  // half of min(60 s, 2^k s)
  expect(pauses).toEqual([1000, 2000, 4000, 8000, 16_000, 30_000, 30_000, 30_000, 30_000]);
  expect(last()).toEqual({ state: 'offline', lastError: new AppError('offline').message });
  expect(await nextBatch(db.read, 10)).toHaveLength(3);
  const [row] = await db.read.select().from(outbox);
  expect(row).toMatchObject({ tryCount: 10, lastAnswer: new AppError('offline').message, verdict: null });
  await engine.stop();
});

it('keeps the silence that the server asked for, whatever is saved or comes back in between', async () => {
  const { clock, engine, key, pushes } = await engineOver(pushRefused('busy', { retryAfterSeconds: 120 }, 1));
  await key();
  engine.start();
  await clock.advance(0);
  engine.saved();
  engine.wake();
  await clock.advance(119_999);
  expect(pushes()).toHaveLength(1);
  await clock.advance(1);
  expect(pushes()).toHaveLength(2);
  await engine.stop();
});

it('halves a batch that is too large or too slow, and lets it grow back', async () => {
  const { clock, engine, key, pushes, db } = await engineOver((asked) =>
    asked.changes.length > 100 ? new AppError('too_large') : undefined,
  );
  await key(500);
  engine.start();
  await clock.advance(0);
  const sizes = pushes().map(({ changes }) => changes.length);
  const halves = sizes.slice(0, sizes.findIndex((size) => size <= 100) + 1);
  expect(halves.length).toBeGreaterThan(2);
  halves.slice(1).forEach((size, index) => expect(size).toBe(Math.floor((halves[index] ?? 0) / 2)));
  expect(Math.max(...sizes.slice(halves.length))).toBeGreaterThan(halves.at(-1) ?? 0);
  expect((await waitingOf(db.read)).count).toBe(0);
  await engine.stop();
});

it('sets a single change aside that the server finds too large, and sends the others', async () => {
  const strict: { id?: string } = {};
  const { clock, engine, key, db } = await engineOver(({ changes }) =>
    changes.some(({ id }) => id === strict.id) ? new AppError('too_large') : undefined,
  );
  const [, second] = await key(3);
  strict.id = second?.id;
  engine.start();
  await clock.advance(0);
  const rows = await db.read.select({ id: outbox.id, verdict: outbox.verdict }).from(outbox);
  expect(rows.filter(({ verdict }) => verdict === 'rejected').map(({ id }) => id)).toEqual([second?.id]);
  expect(rows.filter(({ verdict }) => verdict === 'applied')).toHaveLength(2);
  await engine.stop();
});

it.each(['device_unknown', 'forked'] as const)(
  'stops and keeps everything when the answer is %s',
  async (code) => {
    const { clock, engine, key, db, last, pushes } = await engineOver(pushRefused(code, { last: 9 }));
    await key(2);
    engine.start();
    await clock.advance(0);
    expect(last()).toMatchObject({ state: 'enrolAgain' });
    engine.wake();
    await clock.advance(600_000);
    expect(pushes()).toHaveLength(1);
    expect((await waitingOf(db.read)).count).toBe(2);
    expect(await getFact(db.read, 'standing')).toBe('enrolAgain');
    await engine.stop();
  },
);

it('stores the verdicts of a device that was shut out, and goes on asking quietly', async () => {
  const { clock, engine, key, db, last } = await engineOver(({ path, changes }) =>
    path === '/api/sync/push'
      ? new AppError('device_revoked', {
          extra: { verdicts: changes.map(({ id }) => ({ id, verdict: 'held', why: 'device_revoked' })) },
        })
      : path === '/api/sync/pull'
        ? new AppError('device_revoked')
        : undefined,
  );
  await key(2);
  engine.start();
  await clock.advance(0);
  expect(last()).toMatchObject({ state: 'revoked' });
  const rows = await db.read.select({ verdict: outbox.verdict }).from(outbox);
  expect(rows).toEqual([{ verdict: 'held' }, { verdict: 'held' }]);
  expect(clock.nextInMs()).toBe(60_000);
  await engine.stop();
});

it('sends on while the app is too old to read', async () => {
  const { clock, engine, key, db, last } = await engineOver(({ path }) =>
    path === '/api/sync/pull' ? new AppError('update_needed') : undefined,
  );
  await key();
  engine.start();
  await clock.advance(0);
  expect((await waitingOf(db.read)).count).toBe(0);
  expect(last()).toMatchObject({ state: 'updateNeeded' });
  await engine.stop();
});

it('reads the news even when the server chokes on what is sent', async () => {
  const { clock, engine, key, asked, last } = await engineOver(pushRefused('internal'));
  await key();
  engine.start();
  await clock.advance(0);
  expect(asked.map(({ path }) => path)).toContain('/api/sync/pull');
  expect(last()).toMatchObject({ state: 'waiting' });
  await engine.stop();
});

it('says how far it is with a long queue', async () => {
  const { clock, engine, key, reports } = await engineOver(() => undefined);
  await key(1200);
  engine.start();
  await clock.advance(0);
  const progress = reports.flatMap((report) => (report.progress ? [report.progress] : []));
  expect(progress[0]).toEqual({ done: 0, total: 1200 });
  expect(progress.length).toBeGreaterThan(2);
  expect(progress.every(({ total }) => total === 1200)).toBe(true);
  expect(progress.map(({ done }) => done)).toEqual(
    [...progress.map(({ done }) => done)].sort((a, b) => a - b),
  );
  await engine.stop();
});
