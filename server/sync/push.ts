import { AppError } from '@/shared/errors';
import { PushRequest, type PushResponse, type VerdictOf } from '@/shared/sync/protocol';
import { epochSql } from '@/db/server/epoch';
import { readVerdicts, withChanges } from '@/db/server/sync/applyChanges';
import type { Incoming } from '@/db/server/sync/incoming';
import type { ShopTx } from '@/db/server/transaction';
import type { DeviceCtx } from '../ctx';
import { readChange } from './readChange';

const largestInteger = 2_147_483_647;

/** Takes a batch of changes from a device and answers each with its verdict, in one transaction under the shop's feed
 * lock. Pushed again after a lost answer it gives the same verdicts and changes nothing.
 * @throws AppError `gap`, `forked` (nothing was taken; `last` says where the server is), `device_revoked` (the batch was
 * kept as held; the verdicts stand in the problem), `invalid`
 */
export async function push(ctx: DeviceCtx, raw: unknown): Promise<PushResponse> {
  const envelope = PushRequest.safeParse(raw);
  if (!envelope.success)
    throw new AppError('invalid', {
      fields: envelope.error.issues
        .slice(0, 5)
        .map((issue) => ({ path: issue.path.map(String).join('.').toWellFormed(), sentence: issue.message })),
    });
  const request = envelope.data;
  if (request.device !== ctx.device.id)
    throw new AppError('invalid', { fields: [{ path: 'device', sentence: 'not the device of this token' }] });
  const incoming = request.changes.map(readChange);
  const receivedAt = ctx.clock();

  const pendingCount = Math.min(Math.max(request.pendingCount - incoming.length, 0), largestInteger);
  const { isRevoked, ...answer } = await withChanges(ctx.db, ctx.device.shopId, async (tx, apply) => {
    const { stored, isRevoked, epoch } = await readDevice(tx, ctx.device.id);
    const known = await readVerdicts(
      tx,
      incoming.map((one) => one.id),
    );
    const { fresh, last } = inOrder(incoming, known, stored);
    const device = { id: ctx.device.id, last, pendingCount };
    const verdicts = await apply({ source: 'device', device, isRevoked, receivedAt }, fresh);
    for (const verdict of verdicts) known.set(verdict.id, verdict);
    return { isRevoked, epoch, last, verdicts: incoming.flatMap((one) => known.get(one.id) ?? []) };
  });
  if (isRevoked) throw new AppError('device_revoked', { extra: answer });
  return { ...answer, now: receivedAt.toISOString() };
}

/** The changes that are new, after looking whether they follow on what the device sent before. A change that is known
 * keeps its place too: a device that was enrolled anew sends again, under new numbers, what it sent as another.
 */
function inOrder(
  incoming: readonly Incoming[],
  known: ReadonlyMap<string, VerdictOf>,
  stored: number,
): { fresh: Incoming[]; last: number } {
  const fresh = new Map<string, Incoming>();
  let last = stored;
  for (const one of incoming) {
    const n = one.n ?? 0;
    const isKnown = known.has(one.id) || fresh.has(one.id);
    if (isKnown && n <= last) continue;
    if (n !== last + 1) throw new AppError(n <= last ? 'forked' : 'gap', { extra: { last: stored } });
    last = n;
    if (!isKnown) fresh.set(one.id, one);
  }
  return { fresh: [...fresh.values()], last };
}

async function readDevice(
  tx: ShopTx,
  id: string,
): Promise<{ stored: number; isRevoked: boolean; epoch: string }> {
  const { rows } = await tx.client.query<{ stored: number; isRevoked: boolean; epoch: string }>(
    `select last_n as stored, revoked_at is not null as "isRevoked", ${epochSql} as epoch from devices where id = $1`,
    [id],
  );
  if (!rows[0]) throw new AppError('device_unknown');
  return rows[0];
}
