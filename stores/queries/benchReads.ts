import { and, asc, desc, eq, getTableColumns, lte, sql } from 'drizzle-orm';
import { z } from 'zod';
import { Catalogue, SessionSummary, SessionView } from '@/shared/schema/views';
import type { DeviceTx } from '@/db/device/deviceDb';
import { roster } from '@/db/device/schema/deviceTables';
import {
  benches,
  customers,
  heads,
  portDimensions,
  readings,
  rungs,
  runs,
  sessions,
  stages,
} from '@/db/device/schema/working';

/* What bench screens read from the device's own database, in the shapes of shared/schema/views. */

/** One session whole, or null when this device has not (yet) all that it stands on. Six statements: it is read again
 * after every SAVE. */
export async function readSession(tx: DeviceTx, id: string): Promise<SessionView | null> {
  const [top] = await tx
    .select({ session: sessions, stage: stages, head: heads, customer: customers, bench: benches })
    .from(sessions)
    .innerJoin(stages, eq(stages.id, sessions.stageId))
    .innerJoin(heads, eq(heads.id, stages.headId))
    .innerJoin(customers, eq(customers.id, heads.customerId))
    .innerJoin(benches, eq(benches.id, sessions.benchId))
    .where(and(eq(sessions.id, id), eq(sessions.deleted, false)));
  if (!top) return null;
  const dimensions = await tx
    .select({ stageOrdinal: stages.stageOrdinal, row: portDimensions })
    .from(portDimensions)
    .innerJoin(stages, eq(stages.id, portDimensions.stageId))
    .where(
      and(
        eq(stages.headId, top.head.id),
        lte(stages.stageOrdinal, top.stage.stageOrdinal),
        eq(portDimensions.deleted, false),
      ),
    )
    .orderBy(desc(stages.stageOrdinal), asc(portDimensions.id));
  const runRows = await tx
    .select()
    .from(runs)
    .where(and(eq(runs.sessionId, id), eq(runs.deleted, false)))
    .orderBy(asc(runs.runOrdinal), asc(runs.id));
  const rungRows = await tx
    .select(getTableColumns(rungs))
    .from(rungs)
    .innerJoin(runs, eq(runs.id, rungs.runId))
    .where(and(eq(runs.sessionId, id), eq(rungs.deleted, false)))
    .orderBy(asc(rungs.rungOrdinal), asc(rungs.id));
  const readingRows = await tx
    .select(getTableColumns(readings))
    .from(readings)
    .innerJoin(runs, eq(runs.id, readings.runId))
    .where(and(eq(runs.sessionId, id), eq(readings.deleted, false)))
    .orderBy(asc(readings.readingOrdinal), asc(readings.id));
  const people = await tx.select({ id: roster.personId, name: roster.name }).from(roster);
  // a stage without dimensions of its own has those of the nearest stage before it
  const nearest = dimensions[0]?.stageOrdinal;
  return SessionView.parse({
    ...top,
    portDimensions: dimensions.filter((d) => d.stageOrdinal === nearest).map((d) => d.row),
    runs: runRows.map((run) => ({
      run,
      rungs: rungRows.filter((rung) => rung.runId === run.id),
      readings: readingRows.filter((reading) => reading.runId === run.id),
    })),
    people,
  });
}

/** Every session this device holds, the one worked on last first. */
export async function readSessions(tx: DeviceTx): Promise<SessionSummary[]> {
  const ofSession = (what: ReturnType<typeof sql>, table: typeof rungs | typeof readings) =>
    sql`(select ${what} from ${table} inner join ${runs} on ${runs.id} = ${table.runId}
      where ${runs.sessionId} = ${sessions.id} and ${runs.deleted} = 0 and ${table.deleted} = 0)`;
  const rows = await tx
    .select({
      id: sessions.id,
      label: sessions.label,
      state: sessions.state,
      customerName: customers.name,
      headName: heads.name,
      stageName: stages.name,
      benchName: benches.name,
      runCount: sql<number>`(select count(*) from ${runs} where ${runs.sessionId} = ${sessions.id} and ${runs.deleted} = 0)`,
      rungCount: ofSession(sql`count(*)`, rungs),
      readingCount: ofSession(sql`count(*)`, readings),
      notSentCount: ofSession(sql`coalesce(sum(${readings.mark} <> 'sent'), 0)`, readings),
      lastReadingAt: ofSession(sql`max(${readings.at})`, readings),
      keyedBy: sql<string>`(select json_group_array(distinct ${roster.name}) from ${readings}
        inner join ${runs} on ${runs.id} = ${readings.runId}
        inner join ${roster} on ${roster.personId} = ${readings.byPersonId}
        where ${runs.sessionId} = ${sessions.id} and ${readings.deleted} = 0)`,
    })
    .from(sessions)
    .innerJoin(stages, eq(stages.id, sessions.stageId))
    .innerJoin(heads, eq(heads.id, stages.headId))
    .innerJoin(customers, eq(customers.id, heads.customerId))
    .innerJoin(benches, eq(benches.id, sessions.benchId))
    .where(eq(sessions.deleted, false))
    .orderBy(desc(sessions.id));
  const list = rows.map((row) =>
    SessionSummary.parse({ ...row, keyedBy: z.array(z.string()).parse(JSON.parse(row.keyedBy)) }),
  );
  return list.sort((a, b) => (b.lastReadingAt ?? '').localeCompare(a.lastReadingAt ?? ''));
}

/** Everything a session can be started from. */
export async function readCatalogue(tx: DeviceTx): Promise<Catalogue> {
  return Catalogue.parse({
    customers: await tx
      .select()
      .from(customers)
      .where(eq(customers.deleted, false))
      .orderBy(asc(customers.name)),
    heads: await tx.select().from(heads).where(eq(heads.deleted, false)).orderBy(asc(heads.name)),
    stages: await tx.select().from(stages).where(eq(stages.deleted, false)).orderBy(asc(stages.stageOrdinal)),
    benches: await tx.select().from(benches).where(eq(benches.deleted, false)).orderBy(asc(benches.name)),
  });
}
