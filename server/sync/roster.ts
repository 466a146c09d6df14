import { and, asc, eq, isNull } from 'drizzle-orm';
import { AppError } from '@/shared/errors';
import type { RosterResponse } from '@/shared/schema/api';
import { devices, memberships, people, pins } from '@/db/server/schema/people';
import { shops } from '@/db/server/schema/shops';
import { withShop, withShopUnsynced } from '@/db/server/transaction';
import type { DeviceCtx } from '../ctx';

/** The people of the shop with their PIN verifiers, and the shop's settings: for devices only, and not in the feed.
 * Somebody whose account is closed is not in it.
 */
export async function roster(ctx: DeviceCtx): Promise<RosterResponse> {
  // a device asks this in every round: the desk sees by it that the device is in use, though it has nothing to send
  await withShopUnsynced(ctx.db, ctx.device.shopId, (tx) =>
    tx.orm.update(devices).set({ lastSeenAt: ctx.clock() }).where(eq(devices.id, ctx.device.id)),
  );
  return withShop(ctx.db, ctx.device.shopId, async (tx) => {
    const [shop] = await tx.orm
      .select({ id: shops.id, name: shops.name, settings: shops.settings })
      .from(shops);
    if (!shop) throw new AppError('device_unknown');
    const found = await tx.orm
      .select({ id: people.id, name: people.name, roles: memberships.roles, pinHash: pins.pinHash })
      .from(people)
      .innerJoin(memberships, eq(memberships.personId, people.id))
      .leftJoin(pins, eq(pins.personId, people.id))
      .where(and(isNull(people.closedAt)))
      .orderBy(asc(people.name), asc(people.id));
    return { shop, people: found };
  });
}
