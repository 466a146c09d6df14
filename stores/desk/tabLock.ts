/** Runs `work` while no other tab of this browser runs under the same name. Browsers hide locks from pages that came
 * over plain HTTP from another machine; there each tab stands alone.
 */
export async function withTabLock<T>(name: string, work: () => Promise<T>): Promise<T> {
  if (typeof navigator === 'undefined' || !navigator.locks) return work();
  return navigator.locks.request(name, () => work());
}

/** Holds a lock that only one tab can have, for as long as `hold` runs; waits its turn until `signal` says stop. */
export async function holdTabLock(
  name: string,
  signal: AbortSignal,
  hold: () => Promise<void>,
): Promise<void> {
  if (typeof navigator === 'undefined' || !navigator.locks) return hold();
  try {
    await navigator.locks.request(name, { signal }, hold);
  } catch (error) {
    if (!signal.aborted) throw error;
  }
}

/** A channel to the other tabs of this browser; null where there is none. */
export function openTabChannel(name: string): BroadcastChannel | null {
  if (typeof BroadcastChannel === 'undefined') return null;
  const channel: BroadcastChannel & { unref?: () => void } = new BroadcastChannel(name);
  // under Node, where tests run, an open channel would keep the process alive
  channel.unref?.();
  return channel;
}
