import { getFacts } from '@/db/device/meta';
import type { DeviceDb } from '@/db/device/deviceDb';
import { readEvents } from '@/stores/desk/eventLines';
import { openStream } from '@/stores/http/apiClient';

const silenceMs = 60_000;
const longestPauseMs = 60_000;

/** Listens to the server's "something changed" and calls back, so that the device looks at once instead of in a minute.
 * Nothing depends on it: while no stream stands, the engine's own clock looks. Ends with the signal. */
export async function listenForPokes(db: DeviceDb, onPoke: () => void, signal: AbortSignal): Promise<void> {
  let failureCount = 0;
  while (!signal.aborted) {
    const attempt = new AbortController();
    const stopAttempt = () => attempt.abort();
    signal.addEventListener('abort', stopAttempt);
    let watchdog = setTimeout(stopAttempt, silenceMs);
    try {
      const { token, standing } = await getFacts(db.read);
      if (token !== undefined && standing === 'enrolled') {
        const response = await openStream({ path: '/api/sync/events', token, signal: attempt.signal });
        failureCount = 0;
        // what happened while no stream stood
        onPoke();
        if (response.body)
          await readEvents(response.body, (event) => {
            clearTimeout(watchdog);
            watchdog = setTimeout(stopAttempt, silenceMs);
            if (event.name !== 'beat') onPoke();
          });
      }
    } catch {
      // no network, or a server that is not there
    } finally {
      clearTimeout(watchdog);
      signal.removeEventListener('abort', stopAttempt);
    }
    failureCount += 1;
    await pause(Math.random() * Math.min(longestPauseMs, 1000 * 2 ** failureCount), signal);
  }
}

/** Waits, or until the signal or the network says to go on. */
function pause(ms: number, signal: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    if (signal.aborted) return resolve();
    const done = () => {
      clearTimeout(timer);
      globalThis.removeEventListener?.('online', done);
      signal.removeEventListener('abort', done);
      resolve();
    };
    const timer = setTimeout(done, ms);
    globalThis.addEventListener?.('online', done);
    signal.addEventListener('abort', done);
  });
}
