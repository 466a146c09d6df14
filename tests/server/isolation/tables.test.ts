import pg from 'pg';
import { v7 } from 'uuid';
import { fullShop, type FullShop } from '@/tests/factories/deskShop';
import { asPerson, testServer, type TestServer } from '@/tests/factories/shopWorld';

/* Walks every table that PostgreSQL knows, so that a new one is looked at without being named here. */

/** Tables that belong to no shop, with the reason. */
const ofNoShop = { epochs: 'which life of the database this is' };

type Table = { name: string; column: string };

let server: TestServer;
let ours: FullShop;
let theirs: FullShop;
let admin: pg.Client;
let app: pg.Client;
let tables: Table[];

beforeAll(async () => {
  server = await testServer();
  ours = await fullShop(server, 'larch');
  theirs = await fullShop(server, 'maple');
  admin = new pg.Client({ connectionString: server.db.adminUrl });
  app = new pg.Client({ connectionString: server.db.appUrl });
  await admin.connect();
  await app.connect();
  for (const shop of [ours, theirs]) await fillTheRest(shop);
  const { rows } = await admin.query<{ name: string; has_shop: boolean }>(
    `select c.relname as name, exists (select from pg_attribute a
       where a.attrelid = c.oid and a.attname = 'shop_id' and not a.attisdropped) as has_shop
     from pg_class c where c.relnamespace = 'public'::regnamespace and c.relkind in ('r', 'p') order by 1`,
  );
  tables = rows
    .filter((row) => !(row.name in ofNoShop))
    .map((row) => ({ name: row.name, column: row.has_shop ? 'shop_id' : 'id' }));
  expect(rows.filter((row) => !row.has_shop).map((row) => row.name)).toEqual(['epochs', 'shops']);
});
afterAll(async () => {
  await admin.end();
  await app.end();
  await server.close();
});

/** What the full shop has not by itself: a dispute. */
async function fillTheRest(shop: FullShop): Promise<void> {
  const { device, ids } = shop;
  const { verdicts } = await device.push(
    device.change({
      kind: 'patch',
      table: 'readings',
      rid: ids.reading,
      base: { flowText: '1' },
      set: { flowText: '2' },
    }),
  );
  expect(verdicts).toMatchObject([{ verdict: 'dispute' }]);
  await asPerson(server, shop.people.owner).get('/api/me').expect(200);
}

/** Runs as the role of the server, in a transaction that is always undone; the marks for synced tables are set as a
 * forgetful program might set them, so that nothing but row-level security stands in the way.
 */
async function asShop<T>(shopId: string | null, mark: string, work: () => Promise<T>): Promise<T> {
  await app.query('begin');
  try {
    if (shopId) await app.query(`select set_config('app.shop_id', $1, true)`, [shopId]);
    await app.query(
      `select set_config('app.feed_lock', $1, true), set_config('app.feed_from', '-1', true),
         set_config('app.feed_to', '1000000000', true)`,
      [mark],
    );
    return await work();
  } finally {
    await app.query('rollback');
  }
}

const refusal = (work: Promise<unknown>) =>
  work.then(
    () => 'done',
    (error: unknown) => (error instanceof pg.DatabaseError ? `${error.code}` : String(error)),
  );

const each = async (check: (table: Table) => Promise<void>) => {
  expect(tables.length).toBeGreaterThan(20);
  for (const table of tables)
    await check(table).catch((error: unknown) => {
      throw new Error(`table ${table.name}: ${error instanceof Error ? error.message : error}`);
    });
};

test('the role of the server is no superuser, cannot bypass row-level security, owns nothing, belongs to nobody', async () => {
  const { rows } = await admin.query(
    `select rolsuper or rolbypassrls or rolcreaterole or rolcreatedb as mighty,
       (select count(*)::int from pg_class where relowner = r.oid) as owns,
       (select count(*)::int from pg_auth_members where member = r.oid) as groups
     from pg_roles r where rolname = 'app'`,
  );
  expect(rows).toEqual([{ mighty: false, owns: 0, groups: 0 }]);
});

test('every table of a shop has row-level security enabled and forced, and a policy bound to the shop that is set', () =>
  each(async ({ name, column }) => {
    const { rows } = await admin.query(
      `select relrowsecurity as enabled, relforcerowsecurity as forced from pg_class where oid = $1::regclass`,
      [name],
    );
    expect(rows).toEqual([{ enabled: true, forced: true }]);
    const policies = await admin.query<{ roles: string[]; qual: string; with_check: string | null }>(
      `select roles::text[], qual, with_check from pg_policies where schemaname = 'public' and tablename = $1
       and not roles = '{owner}'`,
      [name],
    );
    const bound = `(${column} = current_shop())`;
    expect(policies.rows).toEqual([{ roles: ['public'], qual: bound, with_check: bound }]);
  }));

test('the server can neither delete nor empty a table', () =>
  each(async ({ name }) => {
    const { rows } = await admin.query(
      `select has_table_privilege('app', $1, 'DELETE') or has_table_privilege('app', $1, 'TRUNCATE') as may`,
      [name],
    );
    expect(rows).toEqual([{ may: false }]);
  }));

test('a transaction of one shop sees its own rows and none of the other', () =>
  each(async ({ name, column }) => {
    const count = async (shopId: string) =>
      (
        await app.query<{ n: number }>(`select count(*)::int as n from ${name} where ${column} = $1`, [
          shopId,
        ])
      ).rows[0]?.n;
    const [own, other] = await asShop(ours.id, ours.id, async () => [
      await count(ours.id),
      await count(theirs.id),
    ]);
    // without rows of its own the table would prove nothing: fill it in the factory
    expect(own).toBeGreaterThan(0);
    expect(other).toBe(0);
  }));

test('a transaction that set no shop, or nonsense, sees nothing', () =>
  each(async ({ name }) => {
    const all = `select * from ${name}`;
    expect(await asShop(null, ours.id, async () => (await app.query(all)).rows)).toEqual([]);
    expect(await asShop(v7(), ours.id, async () => (await app.query(all)).rows)).toEqual([]);
    expect(await asShop('', ours.id, async () => (await app.query(all)).rows)).toEqual([]);
  }));

test('a row of the other shop can be neither added nor changed nor taken, nor one of ours given away', () =>
  each(async ({ name, column }) => {
    const { rows } = await admin.query(
      `select to_jsonb(t) as row from ${name} t where ${column} = $1 limit 1`,
      [theirs.id],
    );
    const id = v7();
    const born = { ...rows[0].row, ...(column === 'shop_id' && 'id' in rows[0].row ? { id } : {}) };
    const insert = () =>
      app.query(`insert into ${name} select * from jsonb_populate_record(null::${name}, $1)`, [born]);
    expect(await asShop(ours.id, theirs.id, () => refusal(insert()))).toBe('42501');
    const update = async () =>
      (await app.query(`update ${name} set ${column} = ${column} where ${column} = $1`, [theirs.id]))
        .rowCount;
    const isAppendOnly = ['changes', 'audit'].includes(name);
    if (isAppendOnly) expect(await asShop(ours.id, theirs.id, () => refusal(update()))).toBe('42501');
    else expect(await asShop(ours.id, theirs.id, update)).toBe(0);
    const give = () =>
      app.query(`update ${name} set ${column} = $1 where ${column} = $2`, [theirs.id, ours.id]);
    expect(await asShop(ours.id, theirs.id, () => refusal(give()))).toBe('42501');
  }));

test('what is looked up before the shop is known gives ids and nothing else', async () => {
  const { rows } = await admin.query(
    `select proname as name, pg_get_function_result(oid) as gives from pg_proc
     where pronamespace = 'public'::regnamespace and prosecdef order by 1`,
  );
  expect(rows).toEqual([
    { name: 'find_device', gives: 'TABLE(shop_id uuid, device_id uuid)' },
    { name: 'find_enrolment_code', gives: 'TABLE(shop_id uuid, code_id uuid)' },
    { name: 'find_people_by_mail', gives: 'TABLE(shop_id uuid, person_id uuid)' },
    { name: 'has_any_shop', gives: 'boolean' },
  ]);
});

test('there is no view that could look past the policies', async () => {
  const { rows } = await admin.query(
    `select relname from pg_class where relnamespace = 'public'::regnamespace and relkind in ('v', 'm', 'f')`,
  );
  expect(rows).toEqual([]);
});
