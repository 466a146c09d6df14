import { useEffect } from 'react';
import { Screen } from '@/components/ui/Screen';
import { ErrorState } from '@/components/ui/States';

const everyMs = 5000;

/** The desk before it ever reached the server. It goes on trying by itself. */
export function DeskUnreachable({ onTryAgain }: { onTryAgain: () => void }) {
  useEffect(() => {
    const timer = setInterval(onTryAgain, everyMs);
    window.addEventListener('online', onTryAgain);
    return () => {
      clearInterval(timer);
      window.removeEventListener('online', onTryAgain);
    };
  }, [onTryAgain]);
  return (
    <Screen title="Desk" width="narrow">
      <ErrorState
        sentence="The server does not answer. The desk needs it; the bench on an enrolled tablet goes on without. It is tried again by itself."
        onTryAgain={onTryAgain}
      />
    </Screen>
  );
}
