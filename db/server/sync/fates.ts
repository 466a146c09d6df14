import type { Change, Verdict } from '@/shared/sync/protocol';
import { isSyncTable } from '@/shared/sync/syncTables';
import type { ShopTx } from '../transaction';
import { namedBy } from './loadRecords';
import type { Records } from './records';

/** What became of records that are not there: their create was held or rejected. What hangs on them shares that. */
export type Fates = Map<string, 'held' | 'rejected'>;

export const fateKey = (table: string, id: string) => `${table} ${id}`;

/** Looks up, in the log, the creates of the records that the changes name and the shop does not have. */
export async function loadFates(tx: ShopTx, changes: readonly Change[], records: Records): Promise<Fates> {
  const missing = new Set<string>();
  for (const change of changes) {
    if (!isSyncTable(change.table)) continue;
    const named = [{ table: change.table, id: change.rid }, ...namedBy(change.table, change.set)];
    for (const one of named) if (!records.has(one.table, one.id)) missing.add(one.id);
  }
  if (missing.size === 0) return new Map();
  const { rows } = await tx.client.query<{ table: string; id: string; verdict: Verdict }>(
    `select distinct on (table_name, record_id) table_name as "table", record_id as id, verdict
     from changes where record_id = any($1::uuid[]) and kind = 'create' and verdict in ('held', 'rejected')
     order by table_name, record_id, received_at desc`,
    [[...missing]],
  );
  return new Map(
    rows.map(({ table, id, verdict }) => [fateKey(table, id), verdict === 'held' ? 'held' : 'rejected']),
  );
}
