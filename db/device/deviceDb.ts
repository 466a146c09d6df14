import { drizzle, type SqliteRemoteDatabase } from 'drizzle-orm/sqlite-proxy';
import type { DeviceDriver } from './driver';

export type DeviceTx = SqliteRemoteDatabase;

/** The device's database: one queue for every statement, so that none slips into somebody else's transaction. */
export type DeviceDb = {
  /** single statements outside a transaction: reads, mostly */
  read: DeviceTx;
  /** One local transaction. Resolves only when it is durable; anything thrown inside undoes all of it. A quiet one
   * tells nobody that it has committed: for what no screen shows. */
  tx: <T>(work: (tx: DeviceTx) => Promise<T>, options?: { isQuiet?: boolean }) => Promise<T>;
  /** called after every commit; returns how to stop listening */
  onCommit: (listener: () => void) => () => void;
  /** resolves when everything that was queued until now is done */
  idle: () => Promise<void>;
  close: () => Promise<void>;
};

type Method = 'run' | 'all' | 'get' | 'values';

/** Puts drizzle and the write queue over a driver. */
export function createDeviceDb(driver: DeviceDriver): DeviceDb {
  let tail: Promise<unknown> = Promise.resolve();
  const inTurn = <T>(work: () => Promise<T>): Promise<T> => {
    const turn = tail.then(work, work);
    tail = turn.catch(() => undefined);
    return turn;
  };
  const listeners = new Set<() => void>();

  const call = async (sql: string, params: unknown[], method: Method): Promise<{ rows: unknown[] }> => {
    if (method === 'run') {
      await driver.run(sql, params);
      return { rows: [] };
    }
    const rows = await driver.all(sql, params);
    if (method !== 'get') return { rows };
    // drizzle's `get` wants the one row itself, and undefined when there is none
    return { rows: rows[0] as unknown[] };
  };
  // inside a transaction the turn is already ours
  const inside = drizzle(call);
  const read = drizzle((sql: string, params: unknown[], method: Method) =>
    inTurn(() => call(sql, params, method)),
  );

  async function tx<T>(work: (tx: DeviceTx) => Promise<T>, options: { isQuiet?: boolean } = {}): Promise<T> {
    const result = await inTurn(async () => {
      await driver.exec('begin immediate');
      try {
        const value = await work(inside);
        await driver.exec('commit');
        return value;
      } catch (error) {
        await driver.exec('rollback').catch(() => undefined);
        throw error;
      }
    });
    if (!options.isQuiet) for (const listener of listeners) listener();
    return result;
  }

  return {
    read,
    tx,
    onCommit: (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    idle: () => inTurn(async () => undefined),
    close: () => inTurn(() => driver.close()),
  };
}
