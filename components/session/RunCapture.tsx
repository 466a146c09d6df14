import { useEffect, useMemo, useState } from 'react';
import { CaptureScreen } from '@/components/capture/CaptureScreen';
import { unitLabel } from '@/components/capture/captureProps';
import type { StatusFacts } from '@/components/ui/StatusStrip';
import type { KeypadEvent, KeypadState } from '@/shared/entry/keypad';
import type { LiftUnit } from '@/shared/schema/primitives';
import type { Chip } from '@/shared/schema/records';
import type { ReadingRow, RunView, SessionView } from '@/shared/schema/views';
import { nextPort, proposeRun, type RunProposal } from '@/shared/session/nextPort';
import { BenchNewRun } from './BenchNewRun';
import { benchColumn } from './benchColumn';
import { ReadingSheet } from './ReadingSheet';
import { readingRows } from './readingRows';
import { RunAddLift } from './RunAddLift';
import { noticeFor, shownResult, type SavedNow } from './runShown';

export type RunCaptureProps = {
  view: SessionView;
  run: RunView;
  facts: StatusFacts;
  state: {
    keypad: KeypadState;
    rungId: string | null;
    chips: Chip[];
    saved: SavedNow | null;
    failure: string | null;
    isDraftAtRisk: boolean;
  };
  onKeypadEvent: (event: KeypadEvent) => void;
  onGoToRung: (rungId: string) => void;
  onSkip: () => void;
  onUndo: (reading: Pick<ReadingRow, 'id' | 'rungId'>) => void;
  onAddLift: (text: string, unit: LiftUnit) => void;
  onToggleChip: (chip: Chip) => void;
  /** resolves with a sentence when it did not work */
  onStartRun: (run: RunProposal) => Promise<string | null>;
  onOpenStatus: () => void;
  onLeave: () => void;
};

/** Keying one run: the capture screen with what lies one press behind it. */
export function RunCapture(props: RunCaptureProps) {
  const { view, run, state } = props;
  const [panel, setPanel] = useState<'addLift' | 'newRun' | null>(null);
  const [workingId, setWorkingId] = useState<string | null>(null);
  const [isBusy, setIsBusy] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const { session } = view;
  const { settings } = session;
  const rows = useMemo(() => readingRows(run, view), [run, view]);
  const rungs = useMemo(() => benchColumn(run, view), [run, view]);
  const title = `${run.run.side === 'intake' ? 'Intake' : 'Exhaust'} ${run.run.port}`;
  useEffect(() => {
    document.title = `${title}, session ${session.label} · Inchwater`;
  }, [title, session.label]);

  const locked = lockedSentence(view);
  const following = nextPort(view);
  const opened = rows.find((row) => row.reading.id === workingId);
  const undo = (readingId: string) => {
    const rungId =
      run.readings.find((reading) => reading.id === readingId)?.rungId ?? state.saved?.rung.id ?? null;
    props.onUndo({ id: readingId, rungId });
  };
  /** a closed session is looked at, not changed: the change would be held */
  const unlessLocked = (act: () => void) => () => {
    if (locked === null) act();
  };
  const goToRung = (rungId: string) => {
    const isSkipped = run.rungs.some((rung) => rung.id === rungId && rung.isSkipped);
    if (locked === null || !isSkipped) props.onGoToRung(rungId);
  };
  const repeat = () => {
    const rungId = state.saved?.rung.id ?? run.readings.at(-1)?.rungId;
    if (rungId) goToRung(rungId);
  };
  const startRun = async (proposal: RunProposal) => {
    setIsBusy(true);
    setProblem(await props.onStartRun(proposal));
    setIsBusy(false);
  };

  return (
    <>
      <CaptureScreen
        runTitle={title}
        rungs={rungs}
        currentRungId={state.rungId}
        keypad={{ ...state.keypad, notice: noticeFor(state) }}
        result={shownResult(view, run, state.rungId, state.saved, locked === null)}
        facts={props.facts}
        flowUnit={settings.flowUnit}
        pressureUnit={settings.pressureUnit}
        standardPressure={`${settings.standardPressureText} ${unitLabel(settings.standardPressureUnit)}`}
        chips={state.chips}
        lockedSentence={locked}
        onKeypadEvent={props.onKeypadEvent}
        onUndo={undo}
        onRepeat={repeat}
        onSkip={unlessLocked(props.onSkip)}
        onGoToRung={goToRung}
        onAddLift={unlessLocked(() => setPanel('addLift'))}
        onToggleChip={(chip) => unlessLocked(() => props.onToggleChip(chip))()}
        onOpenWorking={setWorkingId}
        onOpenStatus={props.onOpenStatus}
        onLeave={props.onLeave}
        onFinishRun={() => (following ? setPanel('newRun') : props.onLeave())}
      />
      {opened ? <ReadingSheet row={opened} onClose={() => setWorkingId(null)} /> : null}
      {panel === 'addLift' ? (
        <RunAddLift
          run={run}
          unit={run.rungs[0]?.liftUnit ?? settings.liftUnit}
          onAdd={(text, unit) => {
            setPanel(null);
            props.onAddLift(text, unit);
          }}
          onGoToRung={(rungId) => {
            setPanel(null);
            props.onGoToRung(rungId);
          }}
          onClose={() => setPanel(null)}
        />
      ) : null}
      {panel === 'newRun' && following ? (
        <BenchNewRun
          view={view}
          start={proposeRun(view, following)}
          isBusy={isBusy}
          problem={problem}
          onStart={(proposal) => void startRun(proposal)}
          onClose={props.onLeave}
        />
      ) : null}
    </>
  );
}

function lockedSentence({ session }: SessionView): string | null {
  if (session.state === 'handedIn')
    return `Session ${session.label} is handed in. The supervisor returns it before it is keyed on.`;
  if (session.state === 'approved')
    return `Session ${session.label} is approved. A supervisor reopens it before it is keyed on.`;
  return null;
}
