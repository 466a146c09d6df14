import { z } from 'zod';
import { Label } from '@/shared/schema/primitives';
import { ShopSettings } from '@/shared/schema/records';
import { feeds, shops } from '@/db/server/schema/shops';
import { withShopUnsynced } from '@/db/server/transaction';
import { writeAudit } from '../audit';
import type { Ctx, PersonCtx } from '../ctx';
import { parse } from '../http/parse';
import { insertPerson, readNewPerson } from '../people/addPerson';

export const NewShop = z.strictObject({
  name: Label,
  settings: ShopSettings,
  /** the first person: has to be an owner, who then adds the others */
  owner: z.unknown(),
});

/** Makes a shop with its first person. @returns the context of that person, to go on with */
export async function createShop<C extends Ctx>(ctx: C, raw: unknown): Promise<C & PersonCtx> {
  const { name, settings, owner } = parse(NewShop, raw);
  const person = await readNewPerson(owner);
  const shopId = ctx.newId();
  const { id } = await withShopUnsynced(ctx.db, shopId, async (tx) => {
    await tx.orm.insert(shops).values({ id: shopId, name, settings, createdAt: ctx.clock() });
    await tx.orm.insert(feeds).values({ shopId });
    await writeAudit(ctx, tx, { by: null, act: 'shopMade', about: shopId });
    return insertPerson(ctx, tx, person, null);
  });
  return { ...ctx, actor: { shopId, id, name: person.name, roles: person.roles, signInId: null } };
}
