import { asc } from 'drizzle-orm';
import type { DeviceList } from '@/shared/schema/api';
import { devices } from '@/db/server/schema/people';
import { withShop } from '@/db/server/transaction';
import type { PersonCtx } from '../ctx';

/** The shop's bench devices in the order of their numbers. */
export async function listDevices(ctx: PersonCtx): Promise<DeviceList> {
  return withShop(ctx.db, ctx.actor.shopId, async (tx) => {
    const rows = await tx.orm.select().from(devices).orderBy(asc(devices.deviceOrdinal));
    return {
      devices: rows.map((row) => ({
        id: row.id,
        deviceOrdinal: row.deviceOrdinal,
        name: row.name,
        enrolledAt: row.enrolledAt.toISOString(),
        lastSeenAt: row.lastSeenAt?.toISOString() ?? null,
        pendingCount: row.pendingCount,
        revokedAt: row.revokedAt?.toISOString() ?? null,
      })),
    };
  });
}
