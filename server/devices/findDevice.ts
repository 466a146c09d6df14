import { createHash } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { AppError } from '@/shared/errors';
import type { ServerDb } from '@/db/server/connect';
import { devices } from '@/db/server/schema/people';
import { lookUp, withShop } from '@/db/server/transaction';
import type { Ctx, DeviceCtx } from '../ctx';

/** What is stored of a device's token or an enrolment code: both are random, so a plain hash is enough. */
export const hashOf = (secret: string) => createHash('sha256').update(secret).digest('hex');

/** Which device a token belongs to never changes, so it is asked once; whether the device may come in is asked always. */
const found = new WeakMap<ServerDb, Map<string, DeviceCtx['device']>>();
const mostRemembered = 5000;

/** The device that holds a token. @throws AppError `device_unknown`, `device_revoked` */
export async function findDevice(
  ctx: Ctx,
  token: string,
  { evenRevoked = false }: { evenRevoked?: boolean } = {},
): Promise<DeviceCtx['device']> {
  if (token === '') throw new AppError('device_unknown');
  const device = await deviceOf(ctx.db, hashOf(token));
  if (!device) throw new AppError('device_unknown');
  if (!evenRevoked) await refuseRevoked(ctx.db, device);
  return device;
}

async function deviceOf(db: ServerDb, hash: string): Promise<DeviceCtx['device'] | null> {
  const remembered = found.get(db) ?? new Map<string, DeviceCtx['device']>();
  found.set(db, remembered);
  const known = remembered.get(hash);
  if (known) return known;
  const [row] = await lookUp<{ shop_id: string; device_id: string }>(
    db,
    'select shop_id, device_id from find_device($1)',
    [hash],
  );
  if (!row) return null;
  if (remembered.size >= mostRemembered) remembered.clear();
  const device = { shopId: row.shop_id, id: row.device_id };
  remembered.set(hash, device);
  return device;
}

async function refuseRevoked(db: ServerDb, device: DeviceCtx['device']): Promise<void> {
  await withShop(db, device.shopId, async ({ orm }) => {
    const [row] = await orm
      .select({ revokedAt: devices.revokedAt })
      .from(devices)
      .where(eq(devices.id, device.id));
    if (!row) throw new AppError('device_unknown');
    if (row.revokedAt !== null) throw new AppError('device_revoked');
  });
}
