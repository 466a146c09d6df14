import { lt, sql } from 'drizzle-orm';
import type { PullResponse } from '@/shared/sync/protocol';
import type { DeviceTx } from './deviceDb';
import { getFact, setFact } from './meta';
import { resendAll } from './outbox';
import { copies } from './schema/deviceTables';
import { rebuildRecords, recordsInOutbox } from './workingRows';

/** Stores one page of the feed: copies, working rows and the place in the feed commit together, so that a page that
 * was cut off is simply asked for again. */
export async function storePage(tx: DeviceTx, page: PullResponse): Promise<void> {
  if (page.items.length > 0) {
    await tx.run(sql`
      insert into copies (table_name, id, version, deleted, seq, fields)
      select json_extract(value, '$.table'), json_extract(value, '$.id'), json_extract(value, '$.version'),
        json_extract(value, '$.deleted'), json_extract(value, '$.seq'), json_extract(value, '$.fields')
      from json_each(${JSON.stringify(page.items)}) where true
      on conflict (table_name, id) do update set version = excluded.version, deleted = excluded.deleted,
        seq = excluded.seq, fields = excluded.fields
      where excluded.seq > copies.seq`);
    await rebuildRecords(
      tx,
      page.items.map((item) => ({ tableName: item.table, id: item.id })),
    );
  }
  await setFact(tx, 'cursor', page.cursor);
  await setFact(tx, 'seen', page.seen);
  await setFact(tx, 'epoch', page.epoch);
  if (!page.more && (await getFact(tx, 'isReplaying'))) await finishReplay(tx);
}

/** The server was set back to an earlier copy of itself: send everything that is retained again, and read the feed
 * from its beginning. The copies stay on the screen until the new ones come; they are marked by a place below 0.
 * @param epoch the server's new life, or empty when it did not say
 */
export async function startReplay(tx: DeviceTx, epoch: string): Promise<void> {
  await tx
    .update(copies)
    .set({ seq: sql`-1 - ${copies.seq}` })
    .where(sql`${copies.seq} >= 0`);
  await setFact(tx, 'isReplaying', true);
  await setFact(tx, 'cursor', 0);
  await setFact(tx, 'seen', '');
  await setFact(tx, 'epoch', epoch);
  await resendAll(tx);
  await rebuildRecords(tx, await recordsInOutbox(tx));
}

/** What the whole new feed did not bring is not in the shop any more. */
async function finishReplay(tx: DeviceTx): Promise<void> {
  const stale = await tx
    .select({ tableName: copies.tableName, id: copies.id })
    .from(copies)
    .where(lt(copies.seq, 0));
  await tx.delete(copies).where(lt(copies.seq, 0));
  await rebuildRecords(tx, stale);
  await setFact(tx, 'isReplaying', false);
}
