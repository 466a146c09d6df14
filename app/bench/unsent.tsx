import { useRouter } from 'expo-router';
import { UnsentList } from '@/components/bench/UnsentList';
import { Screen } from '@/components/ui/Screen';
import { ErrorState, Progress } from '@/components/ui/States';
import { useBenchStore } from '@/stores/bench/benchStore';
import { downloadCopy } from '@/stores/bench/downloadCopy';
import { useUnsent } from '@/stores/queries/benchQueries';

export default function UnsentRoute() {
  const router = useRouter();
  const { sync, syncNow } = useBenchStore();
  const { data: lines, error, refetch } = useUnsent();
  return (
    <Screen
      title="Where the readings are"
      onBack={() => (router.canGoBack() ? router.back() : router.replace('/bench'))}
    >
      {error ? (
        <ErrorState
          sentence="The list could not be read. What is saved stays saved."
          details={String(error)}
          onTryAgain={() => void refetch()}
        />
      ) : null}
      {!lines && !error ? <Progress label="Reading what is on this device" /> : null}
      {lines ? (
        <UnsentList
          sync={sync}
          lines={lines}
          onSendNow={syncNow}
          onKeepCopy={downloadCopy}
          onEnrolAgain={() => router.push('/bench/enrol')}
        />
      ) : null}
    </Screen>
  );
}
