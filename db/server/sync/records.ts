import type { Row } from '@/shared/sync/merge';
import type { Fields } from '@/shared/sync/protocol';
import { syncTableNames, syncTables, type SyncTable } from '@/shared/sync/syncTables';

type Entry = { stored: Row | null; now: Row };

/** The records a batch touches, as they stand after each change of it. */
export class Records {
  private readonly tables = new Map<SyncTable, Map<string, Entry>>(
    syncTableNames.map((table) => [table, new Map()]),
  );

  private of(table: SyncTable): Map<string, Entry> {
    return this.tables.get(table) ?? new Map();
  }

  /** Takes in a record as the database holds it. */
  load(table: SyncTable, row: Row): void {
    if (!this.has(table, row.id)) this.of(table).set(row.id, { stored: row, now: row });
  }

  has(table: SyncTable, id: string): boolean {
    return this.of(table).has(id);
  }

  get(table: SyncTable, id: unknown): Row | null {
    return typeof id === 'string' ? (this.of(table).get(id)?.now ?? null) : null;
  }

  set(table: SyncTable, row: Row): void {
    this.of(table).set(row.id, { stored: this.of(table).get(row.id)?.stored ?? null, now: row });
  }

  /** Records of a table that are new or differ from what is stored. */
  moved(table: SyncTable): { row: Row; isNew: boolean }[] {
    return [...this.of(table).values()]
      .filter(({ stored, now }) => stored !== now)
      .map(({ stored, now }) => ({ row: now, isNew: stored === null }));
  }

  /** Living records of a table with that value in a field. */
  living(table: SyncTable, field: string, value: string): Row[] {
    return [...this.of(table).values()]
      .map(({ now }) => now)
      .filter((row) => !row.deleted && row.fields[field] === value);
  }

  /** The session that a record with these fields belongs to; null outside sessions, or while it has none. */
  sessionOf(table: SyncTable, id: string, fields: Fields): Row | null {
    if (table === 'sessions') return this.get('sessions', id);
    const { parent } = syncTables[table];
    if (!parent) return null;
    const above = this.get(parent.table, fields[parent.field]);
    return above ? this.sessionOf(parent.table, above.id, above.fields) : null;
  }
}
