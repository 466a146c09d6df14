import { getTableColumns, getTableName } from 'drizzle-orm';
import { syncTableNames, type SyncTable } from '@/shared/sync/syncTables';
import { syncedPgTables } from '../schema/synced';

/* SQL for the synced tables, written once from the schema. Hundreds of rows travel as one JSON parameter, which is
 * faster than a parameter a value, and what belongs together is one statement, because each costs a round trip. */

const common = ['shopId', 'id', 'version', 'deleted', 'seq'];

export type TableSql = {
  name: string;
  columnOf: (field: string) => string;
  /** columns under the names of the record's fields */
  columns: string;
  /** one JSON column with the record's fields */
  fields: string;
  /** `rows`: placeholder of the rows as JSON; their seq counts from `draw.base` */
  insert: (rows: string) => string;
  update: (rows: string) => string;
};

/** The record's own fields with their columns. */
export function fieldsOf(table: SyncTable): { field: string; column: string; type: string }[] {
  return Object.entries(getTableColumns(syncedPgTables[table]))
    .filter(([field]) => !common.includes(field))
    .map(([field, column]) => ({ field, column: column.name, type: column.getSQLType() }));
}

function sqlOf(table: SyncTable): TableSql {
  const name = getTableName(syncedPgTables[table]);
  const fields = fieldsOf(table);
  const list = (each: (one: (typeof fields)[number]) => string) => fields.map(each).join(', ');
  const record = `id uuid, version integer, deleted boolean, seq bigint, ${list(({ field, type }) => `"${field}" ${type}`)}`;
  return {
    name,
    columnOf: (field) => fields.find((one) => one.field === field)?.column ?? 'id',
    columns: `id, version, deleted, ${list(({ field, column }) => `${column} as "${field}"`)}`,
    fields: `json_build_object(${list(({ field, column }) => `'${field}', ${column}`)})`,
    insert: (rows) =>
      `insert into ${name} (shop_id, id, version, deleted, seq, ${list(({ column }) => column)})
       select current_shop(), r.id, r.version, r.deleted, draw.base + r.seq, ${list(({ field }) => `r."${field}"`)}
       from draw, jsonb_to_recordset(${rows}::jsonb) as r(${record})`,
    update: (rows) =>
      `update ${name} t set version = r.version, deleted = r.deleted, seq = draw.base + r.seq,
         ${list(({ field, column }) => `${column} = r."${field}"`)}
       from draw, jsonb_to_recordset(${rows}::jsonb) as r(${record}) where t.id = r.id`,
  };
}

/** SQL of each synced table. */
export const syncedSql = Object.fromEntries(syncTableNames.map((table) => [table, sqlOf(table)])) as Record<
  SyncTable,
  TableSql
>;
