import { and, asc, desc, eq, max } from 'drizzle-orm';
import { v7 } from 'uuid';
import { AppError } from '@/shared/errors';
import type { Direction, LiftUnit, PlannedLift, Side } from '@/shared/schema/primitives';
import type { Chip, Reading, SetUp } from '@/shared/schema/records';
import { newRun, rungsOfPlan } from '@/shared/session/startSession';
import type { Fields, Json } from '@/shared/sync/protocol';
import type { DeviceTx } from '@/db/device/deviceDb';
import { getFact, setFact } from '@/db/device/meta';
import { record } from '@/db/device/recordChange';
import { copies } from '@/db/device/schema/deviceTables';
import { heads, readings, rungs, runs, sessions, stages } from '@/db/device/schema/working';
import { benchDevice, commitAs, stored } from './benchDevice';
import { writeDraft } from './drafts';

/* What an operator does at the bench. Each verb is one local transaction and resolves only when it is durable; none
 * waits for the network. Each throws an AppError: `invalid` with the fields, `no_such_record`, `sign_in_needed`, or
 * `not_saved` when the device could not store it. */

/** Adds a run of a port, with its rungs from the session's lift plan. @returns id of the run */
export function addRun(input: {
  sessionId: string;
  side: Side;
  port: string;
  direction?: Direction;
  valvesOpenCount?: number;
  setUp?: SetUp;
}): Promise<string> {
  return commitAs(async (tx, author) => {
    const [found] = await tx
      .select({ liftPlan: sessions.liftPlan, head: heads })
      .from(sessions)
      .innerJoin(stages, eq(stages.id, sessions.stageId))
      .innerJoin(heads, eq(heads.id, stages.headId))
      .where(and(eq(sessions.id, input.sessionId), eq(sessions.deleted, false)));
    if (!found) throw new AppError('no_such_record');
    const [last] = await tx
      .select({ ordinal: max(runs.runOrdinal) })
      .from(runs)
      .where(eq(runs.sessionId, input.sessionId));
    const headValveCount =
      input.side === 'intake' ? found.head.intakeValveCount : found.head.exhaustValveCount;
    const runId = v7();
    const run = newRun({
      ...input,
      runOrdinal: (last?.ordinal ?? 0) + 1,
      valvesOpenCount: input.valvesOpenCount ?? headValveCount,
    });
    await record(
      tx,
      [
        { kind: 'create', table: 'runs', rid: runId, set: run },
        ...rungsOfPlan(runId, found.liftPlan).map(
          (rung) => ({ kind: 'create', table: 'rungs', rid: v7(), set: rung }) as const,
        ),
      ],
      author,
    );
    return runId;
  });
}

export type SaveReadingInput = {
  runId: string;
  rungId: string | null;
  liftText: string;
  liftUnit: LiftUnit;
  flowText: string;
  pressureText: string;
  isPressureRepeated: boolean;
  chips: Chip[];
  /** what the capture screen opens on after this reading; without it the half-keyed digits are forgotten */
  nextDraft?: Json;
};

/** Saves one reading exactly as keyed; the draft of the run moves on in the same transaction, so that a kill in between
 * cannot leave the digits of a saved reading in the fields. @returns id of the reading */
export function saveReading({ nextDraft, ...keyed }: SaveReadingInput): Promise<string> {
  return commitAs(async (tx, author) => {
    const [session] = await tx
      .select({ settings: sessions.settings })
      .from(runs)
      .innerJoin(sessions, eq(sessions.id, runs.sessionId))
      .where(and(eq(runs.id, keyed.runId), eq(runs.deleted, false)));
    if (!session) throw new AppError('no_such_record');
    const [last] = await tx
      .select({ ordinal: max(readings.readingOrdinal) })
      .from(readings)
      .where(eq(readings.runId, keyed.runId));
    const device = await getFact(tx, 'device');
    const reading: Reading = {
      ...keyed,
      readingOrdinal: (last?.ordinal ?? 0) + 1,
      flowUnit: session.settings.flowUnit,
      pressureUnit: session.settings.pressureUnit,
      range: null,
      leakId: null,
      zeroId: null,
      needleSwingText: null,
      needleSwingUnit: null,
      fan: 'notNoted',
      isUsed: true,
      notUsedWhy: '',
      secondLook: 'none',
      byPersonId: author.personId,
      deviceId: device?.id ?? null,
      at: author.atIso,
    };
    const readingId = v7();
    await record(tx, [{ kind: 'create', table: 'readings', rid: readingId, set: reading }], author);
    await writeDraft(tx, keyed.runId, nextDraft ?? null, author.atIso);
    return readingId;
  });
}

const evidence = ['liftText', 'liftUnit', 'flowText', 'flowUnit', 'pressureText', 'pressureUnit'] as const;

/** Takes a reading back. A reading that is not sent yet is not taken out of the queue: its deletion follows it. */
export function undoReading(readingId: string): Promise<void> {
  return commitAs(async (tx, author) => {
    const reading = await livingReading(tx, readingId);
    const base: Fields = Object.fromEntries(evidence.map((field) => [field, reading[field]]));
    await record(tx, [{ kind: 'delete', table: 'readings', rid: readingId, base }], author);
  });
}

/** Sets the note chips of a reading. */
export function setReadingNotes(readingId: string, chips: Chip[]): Promise<void> {
  return commitAs(async (tx, author) => {
    const reading = await livingReading(tx, readingId);
    await record(
      tx,
      [{ kind: 'patch', table: 'readings', rid: readingId, base: { chips: reading.chips }, set: { chips } }],
      author,
    );
  });
}

/** Marks a planned lift as skipped. */
export const skipRung = (rungId: string): Promise<void> => setSkipped(rungId, true);

/** Takes a skipped lift back into the run. */
export const unskipRung = (rungId: string): Promise<void> => setSkipped(rungId, false);

function setSkipped(rungId: string, isSkipped: boolean): Promise<void> {
  return commitAs(async (tx, author) => {
    const [rung] = await tx
      .select()
      .from(rungs)
      .where(and(eq(rungs.id, rungId), eq(rungs.deleted, false)));
    if (!rung) throw new AppError('no_such_record');
    if (rung.isSkipped === isSkipped) return;
    await record(
      tx,
      [
        {
          kind: 'patch',
          table: 'rungs',
          rid: rungId,
          base: { isSkipped: rung.isSkipped },
          set: { isSkipped },
        },
      ],
      author,
    );
  });
}

/** Adds a lift that was not planned to a run. @returns id of the rung */
export function addRung(runId: string, lift: PlannedLift): Promise<string> {
  return commitAs(async (tx, author) => {
    const [run] = await tx.select({ id: runs.id }).from(runs).where(eq(runs.id, runId));
    if (!run) throw new AppError('no_such_record');
    const [last] = await tx
      .select({ rungOrdinal: rungs.rungOrdinal })
      .from(rungs)
      .where(eq(rungs.runId, runId))
      .orderBy(desc(rungs.rungOrdinal))
      .limit(1);
    const rungId = v7();
    const rung = {
      runId,
      rungOrdinal: (last?.rungOrdinal ?? 0) + 1,
      liftText: lift.text,
      liftUnit: lift.unit,
      isSkipped: false,
    };
    await record(tx, [{ kind: 'create', table: 'rungs', rid: rungId, set: rung }], author);
    return rungId;
  });
}

/** Hands a session in, pinned to the readings that stand on this screen. Readings that the shop never took, because
 * they are held or set aside, are not part of it. @throws AppError `state_forbids` unless it is open or returned */
export function handInSession(sessionId: string): Promise<void> {
  return commitAs(async (tx, author) => {
    const [session] = await tx
      .select({ state: sessions.state })
      .from(sessions)
      .where(eq(sessions.id, sessionId));
    if (!session) throw new AppError('no_such_record');
    if (session.state !== 'open' && session.state !== 'returned') throw new AppError('state_forbids');
    const seen = await tx
      .select({ reading: readings, copyId: copies.id })
      .from(readings)
      .innerJoin(runs, eq(runs.id, readings.runId))
      .leftJoin(copies, and(eq(copies.tableName, 'readings'), eq(copies.id, readings.id)))
      .where(and(eq(runs.sessionId, sessionId), eq(runs.deleted, false), eq(readings.deleted, false)))
      .orderBy(asc(runs.runOrdinal), asc(readings.readingOrdinal));
    const expect = seen
      .filter(({ reading, copyId }) => copyId !== null || !['held', 'setAside'].includes(reading.mark))
      .map(({ reading }) => ({
        readingId: reading.id,
        liftText: reading.liftText,
        flowText: reading.flowText,
        pressureText: reading.pressureText,
      }));
    await record(tx, [{ kind: 'handIn', rid: sessionId, expect }], author);
  });
}

/** Notes on this device that the person signed in has read the safety card of a session. */
export async function noteSafetyRead(sessionId: string): Promise<void> {
  const { db, personId } = benchDevice();
  const mark = safetyMark(sessionId, personId());
  await stored(() =>
    db.tx(async (tx) => {
      const read = (await getFact(tx, 'safetyRead')) ?? [];
      if (!read.includes(mark)) await setFact(tx, 'safetyRead', [...read, mark].slice(-400));
    }),
  );
}

/** How a reading of the safety card is noted: once per person and session. */
export const safetyMark = (sessionId: string, personId: string | null): string =>
  `${personId ?? ''} ${sessionId}`;

async function livingReading(tx: DeviceTx, readingId: string): Promise<typeof readings.$inferSelect> {
  const [reading] = await tx
    .select()
    .from(readings)
    .where(and(eq(readings.id, readingId), eq(readings.deleted, false)));
  if (!reading) throw new AppError('no_such_record');
  return reading;
}
