import type { Change, Fields } from '@/shared/sync/protocol';
import {
  isSyncTable,
  sessionTables,
  syncTableNames,
  syncTables,
  type SyncTable,
} from '@/shared/sync/syncTables';
import type { ShopTx } from '../transaction';
import { namedBy } from './namedBy';
import { readRows } from './readRows';
import { Records } from './records';
import { syncedSql } from './syncedSql';

/** Everything that judging a batch needs to know, as it stands before it. */
export type Sight = {
  records: Records;
  /** people the changes name; who is missing is none of the shop's */
  people: Map<string, { isClosed: boolean }>;
  fates: Fates;
};

/** What became of records that are not there: their create was held or rejected. What hangs on them shares that. */
export type Fates = Map<string, 'held' | 'rejected'>;
export const fateKey = (table: string, id: string) => `${table} ${id}`;

/** `kind` is 'person', the verdict of a create, or the table of a record. */
type Seen = { kind: string; id: string; version: number; deleted: boolean; fields: Fields };

/** Reads what the changes touch and name, the way up from readings to their sessions, the people and the fates of
 * what is not there: one statement.
 */
export async function look(tx: ShopTx, changes: readonly Change[]): Promise<Sight> {
  const wanted = new Map<SyncTable, Set<string>>(syncTableNames.map((table) => [table, new Set()]));
  const fateIds = new Set<string>();
  for (const { table, kind, rid, set } of changes) {
    if (!isSyncTable(table)) continue;
    wanted.get(table)?.add(rid);
    if (kind !== 'create') fateIds.add(rid);
    for (const named of namedBy(table, set)) {
      wanted.get(named.table)?.add(named.id);
      fateIds.add(named.id);
    }
  }
  const values: string[][] = [];
  const placeholder = (ids: Iterable<string>) => `$${values.push([...ids])}::uuid[]`;
  const parts: string[] = [];
  const selects = [
    `select 'person' as kind, id, 0 as version, closed_at is not null as deleted, null::json as fields
     from people where id = any(${placeholder(new Set(changes.map((change) => change.by)))})`,
    `(select distinct on (table_name, record_id) verdict, record_id, 0, false, json_build_object('table', table_name)
      from changes where record_id = any(${placeholder(fateIds)}) and kind = 'create'
        and verdict in ('held', 'rejected') order by table_name, record_id, received_at desc)`,
  ];
  const included = new Set<SyncTable>();
  for (const table of [...syncTableNames].reverse()) {
    const ids = wanted.get(table) ?? new Set();
    const above = sessionTables.filter(
      (child) => included.has(child) && syncTables[child].parent?.table === table,
    );
    const isChain = sessionTables.includes(table) && above.length > 0;
    if (ids.size === 0 && !isChain) continue;
    included.add(table);
    const { name, fields } = syncedSql[table];
    const sources = [
      `select unnest(${placeholder(ids)})`,
      ...(isChain
        ? above.map(
            (child) =>
              `select ${syncedSql[child].columnOf(syncTables[child].parent?.field ?? '')} from at_${child}`,
          )
        : []),
    ];
    parts.push(`at_${table} as (select * from ${name} where id in (${sources.join(' union ')}))`);
    selects.push(`select '${table}', id, version, deleted, ${fields} from at_${table}`);
  }
  const { rows } = await tx.client.query<Seen>(
    `${parts.length > 0 ? `with ${parts.join(', ')}` : ''} ${selects.join(' union all ')}`,
    values,
  );
  const sight: Sight = { records: new Records(), people: new Map(), fates: new Map() };
  for (const row of rows) takeIn(sight, row);
  await lookAtHandedIn(tx, sight.records, changes);
  return sight;
}

function takeIn(sight: Sight, { kind, id, version, deleted, fields }: Seen): void {
  if (kind === 'person') sight.people.set(id, { isClosed: deleted });
  else if (isSyncTable(kind)) sight.records.load(kind, { id, version, deleted, fields });
  else sight.fates.set(fateKey(String(fields.table), id), kind === 'held' ? 'held' : 'rejected');
}

/** A hand in is pinned to the readings that were seen: all runs and readings of its session are needed. */
async function lookAtHandedIn(tx: ShopTx, records: Records, changes: readonly Change[]): Promise<void> {
  const sessionIds = changes.filter((change) => change.kind === 'handIn').map((change) => change.rid);
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
