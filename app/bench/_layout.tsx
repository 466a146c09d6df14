import { Navigator, Redirect, Slot, usePathname, useRouter, useSegments } from 'expo-router';
import { useEffect } from 'react';
import { View, useWindowDimensions } from 'react-native';
import { BenchFailed, BenchOpening, BenchOtherTab } from '@/components/bench/BenchClosed';
import { PinGate } from '@/components/bench/PinGate';
import { isNarrowFor, statusFacts } from '@/components/bench/statusFacts';
import { StatusStrip } from '@/components/ui/StatusStrip';
import { ThemeProvider, useTheme } from '@/components/ui/ThemeProvider';
import { useBenchStore } from '@/stores/bench/benchStore';
import { downloadCopy } from '@/stores/bench/downloadCopy';
import { usePreferencesStore } from '@/stores/preferences/preferencesStore';
import { useRoster } from '@/stores/queries/benchQueries';

export default function BenchLayout() {
  const theme = usePreferencesStore((preferences) => preferences.theme);
  const open = useBenchStore((state) => state.open);
  useEffect(() => void open(), [open]);
  return (
    <ThemeProvider place="bench" choice={theme}>
      {/* the navigator stays while what stands before it changes: one that comes and goes while an address is being
          changed chases its own state for ever */}
      <Navigator>
        <BenchDoor />
      </Navigator>
    </ThemeProvider>
  );
}

/** What stands before the bench: its database, its enrolment, a PIN. The address stays, so that a link leads on. */
function BenchDoor() {
  const router = useRouter();
  const pathname = usePathname();
  const { phase, failure, takeOver, person } = useBenchStore();
  if (phase === 'opening') return <BenchOpening />;
  if (phase === 'otherTab') return <BenchOtherTab onUseHere={takeOver} onHome={() => router.replace('/')} />;
  if (phase === 'failed')
    return (
      <BenchFailed
        sentence={failure ?? 'The database of this browser could not be opened.'}
        onTryAgain={() => window.location.reload()}
        onKeepCopy={downloadCopy}
      />
    );
  if (pathname === '/bench/enrol') return <Slot />;
  if (phase === 'notEnrolled')
    return <Redirect href={{ pathname: '/bench/enrol', params: { then: pathname } }} />;
  return person ? <BenchInside personName={person.name} /> : <BenchPin />;
}

function BenchPin() {
  const shop = useBenchStore((state) => state.shop);
  const unlock = useBenchStore((state) => state.unlock);
  const { data: people } = useRoster();
  if (!people) return <BenchOpening />;
  return <PinGate shopName={shop?.name ?? ''} people={people} onUnlock={unlock} />;
}

function BenchInside({ personName }: { personName: string }) {
  const router = useRouter();
  const sync = useBenchStore((state) => state.sync);
  const { isTablet } = useTheme();
  const { width } = useWindowDimensions();
  // the capture screen has the strip in its own sum of heights
  const isKeying = useSegments().some((segment) => segment === '[runId]');
  if (isKeying) return <Slot />;
  return (
    <View style={{ flex: 1 }}>
      <StatusStrip
        facts={statusFacts(personName, sync, new Date(), isNarrowFor(width))}
        height={isTablet ? 64 : 48}
        onPress={() => router.push('/bench/unsent')}
      />
      <Slot />
    </View>
  );
}
