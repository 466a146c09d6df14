import { AppError } from '@/shared/errors';
import { PullQuery, type FeedItem, type PullResponse } from '@/shared/sync/protocol';
import { readEpoch } from '@/db/server/epoch';
import { feedSql } from '@/db/server/sync/syncedSql';
import { withShop, type ShopTx } from '@/db/server/transaction';
import type { DeviceCtx } from '../ctx';
import type { Deps } from '../deps';
import { parse } from '../http/parse';

/** A page of the shop's feed after a cursor, oldest first. All of it is read at one moment, and numbers are drawn and
 * committed one writer at a time, so what lies at or below the cursor can never appear later.
 * @throws AppError `server_restored` when the device stands on a life of the database that is over; `update_needed`
 */
export async function pull(
  ctx: DeviceCtx & Pick<Deps, 'oldestSchemaVersion'>,
  raw: unknown,
): Promise<PullResponse> {
  const query = parse(PullQuery, raw);
  if (query.sv < ctx.oldestSchemaVersion) throw new AppError('update_needed');
  return withShop(ctx.db, ctx.device.shopId, async (tx) => {
    const epoch = await readEpoch(tx);
    const newest = await readNewest(tx);
    const isOtherLife = query.epoch !== '' && query.epoch !== epoch;
    if (isOtherLife || query.after > newest || (await seenAt(tx, query.after)) !== query.seen)
      throw new AppError('server_restored', { extra: { epoch } });
    const { rows: items } = await tx.client.query<FeedItem>({
      name: 'feed',
      text: feedSql,
      values: [query.after, query.limit],
    });
    const more = items.length === query.limit && (items.at(-1)?.seq ?? 0) < newest;
    const cursor = more ? (items.at(-1)?.seq ?? query.after) : newest;
    return { epoch, cursor, seen: await seenAt(tx, cursor), more, now: ctx.clock().toISOString(), items };
  });
}

async function readNewest(tx: ShopTx): Promise<number> {
  const { rows } = await tx.client.query<{ seq: string }>('select seq from feeds');
  return Number(rows[0]?.seq ?? 0);
}

/** Id of the last change at or below a place of the feed; empty at its beginning. */
async function seenAt(tx: ShopTx, seq: number): Promise<string> {
  const { rows } = await tx.client.query<{ id: string }>(
    'select id from changes where seq <= $1 order by seq desc limit 1',
    [seq],
  );
  return rows[0]?.id ?? '';
}
