import { audit } from '@/db/server/schema/changeLog';
import type { ShopTx } from '@/db/server/transaction';
import type { Ctx } from './ctx';

export type AuditedAct =
  | 'shopMade'
  | 'personAdded'
  | 'pinSet'
  | 'signedIn'
  | 'signedOut'
  | 'signedOutEverywhere'
  | 'signInReused'
  | 'codeMade'
  | 'deviceEnrolled'
  | 'deviceRevoked';

/** Writes down an act that is no change to a synced record, in the transaction that does it. */
export async function writeAudit(
  ctx: Ctx,
  tx: ShopTx,
  line: { by: string | null; act: AuditedAct; about: string; body?: Record<string, unknown> },
): Promise<void> {
  await tx.orm.insert(audit).values({
    shopId: tx.shopId,
    id: ctx.newId(),
    byPersonId: line.by,
    act: line.act,
    about: line.about,
    body: line.body ?? {},
    at: ctx.clock(),
  });
}
