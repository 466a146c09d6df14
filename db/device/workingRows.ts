import { and, asc, eq, getTableColumns, getTableName, inArray, sql, type SQL } from 'drizzle-orm';
import type { Row } from '@/shared/sync/merge';
import { schemaVersion, syncTableNames, type SyncTable } from '@/shared/sync/syncTables';
import type { DeviceDb, DeviceTx } from './deviceDb';
import { getFact, setFact } from './meta';
import { overlay, type QueuedChange } from './overlay';
import { copies, outbox } from './schema/deviceTables';
import { workingTables } from './schema/working';

const chunkSize = 500;

/** Rebuilds the working rows of some records of one table: the server's copy with the device's own changes over it.
 * Belongs into the transaction that changed either. */
export async function rebuildRows(tx: DeviceTx, table: SyncTable, ids: readonly string[]): Promise<void> {
  const unique = [...new Set(ids)];
  for (let from = 0; from < unique.length; from += chunkSize)
    await rebuildChunk(tx, table, unique.slice(from, from + chunkSize));
}

/** Rebuilds the working rows of records named by table. Tables this version does not know keep their copies only. */
export async function rebuildRecords(
  tx: DeviceTx,
  records: readonly { tableName: string; id: string }[],
): Promise<void> {
  for (const table of syncTableNames) {
    const ids = records.filter((record) => record.tableName === table).map((record) => record.id);
    if (ids.length > 0) await rebuildRows(tx, table, ids);
  }
}

/** Rebuilds every working row when this build reads records differently than the one that built them. */
export async function bringRowsUpToDate(db: DeviceDb): Promise<void> {
  if ((await getFact(db.read, 'sv')) === schemaVersion) return;
  await db.tx(async (tx) => {
    const known = await tx.select({ tableName: copies.tableName, id: copies.id }).from(copies);
    await rebuildRecords(tx, [...known, ...(await recordsInOutbox(tx))]);
    await setFact(tx, 'sv', schemaVersion);
  });
}

/** Every record that the device has changed and still keeps a change of. */
export function recordsInOutbox(tx: DeviceTx): Promise<{ tableName: string; id: string }[]> {
  return tx.selectDistinct({ tableName: outbox.tableName, id: outbox.recordId }).from(outbox);
}

async function rebuildChunk(tx: DeviceTx, table: SyncTable, ids: string[]): Promise<void> {
  // one parameter however many ids: the statement stays the same and stays prepared
  const wanted = sql`(select value from json_each(${JSON.stringify(ids)}))`;
  const copyRows = await tx
    .select({ id: copies.id, version: copies.version, deleted: copies.deleted, fields: copies.fields })
    .from(copies)
    .where(and(eq(copies.tableName, table), inArray(copies.id, wanted)));
  const queuedRows = await tx
    .select({
      recordId: outbox.recordId,
      change: outbox.change,
      verdict: outbox.verdict,
      appliedVersion: outbox.appliedVersion,
    })
    .from(outbox)
    .where(and(eq(outbox.tableName, table), inArray(outbox.recordId, wanted)))
    .orderBy(asc(outbox.n));
  const copyOf = new Map<string, Row>(copyRows.map((copy) => [copy.id, copy]));
  const queuedOf = new Map<string, QueuedChange[]>();
  for (const queued of queuedRows) {
    const list = queuedOf.get(queued.recordId);
    if (list) list.push(queued);
    else queuedOf.set(queued.recordId, [queued]);
  }

  const rows: Record<string, unknown>[] = [];
  const gone: string[] = [];
  for (const id of ids) {
    const seen = overlay(copyOf.get(id) ?? null, queuedOf.get(id) ?? []);
    if (seen === null) gone.push(id);
    else if (isComplete(table, seen.row))
      rows.push({
        ...seen.row.fields,
        id,
        version: seen.row.version,
        deleted: seen.row.deleted,
        mark: seen.mark,
      });
  }
  if (rows.length > 0) await tx.run(upsertOf(table, JSON.stringify(rows)));
  if (gone.length > 0) {
    const working = workingTables[table];
    await tx
      .delete(working)
      .where(inArray(working.id, sql`(select value from json_each(${JSON.stringify(gone)}))`));
  }
}

/** A record that lacks what this version needs cannot be shown, but must not stop the others: its copy is kept. */
function isComplete(table: SyncTable, row: Row): boolean {
  const own = new Set(['id', 'version', 'deleted', 'mark']);
  return Object.entries(getTableColumns(workingTables[table])).every(
    ([field, column]) => own.has(field) || !column.notNull || (row.fields[field] ?? null) !== null,
  );
}

/** All rows in one statement with one parameter: fields this version does not know fall away here. */
function upsertOf(table: SyncTable, rowsJson: string): SQL {
  const columns = Object.entries(getTableColumns(workingTables[table]));
  const names = columns.map(([, column]) => sql.identifier(column.name));
  const values = columns.map(([field]) => sql.raw(`json_extract(value, '$.${field}')`));
  return sql`insert or replace into ${sql.identifier(getTableName(workingTables[table]))} (${sql.join(
    names,
    sql`, `,
  )}) select ${sql.join(values, sql`, `)} from json_each(${rowsJson})`;
}
