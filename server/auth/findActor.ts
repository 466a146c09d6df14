import { and, eq, gt, isNull } from 'drizzle-orm';
import { AppError } from '@/shared/errors';
import { memberships, people, signIns } from '@/db/server/schema/people';
import { withShop, type ShopTx } from '@/db/server/transaction';
import type { Actor } from '../ctx';
import type { Deps } from '../deps';
import { readAccess } from './tokens';

/** The person behind an access token, with roles and sign-in as they are at this moment, so that a closed account and
 * "sign out everywhere" bite at once.
 * @throws AppError `sign_in_needed`, `sign_in_ended`
 */
export async function findActor(
  deps: Pick<Deps, 'db' | 'clock' | 'jwtSecret'>,
  token: string,
): Promise<Actor> {
  if (token === '') throw new AppError('sign_in_needed');
  const claims = await readAccess(deps, token);
  return withShop(deps.db, claims.shop, async (tx) => {
    const [signIn] = await tx.orm
      .select({ id: signIns.id })
      .from(signIns)
      .where(
        and(
          eq(signIns.id, claims.family),
          eq(signIns.personId, claims.sub),
          isNull(signIns.endedAt),
          gt(signIns.expiresAt, deps.clock()),
        ),
      );
    const person = signIn ? await readPerson(tx, claims.sub) : null;
    if (!person) throw new AppError('sign_in_ended');
    return { ...person, signInId: claims.family };
  });
}

/** A person of the shop whose account is open, with their roles. */
export async function readPerson(tx: ShopTx, personId: string): Promise<Actor | null> {
  const [person] = await tx.orm
    .select({ id: people.id, name: people.name, roles: memberships.roles })
    .from(people)
    .innerJoin(memberships, and(eq(memberships.shopId, people.shopId), eq(memberships.personId, people.id)))
    .where(and(eq(people.id, personId), isNull(people.closedAt)));
  return person ? { ...person, shopId: tx.shopId, signInId: null } : null;
}
