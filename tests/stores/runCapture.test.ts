import { AppError } from '@/shared/errors';
import type { KeypadKey } from '@/shared/entry/keypad';
import { loadDraft, saveDraft } from '@/stores/bench/drafts';
import { startSession } from '@/stores/bench/startSession';
import { addRun, addRung, saveReading, skipRung, undoReading, unskipRung } from '@/stores/bench/verbs';
import { createRunCapture, type RunCapture, type RunCaptureVerbs } from '@/stores/capture/runCapture';
import { parseRunDraft } from '@/stores/capture/runDraft';
import { readSession } from '@/stores/queries/benchReads';
import { enrolledDevice, noon, standAtBench } from '../factories/deviceFixture';

/* The state of the capture screen over the real reducer, the real verbs and the real SQLite build. */

const real: RunCaptureVerbs = { saveReading, undoReading, skipRung, unskipRung, addRung, saveDraft };

async function atRun(over: Partial<RunCaptureVerbs> = {}) {
  const { db, ids } = await enrolledDevice();
  standAtBench(db, ids.person);
  const sessionId = await startSession({
    customer: { name: 'Harrow Lane Garage' },
    head: {
      name: 'Iron four',
      casting: '',
      cylinderCount: 4,
      ports: [{ side: 'intake', port: '1' }],
      intakeValveCount: 1,
      exhaustValveCount: 1,
    },
    stage: { name: 'As received' },
    benchId: ids.bench,
    liftPlan: ['0.100', '0.200', '0.300'].map((text) => ({ text, unit: 'in' })),
  });
  const runId = await addRun({ sessionId, side: 'intake', port: '1' });
  const look = async () => {
    const view = await readSession(db.read, sessionId);
    if (!view) throw new Error('the session is not there');
    return view;
  };
  const open = async (verbs: Partial<RunCaptureVerbs> = over) =>
    createRunCapture({
      view: await look(),
      runId,
      draft: parseRunDraft(await loadDraft(runId)),
      bounceMs: 80,
      nowMs: () => noon,
      verbs: { ...real, ...verbs },
      onDigits: () => undefined,
    });
  const readings = async () => (await look()).runs[0]!.readings;
  const liftOf = async (capture: RunCapture) =>
    (await look()).runs[0]!.rungs.find((rung) => rung.id === capture.store.getState().rungId)?.liftText ??
    null;
  return { db, look, open, readings, liftOf, runId };
}

let atMs = 0;
function press(capture: RunCapture, keys: (KeypadKey | string)[]): void {
  for (const key of keys as KeypadKey[]) {
    atMs += 200;
    capture.send({ type: 'press', key, atMs });
    capture.send({ type: 'release', key, atMs: atMs + 50, isInside: true });
  }
}
const key = (capture: RunCapture, flow: string, pressure: string) =>
  press(capture, [
    ...flow.split(''),
    'save',
    ...pressure.split('').map((c) => (c === '.' ? 'mark' : c)),
    'save',
  ]);

/** Until nothing is being stored any more. */
async function settled(capture: RunCapture, db: { idle: () => Promise<void> }) {
  for (let turn = 0; turn < 50; turn += 1) {
    await db.idle();
    await new Promise((resolve) => setImmediate(resolve));
    if (!capture.store.getState().keypad.saving) return db.idle();
  }
  throw new Error('still saving');
}

it('a saved reading stands on the device to the letter and the next lift is up', async () => {
  const { db, open, readings, liftOf } = await atRun();
  const capture = await open();
  expect(await liftOf(capture)).toBe('0.100');
  key(capture, '60', '27.0');
  expect(capture.store.getState().saved).toBeNull();
  await settled(capture, db);
  expect(await readings()).toMatchObject([{ liftText: '0.100', flowText: '60', pressureText: '27.0' }]);
  expect(capture.store.getState().saved).toMatchObject({ flowText: '60' });
  expect(await liftOf(capture)).toBe('0.200');
});

it('a killed page opens on the same lift with the half-keyed digits', async () => {
  const { db, open, liftOf } = await atRun();
  const first = await open();
  key(first, '60', '27.0');
  await settled(first, db);
  press(first, ['1', '1', '7', 'save', '2', '8', 'mark']);
  await settled(first, db);
  const again = await open();
  expect(await liftOf(again)).toBe('0.200');
  expect(again.store.getState().keypad).toMatchObject({
    flowText: '117',
    pressureText: '28.',
    lane: 'pressure',
  });
});

it('a draft that still waits cannot put the digits of a saved reading back', async () => {
  const { db, open } = await atRun();
  const first = await open();
  key(first, '60', '27.0');
  await settled(first, db);
  expect((await open()).store.getState().keypad).toMatchObject({ flowText: '', pressureText: '' });
});

it('keys pressed while a reading is stored belong to the next one and are kept', async () => {
  const { db, open, readings, liftOf } = await atRun();
  const capture = await open();
  key(capture, '60', '27.0');
  press(capture, ['8', '8']);
  await settled(capture, db);
  expect(await readings()).toHaveLength(1);
  const again = await open();
  expect(again.store.getState().keypad.flowText).toBe('88');
  expect(await liftOf(again)).toBe('0.200');
});

it('a device that cannot store says so and keeps lift and digits', async () => {
  const { db, open, readings, liftOf } = await atRun();
  const capture = await open({ saveReading: () => Promise.reject(new AppError('not_saved')) });
  key(capture, '60', '27.0');
  await settled(capture, db);
  const { keypad, saved } = capture.store.getState();
  expect(keypad).toMatchObject({ flowText: '60', pressureText: '27.0', notice: { code: 'notSaved' } });
  expect(saved).toBeNull();
  expect(await readings()).toHaveLength(0);
  expect(await liftOf(capture)).toBe('0.100');
  const again = await open();
  expect(again.store.getState().keypad).toMatchObject({ flowText: '60', pressureText: '27.0' });
});

it('UNDO takes the reading back and stands on its lift again', async () => {
  const { db, look, open, readings, liftOf } = await atRun();
  const capture = await open();
  key(capture, '60', '27.0');
  await settled(capture, db);
  capture.setView(await look());
  const [reading] = await readings();
  await capture.undo(reading!);
  expect(await readings()).toHaveLength(0);
  expect(await liftOf(capture)).toBe('0.100');
});

it('UNDO leaves half-keyed digits at the lift they were keyed for', async () => {
  const { db, look, open, readings, liftOf } = await atRun();
  const capture = await open();
  key(capture, '60', '27.0');
  await settled(capture, db);
  capture.setView(await look());
  press(capture, ['9']);
  const [reading] = await readings();
  await capture.undo(reading!);
  expect(await liftOf(capture)).toBe('0.200');
  expect(capture.store.getState().keypad.flowText).toBe('9');
});

it('a repeat is another reading of the same lift, and the run goes on where it was left', async () => {
  const { db, look, open, readings, liftOf } = await atRun();
  const capture = await open();
  key(capture, '60', '27.0');
  await settled(capture, db);
  capture.setView(await look());
  await capture.goToRung((await readings())[0]!.rungId!);
  key(capture, '61', '27.1');
  await settled(capture, db);
  expect(await readings()).toMatchObject([{ liftText: '0.100' }, { liftText: '0.100', flowText: '61' }]);
  expect(await liftOf(capture)).toBe('0.200');
});

it('a skipped lift is passed over, and going there takes it back into the run', async () => {
  const { look, open, liftOf } = await atRun();
  const capture = await open();
  const skippedId = capture.store.getState().rungId!;
  await capture.skip();
  expect(await liftOf(capture)).toBe('0.200');
  capture.setView(await look());
  await capture.goToRung(skippedId);
  expect((await look()).runs[0]!.rungs[0]).toMatchObject({ id: skippedId, isSkipped: false });
  expect(await liftOf(capture)).toBe('0.100');
});

it('a lift that was not planned is keyed next and the run goes on upward from it', async () => {
  const { db, look, open, readings, liftOf } = await atRun();
  const capture = await open();
  await capture.addLift('0.250', 'in');
  capture.setView(await look());
  expect(await liftOf(capture)).toBe('0.250');
  key(capture, '140', '27.6');
  await settled(capture, db);
  expect(await readings()).toMatchObject([{ liftText: '0.250', flowText: '140' }]);
  expect(await liftOf(capture)).toBe('0.300');
});

it('with the last lift saved nothing is left to key', async () => {
  const { db, look, open } = await atRun();
  const capture = await open();
  for (const flow of ['60', '117', '166']) {
    key(capture, flow, '27.0');
    await settled(capture, db);
    capture.setView(await look());
  }
  expect(capture.store.getState().rungId).toBeNull();
  expect((await open()).store.getState().rungId).toBeNull();
});

it('notes on a reading go with it and not with the next one', async () => {
  const { db, open, readings } = await atRun();
  const capture = await open();
  capture.toggleChip('unsteady');
  key(capture, '60', '27.0');
  await settled(capture, db);
  expect(await readings()).toMatchObject([{ chips: ['unsteady'] }]);
  expect(capture.store.getState().chips).toEqual([]);
});

it('says so when half-keyed digits cannot be kept', async () => {
  const { db, open } = await atRun();
  const capture = await open({ saveDraft: () => Promise.reject(new AppError('not_saved')) });
  press(capture, ['6']);
  await settled(capture, db);
  expect(capture.store.getState().isDraftAtRisk).toBe(true);
});

it('a verb that does not work says why, and the next key clears it', async () => {
  const { open } = await atRun();
  const capture = await open({ skipRung: () => Promise.reject(new AppError('not_saved')) });
  await capture.skip();
  expect(capture.store.getState().failure).toMatch(/could not store it/);
  press(capture, ['6']);
  expect(capture.store.getState().failure).toBeNull();
});
