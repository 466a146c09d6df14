import { v7 } from 'uuid';
import { AppError, type FieldProblem } from '@/shared/errors';
import type { Change, Fields, SeenReading } from '@/shared/sync/protocol';
import { schemaVersion, syncTables, type SyncTable } from '@/shared/sync/syncTables';
import type { DeviceTx } from './deviceDb';
import { getFact, setFact } from './meta';
import { appendToOutbox } from './outbox';
import { rebuildRecords } from './workingRows';

/** A change before it has its place in the queue. */
export type Draft =
  | { kind: 'create'; table: SyncTable; rid: string; set: Fields }
  | { kind: 'patch'; table: SyncTable; rid: string; base: Fields; set: Fields }
  | { kind: 'delete'; table: SyncTable; rid: string; base: Fields }
  | { kind: 'handIn'; rid: string; expect: SeenReading[] };

/** Who makes a change, and when by the device's clock. */
export type Author = { personId: string; atIso: string };

/** Records changes: they take the next places in the queue and the working rows follow, all in the caller's one local
 * transaction. When that has committed, the change is durable and will reach the server some day.
 * @throws AppError `invalid` with the fields, before anything is written
 */
export async function record(tx: DeviceTx, drafts: readonly Draft[], author: Author): Promise<Change[]> {
  const problems = drafts.flatMap(problemsOf);
  if (problems.length > 0) throw new AppError('invalid', { fields: problems });
  const first = (await getFact(tx, 'nextN')) ?? 1;
  const changes = drafts.map((draft, index): Change => ({
    id: v7(),
    n: first + index,
    kind: draft.kind,
    table: draft.kind === 'handIn' ? 'sessions' : draft.table,
    rid: draft.rid,
    sv: schemaVersion,
    by: author.personId,
    at: author.atIso,
    base: draft.kind === 'patch' || draft.kind === 'delete' ? draft.base : {},
    set: draft.kind === 'create' || draft.kind === 'patch' ? draft.set : {},
    ...(draft.kind === 'handIn' ? { expect: draft.expect } : {}),
  }));
  await appendToOutbox(tx, changes);
  await setFact(tx, 'nextN', first + changes.length);
  await rebuildRecords(
    tx,
    changes.map((change) => ({ tableName: change.table, id: change.rid })),
  );
  return changes;
}

/** What the server would refuse for ever is refused here, while the person still has the digits before them. */
function problemsOf(draft: Draft): FieldProblem[] {
  if (draft.kind === 'delete' || draft.kind === 'handIn') return [];
  const { schema } = syncTables[draft.table];
  const parsed = (draft.kind === 'create' ? schema : schema.partial()).safeParse(draft.set);
  if (parsed.success) return [];
  return parsed.error.issues.map((issue) => ({
    path: issue.path.map(String).join('.'),
    sentence: issue.message,
  }));
}
