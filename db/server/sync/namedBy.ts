import type { Fields } from '@/shared/sync/protocol';
import { syncTables, type SyncTable } from '@/shared/sync/syncTables';

/** Anything else would break the look-up; the schema of the record refuses it in its turn. */
const uuid = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/;

/** The records that a record with these fields names: its parent and its other references. */
export function namedBy(table: SyncTable, fields: Fields): { table: SyncTable; id: string }[] {
  const { parent, references } = syncTables[table];
  return [...(parent ? [parent] : []), ...references].flatMap((link) => {
    const id = fields[link.field];
    return typeof id === 'string' && uuid.test(id) ? [{ table: link.table, id }] : [];
  });
}
