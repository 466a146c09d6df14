import { QueryClientProvider } from '@tanstack/react-query';
import { Slot, useRouter, useSegments, type ErrorBoundaryProps } from 'expo-router';
import { useEffect } from 'react';
import { View } from 'react-native';
import { FaultScreen } from '@/components/bench/FaultScreen';
import { UpdateOffer } from '@/components/bench/UpdateOffer';
import { FontGate } from '@/components/ui/FontGate';
import { ThemeProvider } from '@/components/ui/ThemeProvider';
import { heldDigits } from '@/stores/capture/heldDigits';
import { queryClient } from '@/stores/queries/queryClient';
import { registerServiceWorker } from '@/stores/serviceWorker/registerServiceWorker';
import { useUpdateStore } from '@/stores/serviceWorker/updateStore';

export default function RootLayout() {
  const { apply, offer } = useUpdateStore();
  useEffect(() => registerServiceWorker(offer), [offer]);
  // a run being keyed is left alone: the offer waits on the screens around it
  const isKeying = useSegments().some((segment) => segment === 'runs');
  return (
    <FontGate>
      <ThemeProvider place="desk">
        <QueryClientProvider client={queryClient}>
          <View style={{ flex: 1 }}>
            <Slot />
            {apply && !isKeying ? <UpdateOffer onTake={apply} /> : null}
          </View>
        </QueryClientProvider>
      </ThemeProvider>
    </FontGate>
  );
}

export function ErrorBoundary({ error, retry }: ErrorBoundaryProps) {
  const router = useRouter();
  const details = [error.message, error.stack, window.location.pathname, new Date().toISOString()];
  const home = () => {
    router.replace('/');
    void retry();
  };
  return (
    <ThemeProvider place="bench">
      <FaultScreen
        details={details.filter(Boolean).join('\n')}
        keyed={heldDigits()}
        onTryAgain={() => void retry()}
        onHome={home}
      />
    </ThemeProvider>
  );
}
