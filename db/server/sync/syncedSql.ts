import { getTableColumns, getTableName } from 'drizzle-orm';
import { syncTableNames, type SyncTable } from '@/shared/sync/syncTables';
import { syncedPgTables } from '../schema/synced';

/* SQL for the synced tables, written once from the schema: hundreds of rows travel as one JSON parameter, which is
 * faster than a parameter a value. */

const common = ['shopId', 'id', 'version', 'deleted', 'seq'];

type TableSql = {
  /** Rows whose field is one of $1, with their columns under the names of the record's fields. */
  readBy: (field: string) => string;
  /** Living rows. */
  readAll: string;
  /** $1: rows as JSON */
  insert: string;
  update: string;
  /** $1: after, $2: limit. Columns table, id, version, deleted, seq, fields. */
  feed: string;
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
  const record = [
    'id uuid, version integer, deleted boolean, seq bigint',
    ...fields.map(({ field, type }) => `"${field}" ${type}`),
  ].join(', ');
  const columns = fields.map(({ column }) => column).join(', ');
  const values = fields.map(({ field }) => `r."${field}"`).join(', ');
  const assignments = fields.map(({ field, column }) => `${column} = r."${field}"`).join(', ');
  const pairs = fields.map(({ field, column }) => `'${field}', ${column}`).join(', ');
  const named = [
    'id, version, deleted',
    ...fields.map(({ field, column }) => `${column} as "${field}"`),
  ].join(', ');
  const columnOf = (field: string) => fields.find((one) => one.field === field)?.column ?? 'id';
  return {
    readBy: (field) => `select ${named} from ${name} where ${columnOf(field)} = any($1::uuid[])`,
    readAll: `select ${named} from ${name} where not deleted order by id`,
    insert: `insert into ${name} (shop_id, id, version, deleted, seq, ${columns})
             select current_shop(), r.id, r.version, r.deleted, r.seq, ${values}
             from jsonb_to_recordset($1::jsonb) as r(${record})`,
    update: `update ${name} t set version = r.version, deleted = r.deleted, seq = r.seq, ${assignments}
             from jsonb_to_recordset($1::jsonb) as r(${record}) where t.id = r.id`,
    feed: `(select '${table}' as "table", id, version, deleted, seq, json_build_object(${pairs}) as fields
            from ${name} where seq > $1::bigint order by seq limit $2::int)`,
  };
}

/** Statements of each synced table. */
export const syncedSql = Object.fromEntries(syncTableNames.map((table) => [table, sqlOf(table)])) as Record<
  SyncTable,
  TableSql
>;

/** A page of the feed over all synced tables. $1: after, $2: limit. */
export const feedSql = `select "table", id, version, deleted, seq::float8 as seq, fields
  from (${syncTableNames.map((table) => syncedSql[table].feed).join(' union all ')}) as feed
  order by seq limit $2::int`;
