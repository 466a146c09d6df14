import { randomBytes } from 'node:crypto';
import pg from 'pg';

/** A database of its own for one test file, with the three ways into it. */
export type TestDb = {
  name: string;
  appUrl: string;
  ownerUrl: string;
  adminUrl: string;
  close: () => Promise<void>;
};

function urlOf(role: 'ADMIN' | 'OWNER' | 'APP', database: string): string {
  const base = process.env[`TEST_PG_${role}_URL`];
  if (!base)
    throw new Error(`TEST_PG_${role}_URL is missing: this test belongs to a jest project without a database`);
  const url = new URL(base);
  url.pathname = `/${database}`;
  return url.href;
}

async function asAdmin(sql: string[]): Promise<void> {
  const admin = new pg.Client({ connectionString: urlOf('ADMIN', 'postgres') });
  await admin.connect();
  try {
    for (const statement of sql) await admin.query(statement);
  } finally {
    await admin.end();
  }
}

/** Makes a fresh database, migrated to the newest step. End every pool before `close`, which drops it. */
export async function testDb(): Promise<TestDb> {
  const name = `test_${randomBytes(6).toString('hex')}`;
  await asAdmin([
    `create database ${name} template template_inchwater owner owner`,
    `revoke all on database ${name} from public`,
    `grant connect on database ${name} to app`,
  ]);
  return {
    name,
    appUrl: urlOf('APP', name),
    ownerUrl: urlOf('OWNER', name),
    adminUrl: urlOf('ADMIN', name),
    close: () => asAdmin([`drop database if exists ${name} with (force)`]),
  };
}
