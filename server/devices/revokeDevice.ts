import { and, eq, isNull } from 'drizzle-orm';
import { AppError } from '@/shared/errors';
import { devices } from '@/db/server/schema/people';
import { withShopWrite } from '@/db/server/transaction';
import { need } from '../access';
import { writeAudit } from '../audit';
import type { PersonCtx } from '../ctx';

/** Shuts a device out: it reads nothing more, and what it still sends is kept and waits for the supervisor. Under the
 * shop's lock, so that no batch is half before and half after. Shutting out twice is done once.
 * @throws AppError `not_allowed`, `no_such_record`
 */
export async function revokeDevice(ctx: PersonCtx, id: string): Promise<void> {
  need(ctx, 'revokeDevice');
  await withShopWrite(ctx.db, ctx.actor.shopId, async (tx) => {
    const [known] = await tx.orm.select({ id: devices.id }).from(devices).where(eq(devices.id, id));
    if (!known) throw new AppError('no_such_record');
    const revoked = await tx.orm
      .update(devices)
      .set({ revokedAt: ctx.clock() })
      .where(and(eq(devices.id, id), isNull(devices.revokedAt)))
      .returning({ id: devices.id });
    if (revoked.length > 0) await writeAudit(ctx, tx, { by: ctx.actor.id, act: 'deviceRevoked', about: id });
  });
}
