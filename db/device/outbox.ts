import { and, asc, eq, gt, inArray, isNotNull, isNull, lt, max, min, sql } from 'drizzle-orm';
import { maxBatch, maxBatchBytes, type Change, type VerdictOf } from '@/shared/sync/protocol';
import type { DeviceTx } from './deviceDb';
import { getFact, setFact } from './meta';
import { copies, outbox } from './schema/deviceTables';
import { rebuildRecords } from './workingRows';

/* outbox: the ordered queue of this device's changes.
 *
 * A change enters with the working rows it changed, in one transaction. It is waiting until the server has answered;
 * the answer stays with it. Applied ones are kept 35 days, longer than any backup one would restore; all others for
 * ever. `n` is its place: waiting changes stand in an unbroken row at the end; places at and below 0 are those of an
 * earlier enrolment. The column `n` counts, not the number inside the stored change.
 */

const retentionMs = 35 * 24 * 60 * 60 * 1000;
const named = (ids: readonly string[]) => sql`(select value from json_each(${JSON.stringify(ids)}))`;

/** Puts changes at the end of the queue. Only `record` calls it, in the transaction that rebuilds the rows. */
export async function appendToOutbox(tx: DeviceTx, changes: readonly Change[]): Promise<void> {
  const rows = changes.map((change) => ({
    id: change.id,
    n: change.n,
    tableName: change.table,
    recordId: change.rid,
    change,
    recordedAt: change.at,
  }));
  for (let from = 0; from < rows.length; from += 200)
    await tx.insert(outbox).values(rows.slice(from, from + 200));
}

/** The next changes to send, in order: at most `limit` and 256 KiB, but always one when there is one. */
export async function nextBatch(tx: DeviceTx, limit: number): Promise<Change[]> {
  const rows = await tx
    .select({ n: outbox.n, change: outbox.change })
    .from(outbox)
    .where(isNull(outbox.verdict))
    .orderBy(asc(outbox.n))
    .limit(Math.min(limit, maxBatch));
  const batch: Change[] = [];
  let bytes = 0;
  for (const row of rows) {
    const change = { ...row.change, n: row.n };
    bytes += new TextEncoder().encode(JSON.stringify(change)).length + 1;
    if (batch.length > 0 && bytes > maxBatchBytes) break;
    batch.push(change);
  }
  return batch;
}

/** How many changes wait, how many readings they are about, and since when the oldest waits. */
export async function waitingOf(
  tx: DeviceTx,
): Promise<{ count: number; readingCount: number; oldestAt: string | null }> {
  const [row] = await tx
    .select({
      count: sql<number>`count(*)`,
      readingCount: sql<number>`count(distinct case when ${outbox.tableName} = 'readings' then ${outbox.recordId} end)`,
      oldestAt: min(outbox.recordedAt),
    })
    .from(outbox)
    .where(isNull(outbox.verdict));
  return { count: row?.count ?? 0, readingCount: row?.readingCount ?? 0, oldestAt: row?.oldestAt ?? null };
}

/** Notes that changes were sent without an answer to them. */
export async function noteTry(
  tx: DeviceTx,
  ids: readonly string[],
  atIso: string,
  answer: string,
): Promise<void> {
  await tx
    .update(outbox)
    .set({ tryCount: sql`${outbox.tryCount} + 1`, lastTryAt: atIso, lastAnswer: answer })
    .where(and(inArray(outbox.id, named(ids)), isNull(outbox.verdict)));
}

/** Stores the server's verdicts and redraws what they touch.
 * @returns how many waiting changes were answered */
export async function storeVerdicts(
  tx: DeviceTx,
  verdicts: readonly VerdictOf[],
  atIso: string,
): Promise<number> {
  const waiting = await tx
    .select({ id: outbox.id, tableName: outbox.tableName, recordId: outbox.recordId })
    .from(outbox)
    .where(and(inArray(outbox.id, named(verdicts.map((v) => v.id))), isNull(outbox.verdict)));
  // one statement for all of them; a verdict is final, so an answered change is never answered again. The plus keeps
  // SQLite from walking everything that waits for each of them instead of going by the id.
  await tx.run(sql`
    update outbox set
      verdict = json_extract(v.value, '$.verdict'),
      why = json_extract(v.value, '$.why'),
      detail = json_extract(v.value, '$.detail'),
      applied_version = json_extract(v.value, '$.version'),
      answered_at = ${atIso}, last_try_at = ${atIso}, last_answer = null, try_count = try_count + 1
    from json_each(${JSON.stringify(verdicts)}) as v
    where outbox.id = json_extract(v.value, '$.id') and +outbox.verdict is null`);
  await rebuildRecords(
    tx,
    waiting.map((row) => ({ tableName: row.tableName, id: row.recordId })),
  );
  return waiting.length;
}

/** Gives the waiting changes the places from `first` on, in their order. Everything else moves below 1 first. */
export async function renumberWaiting(tx: DeviceTx, first: number): Promise<void> {
  const [range] = await tx.select({ low: min(outbox.n), high: max(outbox.n) }).from(outbox);
  if (range?.low == null || range.high === null) return setFact(tx, 'nextN', first);
  // further than the whole range, so that no place is taken twice while the rows move one by one
  const shift = range.high - Math.min(range.low, 0) + 1;
  await tx.update(outbox).set({ n: sql`${outbox.n} - ${shift}` });
  await tx.run(sql`
    update outbox set n = ${first - 1} + ordered.place
    from (select id, row_number() over (order by n) as place from outbox where verdict is null) as ordered
    where outbox.id = ordered.id`);
  await setFact(tx, 'nextN', first + (await waitingOf(tx)).count);
}

/** The server holds this device's changes up to `last` only: everything after it waits again, in an unbroken row. When
 * places are missing there, nobody can tell what the server lost, and everything retained is sent again. */
export async function resendAfter(tx: DeviceTx, last: number): Promise<void> {
  await waitAgain(tx, gt(outbox.n, last));
  const [waiting] = await tx
    .select({ low: min(outbox.n) })
    .from(outbox)
    .where(isNull(outbox.verdict));
  if (waiting?.low == null || waiting.low === last + 1) return;
  if (!(await getFact(tx, 'isReplaying'))) {
    await waitAgain(tx, isNotNull(outbox.verdict));
    await setFact(tx, 'isReplaying', true);
  }
  await renumberWaiting(tx, last + 1);
}

/** Everything that is retained waits again (the server was set back); answers are recognised by the change's id. */
export async function resendAll(tx: DeviceTx): Promise<void> {
  await waitAgain(tx, isNotNull(outbox.verdict));
  const [waiting] = await tx.select({ low: min(outbox.n) }).from(outbox);
  if (waiting?.low != null && waiting.low < 1) await renumberWaiting(tx, 1);
}

async function waitAgain(tx: DeviceTx, which: ReturnType<typeof gt>): Promise<void> {
  const rows = await tx
    .select({ tableName: outbox.tableName, id: outbox.recordId })
    .from(outbox)
    .where(and(which, isNotNull(outbox.verdict)));
  await tx
    .update(outbox)
    .set({ verdict: null, why: null, detail: null, appliedVersion: null, answeredAt: null })
    .where(and(which, isNotNull(outbox.verdict)));
  await rebuildRecords(tx, rows);
}

/** Deletes applied changes older than the retention whose record the feed has brought. The only function in the
 * product that may delete from the outbox. */
export async function pruneOutbox(tx: DeviceTx, nowMs: number): Promise<void> {
  if (await getFact(tx, 'isReplaying')) return;
  const before = new Date(nowMs - retentionMs).toISOString();
  await tx.delete(outbox).where(
    and(
      eq(outbox.verdict, 'applied'),
      lt(outbox.answeredAt, before),
      sql`exists (select 1 from ${copies} where ${copies.tableName} = ${outbox.tableName}
        and ${copies.id} = ${outbox.recordId} and ${copies.version} >= coalesce(${outbox.appliedVersion}, 0))`,
    ),
  );
  await setFact(tx, 'lastPrunedAt', new Date(nowMs).toISOString());
}

/** One change alone that the server will not even read for its size: set aside here, and what stands behind it moves up.
 */
export async function setAsideUnsendable(tx: DeviceTx, id: string, atIso: string): Promise<void> {
  const [row] = await tx.select().from(outbox).where(eq(outbox.id, id));
  if (!row) return;
  await storeVerdicts(
    tx,
    [{ id, verdict: 'rejected', why: 'invalid', detail: 'too large to be sent' }],
    atIso,
  );
  await renumberWaiting(tx, row.n);
}
