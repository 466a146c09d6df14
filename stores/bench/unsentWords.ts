import { eq, inArray, sql } from 'drizzle-orm';
import { z } from 'zod';
import type { Verdict } from '@/shared/sync/protocol';
import { whySentence } from '@/shared/sync/whySentence';
import type { DeviceTx } from '@/db/device/deviceDb';
import { readings, rungs, runs, sessions } from '@/db/device/schema/working';
import { readRefusals, readWaiting, type OutboxRow } from '@/db/device/unsettled';

/** One line of the list of what the shop has not taken. */
export type UnsentItem = {
  id: string;
  /** in plain words: "Reading 0.300 in · 166 cfm · 27.0 inH2O, session 3-001" */
  what: string;
  /** when it was recorded, by the device's clock */
  when: string;
  tryCount: number;
  lastTryAt: string | null;
  /** what the server, or the silence, said last */
  lastAnswer: string | null;
  /** null while it waits to be sent */
  verdict: Exclude<Verdict, 'applied'> | null;
  whySentence: string | null;
  detail: string | null;
};

/** Longest list of waiting changes shown; the count is told apart from it. */
const longestList = 500;

/** What waits, oldest first, then what is in dispute, held or set aside. */
export async function readUnsent(tx: DeviceTx): Promise<UnsentItem[]> {
  const waiting = (await readWaiting(tx, longestList)).map((row) => ({ row, followerCount: 0 }));
  const all = [...waiting, ...(await readRefusals(tx))];
  const placeOf = await readPlaces(
    tx,
    all.map(({ row }) => row.recordId),
  );
  return all.map(({ row, followerCount }) => ({
    id: row.id,
    what:
      whatOf(row, placeOf.get(row.recordId)) +
      (followerCount > 0 ? `, and ${followerCount} that belong to it` : ''),
    when: row.recordedAt,
    tryCount: row.tryCount,
    lastTryAt: row.lastTryAt,
    lastAnswer: row.lastAnswer,
    verdict: row.verdict === 'applied' ? null : row.verdict,
    whySentence: row.why === null ? null : whySentence(row.why),
    detail: row.detail,
  }));
}

/** Where a record stands: the session's number and, for lifts and readings, the lift. */
type Place = { label: string | null; lift: string | null };

async function readPlaces(tx: DeviceTx, ids: string[]): Promise<Map<string, Place>> {
  const wanted = sql`(select value from json_each(${JSON.stringify(ids)}))`;
  const lift = (table: typeof readings | typeof rungs) =>
    sql<string>`${table.liftText} || ' ' || ${table.liftUnit}`;
  const found = [
    await tx
      .select({ id: sessions.id, label: sessions.label, lift: sql<null>`null` })
      .from(sessions)
      .where(inArray(sessions.id, wanted)),
    await tx
      .select({ id: runs.id, label: sessions.label, lift: sql<null>`null` })
      .from(runs)
      .leftJoin(sessions, eq(sessions.id, runs.sessionId))
      .where(inArray(runs.id, wanted)),
    await tx
      .select({ id: rungs.id, label: sessions.label, lift: lift(rungs) })
      .from(rungs)
      .leftJoin(runs, eq(runs.id, rungs.runId))
      .leftJoin(sessions, eq(sessions.id, runs.sessionId))
      .where(inArray(rungs.id, wanted)),
    await tx
      .select({ id: readings.id, label: sessions.label, lift: lift(readings) })
      .from(readings)
      .leftJoin(runs, eq(runs.id, readings.runId))
      .leftJoin(sessions, eq(sessions.id, runs.sessionId))
      .where(inArray(readings.id, wanted)),
  ].flat();
  return new Map(found.map(({ id, ...place }) => [id, place]));
}

/** The fields that the sentences name; whatever else a change carries does not matter here. */
const Named = z.object({
  name: z.string().catch(''),
  label: z.string().catch(''),
  side: z.string().catch(''),
  port: z.string().nullable().catch(null),
  liftText: z.string().catch(''),
  liftUnit: z.string().catch(''),
  flowText: z.string().catch(''),
  flowUnit: z.string().catch(''),
  pressureText: z.string().catch(''),
  pressureUnit: z.string().catch(''),
  isSkipped: z.boolean().catch(false),
});

function whatOf(row: OutboxRow, place: Place | undefined): string {
  const { kind, table } = row.change;
  const named = Named.parse({ ...row.change.base, ...row.change.set });
  const inSession = place?.label ? `, session ${place.label}` : '';
  const lift = place?.lift ?? (named.liftText ? `${named.liftText} ${named.liftUnit}` : '');
  const reading =
    `${lift} · ${named.flowText} ${named.flowUnit} · ${named.pressureText} ${named.pressureUnit}` + inSession;
  if (table === 'readings' && kind === 'create') return `Reading ${reading}`;
  if (table === 'readings' && kind === 'delete') return `Reading taken back: ${reading}`;
  if (table === 'readings') return `Notes on the reading at ${lift}${inSession}`;
  if (table === 'rungs' && kind === 'create') return `Planned lift ${lift}${inSession}`;
  if (table === 'rungs')
    return `Lift ${lift} ${named.isSkipped ? 'skipped' : 'taken back into the run'}${inSession}`;
  if (table === 'runs') return `Run ${named.side} ${named.port ?? ''}${inSession}`;
  if (kind === 'handIn') return `Hand in session ${place?.label ?? ''}`;
  if (table === 'sessions') return `Session ${named.label || (place?.label ?? '')}`;
  if (table === 'portDimensions') return `Dimensions of ${named.side} port ${named.port ?? '(all)'}`;
  const words: Record<string, string> = { customers: 'Customer', heads: 'Head', stages: 'Stage' };
  return `${words[table] ?? 'Record'} ${named.name}`.trim();
}
