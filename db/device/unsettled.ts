import { and, asc, inArray, isNotNull, isNull, ne, sql } from 'drizzle-orm';
import { syncTables, isSyncTable } from '@/shared/sync/syncTables';
import type { DeviceTx } from './deviceDb';
import { unsettled } from './overlay';
import { outbox } from './schema/deviceTables';

export type OutboxRow = typeof outbox.$inferSelect;

/** A change that the shop did not simply take, with how many others share its fate because they belong to it. */
export type Refusal = { row: OutboxRow; followerCount: number };

/** Everything that is in dispute, held or set aside and that no later change has made good, oldest first. What hangs
 * on a held or refused record is counted with it: it is one entry for a person. */
export async function readRefusals(tx: DeviceTx): Promise<Refusal[]> {
  const refused = and(isNotNull(outbox.verdict), ne(outbox.verdict, 'applied'));
  const rows = await tx
    .select()
    .from(outbox)
    .where(inArray(outbox.recordId, sql`(select record_id from outbox where ${refused})`))
    .orderBy(asc(outbox.n));
  const byRecord = new Map<string, OutboxRow[]>();
  for (const row of rows) byRecord.set(row.recordId, [...(byRecord.get(row.recordId) ?? []), row]);
  const open = [...byRecord.values()].flatMap((list) => {
    const left = new Set(unsettled(list));
    return list.filter((row) => left.has(row));
  });
  const createOf = new Map(
    open.filter((row) => row.change.kind === 'create').map((row) => [row.recordId, row]),
  );
  const followers = new Map<string, number>();
  const heads: OutboxRow[] = [];
  for (const row of open) {
    const top = topOf(row, createOf);
    if (top.id === row.id) heads.push(row);
    else followers.set(top.id, (followers.get(top.id) ?? 0) + 1);
  }
  return heads.sort((a, b) => a.n - b.n).map((row) => ({ row, followerCount: followers.get(row.id) ?? 0 }));
}

/** The change whose refusal this one shares; itself when it has a reason of its own. */
function topOf(row: OutboxRow, createOf: ReadonlyMap<string, OutboxRow>): OutboxRow {
  let top = row;
  for (
    let level = 0;
    level < 10 && (top.why === 'parent_held' || top.why === 'parent_rejected');
    level += 1
  ) {
    const parent = createOf.get(parentIdOf(top));
    if (!parent || parent.id === top.id) break;
    top = parent;
  }
  return top;
}

function parentIdOf(row: OutboxRow): string {
  const field = isSyncTable(row.tableName) ? syncTables[row.tableName].parent?.field : undefined;
  return row.change.kind === 'create' && field ? String(row.change.set[field]) : row.recordId;
}

/** Waiting changes, oldest first. */
export function readWaiting(tx: DeviceTx, limit: number): Promise<OutboxRow[]> {
  return tx.select().from(outbox).where(isNull(outbox.verdict)).orderBy(asc(outbox.n)).limit(limit);
}
