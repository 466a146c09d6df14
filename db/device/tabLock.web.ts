/* One tab owns the database of the browser: two would fail with an invalid file system until both are reloaded. The
 * lock must be held before the first call to expo-sqlite. The only way to free the worker's files is to unload the
 * page, so handing over means: finish writing, reload, and find oneself second in the queue. Stealing the lock would
 * take the name but not the files. */
const lockName = 'inchwater-device';
const longestFlushMs = 3000;
const channel = typeof BroadcastChannel === 'undefined' ? null : new BroadcastChannel(lockName);
let flushBeforeHandOver: () => Promise<void> = () => Promise.resolve();

/** Says what the owner does before it lets go: finish what is being written. */
export function beforeHandOver(flush: () => Promise<void>): void {
  flushBeforeHandOver = flush;
}

/** Takes the lock when nobody has it. @returns false when another tab does */
export function takeTabLock(): Promise<boolean> {
  return new Promise((resolve, reject) => {
    navigator.locks
      .request(lockName, { ifAvailable: true }, (lock) => {
        resolve(lock !== null);
        return lock ? untilHandedOver() : undefined;
      })
      .catch(reject);
  });
}

/** Resolves when the other tab has gone or has handed the database over. */
export function waitForTabLock(): Promise<void> {
  return new Promise((resolve, reject) => {
    navigator.locks
      .request(lockName, () => {
        resolve();
        return untilHandedOver();
      })
      .catch(reject);
  });
}

/** Asks the tab that has the database to hand it over. */
export function askForTabLock(): void {
  channel?.postMessage('hand over');
}

/** Never resolves: the lock goes when the page does. */
function untilHandedOver(): Promise<never> {
  channel?.addEventListener('message', (event) => {
    if (event.data !== 'hand over') return;
    const tooLong = new Promise<void>((resolve) => setTimeout(resolve, longestFlushMs));
    void Promise.race([flushBeforeHandOver().catch(() => undefined), tooLong]).then(() =>
      window.location.reload(),
    );
  });
  return new Promise<never>(() => undefined);
}
