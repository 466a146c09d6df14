import type { Row } from '@/shared/sync/merge';
import type { Fields } from '@/shared/sync/protocol';
import type { SyncTable } from '@/shared/sync/syncTables';
import type { ShopTx } from '../transaction';
import { syncedSql } from './syncedSql';

/** Records whose `field` is one of the ids, deleted ones too. */
export async function readRows(
  tx: ShopTx,
  table: SyncTable,
  field: string,
  ids: readonly string[],
): Promise<Row[]> {
  if (ids.length === 0) return [];
  const { name, columns, columnOf } = syncedSql[table];
  const { rows } = await tx.client.query<StoredRow>(
    `select ${columns} from ${name} where ${columnOf(field)} = any($1::uuid[])`,
    [ids],
  );
  return rows.map(toRow);
}

/** Living records of a whole table, in the order they were born. */
export async function readAll(tx: ShopTx, table: SyncTable): Promise<Row[]> {
  const { name, columns } = syncedSql[table];
  const { rows } = await tx.client.query<StoredRow>(
    `select ${columns} from ${name} where not deleted order by id`,
  );
  return rows.map(toRow);
}

type StoredRow = { id: string; version: number; deleted: boolean } & Fields;
const toRow = ({ id, version, deleted, ...fields }: StoredRow): Row => ({ id, version, deleted, fields });
