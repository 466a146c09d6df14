import { openDeskStream } from './callDesk';
import { readEvents } from './eventLines';
import { holdTabLock, openTabChannel } from './tabLock';

/* News for the desk: "something changed", never what. One tab of the browser holds the stream and tells the others, so
 * that ten tabs are one connection. While the stream is down, every tab looks by itself every few seconds.
 */

const silenceMs = 45_000;
const pollMs = 10_000;
const longestPauseMs = 30_000;

type Listener = {
  /** look again: something may have changed */
  onPoke: () => void;
  /** whether news come by themselves, or have to be looked for */
  onLive: (isLive: boolean) => void;
};

/** Listens until the returned function is called. */
export function listenToDesk({ onPoke, onLive }: Listener): () => void {
  const stop = new AbortController();
  const channel = openTabChannel('inchwater-desk-news');
  let heardAt = 0;
  let isLive = false;
  let isDown = false;
  const live = (next: boolean) => {
    if (next !== isLive) onLive(next);
    isLive = next;
  };
  const hear = (word: unknown) => {
    isDown = word === 'down';
    // a stream that ends is mostly a token that ran out: only one that stays away is said
    if (isDown) return;
    heardAt = Date.now();
    live(true);
    if (word === 'poke') onPoke();
  };
  channel?.addEventListener('message', (event: MessageEvent<unknown>) => hear(event.data));
  const tell = (word: 'beat' | 'poke' | 'down') => {
    hear(word);
    channel?.postMessage(word);
  };

  const poll = setInterval(() => {
    if (isDown || Date.now() - heardAt > silenceMs) live(false);
    if (!isLive && document.visibilityState === 'visible') onPoke();
  }, pollMs);
  const onBack = () => document.visibilityState === 'visible' && onPoke();
  document.addEventListener('visibilitychange', onBack);
  window.addEventListener('online', onPoke);

  void holdTabLock('inchwater-desk-news', stop.signal, () => keepStream(stop.signal, tell));

  return () => {
    stop.abort();
    clearInterval(poll);
    document.removeEventListener('visibilitychange', onBack);
    window.removeEventListener('online', onPoke);
    channel?.close();
  };
}

/** Keeps one stream open, with growing pauses while it cannot be. */
async function keepStream(
  signal: AbortSignal,
  tell: (word: 'beat' | 'poke' | 'down') => void,
): Promise<void> {
  let failures = 0;
  while (!signal.aborted) {
    const attempt = new AbortController();
    const stopAttempt = () => attempt.abort();
    signal.addEventListener('abort', stopAttempt);
    let watchdog = setTimeout(stopAttempt, silenceMs);
    try {
      const response = await openDeskStream('/api/events', attempt.signal);
      failures = 0;
      // what happened while no stream stood is looked up once
      tell('poke');
      if (response.body)
        await readEvents(response.body, (event) => {
          clearTimeout(watchdog);
          watchdog = setTimeout(stopAttempt, silenceMs);
          tell(event.name === 'beat' ? 'beat' : 'poke');
        });
    } catch {
      failures += 1;
    } finally {
      clearTimeout(watchdog);
      signal.removeEventListener('abort', stopAttempt);
    }
    if (signal.aborted) return;
    tell('down');
    await pause(Math.random() * Math.min(longestPauseMs, 1000 * 2 ** failures), signal);
  }
}

/** Waits, or until the signal or the network says to go on. */
function pause(ms: number, signal: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    const done = () => {
      clearTimeout(timer);
      window.removeEventListener('online', done);
      signal.removeEventListener('abort', done);
      resolve();
    };
    const timer = setTimeout(done, ms);
    window.addEventListener('online', done);
    signal.addEventListener('abort', done);
  });
}
