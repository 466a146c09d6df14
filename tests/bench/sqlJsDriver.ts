import initSqlJs, { type SqlValue } from 'sql.js';
import type { DeviceDriver } from '@/db/device/driver';

/** A real SQLite in memory under Node, for measuring what our code adds to it: no disk takes part. */
export async function openSqlJs(): Promise<DeviceDriver> {
  const { Database } = await initSqlJs();
  const db = new Database();
  const all = (sql: string, params: unknown[]): SqlValue[][] => {
    const statement = db.prepare(sql);
    try {
      statement.bind(
        params.map((value) => (typeof value === 'boolean' ? Number(value) : (value as SqlValue))),
      );
      const rows: SqlValue[][] = [];
      while (statement.step()) rows.push(statement.get());
      return rows;
    } finally {
      statement.free();
    }
  };
  return {
    exec: async (sql) => void db.exec(sql),
    all: async (sql, params) => all(sql, params),
    run: async (sql, params) => void all(sql, params),
    close: async () => db.close(),
  };
}
