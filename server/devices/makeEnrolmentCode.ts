import { randomInt } from 'node:crypto';
import type { EnrolmentCode } from '@/shared/schema/api';
import { enrolmentCodes } from '@/db/server/schema/people';
import { withShopUnsynced } from '@/db/server/transaction';
import { need } from '../access';
import { writeAudit } from '../audit';
import type { PersonCtx } from '../ctx';
import { hashOf } from './findDevice';

/** Without those that are mistaken for one another. */
const alphabet = 'ABCDEFGHJKLMNPQRSTUVWXYZ23456789';
const goodForMs = 15 * 60_000;

/** A one-time code to be keyed on a bench device. It is shown once and kept as a hash. */
export async function makeEnrolmentCode(ctx: PersonCtx): Promise<EnrolmentCode> {
  need(ctx, 'enrolDevice');
  const code = Array.from({ length: 8 }, () => alphabet[randomInt(alphabet.length)]).join('');
  const now = ctx.clock();
  const expiresAt = new Date(now.getTime() + goodForMs);
  const id = ctx.newId();
  await withShopUnsynced(ctx.db, ctx.actor.shopId, async (tx) => {
    await tx.orm.insert(enrolmentCodes).values({
      shopId: tx.shopId,
      id,
      codeHash: hashOf(code),
      madeBy: ctx.actor.id,
      madeAt: now,
      expiresAt,
    });
    await writeAudit(ctx, tx, { by: ctx.actor.id, act: 'codeMade', about: id });
  });
  return { code, expiresAt: expiresAt.toISOString() };
}
