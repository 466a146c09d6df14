import type { Guard } from '@/shared/sync/merge';
import type { VerdictOf } from '@/shared/sync/protocol';
import { isRefusedValue } from '../databaseErrors';
import type { ShopTx } from '../transaction';
import { loadFates } from './fates';
import type { Incoming } from './incoming';
import { judgeChanges, type Judged, type Standing } from './judgeChanges';
import { loadRecords } from './loadRecords';
import { writeJudged } from './writeJudged';

/* Applies a batch of new changes to the records of a shop, inside `withShopWrite`.
 *
 * read what they touch (a query a table) → judge in order, in memory (shared/sync/merge) → write (a statement a table,
 * one for the log, one for disputes). Every change leaves one line in the log with its verdict, whatever it is.
 *
 * Should PostgreSQL refuse a value that the judgement let through, the batch is undone to where it began and its
 * changes go one by one; the one that cannot be stored is set aside and nothing else suffers.
 */

export type Batch = {
  source: Guard['source'];
  deviceId: string | null;
  /** the device was shut out: what it sends is kept, and a supervisor decides */
  isRevoked: boolean;
  receivedAt: Date;
};

/** Applies changes that the shop has not seen before. @returns a verdict each, in their order */
export async function applyChanges(
  tx: ShopTx,
  batch: Batch,
  incoming: readonly Incoming[],
): Promise<VerdictOf[]> {
  if (incoming.length === 0) return [];
  await tx.client.query('savepoint batch');
  try {
    return await applyTogether(tx, batch, incoming);
  } catch (error) {
    if (!isRefusedValue(error)) throw error;
    await tx.client.query('rollback to savepoint batch');
  }
  const [only] = incoming;
  if (incoming.length === 1 && only) return applyTogether(tx, batch, [setAside(only)]);
  const verdicts: VerdictOf[] = [];
  for (const one of incoming) verdicts.push(...(await applyChanges(tx, batch, [one])));
  return verdicts;
}

const setAside = (incoming: Incoming): Incoming => ({
  ...incoming,
  change: null,
  problem: 'a value in it cannot be stored',
});

async function applyTogether(tx: ShopTx, batch: Batch, incoming: readonly Incoming[]): Promise<VerdictOf[]> {
  const judged = await judge(tx, batch, incoming);
  await writeJudged(tx, judged.judged, judged.records, batch.deviceId, batch.receivedAt);
  return judged.judged.map((one) => one.verdict);
}

async function judge(tx: ShopTx, batch: Batch, incoming: readonly Incoming[]) {
  const changes = incoming.flatMap(({ change }) => (change ? [change] : []));
  const records = await loadRecords(tx, changes);
  const fates = await loadFates(tx, changes, records);
  const people = await readPeople(tx, [...new Set(changes.map((change) => change.by))]);
  const standingOf = (personId: string): Standing => {
    const person = people.get(personId);
    if (!person) return 'unknown_person';
    if (batch.isRevoked) return 'device_revoked';
    return person.isClosed ? 'account_closed' : 'open';
  };
  const judged: Judged[] = judgeChanges(incoming, records, fates, batch.source, standingOf);
  return { judged, records };
}

async function readPeople(tx: ShopTx, ids: string[]): Promise<Map<string, { isClosed: boolean }>> {
  const { rows } = await tx.client.query<{ id: string; isClosed: boolean }>(
    `select id, closed_at is not null as "isClosed" from people where id = any($1::uuid[])`,
    [ids],
  );
  return new Map(rows.map((row) => [row.id, row]));
}

/** Verdicts of changes that the shop has answered before: asking twice gives the same answer. */
export async function readVerdicts(tx: ShopTx, ids: readonly string[]): Promise<Map<string, VerdictOf>> {
  const { rows } = await tx.client.query<Record<keyof VerdictOf, never>>(
    `select id, verdict, why, detail, version from changes where id = any($1::uuid[])`,
    [ids],
  );
  return new Map(
    rows.map(({ id, verdict, why, detail, version }) => [
      id,
      {
        id,
        verdict,
        ...(why === null ? {} : { why }),
        ...(detail === null ? {} : { detail }),
        ...(version === null ? {} : { version }),
      },
    ]),
  );
}
