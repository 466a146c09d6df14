import { v7 } from 'uuid';
import { Id } from '@/shared/schema/primitives';
import type { Change } from '@/shared/sync/protocol';
import { syncTableNames } from '@/shared/sync/syncTables';
import type { ShopTx } from '../transaction';
import type { Judged } from './judgeChanges';
import type { Records } from './records';
import { syncedSql } from './syncedSql';

const largestInteger = 2_147_483_647;

/** What is written of the device that pushed, in the same statement. */
export type DeviceState = { id: string; last: number; pendingCount: number };

/** Writes a judged batch in one statement: new and changed records of each table, the log, disputes, the device. Each
 * moved record gets one number of the feed, drawn together; when several changes of the batch moved one record, the
 * last of them carries its number, because the feed brings a record once, as it stands after all of them.
 */
export async function writeJudged(
  tx: ShopTx,
  judged: readonly Judged[],
  records: Records,
  device: DeviceState | null,
  receivedAt: Date,
): Promise<void> {
  const values: unknown[] = [];
  const put = (value: unknown) => `$${values.push(value)}`;
  const rows = (list: readonly unknown[]) => put(JSON.stringify(list));
  const places = placesOf(judged);
  const parts = [
    places.count > 0
      ? `draw as materialized (select draw_feed(${put(places.count)}::integer) as base)`
      : 'draw as (select 0::bigint as base)',
  ];
  for (const table of syncTableNames) {
    const moved = records.moved(table).map(({ row: { fields, id, version, deleted }, isNew }) => ({
      isNew,
      json: { ...fields, id, version, deleted, seq: places.ofRecord(table, id) },
    }));
    const born = moved.filter((row) => row.isNew).map((row) => row.json);
    const changed = moved.filter((row) => !row.isNew).map((row) => row.json);
    if (born.length > 0) parts.push(`new_${table} as (${syncedSql[table].insert(rows(born))})`);
    if (changed.length > 0) parts.push(`old_${table} as (${syncedSql[table].update(rows(changed))})`);
  }
  const lines = judged.map((one, index) => logLine(one, places.ofChange(index)));
  if (lines.length > 0)
    parts.push(`log as (${insertLog(rows(lines), put(device?.id ?? null), put(receivedAt))})`);
  const disputes = judged.flatMap((one) => disputeLines(one, receivedAt));
  if (disputes.length > 0) parts.push(`opened as (${insertDisputes(rows(disputes), put(receivedAt))})`);
  if (device)
    parts.push(
      `device as (update devices set last_n = ${put(device.last)}, pending_count = ${put(device.pendingCount)},
         last_seen_at = ${put(receivedAt)} where id = ${put(device.id)})`,
    );
  await tx.client.query(`with ${parts.join(',\n')} select base from draw`, values);
}

/** Places in the order of the feed, counted from the number before the first one drawn. */
function placesOf(judged: readonly Judged[]) {
  const lastMover = new Map<string, number>();
  judged.forEach(({ moved }, index) => {
    if (moved) lastMover.set(`${moved.table} ${moved.id}`, index);
  });
  const inOrder = [...lastMover].sort(([, a], [, b]) => a - b);
  const ofRecord = new Map(inOrder.map(([key], place) => [key, place + 1]));
  const ofChange = new Map(inOrder.map(([, index], place) => [index, place + 1]));
  return {
    count: inOrder.length,
    ofRecord: (table: string, id: string) => ofRecord.get(`${table} ${id}`),
    ofChange: (index: number) => ofChange.get(index) ?? null,
  };
}

function logLine({ incoming, verdict, isCombined, old }: Judged, seq: number | null) {
  return {
    ...(incoming.change ? headOf(incoming.change) : headOfUnread(incoming.body)),
    id: incoming.id,
    n: incoming.n,
    body: incoming.body,
    verdict: verdict.verdict,
    why: verdict.why,
    detail: verdict.detail,
    version: verdict.version,
    seq,
    old,
    isCombined,
  };
}

const insertLog = (rows: string, deviceId: string, receivedAt: string) =>
  `insert into changes (shop_id, id, device_id, n, by_person_id, kind, table_name, record_id, schema_version, body,
     verdict, why, detail, version, seq, old, is_combined, recorded_at, received_at)
   select current_shop(), r.id, ${deviceId}::uuid, r.n, r."by", r.kind, r."table", r.rid, r.sv, r.body, r.verdict, r.why,
     r.detail, r.version, draw.base + r.seq, r.old, r."isCombined", r."at", ${receivedAt}::timestamptz
   from draw, jsonb_to_recordset(${rows}::jsonb) as r(id uuid, n integer, "by" uuid, kind text, "table" text, rid uuid,
     sv integer, body jsonb, verdict text, why text, detail text, version integer, seq bigint, old jsonb,
     "isCombined" boolean, "at" text)`;

/** What the columns of the log say about a change. */
const headOf = ({ by, kind, table, rid, sv, at }: Change) => ({
  by,
  kind,
  table,
  rid,
  sv: Math.min(sv, largestInteger),
  at,
});

/** The same of one that could not be read, as far as it goes. */
function headOfUnread(change: unknown) {
  const given: Record<string, unknown> = typeof change === 'object' && change !== null ? { ...change } : {};
  const text = (value: unknown) => (typeof value === 'string' ? storable(value.slice(0, 60)) : '');
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

const storable = (text: string) => text.replaceAll('\u0000', '').toWellFormed();

function disputeLines({ incoming, disputes }: Judged, openedAt: Date) {
  return disputes.map((dispute) => ({
    ...dispute,
    id: v7({ msecs: openedAt.getTime() }),
    changeId: incoming.id,
    table: incoming.change?.table,
    rid: incoming.change?.rid,
  }));
}

const insertDisputes = (rows: string, openedAt: string) =>
  `insert into disputes (shop_id, id, change_id, table_name, record_id, field_group, base, theirs, mine, opened_at)
   select current_shop(), r.id, r."changeId", r."table", r.rid, r."group", r.base, r.theirs, r.mine, ${openedAt}::timestamptz
   from jsonb_to_recordset(${rows}::jsonb) as r(id uuid, "changeId" uuid, "table" text, rid uuid, "group" text,
     base jsonb, theirs jsonb, mine jsonb)`;
