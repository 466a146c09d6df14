import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import type pg from 'pg';
import type { ServerDb } from './connect';
import { databaseErrorOf, DatabaseUnavailable } from './databaseErrors';

/** A transaction that sees one shop. */
export type ShopTx = {
  shopId: string;
  client: pg.ClientBase;
  orm: NodePgDatabase;
};

const uuid = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/;

/** Runs `fn` in one transaction. `opening` is sent as one message, so that it costs one round trip; it carries the
 * shop's id as a literal and therefore nothing but an id is let through.
 */
async function inTransaction<T>(
  db: ServerDb,
  shopId: string,
  opening: (shop: string) => string[],
  fn: (tx: ShopTx) => Promise<T>,
): Promise<T> {
  if (!uuid.test(shopId)) throw new TypeError('not the id of a shop');
  const client = await db.pool.connect().catch((error: unknown) => {
    throw new DatabaseUnavailable(error);
  });
  let broken: unknown = null;
  const onError = (error: unknown) => {
    broken = error;
  };
  client.on('error', onError);
  try {
    await client.query(opening(`'${shopId}'`).join('; '));
    const result = await fn({ shopId, client, orm: drizzle(client) });
    const end = await client.query('commit');
    // PostgreSQL answers a commit of a failed transaction with a quiet rollback
    if (end.command !== 'COMMIT') throw new Error('committed a transaction that had already failed');
    return result;
  } catch (error) {
    if (!broken) await client.query('rollback').catch(onError);
    if (!broken || isOurs(error)) throw error;
    throw new DatabaseUnavailable(error);
  } finally {
    client.off('error', onError);
    client.release(Boolean(broken));
  }
}

/** An error that says something of its own, even when the connection broke as well. */
const isOurs = (error: unknown) =>
  databaseErrorOf(error) !== null || (error instanceof Error && error.name === 'AppError');

/** Reads one shop, all of it as it stood at one moment. */
export function withShop<T>(db: ServerDb, shopId: string, fn: (tx: ShopTx) => Promise<T>): Promise<T> {
  const opening = (shop: string) => [
    'begin isolation level repeatable read read only',
    `select set_config('app.shop_id', ${shop}, true)`,
  ];
  return inTransaction(db, shopId, opening, fn);
}

/** Writes tables of one shop that are not in the feed: sign-ins, PINs, codes. Synced tables refuse it. */
export function withShopUnsynced<T>(
  db: ServerDb,
  shopId: string,
  fn: (tx: ShopTx) => Promise<T>,
): Promise<T> {
  const opening = (shop: string) => ['begin', `select set_config('app.shop_id', ${shop}, true)`];
  return inTransaction(db, shopId, opening, fn);
}

/** The one way to write a synced table. Takes the shop's feed lock first, so that one writer at a time draws numbers
 * and commits, and the feed has no holes; then says so to the triggers, and pokes whoever listens at commit.
 */
export function withShopWrite<T>(db: ServerDb, shopId: string, fn: (tx: ShopTx) => Promise<T>): Promise<T> {
  const opening = (shop: string) => [
    'begin',
    `select pg_advisory_xact_lock(hashtextextended('feed:' || ${shop}, 0))`,
    `select set_config('app.shop_id', ${shop}, true), set_config('app.feed_lock', ${shop}, true)`,
    `select pg_notify('feed', ${shop})`,
  ];
  return inTurn(db, shopId, () => inTransaction(db, shopId, opening, fn));
}

const turns = new WeakMap<ServerDb, Map<string, Promise<unknown>>>();

/** Writers of one shop wait for one another here, before they take a connection: fifty devices that push at once would
 * otherwise hold every connection of the pool while they wait for the lock, and nobody could read. The lock in the
 * database remains what counts; other processes wait there.
 */
async function inTurn<T>(db: ServerDb, shopId: string, work: () => Promise<T>): Promise<T> {
  const ofShops = turns.get(db) ?? new Map<string, Promise<unknown>>();
  turns.set(db, ofShops);
  const mine = (ofShops.get(shopId) ?? Promise.resolve()).then(work);
  const over = mine.catch(() => undefined);
  ofShops.set(shopId, over);
  try {
    return await mine;
  } finally {
    if (ofShops.get(shopId) === over) ofShops.delete(shopId);
  }
}

/** Asks one of the functions that answer before the shop is known; they return ids and nothing else. */
export async function lookUp<Row extends object>(
  db: ServerDb,
  sql: string,
  values: unknown[],
): Promise<Row[]> {
  try {
    return (await db.pool.query<Row & Record<string, unknown>>(sql, values)).rows;
  } catch (error) {
    throw databaseErrorOf(error) ? error : new DatabaseUnavailable(error);
  }
}
