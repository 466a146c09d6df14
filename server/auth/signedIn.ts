import { eq } from 'drizzle-orm';
import { AppError } from '@/shared/errors';
import type { SignedIn } from '@/shared/schema/api';
import { shops } from '@/db/server/schema/shops';
import type { ShopTx } from '@/db/server/transaction';
import type { Actor } from '../ctx';
import type { Deps } from '../deps';
import { accessSeconds, signAccess, signRefresh } from './tokens';

/** Who somebody is, as screens show it. */
export async function readMe(tx: ShopTx, actor: Actor): Promise<Pick<SignedIn, 'person' | 'shop'>> {
  const [shop] = await tx.orm
    .select({ id: shops.id, name: shops.name, settings: shops.settings })
    .from(shops)
    .where(eq(shops.id, actor.shopId));
  if (!shop) throw new AppError('sign_in_ended');
  return { person: { id: actor.id, name: actor.name, roles: actor.roles }, shop };
}

/** Fresh tokens for a sign-in. The refresh token goes into the cookie, never into the body. */
export async function tokensFor(
  deps: Deps,
  me: Pick<SignedIn, 'person' | 'shop'>,
  family: string,
  tokenId: string,
): Promise<{ body: SignedIn; refreshToken: string }> {
  const claims = { shop: me.shop.id, sub: me.person.id, family };
  return {
    body: {
      accessToken: await signAccess(deps, claims),
      expiresAt: new Date(deps.clock().getTime() + accessSeconds * 1000).toISOString(),
      ...me,
    },
    refreshToken: await signRefresh(deps, { ...claims, jti: tokenId }),
  };
}
