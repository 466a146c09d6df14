import { openDatabaseAsync, type SQLiteBindValue, type SQLiteStatement } from 'expo-sqlite';
import type { DeviceDriver } from './driver';

const keptStatements = 80;

/** Opens a database through expo-sqlite's asynchronous API (its synchronous one does not work on the web).
 * Statements are prepared once and kept: each costs a round trip to the worker to prepare and another to finalize, and
 * a save runs about ten of them. Own prepare/run/finalize instead of `runAsync`, which hides the real error behind
 * "Error finalizing statement".
 */
export async function openExpoDriver(name: string): Promise<DeviceDriver> {
  const connection = await openDatabaseAsync(name);
  const kept = new Map<string, SQLiteStatement>();

  async function statementFor(sql: string): Promise<SQLiteStatement> {
    const found = kept.get(sql);
    if (found) {
      // last used goes to the end, so that the front is the one to give up
      kept.delete(sql);
      kept.set(sql, found);
      return found;
    }
    const made = await connection.prepareAsync(sql);
    kept.set(sql, made);
    const oldest = kept.keys().next().value;
    if (kept.size > keptStatements && oldest !== undefined) await giveUp(oldest);
    return made;
  }

  async function giveUp(sql: string): Promise<void> {
    const statement = kept.get(sql);
    kept.delete(sql);
    await statement?.finalizeAsync().catch(() => undefined);
  }

  async function withStatement<T>(sql: string, work: (statement: SQLiteStatement) => Promise<T>): Promise<T> {
    const statement = await statementFor(sql);
    try {
      return await work(statement);
    } catch (error) {
      // a failed statement may hold a lock until it is finalized
      await giveUp(sql);
      throw error;
    }
  }

  return {
    exec: (sql) => connection.execAsync(sql),
    all: (sql, params) =>
      withStatement(sql, async (statement) => {
        const result = await statement.executeForRawResultAsync<Record<string, unknown>>(bound(params));
        return await result.getAllAsync();
      }),
    run: (sql, params) =>
      withStatement(sql, async (statement) => {
        await statement.executeAsync(bound(params));
      }),
    close: async () => {
      for (const sql of [...kept.keys()]) await giveUp(sql);
      await connection.closeAsync();
    },
  };
}

function bound(params: unknown[]): SQLiteBindValue[] {
  return params.map((value) => {
    if (
      value === null ||
      typeof value === 'string' ||
      typeof value === 'number' ||
      typeof value === 'boolean'
    )
      return value;
    throw new TypeError(`cannot be bound: ${typeof value}`);
  });
}
