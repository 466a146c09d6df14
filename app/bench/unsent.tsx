import { useRouter } from 'expo-router';
import { UnsentList } from '@/components/bench/UnsentList';
import { copyName, saveFile } from '@/components/bench/saveFile';
import { Screen } from '@/components/ui/Screen';
import { ErrorState, Progress } from '@/components/ui/States';
import { useBenchStore } from '@/stores/bench/benchStore';
import { keepCopyAsFile } from '@/stores/bench/keepCopy';
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
          onKeepCopy={keepCopy}
          onEnrolAgain={() => router.push('/bench/enrol')}
        />
      ) : null}
    </Screen>
  );
}

async function keepCopy(): Promise<boolean> {
  try {
    saveFile(await keepCopyAsFile(), copyName(new Date()));
    return true;
  } catch {
    return false;
  }
}
