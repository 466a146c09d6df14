import type { DeviceDb } from '@/db/device/deviceDb';
import { callApi } from '@/stores/http/apiClient';
import { listenForPokes } from './pokes';
import { createSyncEngine, type SyncEngine, type SyncReport } from './syncEngine';

/** The engine of this page: the page's clock and timers, the network's and the page's coming back, the server's pokes. */
export function browserEngine(db: DeviceDb, report: (report: SyncReport) => void): SyncEngine {
  const engine = createSyncEngine({
    db,
    call: callApi,
    nowMs: () => Date.now(),
    random: Math.random,
    setTimer: (work, delayMs) => globalThis.setTimeout(work, delayMs),
    clearTimer: (timer) => globalThis.clearTimeout(timer as ReturnType<typeof setTimeout>),
    isVisible,
    report,
  });
  let listening: AbortController | null = null;
  const onVisible = () => {
    if (isVisible()) engine.wake();
  };
  return {
    ...engine,
    start: () => {
      engine.start();
      if (listening) return;
      listening = new AbortController();
      globalThis.addEventListener?.('online', engine.wake);
      globalThis.document?.addEventListener('visibilitychange', onVisible);
      void listenForPokes(db, engine.wake, listening.signal);
    },
    stop: async () => {
      listening?.abort();
      listening = null;
      globalThis.removeEventListener?.('online', engine.wake);
      globalThis.document?.removeEventListener('visibilitychange', onVisible);
      await engine.stop();
    },
  };
}

function isVisible(): boolean {
  return globalThis.document === undefined || document.visibilityState === 'visible';
}
