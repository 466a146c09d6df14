import type { Fields, FeedItem } from '@/shared/sync/protocol';
import { isSyncTable, type SyncTable } from '@/shared/sync/syncTables';
import { epochSql } from '../epoch';
import type { ShopTx } from '../transaction';
import { syncedSql } from './syncedSql';

/** Where a device stands in the feed, and where the feed ends. */
export type Place = { epoch: string; newest: number; seen: string };

/** The epoch, the newest number of the feed, and the id of the change at `after` (empty at the beginning). */
export async function readPlace(tx: ShopTx, after: number): Promise<Place | null> {
  const { rows } = await tx.client.query<{ epoch: string; newest: string; seen: string }>(
    `select ${epochSql} as epoch, seq as newest,
       coalesce((select id::text from changes where seq <= $1 order by seq desc limit 1), '') as seen from feeds`,
    [after],
  );
  const [place] = rows;
  return place ? { ...place, newest: Number(place.newest) } : null;
}

export type Page = { items: FeedItem[]; cursor: number; seen: string; more: boolean };

/** A page of the feed. Every number of the feed is a line of the log, so the log says up to where the page reaches and
 * which tables have anything in it; a record that moved again later stands further on, and its old number has nothing.
 */
export async function readPage(tx: ShopTx, place: Place, after: number, limit: number): Promise<Page> {
  const { rows: lines } = await tx.client.query<{ id: string; seq: string; table: string }>(
    'select id, seq, table_name as "table" from changes where seq > $1 order by seq limit $2',
    [after, limit],
  );
  const last = lines.at(-1);
  if (!last) return { items: [], cursor: after, seen: place.seen, more: false };
  const cursor = Number(last.seq);
  const items: FeedItem[] = [];
  for (const table of new Set(lines.map((line) => line.table)))
    if (isSyncTable(table)) items.push(...(await readItems(tx, table, after, cursor)));
  items.sort((a, b) => a.seq - b.seq);
  return { items, cursor, seen: last.id, more: cursor < place.newest };
}

type FeedRow = { id: string; version: number; deleted: boolean; seq: string } & Fields;

async function readItems(tx: ShopTx, table: SyncTable, after: number, upTo: number): Promise<FeedItem[]> {
  const { name, columns } = syncedSql[table];
  const { rows } = await tx.client.query<FeedRow>({
    name: `feed of ${name}`,
    text: `select seq, ${columns} from ${name} where seq > $1 and seq <= $2`,
    values: [after, upTo],
  });
  return rows.map(({ id, version, deleted, seq, ...fields }) => ({
    table,
    id,
    version,
    deleted,
    seq: Number(seq),
    fields,
  }));
}
