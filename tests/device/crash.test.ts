import { asc } from 'drizzle-orm';
import type { DeviceDriver } from '@/db/device/driver';
import { getFact } from '@/db/device/meta';
import { nextBatch, storeVerdicts } from '@/db/device/outbox';
import { prepareDeviceDb } from '@/db/device/prepareDb';
import { outbox } from '@/db/device/schema/deviceTables';
import { addRun, saveReading } from '@/stores/bench/verbs';
import { startSession } from '@/stores/bench/startSession';
import { loadDraft, saveDraft } from '@/stores/bench/drafts';
import { readSession } from '@/stores/queries/benchReads';
import { enrolledDevice, feed, item, noon, standAtBench } from '../factories/deviceFixture';
import { copyFiles, freshFile, openNodeSqlite } from '../factories/nodeSqlite';
import { mortal } from '../factories/mortalDriver';
import { readingFields } from '../factories/records';

const atIso = new Date(noon).toISOString();

async function sessionWithRun(driver: DeviceDriver) {
  const { db, ids } = await enrolledDevice({ driver });
  standAtBench(db, ids.person);
  const sessionId = await startSession({
    customer: { name: 'Harrow Lane' },
    head: {
      name: 'Iron head',
      casting: '77',
      cylinderCount: 4,
      ports: [{ side: 'intake', port: '1' }],
      intakeValveCount: 1,
      exhaustValveCount: 1,
    },
    stage: { name: 'As received' },
    benchId: ids.bench,
    liftPlan: [
      { text: '0.100', unit: 'in' },
      { text: '0.200', unit: 'in' },
    ],
  });
  const runId = await addRun({ sessionId, side: 'intake', port: '1' });
  return { db, ids, sessionId, runId };
}

const keyed = (runId: string, flowText: string) => ({
  runId,
  rungId: null,
  liftText: '0.100',
  liftUnit: 'in' as const,
  flowText,
  pressureText: '28.0',
  isPressureRepeated: false,
  chips: [],
});

it('keeps a reading whole or not at all, wherever the browser is killed while it is saved', async () => {
  const outcomes = new Set<string>();
  const original = freshFile();
  const { ids, sessionId, runId } = await sessionWithRun(await openNodeSqlite(original));
  await saveReading(keyed(runId, '100'));
  await saveDraft(runId, { flow: '101' });
  for (let step = 0; ; step += 1) {
    const file = await copyFiles(original);
    const driver = mortal(await openNodeSqlite(file));
    standAtBench(await prepareDeviceDb(driver), ids.person);
    const before = driver.callCount();
    driver.dieAt(step);
    const wasSaid = await saveReading({ ...keyed(runId, '101'), nextDraft: { flow: '' } }).then(
      () => true,
      () => false,
    );
    const calls = driver.callCount() - before;

    const again = await prepareDeviceDb(await openNodeSqlite(file));
    standAtBench(again, ids.person);
    const flows = (await readSession(again.read, sessionId))?.runs[0]?.readings.map((r) => r.flowText);
    const queued = await again.read.select({ n: outbox.n }).from(outbox).orderBy(asc(outbox.n));
    const isThere = flows?.length === 2;
    // said means durable; queue, row and draft go together
    if (wasSaid) expect(isThere).toBe(true);
    expect(flows).toEqual(isThere ? ['100', '101'] : ['100']);
    expect(await loadDraft(runId)).toEqual({ flow: isThere ? '' : '101' });
    expect(queued.map(({ n }) => n)).toEqual(queued.map((_, index) => index + 1));
    expect(await getFact(again.read, 'nextN')).toBe(queued.length + 1);
    // and keying goes on
    await saveReading(keyed(runId, '102'));
    expect((await nextBatch(again.read, 500)).at(-1)?.n).toBe(queued.length + 1);
    outcomes.add(`${String(wasSaid)} ${String(isThere)}`);
    if (wasSaid && calls < step) break;
  }
  expect([...outcomes].sort()).toEqual(['false false', 'false true', 'true true']);
});

it('takes verdicts and pages of the feed whole or not at all', async () => {
  let isWhole = false;
  const original = freshFile();
  const { ids, sessionId, runId } = await sessionWithRun(await openNodeSqlite(original));
  for (let step = 0; !isWhole; step += 1) {
    const file = await copyFiles(original);
    const driver = mortal(await openNodeSqlite(file));
    const db = await prepareDeviceDb(driver);
    const batch = await nextBatch(db.read, 500);
    driver.dieAt(step);
    const verdicts = batch.map(({ id }) => ({ id, verdict: 'applied' as const, version: 1 }));
    const reading = readingFields({ runId, byPersonId: ids.person });
    isWhole = await db
      .tx((tx) => storeVerdicts(tx, verdicts, atIso))
      .then(() => feed(db, [item('readings', batch[0]?.id ?? '', reading)]))
      .then(
        () => true,
        () => false,
      );
    const again = await prepareDeviceDb(await openNodeSqlite(file));
    const view = await readSession(again.read, sessionId);
    const waiting = (await nextBatch(again.read, 500)).length;
    expect([0, batch.length]).toContain(waiting);
    expect(view?.session.mark).toBe(waiting === 0 ? 'sent' : 'onDevice');
    expect(view?.runs[0]?.run.mark).toBe(waiting === 0 ? 'sent' : 'onDevice');
    const isPageThere = view?.runs[0]?.readings.length === 1;
    if (isPageThere) expect(waiting).toBe(0);
    if (isWhole) expect(isPageThere).toBe(true);
  }
});
