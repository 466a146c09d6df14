import { AppError } from '@/shared/errors';
import { SetPinRequest } from '@/shared/schema/api';
import { pins } from '@/db/server/schema/people';
import { withShopUnsynced } from '@/db/server/transaction';
import { need } from '../access';
import { writeAudit } from '../audit';
import { hashSecret } from '../auth/passwords';
import { readPerson } from '../auth/findActor';
import type { PersonCtx } from '../ctx';
import { parse } from '../http/parse';

/** Sets a person's PIN: one's own, or, as the owner, anybody's. Devices learn it with their next roster.
 * @throws AppError `not_allowed`, `no_such_record`, `invalid`
 */
export async function setPin(ctx: PersonCtx, personId: string, raw: unknown): Promise<void> {
  if (personId !== ctx.actor.id) need(ctx, 'managePeople');
  const { pin } = parse(SetPinRequest, raw);
  const pinHash = await hashSecret(pin);
  await withShopUnsynced(ctx.db, ctx.actor.shopId, async (tx) => {
    if (!(await readPerson(tx, personId))) throw new AppError('no_such_record');
    const setAt = ctx.clock();
    await tx.orm
      .insert(pins)
      .values({ shopId: tx.shopId, personId, pinHash, setAt })
      .onConflictDoUpdate({ target: [pins.shopId, pins.personId], set: { pinHash, setAt } });
    await writeAudit(ctx, tx, { by: ctx.actor.id, act: 'pinSet', about: personId });
  });
}
