import { eq } from 'drizzle-orm';
import { AppError } from '@/shared/errors';
import type { SignedIn } from '@/shared/schema/api';
import { signIns } from '@/db/server/schema/people';
import { withShopUnsynced, type ShopTx } from '@/db/server/transaction';
import { writeAudit } from '../audit';
import type { Deps } from '../deps';
import { readPerson } from './findActor';
import { readMe, tokensFor } from './signedIn';
import { readRefresh, refreshSeconds, type RefreshClaims } from './tokens';

/** Two tabs of one browser share the cookie and may refresh at the same moment: the second still sends the token that
 * the first has just used up. For this long that is taken for what it is and answered with the token of the first. A
 * thief would have to use a stolen token within these seconds of its owner, and is found out at the next refresh.
 */
const sameMomentMs = 10_000;

/** Exchanges a refresh token for a fresh pair. An old one used again ends the whole sign-in: somebody has a copy.
 * @throws AppError `sign_in_needed`, `sign_in_ended`
 */
export async function refresh(deps: Deps, token: string): Promise<{ body: SignedIn; refreshToken: string }> {
  if (token === '') throw new AppError('sign_in_needed');
  const claims = await readRefresh(deps, token);
  const outcome = await withShopUnsynced(deps.db, claims.shop, async (tx) => {
    const actor = await readPerson(tx, claims.sub);
    const tokenId = actor ? await rotate(deps, tx, claims) : null;
    return actor && tokenId ? { me: await readMe(tx, actor), tokenId } : null;
  });
  // thrown outside the transaction: that a family ended must be committed
  if (!outcome) throw new AppError('sign_in_ended');
  return tokensFor(deps, outcome.me, claims.family, outcome.tokenId);
}

/** @returns the id of the token that is good now; null when the sign-in is over */
async function rotate(deps: Deps, tx: ShopTx, claims: RefreshClaims): Promise<string | null> {
  const now = deps.clock();
  const [family] = await tx.orm.select().from(signIns).where(eq(signIns.id, claims.family)).for('update');
  if (!family || family.personId !== claims.sub || family.endedAt || family.expiresAt <= now) return null;
  if (family.currentTokenId === claims.jti) {
    const tokenId = deps.newId();
    await tx.orm
      .update(signIns)
      .set({
        currentTokenId: tokenId,
        previousTokenId: claims.jti,
        rotatedAt: now,
        lastUsedAt: now,
        expiresAt: new Date(now.getTime() + refreshSeconds * 1000),
      })
      .where(eq(signIns.id, family.id));
    return tokenId;
  }
  const age = now.getTime() - family.rotatedAt.getTime();
  if (family.previousTokenId === claims.jti && age < sameMomentMs) return family.currentTokenId;
  await tx.orm
    .update(signIns)
    .set({ endedAt: now, endedWhy: 'an old token was used again' })
    .where(eq(signIns.id, family.id));
  await writeAudit(deps, tx, { by: claims.sub, act: 'signInReused', about: family.id });
  return null;
}
