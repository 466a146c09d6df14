import { AppError } from '@/shared/errors';
import { SessionView } from '@/shared/schema/views';
import type { Row } from '@/shared/sync/merge';
import type { SyncTable } from '@/shared/sync/syncTables';
import { people } from '@/db/server/schema/people';
import { readMarks, viewOf } from '@/db/server/sync/marks';
import { readRows } from '@/db/server/sync/readRows';
import { withShop, type ShopTx } from '@/db/server/transaction';
import type { PersonCtx } from '../ctx';

const byOrdinal = (field: string) => (a: Row, b: Row) =>
  Number(a.fields[field]) - Number(b.fields[field]) || a.id.localeCompare(b.id);

/** One session with its head, bench, runs, rungs and readings, all as they stood at one moment.
 * @throws AppError `no_such_record`
 */
export async function getSession(ctx: PersonCtx, id: string): Promise<SessionView> {
  return withShop(ctx.db, ctx.actor.shopId, async (tx) => {
    const session = await one(tx, 'sessions', id);
    const stage = await one(tx, 'stages', session.fields.stageId);
    const head = await one(tx, 'heads', stage.fields.headId);
    const customer = await one(tx, 'customers', head.fields.customerId);
    const bench = await one(tx, 'benches', session.fields.benchId);
    const portDimensions = await living(tx, 'portDimensions', 'stageId', [stage]);
    const runs = (await living(tx, 'runs', 'sessionId', [session])).sort(byOrdinal('runOrdinal'));
    const rungs = (await living(tx, 'rungs', 'runId', runs)).sort(byOrdinal('rungOrdinal'));
    const readings = (await living(tx, 'readings', 'runId', runs)).sort(byOrdinal('readingOrdinal'));
    const shown = [session, stage, head, customer, bench, ...portDimensions, ...runs, ...rungs, ...readings];
    const marks = await readMarks(tx, shown);
    const view = (row: Row) => viewOf(row, marks);
    const ofRun = (rows: Row[], run: Row) => rows.filter((row) => row.fields.runId === run.id).map(view);
    return SessionView.parse({
      session: view(session),
      customer: view(customer),
      head: view(head),
      stage: view(stage),
      bench: view(bench),
      portDimensions: portDimensions.map(view),
      runs: runs.map((run) => ({ run: view(run), rungs: ofRun(rungs, run), readings: ofRun(readings, run) })),
      people: await tx.orm.select({ id: people.id, name: people.name }).from(people).orderBy(people.name),
    });
  });
}

/** A record that must be there. What it hangs on is shown even when it was deleted since. */
async function one(tx: ShopTx, table: SyncTable, id: unknown): Promise<Row> {
  const [row] = await readRows(tx, table, 'id', [String(id)]);
  if (!row || (table === 'sessions' && row.deleted)) throw new AppError('no_such_record');
  return row;
}

async function living(tx: ShopTx, table: SyncTable, field: string, above: readonly Row[]): Promise<Row[]> {
  const rows = await readRows(
    tx,
    table,
    field,
    above.map((row) => row.id),
  );
  return rows.filter((row) => !row.deleted);
}
