import { Id } from '@/shared/schema/primitives';
import type { Fields } from '@/shared/sync/protocol';
import { syncTables, type SyncTable } from '@/shared/sync/syncTables';

/** The records that a record with these fields names: its parent and its other references. */
export function namedBy(table: SyncTable, fields: Fields): { table: SyncTable; id: string }[] {
  const { parent, references } = syncTables[table];
  return [...(parent ? [parent] : []), ...references].flatMap((link) => {
    const id = fields[link.field];
    return typeof id === 'string' && Id.safeParse(id).success ? [{ table: link.table, id }] : [];
  });
}
