import { asc } from 'drizzle-orm';
import { nextBatch, storeVerdicts } from '@/db/device/outbox';
import { outbox } from '@/db/device/schema/deviceTables';
import { type AppError } from '@/shared/errors';
import { keepCopyAsFile } from '@/stores/bench/keepCopy';
import { readStatus } from '@/stores/bench/readStatus';
import { startSession, type StartSessionInput } from '@/stores/bench/startSession';
import { readUnsent } from '@/stores/bench/unsentWords';
import {
  addRun,
  addRung,
  handInSession,
  saveReading,
  setReadingNotes,
  skipRung,
  undoReading,
  unskipRung,
} from '@/stores/bench/verbs';
import { readCatalogue, readSession, readSessions } from '@/stores/queries/benchReads';
import { enrolledDevice, feed, item, noon, standAtBench } from '../factories/deviceFixture';
import { newId, readingFields } from '../factories/records';

const atIso = new Date(noon).toISOString();
const newSession = (benchId: string): StartSessionInput => ({
  customer: { name: 'Harrow Lane Garage' },
  head: {
    name: 'Iron four',
    casting: '77-B',
    cylinderCount: 4,
    ports: [
      { side: 'intake', port: '1' },
      { side: 'exhaust', port: '1' },
    ],
    intakeValveCount: 2,
    exhaustValveCount: 1,
    bore: { text: '86', unit: 'mm' },
  },
  stage: { name: 'As received' },
  dimensions: [{ side: 'intake', valveText: '40', valveUnit: 'mm' }],
  benchId,
  liftPlan: [
    { text: '2', unit: 'mm' },
    { text: '4', unit: 'mm' },
  ],
});

async function atBench() {
  const { db, ids } = await enrolledDevice();
  standAtBench(db, ids.person);
  const sessionId = await startSession(newSession(ids.bench));
  const runId = await addRun({ sessionId, side: 'intake', port: '1' });
  const view = async () => {
    const found = await readSession(db.read, sessionId);
    if (!found) throw new Error('the session is not there');
    return found;
  };
  const key = async (rung: number, flowText: string, over: { chips?: ['loud'] } = {}) => {
    const lift = (await view()).runs[0]?.rungs[rung];
    if (!lift) throw new Error('no such rung');
    return saveReading({
      runId,
      rungId: lift.id,
      liftText: lift.liftText,
      liftUnit: lift.liftUnit,
      flowText,
      pressureText: '28',
      isPressureRepeated: false,
      chips: over.chips ?? [],
    });
  };
  return { db, ids, sessionId, runId, view, key };
}

it('starts a session with a new customer, head and stage, and numbers it by the device', async () => {
  const { db, ids, view } = await atBench();
  const { session, customer, head, stage, bench, portDimensions, people } = await view();
  expect(session).toMatchObject({ label: '3-001', state: 'open', mark: 'onDevice', plannedBy: ids.person });
  expect(session.settings).toMatchObject({ standardPressureText: '28', flowUnit: 'cfm', drawing: null });
  expect([customer.name, head.casting, head.boreText, stage.stageOrdinal, bench.name]).toEqual([
    'Harrow Lane Garage',
    '77-B',
    '86',
    1,
    'Bench by the door',
  ]);
  expect(portDimensions).toMatchObject([{ side: 'intake', port: null, valveText: '40', valveUnit: 'mm' }]);
  expect(people).toEqual([{ id: ids.person, name: 'Ada Fell' }]);
  await startSession({
    ...newSession(ids.bench),
    customer: customer.id,
    head: head.id,
    stage: { name: 'Bowl blend' },
  });
  const [newest] = await readSessions(db.read);
  expect(newest).toMatchObject({ label: '3-002', stageName: 'Bowl blend', customerName: customer.name });
  expect((await readCatalogue(db.read)).stages.map((one) => one.stageOrdinal)).toEqual([1, 2]);
});

it('copies the calibration that holds into the session', async () => {
  const { db, ids } = await enrolledDevice();
  standAtBench(db, ids.person);
  const calibrationId = newId();
  await feed(db, [
    item('calibrations', calibrationId, {
      benchId: ids.bench,
      direction: 'drawing',
      grade: 'computed',
      fit: { kind: 'factor', factorText: '1.031' },
      stepsOn: ['scale'],
      asFoundText: null,
      asFoundUnit: null,
      asLeftText: null,
      asLeftUnit: null,
      adoptedBy: ids.person,
      fromAt: '2026-01-01T00:00:00.000Z',
      untilAt: null,
      withdrawnAt: null,
      note: '',
    }),
  ]);
  const view = await readSession(db.read, await startSession(newSession(ids.bench)));
  expect(view?.session.settings.drawing).toEqual({
    calibrationId,
    grade: 'computed',
    fit: { kind: 'factor', factorText: '1.031' },
  });
});

it('makes a run with the planned lifts and the head’s valves', async () => {
  const { sessionId, view } = await atBench();
  await addRun({ sessionId, side: 'exhaust', port: '1' });
  const [intake, exhaust] = (await view()).runs;
  expect(intake?.run).toMatchObject({ runOrdinal: 1, direction: 'drawing', valvesOpenCount: 2 });
  expect(exhaust?.run).toMatchObject({ runOrdinal: 2, direction: 'blowing', valvesOpenCount: 1 });
  expect(intake?.rungs.map((rung) => [rung.rungOrdinal, rung.liftText, rung.liftUnit])).toEqual([
    [1, '2', 'mm'],
    [2, '4', 'mm'],
  ]);
});

it('saves readings exactly as keyed, in order, by the person, with the session’s units', async () => {
  const { ids, view, key } = await atBench();
  await key(0, '29.80');
  await key(1, '067.3');
  await key(0, '30');
  const readings = (await view()).runs[0]?.readings ?? [];
  expect(readings.map((r) => [r.readingOrdinal, r.liftText, r.flowText, r.flowUnit, r.pressureUnit])).toEqual(
    [
      [1, '2', '29.80', 'cfm', 'inH2O'],
      [2, '4', '067.3', 'cfm', 'inH2O'],
      [3, '2', '30', 'cfm', 'inH2O'],
    ],
  );
  expect(
    readings.every((r) => r.byPersonId === ids.person && r.deviceId === ids.device && r.at === atIso),
  ).toBe(true);
});

it.each([
  ['', 'flowText'],
  ['1.2.3', 'flowText'],
  ['12345678901234567890', 'flowText'],
  ['12.', 'flowText'],
  ['-4', 'flowText'],
])('refuses the flow "%s" with a sentence and saves nothing', async (flowText, path) => {
  const { db, key, view } = await atBench();
  const before = (await nextBatch(db.read, 500)).length;
  const refusal: unknown = await key(0, flowText).catch((error: unknown) => error);
  expect(refusal).toMatchObject({ code: 'invalid' });
  expect((refusal as AppError).fields.map((field) => field.path)).toContain(path);
  expect((refusal as AppError).fields.every((field) => field.sentence.length > 5)).toBe(true);
  expect((await view()).runs[0]?.readings).toEqual([]);
  expect((await nextBatch(db.read, 500)).length).toBe(before);
});

it('undoes by a deletion that follows; the queue keeps both', async () => {
  const { db, key, view } = await atBench();
  const id = await key(0, '29.8');
  await undoReading(id);
  expect((await view()).runs[0]?.readings).toEqual([]);
  const kinds = (await nextBatch(db.read, 500)).filter(({ rid }) => rid === id).map(({ kind }) => kind);
  expect(kinds).toEqual(['create', 'delete']);
  await expect(undoReading(id)).rejects.toMatchObject({ code: 'no_such_record' });
  // an ordinal is never given twice
  await key(0, '30');
  expect((await view()).runs[0]?.readings[0]?.readingOrdinal).toBe(2);
});

it('skips and takes back lifts, adds one, and notes chips', async () => {
  const { key, view, runId } = await atBench();
  const rungs = (await view()).runs[0]?.rungs ?? [];
  const first = rungs[0]?.id ?? '';
  await skipRung(first);
  expect((await view()).runs[0]?.rungs[0]?.isSkipped).toBe(true);
  await unskipRung(first);
  await addRung(runId, { text: '0.15', unit: 'L/D' });
  expect((await view()).runs[0]?.rungs.map((r) => [r.rungOrdinal, r.liftText, r.isSkipped])).toEqual([
    [1, '2', false],
    [2, '4', false],
    [3, '0.15', false],
  ]);
  const id = await key(1, '67.3');
  await setReadingNotes(id, ['loud', 'breaksAway']);
  expect((await view()).runs[0]?.readings[0]?.chips).toEqual(['loud', 'breaksAway']);
});

it('hands in pinned to what stands on the screen, and once', async () => {
  const { db, key, view, sessionId } = await atBench();
  const kept = await key(0, '29.8');
  await undoReading(await key(1, '600'));
  await handInSession(sessionId);
  expect((await view()).session).toMatchObject({ state: 'handedIn', mark: 'onDevice' });
  expect((await nextBatch(db.read, 500)).at(-1)).toMatchObject({
    kind: 'handIn',
    table: 'sessions',
    rid: sessionId,
    expect: [{ readingId: kept, liftText: '2', flowText: '29.8', pressureText: '28' }],
  });
  await expect(handInSession(sessionId)).rejects.toMatchObject({ code: 'state_forbids' });
});

it('saves for nobody who is not signed in', async () => {
  const { db, key } = await atBench();
  standAtBench(db, null);
  await expect(key(0, '29.8')).rejects.toMatchObject({ code: 'sign_in_needed' });
});

it('lists what is not sent in plain words, and what the shop did not take as one entry with what hangs on it', async () => {
  const { db, key, view, sessionId, runId } = await atBench();
  await key(0, '29.8');
  await handInSession(sessionId);
  expect((await readUnsent(db.read)).map(({ what }) => what)).toEqual([
    'Customer Harrow Lane Garage',
    'Head Iron four',
    'Stage As received',
    'Dimensions of intake port (all)',
    'Session 3-001',
    'Run intake 1, session 3-001',
    'Planned lift 2 mm, session 3-001',
    'Planned lift 4 mm, session 3-001',
    'Reading 2 mm · 29.8 cfm · 28 inH2O, session 3-001',
    'Hand in session 3-001',
  ]);
  const batch = await nextBatch(db.read, 500);
  await db.tx((tx) =>
    storeVerdicts(
      tx,
      batch.map(({ id, rid, table }) =>
        rid === runId
          ? { id, verdict: 'held', why: 'session_closed' }
          : table === 'rungs' || table === 'readings'
            ? { id, verdict: 'held', why: 'parent_held' }
            : { id, verdict: 'applied', version: 1 },
      ),
      atIso,
    ),
  );
  const list = await readUnsent(db.read);
  expect(list).toMatchObject([
    {
      what: 'Run intake 1, session 3-001, and 3 that belong to it',
      verdict: 'held',
      whySentence: 'The session was already handed in or approved. The supervisor decides.',
    },
  ]);
  const { counts } = await readStatus(db.read);
  expect(counts).toMatchObject({ unsentCount: 0, heldCount: 1, setAsideCount: 0, disputeCount: 0 });
  // nothing keyed has left the screen
  expect((await view()).runs[0]?.readings[0]).toMatchObject({ flowText: '29.8', mark: 'held' });
  const [summary] = await readSessions(db.read);
  expect(summary).toMatchObject({
    readingCount: 1,
    notSentCount: 1,
    rungCount: 2,
    runCount: 1,
    keyedBy: ['Ada Fell'],
  });
});

it('copies everything the shop has not taken into a file', async () => {
  const { db, key } = await atBench();
  await key(0, '29.8');
  const copy = JSON.parse(await (await keepCopyAsFile()).text()) as {
    changes: { n: number }[];
    format: string;
  };
  const rows = await db.read.select({ n: outbox.n }).from(outbox).orderBy(asc(outbox.n));
  expect(copy.format).toBe('inchwater-unsent-1');
  expect(copy.changes.map(({ n }) => n)).toEqual(rows.map(({ n }) => n));
});

it('opens a session of a stage whose dimensions were only taken before', async () => {
  const { db, ids, view } = await atBench();
  const { head, customer } = await view();
  const id = await startSession({
    ...newSession(ids.bench),
    customer: customer.id,
    head: head.id,
    stage: { name: 'Ported' },
    dimensions: [],
  });
  expect((await readSession(db.read, id))?.portDimensions).toMatchObject([{ valveText: '40' }]);
});

it('reads nothing of a session that is not here', async () => {
  const { db } = await atBench();
  expect(await readSession(db.read, newId())).toBeNull();
});

it('shows a reading that came before its run as soon as the run comes', async () => {
  const { db, ids, sessionId, view } = await atBench();
  const runId = newId();
  const first = (await view()).runs[0]?.run;
  await feed(db, [item('readings', newId(), readingFields({ runId, byPersonId: ids.person }))]);
  expect((await view()).runs).toHaveLength(1);
  const { id: _id, version: _version, mark: _mark, ...fields } = first ?? { id: '', version: 0, mark: '' };
  await feed(db, [item('runs', runId, { ...fields, sessionId, runOrdinal: 2 })]);
  expect((await view()).runs[1]?.readings).toHaveLength(1);
});
