import type { DeskChange } from '@/shared/schema/api';
import { schemaVersion } from '@/shared/sync/syncTables';
import type { Batch } from '@/db/server/sync/applyChanges';
import type { Incoming } from '@/db/server/sync/incoming';
import type { PersonCtx } from '../ctx';

/** A change made at the desk, as the same kind of object that devices send: it goes through the same merge and log. */
export function atDesk(ctx: PersonCtx, given: DeskChange): Incoming {
  const body = { ...given, sv: schemaVersion, by: ctx.actor.id, at: ctx.clock().toISOString() };
  // the desk has no queue: its n says nothing and is not logged
  return { id: given.id, n: null, change: { ...body, n: 1 }, body };
}

export const deskBatch = (ctx: PersonCtx): Batch => ({
  source: 'desk',
  device: null,
  isRevoked: false,
  receivedAt: ctx.clock(),
});
