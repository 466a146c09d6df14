import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { act, configure, createEvent, fireEvent, render, screen } from '@testing-library/react';
import { TextEncoder } from 'node:util';
import { RunCapture } from '@/components/session/RunCapture';
import { useBenchStore } from '@/stores/bench/benchStore';
import { startSession } from '@/stores/bench/startSession';
import { addRun } from '@/stores/bench/verbs';
import { parseRunDraft } from '@/stores/capture/runDraft';
import { useRunCapture } from '@/stores/capture/useRunCapture';
import { useBenchSession, useDraft } from '@/stores/queries/benchQueries';
import { readSession } from '@/stores/queries/benchReads';
import { enrolledDevice, standAtBench } from '../factories/deviceFixture';

// computing what is hidden for every role takes most of the time in jsdom, and a loaded machine needs patience
configure({ defaultHidden: true, asyncUtilTimeout: 10_000 });

/* One run's screen as it stands in the app: real pad, real reducer, real verbs, real queries, the real SQLite build. */

// jsdom leaves it out, and SQLite's own JavaScript needs it
globalThis.TextEncoder ??= TextEncoder as typeof globalThis.TextEncoder;

const facts = { who: 'Ada', where: '3 saved on this device', needsPersonCount: 0 };

function Keying({
  view,
  runId,
  kept,
}: {
  view: Parameters<typeof useRunCapture>[0];
  runId: string;
  kept: unknown;
}) {
  const { capture, state } = useRunCapture(view, runId, parseRunDraft(kept));
  const run = view.runs.find((each) => each.run.id === runId);
  if (!run) return null;
  return (
    <RunCapture
      view={view}
      run={run}
      facts={facts}
      state={state}
      onKeypadEvent={capture.send}
      onGoToRung={(rungId) => void capture.goToRung(rungId)}
      onSkip={() => void capture.skip()}
      onUndo={(reading) => void capture.undo(reading)}
      onAddLift={(text, unit) => void capture.addLift(text, unit)}
      onToggleChip={capture.toggleChip}
      onStartRun={async () => null}
      onOpenStatus={() => undefined}
      onLeave={() => undefined}
    />
  );
}

function Run({ sessionId, runId }: { sessionId: string; runId: string }) {
  const { data: view } = useBenchSession(sessionId);
  const draft = useDraft(runId);
  if (!view || !draft.isSuccess) return null;
  return <Keying view={view} runId={runId} kept={draft.data} />;
}

async function openRun() {
  const { db, ids } = await enrolledDevice();
  standAtBench(db, ids.person);
  useBenchStore.setState({
    phase: 'ready',
    person: { id: ids.person, name: 'Ada Fell', roles: ['operator'] },
  });
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
    liftPlan: ['0.100', '0.200'].map((text) => ({ text, unit: 'in' })),
  });
  const runId = await addRun({ sessionId, side: 'intake', port: '1' });
  const show = () =>
    render(
      <QueryClientProvider client={new QueryClient()}>
        <Run sessionId={sessionId} runId={runId} />
      </QueryClientProvider>,
    );
  const readings = async () => (await readSession(db.read, sessionId))?.runs[0]?.readings ?? [];
  return { db, show, readings };
}

const button = (name: string | RegExp) => screen.getByRole('button', { name });
async function tap(name: string | RegExp) {
  const key = button(name);
  await act(async () => {
    fireEvent.pointerDown(key);
    fireEvent.pointerUp(key);
  });
}
let atMs = 0;
/** Keys of a keyboard, a fifth of a second apart by their own clock: closer ones would count as bounce. */
async function keyIn(...keys: string[]) {
  for (const key of keys.flatMap((each) => (each === 'Enter' ? each : [...each])))
    for (const make of [createEvent.keyDown, createEvent.keyUp])
      await act(async () => {
        const event = make(window, { key });
        atMs += 100;
        Object.defineProperty(event, 'timeStamp', { value: atMs });
        fireEvent(window, event);
      });
}

it('keys a reading, says it is saved when the device has it, and shows the corrected figure and the next lift', async () => {
  const { show, readings } = await openRun();
  show();
  await screen.findByText('0.100');
  await keyIn('60', 'Enter', '27.5', 'Enter');
  await screen.findByText('Saved on this device');
  expect(await readings()).toMatchObject([{ liftText: '0.100', flowText: '60', pressureText: '27.5' }]);
  // 60 × √(28 / 27.5) = 60.54
  expect(screen.getByText(/^60\.5/)).toBeTruthy();
  expect(screen.getByText('0.200')).toBeTruthy();
});

it('opens the working of the figure', async () => {
  const { show } = await openRun();
  show();
  await screen.findByText('0.100');
  await keyIn('60', 'Enter', '27.5', 'Enter');
  await screen.findByText('Saved on this device');
  await tap(/Open the working/);
  expect(await screen.findByText(/Keyed: 60 cfm at 27.5 inH2O/)).toBeTruthy();
});

it('takes a reading back with one press', async () => {
  const { show, readings } = await openRun();
  show();
  await screen.findByText('0.100');
  await keyIn('60', 'Enter', '28', 'Enter');
  await screen.findByText('Saved on this device');
  await tap('UNDO the last reading');
  await screen.findByText('0.100');
  expect(await readings()).toEqual([]);
});

it('opens again with the half-keyed digits', async () => {
  const { db, show } = await openRun();
  const { unmount } = show();
  await screen.findByText('0.100');
  await keyIn('66.');
  await db.idle();
  unmount();
  show();
  expect(await screen.findByText('66.')).toBeTruthy();
});

it('says loudly that a reading was not saved and keeps its digits', async () => {
  const { db, show, readings } = await openRun();
  show();
  await screen.findByText('0.100');
  await keyIn('60', 'Enter', '28');
  await db.idle();
  const full = jest.spyOn(db, 'tx').mockRejectedValue(new Error('disk full'));
  await keyIn('Enter');
  expect((await screen.findByRole('alert')).textContent).toMatch(/Not saved/);
  expect(screen.getByText('60')).toBeTruthy();
  expect(screen.queryByText('Saved on this device')).toBeNull();
  full.mockRestore();
  await keyIn('Enter');
  await screen.findByText('Saved on this device');
  expect(await readings()).toHaveLength(1);
});
