import { activateKeepAwakeAsync, deactivateKeepAwake } from 'expo-keep-awake';
import { useEffect } from 'react';

const tag = 'run';

/** Keeps the screen lit while a run is keyed. Browsers let go of it when the page is hidden, so it is asked for again
 * when it is back; one that refuses, refuses quietly. */
export function useKeepScreenOn(): void {
  useEffect(() => {
    const ask = () => {
      if (document.visibilityState === 'visible') void activateKeepAwakeAsync(tag).catch(() => undefined);
    };
    ask();
    document.addEventListener('visibilitychange', ask);
    return () => {
      document.removeEventListener('visibilitychange', ask);
      void deactivateKeepAwake(tag).catch(() => undefined);
    };
  }, []);
}
