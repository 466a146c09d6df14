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

/** Where the cluster of globalSetup.mjs is, by role. */
const clusterUrls = () => ({
  admin: process.env.TEST_PG_ADMIN_URL,
  owner: process.env.TEST_PG_OWNER_URL,
  app: process.env.TEST_PG_APP_URL,
});

function urlOf(role: 'admin' | 'owner' | 'app', database: string): string {
  const base = clusterUrls()[role];
  if (!base) throw new Error('No PostgreSQL here: this test belongs to a jest project that starts none');
  const url = new URL(base);
  url.pathname = `/${database}`;
  return url.href;
}

async function asAdmin(sql: string[]): Promise<void> {
  const admin = new pg.Client({ connectionString: urlOf('admin', 'postgres') });
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
    appUrl: urlOf('app', name),
    ownerUrl: urlOf('owner', name),
    adminUrl: urlOf('admin', name),
    close: () => asAdmin([`drop database if exists ${name} with (force)`]),
  };
}
