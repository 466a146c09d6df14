import type { SessionState } from '@/shared/schema/records';
import { canonical, merge, type GroupDispute, type Guard, type Outcome, type Row } from '@/shared/sync/merge';
import type { Change, Fields, SeenReading, VerdictOf } from '@/shared/sync/protocol';
import { isSyncTable, sessionTables, type SyncTable } from '@/shared/sync/syncTables';
import { fateKey, type Fates, type Sight } from './look';
import type { Incoming } from './incoming';
import { namedBy } from './namedBy';
import type { Records } from './records';

/** One change with its verdict and everything the log keeps of it. */
export type Judged = {
  incoming: Incoming;
  verdict: VerdictOf;
  disputes: GroupDispute[];
  isCombined: boolean;
  /** the record it moved; null when nothing moved */
  moved: { table: SyncTable; id: string } | null;
  /** the values it replaced */
  old: Fields | null;
};

/** Judges changes in their order; each meets the records as the one before left them. */
export function judgeChanges(
  incoming: readonly Incoming[],
  { records, people, fates }: Sight,
  source: Guard['source'],
  isRevoked: boolean,
): Judged[] {
  const standingOf = (personId: string): Guard['standing'] => {
    const person = people.get(personId);
    if (!person) return 'unknown_person';
    if (isRevoked) return 'device_revoked';
    return person.isClosed ? 'account_closed' : 'open';
  };
  return incoming.map((one) => {
    if (!one.change) return refused(one);
    const { change } = one;
    const table = isSyncTable(change.table) ? change.table : null;
    const before = table ? records.get(table, change.rid) : null;
    const outcome = namesUnknown(table, change, before, records)
      ? unknownParent(before)
      : merge(before, change, {
          source,
          sessionState: table ? stateOf(table, change, before, records) : null,
          standing: standingOf(change.by),
          parent: table ? parentOf(table, change, before, records, fates) : 'unknown',
          isSeenCurrent: change.kind === 'handIn' && isSeenCurrent(change, records),
        });
    if (
      change.kind === 'create' &&
      !outcome.row &&
      (outcome.verdict === 'held' || outcome.verdict === 'rejected')
    )
      fates.set(fateKey(change.table, change.rid), outcome.verdict);
    return judged(one, change, table, before, outcome, records);
  });
}

function judged(
  incoming: Incoming,
  change: Change,
  table: SyncTable | null,
  before: Row | null,
  outcome: Outcome,
  records: Records,
): Judged {
  const { row, verdict, why, detail } = outcome;
  const isMoved = table !== null && row !== null && row !== before;
  if (isMoved) records.set(table, row);
  return {
    incoming,
    verdict: {
      id: change.id,
      verdict,
      ...(why ? { why } : {}),
      ...(detail ? { detail } : {}),
      ...(isMoved ? { version: row.version } : {}),
    },
    // a dispute always leaves something that can be settled
    disputes:
      verdict === 'dispute' && outcome.disputes.length === 0
        ? [{ group: 'deleted', base: change.base, theirs: {}, mine: change.set }]
        : outcome.disputes,
    isCombined: outcome.isCombined,
    moved: isMoved ? { table, id: row.id } : null,
    old: isMoved && before ? replaced(before, row) : null,
  };
}

function replaced(before: Row, after: Row): Fields {
  const old: Fields = {};
  for (const field of Object.keys(after.fields))
    if (canonical(before.fields[field]) !== canonical(after.fields[field]))
      old[field] = before.fields[field] ?? null;
  if (before.deleted !== after.deleted) old.deleted = before.deleted;
  return old;
}

function refused(incoming: Incoming): Judged {
  return {
    incoming,
    verdict: {
      id: incoming.id,
      verdict: 'rejected',
      why: 'invalid',
      ...(incoming.problem ? { detail: incoming.problem } : {}),
    },
    disputes: [],
    isCombined: false,
    moved: null,
    old: null,
  };
}

/** A patch that points a record to another one, which is not there: it would break the key. */
function namesUnknown(
  table: SyncTable | null,
  change: Change,
  before: Row | null,
  records: Records,
): boolean {
  if (!table || !before || change.kind !== 'patch') return false;
  return namedBy(table, change.set).some((named) => !records.has(named.table, named.id));
}

const unknownParent = (row: Row | null): Outcome => ({
  verdict: 'rejected',
  why: 'unknown_parent',
  row,
  disputes: [],
  isCombined: false,
});

/** How the records it hangs on are doing; for a change to a record that is not there, what became of its create. */
function parentOf(
  table: SyncTable,
  change: Change,
  before: Row | null,
  records: Records,
  fates: Fates,
): Guard['parent'] {
  if (before) return 'present';
  if (change.kind !== 'create') return fates.get(fateKey(table, change.rid)) ?? 'unknown';
  const standings = namedBy(table, change.set).map((named) =>
    records.has(named.table, named.id) ? 'present' : (fates.get(fateKey(named.table, named.id)) ?? 'unknown'),
  );
  return (['unknown', 'rejected', 'held'] as const).find((one) => standings.includes(one)) ?? 'present';
}

/** State of the session that a change belongs to; null outside sessions, or while its session is not there. */
export function stateOf(
  table: SyncTable,
  change: Change,
  before: Row | null,
  records: Records,
): SessionState | null {
  if (!sessionTables.includes(table)) return null;
  const session = records.sessionOf(table, change.rid, before?.fields ?? change.set);
  return session ? (session.fields.state as SessionState) : null;
}

/** Whether the readings of the session, as they stand now, are the ones the person saw: neither more, fewer nor other. */
function isSeenCurrent(change: Change, records: Records): boolean {
  const current = records
    .living('runs', 'sessionId', change.rid)
    .flatMap((run) => records.living('readings', 'runId', run.id))
    .map(({ id, fields }) => seenText({ readingId: id, ...pick(fields) }));
  const seen = (change.expect ?? []).map(seenText);
  return change.expect !== undefined && current.sort().join('\n') === seen.sort().join('\n');
}

const pick = (fields: Fields) => ({
  liftText: String(fields.liftText),
  flowText: String(fields.flowText),
  pressureText: String(fields.pressureText),
});

const seenText = (seen: SeenReading) =>
  JSON.stringify([seen.readingId, seen.liftText, seen.flowText, seen.pressureText]);
