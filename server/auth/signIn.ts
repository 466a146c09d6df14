import { and, eq, isNull } from 'drizzle-orm';
import { AppError } from '@/shared/errors';
import { SignInRequest, type SignedIn } from '@/shared/schema/api';
import { people, signIns } from '@/db/server/schema/people';
import { lookUp, withShop, withShopUnsynced } from '@/db/server/transaction';
import { writeAudit } from '../audit';
import type { Actor } from '../ctx';
import type { Deps } from '../deps';
import { parse } from '../http/parse';
import { readPerson } from './findActor';
import { isRightSecret } from './passwords';
import { readMe, tokensFor } from './signedIn';
import { refreshSeconds } from './tokens';

/** Signs a person in by mail and password. @throws AppError `wrong_sign_in`, which never says which of them was wrong */
export async function signIn(deps: Deps, raw: unknown): Promise<{ body: SignedIn; refreshToken: string }> {
  const { mail, password } = parse(SignInRequest, raw);
  const actor = await findByPassword(deps, mail, password);
  if (!actor) throw new AppError('wrong_sign_in');
  const family = deps.newId();
  const tokenId = deps.newId();
  const now = deps.clock();
  const me = await withShopUnsynced(deps.db, actor.shopId, async (tx) => {
    await tx.orm.insert(signIns).values({
      shopId: actor.shopId,
      id: family,
      personId: actor.id,
      currentTokenId: tokenId,
      rotatedAt: now,
      startedAt: now,
      lastUsedAt: now,
      expiresAt: new Date(now.getTime() + refreshSeconds * 1000),
    });
    await writeAudit(deps, tx, { by: actor.id, act: 'signedIn', about: family });
    return readMe(tx, actor);
  });
  return tokensFor(deps, me, family, tokenId);
}

/** The person whose password it is. One mail address may belong to people of several shops; the password tells. */
async function findByPassword(deps: Deps, mail: string, password: string): Promise<Actor | null> {
  const found = await lookUp<{ shop_id: string; person_id: string }>(
    deps.db,
    'select shop_id, person_id from find_people_by_mail($1)',
    [mail],
  );
  if (found.length === 0) await isRightSecret(password, null);
  for (const { shop_id: shopId, person_id: personId } of found) {
    const candidate = await withShop(deps.db, shopId, async (tx) => {
      const [row] = await tx.orm
        .select({ hash: people.passwordHash })
        .from(people)
        .where(and(eq(people.id, personId), isNull(people.closedAt)));
      return { hash: row?.hash ?? null, actor: await readPerson(tx, personId) };
    });
    if ((await isRightSecret(password, candidate.hash)) && candidate.actor) return candidate.actor;
  }
  return null;
}
