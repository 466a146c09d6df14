import type { SessionState } from '@/shared/schema/records';
import type { Change, Fields, Json, Verdict, Why } from './protocol';
import { groupOf, isSyncTable, schemaVersion, syncTables, type SyncTable } from './syncTables';

/* merge: the one rule by which a change meets a record. Pure; the server uses it for the truth, the device to draw its
 * own waiting changes over the server's copy.
 *
 * patch    per group of fields: record = mine → nothing to do; record = what the author saw → take mine;
 *          otherwise a dispute on that group, and the record keeps its value. Other groups merge.
 * create   unknown id → stored; the same content again → nothing to do; different content → set aside.
 * delete   a version like any other; deleting twice is nothing to do.
 * handIn   done only while the readings are the ones the person saw.
 *
 * Order of judgement: can never be right (rejected) → a closed door (held) → values (applied or dispute).
 * Invariants: no field changes except from the value its author saw; no value vanishes (a dispute carries both);
 * the same change over the same record gives the same answer.
 */

export type Row = { id: string; version: number; deleted: boolean; fields: Fields };

export type Guard = {
  source: 'device' | 'desk';
  /** state of the session the record belongs to; null outside sessions */
  sessionState: SessionState | null;
  standing: 'open' | 'unknown_person' | 'account_closed' | 'device_revoked';
  parent: 'present' | 'unknown' | 'held' | 'rejected';
  /** hand in only: the readings are those the person saw */
  isSeenCurrent: boolean;
};

export type GroupDispute = { group: string; base: Fields; theirs: Fields; mine: Fields };

export type Outcome = {
  verdict: Verdict;
  why?: Why;
  detail?: string;
  /** the record after the change: the same object when nothing changed */
  row: Row | null;
  disputes: GroupDispute[];
  /** the change was merged into a version its author had not seen */
  isCombined: boolean;
};

const same = (a: Json | undefined, b: Json | undefined): boolean => canonical(a) === canonical(b);

/** JSON with sorted keys, so that equal values have equal text. Undefined counts as null. */
export function canonical(value: Json | undefined): string {
  if (value === undefined || value === null) return 'null';
  if (Array.isArray(value)) return `[${value.map(canonical).join(',')}]`;
  if (typeof value === 'object') {
    const entries = Object.keys(value)
      .sort()
      .map((key) => `${JSON.stringify(key)}:${canonical(value[key])}`);
    return `{${entries.join(',')}}`;
  }
  return JSON.stringify(value);
}

/** Judges one change against the record it names.
 * @param row the record now, or null when the shop has none with that id
 * @returns verdict, the record afterwards and what is in dispute; never throws on a change that was parsed
 */
export function merge(row: Row | null, change: Change, guard: Guard): Outcome {
  const answer = (verdict: Verdict, why?: Why, detail?: string): Outcome => ({
    verdict,
    row,
    disputes: [],
    isCombined: false,
    ...(why ? { why } : {}),
    ...(detail ? { detail } : {}),
  });

  if (!isSyncTable(change.table)) return answer('rejected', 'unknown_table');
  const table = change.table;
  if (change.sv > schemaVersion) return answer('rejected', 'newer_version');
  if (guard.source === 'device' && !syncTables[table].deviceMay.includes(change.kind))
    return answer('rejected', 'not_by_device');
  if (guard.standing === 'unknown_person') return answer('rejected', 'unknown_person');
  const refusal = validate(table, change, row, guard);
  if (refusal) return answer('rejected', refusal.why, refusal.detail);
  if (change.kind !== 'create' && !row) {
    if (guard.parent === 'held') return answer('held', 'parent_held');
    return answer('rejected', guard.parent === 'rejected' ? 'parent_rejected' : 'unknown_record');
  }
  if (change.kind === 'create' && !row) {
    if (guard.parent === 'unknown') return answer('rejected', 'unknown_parent');
    if (guard.parent === 'rejected') return answer('rejected', 'parent_rejected');
    if (guard.parent === 'held') return answer('held', 'parent_held');
  }
  if (guard.standing !== 'open') return answer('held', guard.standing);
  const isClosed = guard.sessionState === 'handedIn' || guard.sessionState === 'approved';
  if (change.kind === 'handIn') return handIn(row as Row, guard, answer);
  if (change.kind === 'create' && row)
    return canonical(row.fields) === canonical(change.set)
      ? answer('applied')
      : answer('rejected', 'exists_differently');
  if (isClosed && guard.source === 'device') return answer('held', 'session_closed');
  if (change.kind === 'create')
    return { ...answer('applied'), row: { id: change.rid, version: 1, deleted: false, fields: change.set } };
  return change.kind === 'delete' ? remove(row as Row, change, answer) : patch(row as Row, change, answer);
}

type Answer = (verdict: Verdict, why?: Why, detail?: string) => Outcome;

function handIn(row: Row, guard: Guard, answer: Answer): Outcome {
  if (row.deleted) return answer('dispute', 'deleted_meanwhile');
  if (!guard.isSeenCurrent) return answer('rejected', 'changed_since_seen');
  if (row.fields.state === 'handedIn') return answer('applied');
  if (row.fields.state === 'approved') return answer('rejected', 'changed_since_seen');
  return { ...answer('applied'), row: next(row, { state: 'handedIn' }) };
}

function remove(row: Row, change: Change, answer: Answer): Outcome {
  if (row.deleted) return answer('applied');
  // what the author saw must still be what is being deleted
  const moved = Object.keys(change.base).filter((field) => !same(row.fields[field], change.base[field]));
  if (moved.length > 0)
    return {
      ...answer('dispute', 'differs'),
      disputes: [
        { group: 'deleted', base: change.base, theirs: pick(row.fields, Object.keys(change.base)), mine: {} },
      ],
    };
  return { ...answer('applied'), row: { ...row, version: row.version + 1, deleted: true } };
}

function patch(row: Row, change: Change, answer: Answer): Outcome {
  if (row.deleted)
    return {
      ...answer('dispute', 'deleted_meanwhile'),
      disputes: [{ group: 'deleted', base: change.base, theirs: {}, mine: change.set }],
    };
  const groups = new Map<string, string[]>();
  for (const field of Object.keys(change.set))
    groups.set(groupOf(field), [...(groups.get(groupOf(field)) ?? []), field]);
  const taken: Fields = {};
  const disputes: GroupDispute[] = [];
  for (const [group, fields] of groups) {
    if (fields.every((field) => same(row.fields[field], change.set[field]))) continue;
    if (fields.every((field) => same(row.fields[field], change.base[field])))
      for (const field of fields) taken[field] = change.set[field] ?? null;
    else
      disputes.push({
        group,
        base: pick(change.base, fields),
        theirs: pick(row.fields, fields),
        mine: pick(change.set, fields),
      });
  }
  const after = Object.keys(taken).length > 0 ? next(row, taken) : row;
  const outcome = disputes.length > 0 ? answer('dispute', 'differs') : answer('applied');
  return { ...outcome, row: after, disputes };
}

const next = (row: Row, set: Fields): Row => ({
  ...row,
  version: row.version + 1,
  fields: { ...row.fields, ...set },
});

function pick(from: Fields, fields: string[]): Fields {
  return Object.fromEntries(fields.map((field) => [field, from[field] ?? null]));
}

function validate(
  table: SyncTable,
  change: Change,
  row: Row | null,
  guard: Guard,
): { why: Why; detail?: string } | undefined {
  const { schema, fixed } = syncTables[table];
  if (change.kind === 'create') {
    const parsed = schema.safeParse(change.set);
    if (!parsed.success) return invalid(parsed.error.issues);
    if (table === 'readings' && guard.source === 'device' && change.set.byPersonId !== change.by)
      return { why: 'invalid', detail: 'byPersonId: not the person who made the change' };
    if (table === 'sessions' && change.set.state !== 'open')
      return { why: 'invalid', detail: 'state: a session starts open' };
    return undefined;
  }
  if (change.kind !== 'patch') return undefined;
  const touched = Object.keys(change.set);
  const known = Object.keys(schema.shape);
  const stranger = touched.find((field) => !known.includes(field));
  if (stranger !== undefined) return { why: 'invalid', detail: `${stranger}: not a field of this record` };
  if (touched.some((field) => fixed.includes(field))) return { why: 'fixed_field' };
  const parsed = schema.safeParse({ ...row?.fields, ...change.set });
  if (!parsed.success) {
    // only the touched fields are the author's doing; an unknown record is answered later
    const own = parsed.error.issues.filter((issue) => touched.includes(String(issue.path[0])));
    if (own.length > 0) return invalid(own);
  }
  return undefined;
}

function invalid(issues: readonly { path: PropertyKey[]; message: string }[]): { why: Why; detail?: string } {
  const first = issues[0];
  return first
    ? { why: 'invalid', detail: `${first.path.map(String).join('.')}: ${first.message}`.slice(0, 300) }
    : { why: 'invalid' };
}
