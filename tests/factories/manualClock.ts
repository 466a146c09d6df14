/** A clock that stands until a test moves it; timers fire as it passes them, and what they start is awaited. */
export function manualClock(startMs: number) {
  let now = startMs;
  let timers: { atMs: number; work: () => void }[] = [];
  /** Lets everything run that needs no time: SQLite under Node and the scripted answers are promises only, and all
   * promises that are ready run before the next turn of the event loop. */
  const settle = async () => {
    for (let turn = 0; turn < 3; turn += 1) await new Promise((resolve) => setImmediate(resolve));
  };
  return {
    nowMs: () => now,
    setTimer: (work: () => void, delayMs: number) => {
      const timer = { atMs: now + delayMs, work };
      timers.push(timer);
      return timer;
    },
    clearTimer: (timer: unknown) => {
      timers = timers.filter((one) => one !== timer);
    },
    settle,
    /** when the next timer is due, from now; null when none stands */
    nextInMs: () => (timers.length === 0 ? null : Math.min(...timers.map(({ atMs }) => atMs)) - now),
    advance: async (byMs: number) => {
      const until = now + byMs;
      await settle();
      for (;;) {
        const next = timers.filter(({ atMs }) => atMs <= until).sort((a, b) => a.atMs - b.atMs)[0];
        if (!next) break;
        now = Math.max(now, next.atMs);
        timers = timers.filter((one) => one !== next);
        next.work();
        await settle();
      }
      now = until;
    },
  };
}
