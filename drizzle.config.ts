import { defineConfig } from 'drizzle-kit';

/** One configuration for both databases; INCHWATER_DB says which: `server` (PostgreSQL) or `device` (SQLite). */
export default process.env.INCHWATER_DB === 'device'
  ? defineConfig({ dialect: 'sqlite', schema: './db/device/schema/*.ts', out: './drizzle/device' })
  : defineConfig({ dialect: 'postgresql', schema: './db/server/schema/*.ts', out: './drizzle/server' });
