import { v7 } from 'uuid';
import { withChanges } from '@/db/server/sync/applyChanges';
import type { Change } from '@/shared/sync/protocol';
import { schemaVersion } from '@/shared/sync/syncTables';
import type { TestServer, TestShop } from './shopWorld';

/** Changes made at the desk, through the one function that writes synced tables; roles are not looked at here. */
export async function deskBatchOf(
  server: TestServer,
  shop: TestShop,
  changes: (Pick<Change, 'kind' | 'table' | 'rid'> & Partial<Change>)[],
): Promise<void> {
  const receivedAt = new Date();
  const incoming = changes.map((over) => {
    const change: Change = {
      id: v7(),
      n: 1,
      sv: schemaVersion,
      by: shop.people.owner.id,
      at: receivedAt.toISOString(),
      base: {},
      set: {},
      ...over,
    };
    return { id: change.id, n: null, change, body: change };
  });
  const verdicts = await withChanges(server.deps.db, shop.id, (_, apply) =>
    apply({ source: 'desk', device: null, isRevoked: false, receivedAt }, incoming),
  );
  const refused = verdicts.find(({ verdict }) => verdict !== 'applied');
  if (refused) throw new Error(`the desk was answered ${JSON.stringify(refused)}`);
}
