import { createHash } from 'node:crypto';
import { AppError } from '@/shared/errors';
import { lookUp, withShop } from '@/db/server/transaction';
import type { Ctx, DeviceCtx } from '../ctx';

/** What is stored of a device's token or an enrolment code: both are random, so a plain hash is enough. */
export const hashOf = (secret: string) => createHash('sha256').update(secret).digest('hex');

/** The device that holds a token. @throws AppError `device_unknown`, `device_revoked` */
export async function findDevice(
  ctx: Ctx,
  token: string,
  { evenRevoked = false }: { evenRevoked?: boolean } = {},
): Promise<DeviceCtx['device']> {
  if (token === '') throw new AppError('device_unknown');
  const [found] = await lookUp<{ shop_id: string; device_id: string }>(
    ctx.db,
    'select shop_id, device_id from find_device($1)',
    [hashOf(token)],
  );
  if (!found) throw new AppError('device_unknown');
  const device = { shopId: found.shop_id, id: found.device_id };
  if (!evenRevoked && (await isRevoked(ctx, device))) throw new AppError('device_revoked');
  return device;
}

async function isRevoked(ctx: Ctx, device: DeviceCtx['device']): Promise<boolean> {
  return withShop(ctx.db, device.shopId, async ({ client }) => {
    const { rows } = await client.query('select from devices where id = $1 and revoked_at is null', [
      device.id,
    ]);
    return rows.length === 0;
  });
}
