import pg from 'pg';

/** The server's way into PostgreSQL, as the role that row-level security binds. */
export type ServerDb = {
  pool: pg.Pool;
  /** for connections that stay open, such as the one that listens */
  url: string;
};

/** Opens the pool. Nothing is connected until the first use, so a server starts before its database does.
 * @param onError told of connections that broke while idle; PostgreSQL restarting must not end the process
 */
export function connectServerDb(url: string, onError: (error: Error) => void): ServerDb {
  const pool = new pg.Pool({
    connectionString: url,
    application_name: 'inchwater',
    max: 20,
    connectionTimeoutMillis: 10_000,
    idleTimeoutMillis: 30_000,
    // a writer that hangs must not hold the shop's feed lock for ever
    lock_timeout: 10_000,
    statement_timeout: 15_000,
    idle_in_transaction_session_timeout: 15_000,
  });
  pool.on('error', onError);
  // a connection in use has no listener of the pool's, and an error event without one ends the process
  pool.on('connect', (client) => client.on('error', onError));
  return { pool, url };
}
