import { randomBytes } from 'node:crypto';
import { and, eq, gt, isNull, max } from 'drizzle-orm';
import { AppError } from '@/shared/errors';
import { EnrolRequest, type Enrolled } from '@/shared/schema/api';
import { readEpoch } from '@/db/server/epoch';
import { devices, enrolmentCodes } from '@/db/server/schema/people';
import { lookUp, withShopWrite } from '@/db/server/transaction';
import { writeAudit } from '../audit';
import type { Ctx } from '../ctx';
import { hashOf } from '../devices/findDevice';
import { parse } from '../http/parse';

/** Makes a device of the browser that keyed a one-time code. The token is told once and kept as a hash.
 * @throws AppError `wrong_code` when it was never given out, is used up or too old
 */
export async function enrol(ctx: Ctx, raw: unknown): Promise<Enrolled> {
  const { code, deviceName } = parse(EnrolRequest, raw);
  const [found] = await lookUp<{ shop_id: string; code_id: string }>(
    ctx.db,
    'select shop_id, code_id from find_enrolment_code($1)',
    [hashOf(code)],
  );
  if (!found) throw new AppError('wrong_code');
  const token = randomBytes(32).toString('base64url');
  const now = ctx.clock();
  // the shop's lock, so that two devices never get the same number
  return withShopWrite(ctx.db, found.shop_id, async (tx) => {
    const [used] = await tx.orm
      .update(enrolmentCodes)
      .set({ usedAt: now })
      .where(
        and(
          eq(enrolmentCodes.id, found.code_id),
          isNull(enrolmentCodes.usedAt),
          gt(enrolmentCodes.expiresAt, now),
        ),
      )
      .returning({ madeBy: enrolmentCodes.madeBy });
    if (!used) throw new AppError('wrong_code');
    const [highest] = await tx.orm.select({ ordinal: max(devices.deviceOrdinal) }).from(devices);
    const deviceOrdinal = (highest?.ordinal ?? 0) + 1;
    const deviceId = ctx.newId();
    await tx.orm.insert(devices).values({
      shopId: tx.shopId,
      id: deviceId,
      deviceOrdinal,
      name: deviceName,
      tokenHash: hashOf(token),
      enrolledBy: used.madeBy,
      enrolledAt: now,
    });
    await writeAudit(ctx, tx, { by: used.madeBy, act: 'deviceEnrolled', about: deviceId });
    return { deviceId, deviceOrdinal, token, epoch: await readEpoch(tx) };
  });
}
