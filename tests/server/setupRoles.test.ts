import pg from 'pg';
import { testDb, type TestDb } from '@/tests/factories/testDb';

let db: TestDb;
let app: pg.Client;

beforeAll(async () => {
  db = await testDb();
  app = new pg.Client({ connectionString: db.appUrl });
  await app.connect();
});

afterAll(async () => {
  await app.end();
  await db.close();
});

test('neither the role of the server nor the owner of the tables can step round row-level security', async () => {
  const { rows } = await app.query(
    `select rolname, rolcanlogin, rolsuper, rolbypassrls, rolcreaterole, rolcreatedb, rolreplication
     from pg_roles where rolname in ('app', 'owner') order by rolname`,
  );
  const bound = {
    rolcanlogin: true,
    rolsuper: false,
    rolbypassrls: false,
    rolcreaterole: false,
    rolcreatedb: false,
    rolreplication: false,
  };
  expect(rows).toEqual([
    { rolname: 'app', ...bound },
    { rolname: 'owner', ...bound },
  ]);
});

test('the server is not, and cannot become, the owner of a table', async () => {
  const { rows } = await app.query(`select distinct tableowner from pg_tables where schemaname = 'public'`);
  expect(rows).toEqual([{ tableowner: 'owner' }]);
  await expect(app.query('set role owner')).rejects.toThrow(/permission denied to set role/);
  await expect(app.query('create table mine (id int)')).rejects.toThrow(/permission denied/);
  await expect(app.query('alter table sessions disable row level security')).rejects.toThrow(/must be owner/);
});

test('a password is asked for, and a wrong one is refused', async () => {
  const url = new URL(db.appUrl);
  url.password = 'wrong';
  const stranger = new pg.Client({ connectionString: url.href });
  await expect(stranger.connect()).rejects.toThrow(/password authentication failed/);
});

test('PostgreSQL listens on the loopback address only', async () => {
  const { rows } = await app.query(`select current_setting('listen_addresses') as listens`);
  expect(rows).toEqual([{ listens: '127.0.0.1' }]);
});

test('every test file has a database of its own', async () => {
  const other = await testDb();
  expect(other.name).not.toBe(db.name);
  await other.close();
  const { rows } = await app.query('select count(*)::int as n from pg_database where datname = $1', [
    other.name,
  ]);
  expect(rows).toEqual([{ n: 0 }]);
});
