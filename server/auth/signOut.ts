import { and, eq, isNull } from 'drizzle-orm';
import { AppError } from '@/shared/errors';
import { signIns } from '@/db/server/schema/people';
import { withShopUnsynced } from '@/db/server/transaction';
import { writeAudit } from '../audit';
import type { PersonCtx } from '../ctx';
import type { Deps } from '../deps';
import { readRefresh, type RefreshClaims } from './tokens';

/** Ends the sign-in whose refresh token this browser holds. Without a good one there is nothing to end. */
export async function signOut(deps: Deps, token: string): Promise<void> {
  const claims = await readRefresh(deps, token).catch((error: unknown): RefreshClaims | null => {
    if (error instanceof AppError) return null;
    throw error;
  });
  if (!claims) return;
  await withShopUnsynced(deps.db, claims.shop, async (tx) => {
    const ended = await tx.orm
      .update(signIns)
      .set({ endedAt: deps.clock(), endedWhy: 'signed out' })
      .where(and(eq(signIns.id, claims.family), isNull(signIns.endedAt)))
      .returning({ id: signIns.id });
    if (ended.length > 0)
      await writeAudit(deps, tx, { by: claims.sub, act: 'signedOut', about: claims.family });
  });
}

/** Ends every sign-in of the person who asks. */
export async function signOutEverywhere(ctx: PersonCtx): Promise<void> {
  await withShopUnsynced(ctx.db, ctx.actor.shopId, async (tx) => {
    const ended = await tx.orm
      .update(signIns)
      .set({ endedAt: ctx.clock(), endedWhy: 'signed out everywhere' })
      .where(and(eq(signIns.personId, ctx.actor.id), isNull(signIns.endedAt)))
      .returning({ id: signIns.id });
    await writeAudit(ctx, tx, {
      by: ctx.actor.id,
      act: 'signedOutEverywhere',
      about: ctx.actor.id,
      body: { endedCount: ended.length },
    });
  });
}
