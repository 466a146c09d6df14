// Brings a database to the newest migration, as the role `owner`. A process of its own, so that the owner's password
// never stands in the environment of the server.
import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate } from 'drizzle-orm/node-postgres/migrator';
import path from 'node:path';
import pg from 'pg';

async function main(): Promise<void> {
  const url = process.env.OWNER_DATABASE_URL;
  if (!url)
    throw new Error('OWNER_DATABASE_URL is missing: the address of the database, with the role "owner".');
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    await migrate(drizzle(client), { migrationsFolder: path.resolve(__dirname, '../../drizzle/server') });
  } finally {
    await client.end();
  }
}

main().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : error);
  process.exitCode = 1;
});
