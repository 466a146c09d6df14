import { v7 } from 'uuid';
import { Id } from '@/shared/schema/primitives';
import { syncTableNames } from '@/shared/sync/syncTables';
import type { ShopTx } from '../transaction';
import type { Judged } from './judgeChanges';
import type { Records } from './records';
import { syncedSql } from './syncedSql';

const largestInteger = 2_147_483_647;

/** Writes a judged batch: one statement a table for new records, one for changed ones, one for the log, one for
 * disputes. Each moved record gets one number of the feed, in the order of the changes that moved them last.
 */
export async function writeJudged(
  tx: ShopTx,
  judged: readonly Judged[],
  records: Records,
  deviceId: string | null,
  receivedAt: Date,
): Promise<void> {
  const seqs = await drawNumbers(tx, judged);
  for (const table of syncTableNames) {
    const rows = records.moved(table).map(({ row, isNew }) => ({
      isNew,
      json: {
        ...row.fields,
        id: row.id,
        version: row.version,
        deleted: row.deleted,
        seq: seqs.ofRecord(table, row.id),
      },
    }));
    const born = rows.filter((row) => row.isNew).map((row) => row.json);
    const changed = rows.filter((row) => !row.isNew).map((row) => row.json);
    if (born.length > 0) await tx.client.query(syncedSql[table].insert, [JSON.stringify(born)]);
    if (changed.length > 0) await tx.client.query(syncedSql[table].update, [JSON.stringify(changed)]);
  }
  await writeLog(tx, judged, deviceId, receivedAt, seqs.ofChange);
  await writeDisputes(tx, judged, receivedAt);
}

/** Numbers for the moved records. When several changes of the batch moved one record, the last of them carries its
 * number: the feed brings a record once, as it stands after all of them.
 */
async function drawNumbers(tx: ShopTx, judged: readonly Judged[]) {
  const lastMover = new Map<string, number>();
  judged.forEach((one, index) => {
    if (one.moved) lastMover.set(`${one.moved.table} ${one.moved.id}`, index);
  });
  const inOrder = [...lastMover].sort(([, a], [, b]) => a - b);
  const first = inOrder.length > 0 ? await drawFeed(tx, inOrder.length) : 0;
  const ofRecord = new Map(inOrder.map(([key], place) => [key, first + place + 1]));
  const ofChange = new Map(inOrder.map(([, index], place) => [index, first + place + 1]));
  return {
    ofRecord: (table: string, id: string) => ofRecord.get(`${table} ${id}`),
    ofChange: (index: number) => ofChange.get(index) ?? null,
  };
}

async function drawFeed(tx: ShopTx, count: number): Promise<number> {
  const { rows } = await tx.client.query<{ last: string }>('select draw_feed($1) as last', [count]);
  return Number(rows[0]?.last);
}

async function writeLog(
  tx: ShopTx,
  judged: readonly Judged[],
  deviceId: string | null,
  receivedAt: Date,
  seqOf: (index: number) => number | null,
): Promise<void> {
  const lines = judged.map(({ incoming, verdict, isCombined, old }, index) => ({
    ...headOf(incoming.change ?? incoming.body),
    id: incoming.id,
    n: incoming.n,
    body: incoming.body,
    verdict: verdict.verdict,
    why: verdict.why ?? null,
    detail: verdict.detail ?? null,
    version: verdict.version ?? null,
    seq: seqOf(index),
    old,
    isCombined,
  }));
  await tx.client.query(
    `insert into changes (shop_id, id, device_id, n, by_person_id, kind, table_name, record_id, schema_version, body,
       verdict, why, detail, version, seq, old, is_combined, recorded_at, received_at)
     select current_shop(), r.id, $2, r.n, r."by", r.kind, r."table", r.rid, r.sv, r.body, r.verdict, r.why, r.detail,
       r.version, r.seq, r.old, r."isCombined", r."at", $3
     from jsonb_to_recordset($1::jsonb) as r(id uuid, n integer, "by" uuid, kind text, "table" text, rid uuid,
       sv integer, body jsonb, verdict text, why text, detail text, version integer, seq bigint, old jsonb,
       "isCombined" boolean, "at" text)`,
    [JSON.stringify(lines), deviceId, receivedAt],
  );
}

/** What the columns of the log say about a change, as far as it can be read. */
function headOf(change: unknown) {
  const given: Record<string, unknown> = typeof change === 'object' && change !== null ? { ...change } : {};
  const text = (value: unknown) => (typeof value === 'string' ? value.slice(0, 60).toWellFormed() : '');
  const id = (value: unknown) => (Id.safeParse(value).success ? value : null);
  const sv = Number.isInteger(given.sv) ? Math.min(Math.max(Number(given.sv), 0), largestInteger) : 0;
  return {
    by: id(given.by),
    kind: text(given.kind),
    table: text(given.table),
    rid: id(given.rid),
    sv,
    at: text(given.at),
  };
}

async function writeDisputes(tx: ShopTx, judged: readonly Judged[], openedAt: Date): Promise<void> {
  const opened = judged.flatMap(({ incoming, disputes }) =>
    disputes.map((dispute) => ({
      ...dispute,
      id: v7({ msecs: openedAt.getTime() }),
      changeId: incoming.id,
      table: incoming.change?.table,
      rid: incoming.change?.rid,
    })),
  );
  if (opened.length === 0) return;
  await tx.client.query(
    `insert into disputes (shop_id, id, change_id, table_name, record_id, field_group, base, theirs, mine, opened_at)
     select current_shop(), r.id, r."changeId", r."table", r.rid, r."group", r.base, r.theirs, r.mine, $2
     from jsonb_to_recordset($1::jsonb) as r(id uuid, "changeId" uuid, "table" text, rid uuid, "group" text,
       base jsonb, theirs jsonb, mine jsonb)`,
    [JSON.stringify(opened), openedAt],
  );
}
