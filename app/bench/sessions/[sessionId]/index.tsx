import { useLocalSearchParams, useRouter } from 'expo-router';
import { useState } from 'react';
import { BenchSafetyCard } from '@/components/session/BenchSafetyCard';
import { BenchSession } from '@/components/session/BenchSession';
import { Banner } from '@/components/ui/Banner';
import { Screen } from '@/components/ui/Screen';
import { EmptyState, ErrorState, Progress } from '@/components/ui/States';
import { AppError } from '@/shared/errors';
import { addRun, handInSession, noteSafetyRead } from '@/stores/bench/verbs';
import { useBenchSession, useSafetyRead } from '@/stores/queries/benchQueries';

export default function BenchSessionRoute() {
  const router = useRouter();
  const { sessionId } = useLocalSearchParams<{ sessionId: string }>();
  const { data: view, error, refetch } = useBenchSession(sessionId);
  const { data: isRead } = useSafetyRead(sessionId);
  const [isBusy, setIsBusy] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const toRun = (runId: string) => router.push(`/bench/sessions/${sessionId}/runs/${runId}`);
  const frame = {
    onBack: () => router.replace('/bench'),
    backHref: '/bench',
    backLabel: 'Back to sessions',
  };

  if (error || view === null)
    return (
      <Screen title="Session" {...frame}>
        {error ? (
          <ErrorState
            sentence="This session could not be read from the device. What is saved stays saved."
            details={String(error)}
            onTryAgain={() => void refetch()}
          />
        ) : (
          <EmptyState
            title="This session is not on this device"
            sentence="The address may be from another shop, or the session has not come yet. It comes with the next connection if it is planned."
            actionTitle="To the sessions"
            onAction={frame.onBack}
          />
        )}
      </Screen>
    );
  if (!view || isRead === undefined)
    return (
      <Screen title="Session" {...frame}>
        <Progress label="Reading the session" />
      </Screen>
    );
  const readCard = async () => {
    setIsBusy(true);
    setProblem(await sentenceOf(() => noteSafetyRead(sessionId)));
    setIsBusy(false);
  };
  return (
    <Screen
      title={`Session ${view.session.label}`}
      subtitle={`${view.head.name}, ${view.customer.name}, ${view.stage.name}`}
      {...frame}
    >
      {problem ? <Banner kind="refusal" sentence={problem} /> : null}
      {isRead ? (
        <BenchSession
          view={view}
          runHref={(runId) => `/bench/sessions/${sessionId}/runs/${runId}`}
          onOpenRun={toRun}
          onStartRun={(run) => sentenceOf(async () => toRun(await addRun({ sessionId, ...run })))}
          onHandIn={() => sentenceOf(() => handInSession(sessionId))}
        />
      ) : (
        <BenchSafetyCard isBusy={isBusy} onRead={() => void readCard()} />
      )}
    </Screen>
  );
}

/** Runs a verb of the bench. @returns what went wrong, or null */
async function sentenceOf(work: () => Promise<void>): Promise<string | null> {
  try {
    await work();
    return null;
  } catch (error) {
    return (error instanceof AppError ? error : new AppError('not_saved')).message;
  }
}
