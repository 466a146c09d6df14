/** The small part of an SQLite driver that the device database needs. In the browser it is expo-sqlite's asynchronous
 * API; tests put the same SQLite build behind it under Node. */
export type DeviceDriver = {
  /** one or more statements without parameters */
  exec: (sql: string) => Promise<void>;
  /** rows as value arrays, in column order */
  all: (sql: string, params: unknown[]) => Promise<unknown[][]>;
  run: (sql: string, params: unknown[]) => Promise<void>;
  close: () => Promise<void>;
};
