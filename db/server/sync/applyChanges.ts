import type { Guard } from '@/shared/sync/merge';
import type { VerdictOf } from '@/shared/sync/protocol';
import type { ServerDb } from '../connect';
import { isRefusedValue } from '../databaseErrors';
import { withShopWrite, type ShopTx } from '../transaction';
import type { Incoming } from './incoming';
import { judgeChanges } from './judgeChanges';
import { look } from './look';
import { writeJudged, type DeviceState } from './writeJudged';

/* Applies a batch of new changes to the records of a shop, under its feed lock.
 *
 * look (one statement) → judge in order, in memory (shared/sync/merge) → write (one statement). Every change leaves one
 * line in the log with its verdict, whatever it is.
 *
 * Should PostgreSQL refuse a value that the judgement let through, everything is undone and done again with the changes
 * one by one; the one that cannot be stored is set aside and nothing else suffers.
 */

export type Batch = {
  source: Guard['source'];
  /** the device that pushed, with what is written of it; null at the desk */
  device: DeviceState | null;
  /** the device was shut out: what it sends is kept, and a supervisor decides */
  isRevoked: boolean;
  receivedAt: Date;
};

/** Applies changes that the shop has not seen before. @returns a verdict each, in their order */
type Apply = (batch: Batch, incoming: readonly Incoming[]) => Promise<VerdictOf[]>;

/** Runs `fn` under the shop's feed lock, with the one function by which synced records change. `fn` may run twice. */
export async function withChanges<T>(
  db: ServerDb,
  shopId: string,
  fn: (tx: ShopTx, apply: Apply) => Promise<T>,
): Promise<T> {
  try {
    return await withShopWrite(db, shopId, (tx) =>
      fn(tx, (batch, incoming) => applyTogether(tx, batch, incoming)),
    );
  } catch (error) {
    if (!isRefusedValue(error)) throw error;
    return withShopWrite(db, shopId, (tx) => fn(tx, (batch, incoming) => applyOneByOne(tx, batch, incoming)));
  }
}

async function applyTogether(tx: ShopTx, batch: Batch, incoming: readonly Incoming[]): Promise<VerdictOf[]> {
  const sight = await look(
    tx,
    incoming.flatMap(({ change }) => (change ? [change] : [])),
  );
  const judged = judgeChanges(incoming, sight, batch.source, batch.isRevoked);
  await writeJudged(tx, judged, sight.records, batch.device, batch.receivedAt);
  return judged.map((one) => one.verdict);
}

async function applyOneByOne(tx: ShopTx, batch: Batch, incoming: readonly Incoming[]): Promise<VerdictOf[]> {
  const verdicts: VerdictOf[] = [];
  for (const one of incoming) {
    await tx.client.query('savepoint one');
    try {
      verdicts.push(...(await applyTogether(tx, batch, [one])));
    } catch (error) {
      if (!isRefusedValue(error)) throw error;
      await tx.client.query('rollback to savepoint one');
      const setAside = { ...one, change: null, problem: 'a value in it cannot be stored' };
      verdicts.push(...(await applyTogether(tx, batch, [setAside])));
    }
    await tx.client.query('release savepoint one');
  }
  return verdicts;
}

/** Verdicts of changes that the shop has answered before: asking twice gives the same answer. */
export async function readVerdicts(tx: ShopTx, ids: readonly string[]): Promise<Map<string, VerdictOf>> {
  const { rows } = await tx.client.query<{ verdict: VerdictOf }>(
    `select json_strip_nulls(json_build_object(
       'id', id, 'verdict', verdict, 'why', why, 'detail', detail, 'version', version)) as verdict
     from changes where id = any($1::uuid[])`,
    [ids],
  );
  return new Map(rows.map((row) => [row.verdict.id, row.verdict]));
}
