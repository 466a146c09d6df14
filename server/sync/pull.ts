import { AppError } from '@/shared/errors';
import { PullQuery, type PullResponse } from '@/shared/sync/protocol';
import { readPage, readPlace } from '@/db/server/sync/readFeed';
import { withShop } from '@/db/server/transaction';
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
    const place = await readPlace(tx, query.after);
    if (!place) throw new AppError('device_unknown');
    const { epoch, newest, seen } = place;
    const isOtherLife = query.epoch !== '' && query.epoch !== epoch;
    if (isOtherLife || query.after > newest || seen !== query.seen)
      throw new AppError('server_restored', { extra: { epoch } });
    const page = await readPage(tx, place, query.after, query.limit);
    return { epoch, now: ctx.clock().toISOString(), ...page };
  });
}
