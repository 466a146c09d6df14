import type { callApi } from '@/stores/http/apiClient';
import { AppError } from '@/shared/errors';
import { RosterResponse } from '@/shared/schema/api';
import { maxBatch, PullResponse, PushResponse, VerdictOf } from '@/shared/sync/protocol';
import { schemaVersion } from '@/shared/sync/syncTables';
import type { DeviceDb } from '@/db/device/deviceDb';
import { startReplay, storePage } from '@/db/device/feed';
import { getFacts, setFact } from '@/db/device/meta';
import {
  nextBatch,
  noteTry,
  pruneOutbox,
  resendAfter,
  setAsideUnsendable,
  storeVerdicts,
  waitingOf,
} from '@/db/device/outbox';
import { storeRoster } from '@/db/device/rosterStore';
import { z } from 'zod';

/* One round of sync: push until nothing waits, pull until there is no more, then the roster.
 *
 * Invariants: nothing leaves the queue but by a verdict; a verdict and its effects are one local transaction; a page of
 * the feed and the place in it are one local transaction; losing any answer costs a repetition and nothing else.
 * Ids say what a change is, so resending is always safe; `n` only says where it stands. */

export type RoundParts = {
  db: DeviceDb;
  call: typeof callApi;
  nowMs: () => number;
  /** changes per push; halved when one does not get through, grows back */
  memory: { batchLimit: number };
  onProgress: (progress: { done: number; total: number }) => void;
};

const pushTimeoutMs = 30_000;
const pruneEveryMs = 24 * 60 * 60 * 1000;
/** refusals of a batch without any progress in between, before the round gives up until later */
const longestStandstill = 5;

/** Runs one round. @throws AppError whatever ended it; everything committed until then stays */
export async function syncRound(parts: RoundParts, options: { withRoster: boolean }): Promise<void> {
  // a server that was set back is found out by the pull; what it lost is then pushed again
  for (let turn = 0; turn < 3; turn += 1) {
    const pushError = await pushAll(parts).then(
      () => null,
      (error: unknown) => error,
    );
    if (pushError !== null && !mayStillPull(pushError)) throw pushError;
    const isSetBack = await pullAll(parts);
    if (pushError !== null && !isSetBack) throw pushError;
    if (!isSetBack) break;
  }
  if (options.withRoster) await fetchRoster(parts);
  await pruneSometimes(parts);
}

/** A push that the server could not digest must not keep the shop's news away. */
function mayStillPull(error: unknown): boolean {
  return (
    error instanceof AppError &&
    ['internal', 'bad_request', 'bad_json', 'invalid', 'too_large', 'not_found', 'gap'].includes(error.code)
  );
}

type Identity = {
  device: string;
  token: string;
  epoch: string;
  cursor: number;
  seen: string;
  isReplaying: boolean;
};

async function identityOf({ db }: RoundParts): Promise<Identity> {
  const facts = await getFacts(db.read);
  if (!facts.device || !facts.token) throw new AppError('device_unknown');
  return {
    device: facts.device.id,
    token: facts.token,
    epoch: facts.epoch ?? '',
    cursor: facts.cursor ?? 0,
    seen: facts.seen ?? '',
    isReplaying: facts.isReplaying ?? false,
  };
}

async function pushAll(parts: RoundParts): Promise<void> {
  const { db, memory } = parts;
  let standstill = 0;
  let done = 0;
  for (;;) {
    const me = await identityOf(parts);
    const batch = await nextBatch(db.read, memory.batchLimit);
    if (batch.length === 0) return;
    const { count } = await waitingOf(db.read);
    parts.onProgress({ done, total: done + count });
    let answer: PushResponse;
    try {
      answer = await parts.call({
        method: 'POST',
        path: '/api/sync/push',
        token: me.token,
        timeoutMs: pushTimeoutMs,
        schema: PushResponse,
        body: {
          device: me.device,
          sv: schemaVersion,
          now: new Date(parts.nowMs()).toISOString(),
          pendingCount: count,
          changes: batch,
        },
      });
    } catch (error) {
      standstill += 1;
      const wasAnswered = await onPushRefused(
        parts,
        error,
        batch.map((change) => change.id),
        me,
      );
      if (wasAnswered) standstill = 0;
      if (standstill >= longestStandstill) throw error;
      continue;
    }
    const answeredCount = await storeAnswer(parts, answer, me.epoch);
    // an answer without a verdict on anything that was asked is no answer
    if (answeredCount === 0) throw new AppError('internal');
    standstill = 0;
    done += answeredCount;
    memory.batchLimit = Math.min(maxBatch, memory.batchLimit * 2);
  }
}

function storeAnswer(parts: RoundParts, answer: PushResponse, epoch: string): Promise<number> {
  const atIso = new Date(parts.nowMs()).toISOString();
  return parts.db.tx(async (tx) => {
    const count = await storeVerdicts(tx, answer.verdicts, atIso);
    await setFact(tx, 'lastSentAt', atIso);
    await setFact(tx, 'clockOffsetMs', Date.parse(answer.now) - parts.nowMs());
    if (epoch !== '' && answer.epoch !== epoch) await startReplay(tx, answer.epoch);
    return count;
  });
}

/** Does what a refused batch asks for. @returns whether some of it was answered @throws the refusal when nothing can be
 * done about it now */
async function onPushRefused(
  parts: RoundParts,
  error: unknown,
  ids: string[],
  me: Identity,
): Promise<boolean> {
  const { db, memory } = parts;
  if (!(error instanceof AppError)) throw error;
  const atIso = new Date(parts.nowMs()).toISOString();
  const verdicts = z.array(VerdictOf).safeParse(error.extra.verdicts);
  // a device that was shut out still gets its verdicts: held, for the supervisor to decide
  if (verdicts.success && verdicts.data.length > 0)
    return (await db.tx((tx) => storeVerdicts(tx, verdicts.data, atIso))) > 0;
  await db.tx((tx) => noteTry(tx, ids, atIso, error.message));
  const last = z.number().int().min(0).safeParse(error.extra.last);
  const isOutOfStep = error.code === 'gap' || (error.code === 'forked' && me.isReplaying);
  if (isOutOfStep && last.success) {
    await db.tx((tx) => resendAfter(tx, last.data));
    // changes the server knows already stand between: smaller steps find the place of the first it does not
    memory.batchLimit = Math.max(1, Math.floor(ids.length / 2));
    return false;
  }
  if (error.code === 'server_restored') {
    await db.tx((tx) => startReplay(tx, epochIn(error)));
    return false;
  }
  if (error.code === 'too_large' && ids.length === 1 && ids[0] !== undefined) {
    const only = ids[0];
    await db.tx((tx) => setAsideUnsendable(tx, only, atIso));
    return true;
  }
  if (['too_large', 'timeout', 'internal'].includes(error.code))
    memory.batchLimit = Math.max(1, Math.floor(ids.length / 2));
  if (error.code === 'too_large') return false;
  throw error;
}

/** Reads the feed to its end. @returns whether the server turned out to have been set back */
async function pullAll(parts: RoundParts): Promise<boolean> {
  const { db } = parts;
  let isSetBack = false;
  for (;;) {
    const me = await identityOf(parts);
    const query = new URLSearchParams({
      after: String(me.cursor),
      epoch: me.epoch,
      seen: me.seen,
      limit: String(maxBatch),
      sv: String(schemaVersion),
    });
    let page: PullResponse;
    try {
      page = await parts.call({
        method: 'GET',
        path: `/api/sync/pull?${query.toString()}`,
        token: me.token,
        schema: PullResponse,
      });
    } catch (error) {
      if (!(error instanceof AppError) || error.code !== 'server_restored' || isSetBack) throw error;
      await db.tx((tx) => startReplay(tx, epochIn(error)));
      isSetBack = true;
      continue;
    }
    if (me.epoch !== '' && page.epoch !== me.epoch) {
      if (isSetBack) throw new AppError('server_restored');
      await db.tx((tx) => startReplay(tx, page.epoch));
      isSetBack = true;
      continue;
    }
    if (page.more && page.cursor <= me.cursor) throw new AppError('internal');
    await db.tx((tx) => storePage(tx, page));
    if (!page.more) return isSetBack;
  }
}

const epochIn = (error: AppError): string => (typeof error.extra.epoch === 'string' ? error.extra.epoch : '');

/** Reads shop and people anew. */
export async function fetchRoster(parts: Pick<RoundParts, 'db' | 'call'>): Promise<void> {
  const facts = await getFacts(parts.db.read);
  const answer = await parts.call({
    method: 'GET',
    path: '/api/sync/roster',
    token: facts.token ?? null,
    schema: RosterResponse,
  });
  await parts.db.tx((tx) => storeRoster(tx, answer));
}

async function pruneSometimes({ db, nowMs }: RoundParts): Promise<void> {
  const { lastPrunedAt } = await getFacts(db.read);
  if (lastPrunedAt !== undefined && nowMs() - Date.parse(lastPrunedAt) < pruneEveryMs) return;
  await db.tx((tx) => pruneOutbox(tx, nowMs()), { isQuiet: true });
}
