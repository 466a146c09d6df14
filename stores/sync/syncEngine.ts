import { AppError } from '@/shared/errors';
import { getFact, setFact } from '@/db/device/meta';
import { waitingOf } from '@/db/device/outbox';
import { waitSecondsOf } from '@/stores/http/apiClient';
import { syncRound, type RoundParts } from './syncRound';

/* When to sync. One round at a time; the tab lock is held by whoever starts the engine.
 *
 * Rounds begin 1 s after a save, when the network or the page comes back, on a poke from the server, by hand, and every
 * 60 s while the page is visible or anything waits. A failed round is tried again for ever, after a random part of a
 * growing pause (full jitter); a Retry-After of the server is kept. Clock, timers and chance come from outside, so that
 * tests decide them. */

export type SyncState =
  'idle' | 'sending' | 'waiting' | 'offline' | 'enrolAgain' | 'revoked' | 'updateNeeded';
export type SyncReport = {
  state: SyncState;
  progress?: { done: number; total: number };
  /** what ended the last round, as a sentence */
  lastError?: string;
};

export type EngineParts = Omit<RoundParts, 'memory' | 'onProgress'> & {
  random: () => number;
  setTimer: (work: () => void, delayMs: number) => unknown;
  clearTimer: (timer: unknown) => void;
  isVisible: () => boolean;
  report: (report: SyncReport) => void;
};

export type SyncEngine = {
  /** begins with a round at once */
  start: () => void;
  /** resolves when the round that runs has ended; no other begins */
  stop: () => Promise<void>;
  /** something was recorded */
  saved: () => void;
  /** a reason to try now; what the server asked to wait is kept */
  wake: () => void;
  /** asked for by a person: now, whatever was asked to wait. Resolves when the round has ended */
  syncNow: () => Promise<void>;
};

const afterSaveMs = 1000;
const usualMs = 60_000;
const longestPauseMs = 60_000;

/** Makes an engine over one device database. */
export function createSyncEngine(parts: EngineParts): SyncEngine {
  const memory = { batchLimit: 500 };
  let isStarted = false;
  let running: Promise<void> | null = null;
  let isWantedAgain = false;
  let failureCount = 0;
  /** the server asked for silence until then */
  let silentUntilMs = 0;
  let timer: unknown = null;
  let dueAtMs = Infinity;
  let isRosterDue = true;

  function schedule(delayMs: number): void {
    if (!isStarted) return;
    const atMs = Math.max(parts.nowMs() + delayMs, silentUntilMs);
    if (atMs >= dueAtMs) return;
    if (timer !== null) parts.clearTimer(timer);
    dueAtMs = atMs;
    timer = parts.setTimer(() => void onDue(), Math.max(0, atMs - parts.nowMs()));
  }

  async function onDue(): Promise<void> {
    timer = null;
    dueAtMs = Infinity;
    const isWorthIt = parts.isVisible() || (await waitingOf(parts.db.read)).count > 0;
    if (!isStarted) return;
    if (isWorthIt) await run();
    else schedule(usualMs);
  }

  function run(): Promise<void> {
    if (running) {
      isWantedAgain = true;
      return running;
    }
    if (timer !== null) parts.clearTimer(timer);
    timer = null;
    dueAtMs = Infinity;
    running = round().finally(() => {
      running = null;
      if (isWantedAgain) {
        isWantedAgain = false;
        schedule(afterSaveMs);
      }
    });
    return running;
  }

  async function round(): Promise<void> {
    const standing = await getFact(parts.db.read, 'standing');
    if (standing === undefined) return;
    if (standing === 'enrolAgain') return parts.report({ state: 'enrolAgain' });
    parts.report({ state: 'sending' });
    try {
      await syncRound(
        { ...parts, memory, onProgress: (progress) => parts.report({ state: 'sending', progress }) },
        { withRoster: isRosterDue },
      );
      isRosterDue = false;
      failureCount = 0;
      if (standing === 'revoked') await setStanding('enrolled');
      parts.report({ state: 'idle' });
      schedule(usualMs);
    } catch (error) {
      await onFailure(error);
    }
  }

  async function onFailure(error: unknown): Promise<void> {
    const refusal = error instanceof AppError ? error : new AppError('not_saved');
    const lastError = refusal.message;
    failureCount += 1;
    if (refusal.code === 'device_unknown' || refusal.code === 'forked') {
      await setStanding('enrolAgain');
      return parts.report({ state: 'enrolAgain', lastError });
    }
    const isRevoked = refusal.code === 'device_revoked';
    if (isRevoked) await setStanding('revoked');
    const state: SyncState = isRevoked
      ? 'revoked'
      : refusal.code === 'update_needed'
        ? 'updateNeeded'
        : refusal.code === 'offline'
          ? 'offline'
          : 'waiting';
    parts.report({ state, lastError });
    const waitSeconds = waitSecondsOf(refusal);
    if (waitSeconds !== null) {
      silentUntilMs = parts.nowMs() + waitSeconds * 1000;
      schedule(0);
    } else if (isRevoked || state === 'updateNeeded') schedule(usualMs);
    else schedule(parts.random() * Math.min(longestPauseMs, 1000 * 2 ** failureCount));
  }

  const setStanding = (standing: 'enrolled' | 'enrolAgain' | 'revoked') =>
    parts.db.tx((tx) => setFact(tx, 'standing', standing)).catch(() => undefined);

  return {
    start: () => {
      isStarted = true;
      schedule(0);
    },
    stop: async () => {
      isStarted = false;
      isWantedAgain = false;
      if (timer !== null) parts.clearTimer(timer);
      timer = null;
      dueAtMs = Infinity;
      await running;
    },
    saved: () => {
      if (running) isWantedAgain = true;
      // while the server cannot be reached the next try stands already
      else if (failureCount === 0) schedule(afterSaveMs);
    },
    wake: () => {
      isRosterDue = true;
      if (running) isWantedAgain = true;
      else schedule(0);
    },
    syncNow: async () => {
      isRosterDue = true;
      await running;
      if (isStarted) await run();
    },
  };
}
