import { defineConfig } from 'drizzle-kit';

const out = process.env.INCHWATER_DRIZZLE_OUT;

/** One configuration for both databases; INCHWATER_DB says which: `server` (PostgreSQL) or `device` (SQLite). */
export default process.env.INCHWATER_DB === 'device'
  ? defineConfig({ dialect: 'sqlite', schema: './db/device/schema/*.ts', out: out ?? './drizzle/device' })
  : defineConfig({
      dialect: 'postgresql',
      schema: './db/server/schema/*.ts',
      out: out ?? './drizzle/server',
    });
