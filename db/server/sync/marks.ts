import type { Row } from '@/shared/sync/merge';
import type { Fields } from '@/shared/sync/protocol';
import type { Mark } from '@/shared/schema/views';
import type { ShopTx } from '../transaction';

/** Where the newest word about a record stands: in dispute, held, or simply sent. */
export type Marks = (id: string) => Mark;

/** Marks for records at the desk: an open dispute stands before a held change. */
export async function readMarks(tx: ShopTx, rows: readonly Row[]): Promise<Marks> {
  const found = await tx.client.query<{ id: string; isDisputed: boolean }>(
    `select record_id as id, true as "isDisputed" from disputes where record_id = any($1::uuid[]) and settled_at is null
     union select record_id, false from changes where record_id = any($1::uuid[]) and verdict = 'held'`,
    [rows.map((row) => row.id)],
  );
  const disputed = new Set(found.rows.filter((row) => row.isDisputed).map((row) => row.id));
  const held = new Set(found.rows.filter((row) => !row.isDisputed).map((row) => row.id));
  return (id) => (disputed.has(id) ? 'dispute' : held.has(id) ? 'held' : 'sent');
}

/** A record as a screen gets it, with its mark. */
export function viewOf({ id, version, fields }: Row, marks: Marks): Fields {
  return { ...fields, id, version, mark: marks(id) };
}
