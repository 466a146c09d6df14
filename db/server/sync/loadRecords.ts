import { Id } from '@/shared/schema/primitives';
import type { Change, Fields } from '@/shared/sync/protocol';
import {
  isSyncTable,
  sessionTables,
  syncTableNames,
  syncTables,
  type SyncTable,
} from '@/shared/sync/syncTables';
import type { ShopTx } from '../transaction';
import { readRows } from './readRows';
import { Records } from './records';

/** The records that a record with these fields names: its parent and its other references. */
export function namedBy(table: SyncTable, fields: Fields): { table: SyncTable; id: string }[] {
  const { parent, references } = syncTables[table];
  return [...(parent ? [parent] : []), ...references].flatMap((link) => {
    const id = fields[link.field];
    return typeof id === 'string' && Id.safeParse(id).success ? [{ table: link.table, id }] : [];
  });
}

/** Reads what the changes touch and name: one query a table, children before parents, so that the way up from a
 * reading to its session is known when its turn comes.
 */
export async function loadRecords(tx: ShopTx, changes: readonly Change[]): Promise<Records> {
  const records = new Records();
  const wanted = new Map<SyncTable, Set<string>>(syncTableNames.map((table) => [table, new Set()]));
  const want = (table: SyncTable, id: string) => wanted.get(table)?.add(id);
  for (const change of changes) {
    if (!isSyncTable(change.table)) continue;
    want(change.table, change.rid);
    for (const named of namedBy(change.table, change.set)) want(named.table, named.id);
  }
  for (const table of [...syncTableNames].reverse()) {
    const ids = [...(wanted.get(table) ?? [])];
    if (ids.length === 0) continue;
    for (const row of await readRows(tx, table, 'id', ids)) {
      records.load(table, row);
      if (!sessionTables.includes(table)) continue;
      for (const named of namedBy(table, row.fields))
        if (sessionTables.includes(named.table)) want(named.table, named.id);
    }
  }
  await loadHandedIn(tx, records, changes);
  return records;
}

/** A hand in is pinned to the readings that were seen: all runs and readings of its session are needed. */
async function loadHandedIn(tx: ShopTx, records: Records, changes: readonly Change[]): Promise<void> {
  const sessionIds = changes.filter((change) => change.kind === 'handIn').map((change) => change.rid);
  if (sessionIds.length === 0) return;
  const runs = await readRows(tx, 'runs', 'sessionId', sessionIds);
  for (const run of runs) records.load('runs', run);
  const readings = await readRows(
    tx,
    'readings',
    'runId',
    runs.map((run) => run.id),
  );
  for (const reading of readings) records.load('readings', reading);
}
