import { useLocalSearchParams, useRouter } from 'expo-router';
import { useWindowDimensions } from 'react-native';
import { isNarrowFor, statusFacts } from '@/components/bench/statusFacts';
import { RunCapture } from '@/components/session/RunCapture';
import { Screen } from '@/components/ui/Screen';
import { EmptyState, ErrorState, Progress } from '@/components/ui/States';
import { AppError } from '@/shared/errors';
import type { RunView, SessionView } from '@/shared/schema/views';
import type { RunProposal } from '@/shared/session/nextPort';
import { useBenchStore } from '@/stores/bench/benchStore';
import { addRun } from '@/stores/bench/verbs';
import { parseRunDraft } from '@/stores/capture/runDraft';
import { useKeepScreenOn } from '@/stores/capture/useKeepScreenOn';
import { useRunCapture } from '@/stores/capture/useRunCapture';
import { useBenchSession, useDraft } from '@/stores/queries/benchQueries';

export default function RunRoute() {
  const router = useRouter();
  const { sessionId, runId } = useLocalSearchParams<{ sessionId: string; runId: string }>();
  const { data: view, error, refetch, isFetching } = useBenchSession(sessionId);
  const draft = useDraft(runId);
  const run = view?.runs.find((each) => each.run.id === runId);
  const back = () => router.replace(view ? `/bench/sessions/${sessionId}` : '/bench');
  if (view && run && (draft.isSuccess || draft.isError))
    return <Keying key={runId} view={view} run={run} keptDraft={draft.data ?? null} />;
  return (
    <Screen title="Run" onBack={back} backLabel="Back">
      {error ? (
        <ErrorState
          sentence="This run could not be read from the device. What is saved stays saved."
          details={String(error)}
          onTryAgain={() => void refetch()}
        />
      ) : !isFetching && (view === null || (view && !run)) ? (
        <EmptyState
          title="This run is not on this device"
          sentence="It was taken back, or the address was typed wrongly."
          actionTitle={view ? `To session ${view.session.label}` : 'To the sessions'}
          onAction={back}
        />
      ) : (
        <Progress label="Reading the run" />
      )}
    </Screen>
  );
}

function Keying({ view, run, keptDraft }: { view: SessionView; run: RunView; keptDraft: unknown }) {
  const router = useRouter();
  const { person, sync } = useBenchStore();
  const { width } = useWindowDimensions();
  const sessionId = view.session.id;
  const { capture, state } = useRunCapture(view, run.run.id, parseRunDraft(keptDraft));
  useKeepScreenOn();
  const startRun = async (proposal: RunProposal): Promise<string | null> => {
    try {
      const runId = await addRun({ sessionId, ...proposal });
      router.replace(`/bench/sessions/${sessionId}/runs/${runId}`);
      return null;
    } catch (error) {
      return (error instanceof AppError ? error : new AppError('not_saved')).message;
    }
  };
  return (
    <RunCapture
      view={view}
      run={run}
      facts={statusFacts(person?.name ?? '', sync, new Date(), isNarrowFor(width))}
      state={state}
      onKeypadEvent={capture.send}
      onGoToRung={(rungId) => void capture.goToRung(rungId)}
      onSkip={() => void capture.skip()}
      onUndo={(reading) => void capture.undo(reading)}
      onAddLift={(text, unit) => void capture.addLift(text, unit)}
      onToggleChip={capture.toggleChip}
      onStartRun={startRun}
      onOpenStatus={() => router.push('/bench/unsent')}
      onLeave={() => router.replace(`/bench/sessions/${sessionId}`)}
    />
  );
}
