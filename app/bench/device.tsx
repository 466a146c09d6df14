import { useRouter } from 'expo-router';
import { DeviceSettings } from '@/components/bench/DeviceSettings';
import { Screen } from '@/components/ui/Screen';
import { useBenchStore } from '@/stores/bench/benchStore';
import { usePreferencesStore } from '@/stores/preferences/preferencesStore';

export default function BenchDeviceRoute() {
  const router = useRouter();
  const { shop, device, person, lock } = useBenchStore();
  const { theme, bounceMs, choose } = usePreferencesStore();
  return (
    <Screen
      title="This device"
      onBack={() => router.push('/bench')}
      backHref="/bench"
      backLabel="Back to sessions"
    >
      <DeviceSettings
        shopName={shop?.name ?? ''}
        deviceName={device?.name ?? ''}
        personName={person?.name ?? ''}
        theme={theme}
        bounceMs={bounceMs}
        onTheme={(next) => choose({ theme: next })}
        onBounceMs={(next) => choose({ bounceMs: next })}
        onChangePerson={() => {
          lock();
          router.replace('/bench');
        }}
      />
    </Screen>
  );
}
