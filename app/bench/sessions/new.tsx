import { useRouter } from 'expo-router';
import { useState } from 'react';
import { BenchNewSession } from '@/components/session/BenchNewSession';
import { Screen } from '@/components/ui/Screen';
import { ErrorState, Progress } from '@/components/ui/States';
import { AppError } from '@/shared/errors';
import { numberedPorts } from '@/shared/session/newSessionForm';
import { useBenchStore } from '@/stores/bench/benchStore';
import { startSession } from '@/stores/bench/startSession';
import { useNewSessionStore } from '@/stores/newSession/newSessionStore';
import { readNewSession, readPlan, type FormProblems } from '@/stores/newSession/readNewSession';
import { useBenchCatalogue, useBenchSession, useBenchSessions } from '@/stores/queries/benchQueries';

export default function NewSessionRoute() {
  const router = useRouter();
  const shop = useBenchStore((state) => state.shop);
  const { form, change, clear } = useNewSessionStore();
  const { data: catalogue, error, refetch } = useBenchCatalogue();
  const { data: sessions } = useBenchSessions();
  const { data: last } = useBenchSession(sessions?.[0]?.id ?? '');
  const lastPlan = last?.session.liftPlan ?? null;
  const [isChecked, setIsChecked] = useState(false);
  const [isBusy, setIsBusy] = useState(false);
  const [failure, setFailure] = useState<string | null>(null);
  const back = () => router.replace('/bench');

  if (error || !catalogue || !shop)
    return (
      <Screen title="Start a session" onBack={back} backLabel="Back to sessions">
        {error ? (
          <ErrorState
            sentence="What the shop knows could not be read from this device."
            details={String(error)}
            onTryAgain={() => void refetch()}
          />
        ) : (
          <Progress label="Reading customers, heads and benches" />
        )}
      </Screen>
    );

  // a bench that is the only one is taken by itself
  const usable = catalogue.benches.filter((bench) => bench.status !== 'outOfUse');
  const filled = { ...form, benchId: form.benchId ?? (usable.length === 1 ? (usable[0]?.id ?? null) : null) };
  const read = readNewSession(filled, shop.settings, lastPlan);
  const problems: FormProblems = isChecked && 'problems' in read ? read.problems : {};
  const plan = readPlan(filled, shop.settings, lastPlan);

  const start = async () => {
    setIsChecked(true);
    setFailure(null);
    if (isBusy || 'problems' in read) return;
    setIsBusy(true);
    try {
      const sessionId = await startSession(read.input);
      clear();
      router.replace(`/bench/sessions/${sessionId}`);
    } catch (refusal) {
      setFailure(refusal instanceof AppError ? refusal.message : new AppError('not_saved').message);
      setIsBusy(false);
    }
  };

  return (
    <Screen title="Start a session" onBack={back} backHref="/bench" backLabel="Back to sessions">
      <BenchNewSession
        form={filled}
        problems={problems}
        onChange={change}
        catalogue={catalogue}
        shop={shop.settings}
        numberedPorts={numberedPorts(form.cylindersText)}
        lifts={'lifts' in plan ? plan.lifts : null}
        hasLast={lastPlan !== null && lastPlan.length > 0}
        isBusy={isBusy}
        failure={failure}
        onStart={() => void start()}
      />
    </Screen>
  );
}
