import { execFile } from 'node:child_process';
import path from 'node:path';
import { promisify } from 'node:util';
import pg from 'pg';
import { fourValveIntake, twoValveExhaust, twoValveIntake } from '@/server/demo/benchDays';
import { testDb, type TestDb } from '@/tests/factories/testDb';

const run = promisify(execFile);
const root = path.resolve(__dirname, '../..');
let db: TestDb;
let admin: pg.Client;

const demo = () =>
  run(process.execPath, ['--import', 'tsx', 'server/bin/demo.ts'], {
    cwd: root,
    env: { ...process.env, APP_DATABASE_URL: db.appUrl },
  });

beforeAll(async () => {
  db = await testDb();
  admin = new pg.Client(db.adminUrl);
  await admin.connect();
});
afterAll(async () => {
  await admin.end();
  await db.close();
});

it('is made once through the real verbs, and each start gives a fresh enrolment code', async () => {
  const first = await demo();
  const second = await demo();
  const codeOf = (text: string) => /enrolment code (\S{4}-\S{4})/.exec(text)?.[1];
  expect(codeOf(first.stdout)).toBeDefined();
  expect(codeOf(second.stdout)).not.toBe(codeOf(first.stdout));

  const shops = await admin.query('select name from shops');
  expect(shops.rows).toHaveLength(1);
  const keyed = await admin.query<{ row: string[] }>(
    `select jsonb_build_array(r.lift_text, r.flow_text, r.pressure_text) as row
     from readings r join runs u on u.id = r.run_id join sessions s on s.id = u.session_id
     order by s.label, u.run_ordinal, r.reading_ordinal`,
  );
  expect(keyed.rows.map(({ row }) => row)).toEqual([
    ...twoValveIntake,
    ...twoValveExhaust,
    ...fourValveIntake.slice(0, 6),
  ]);
  const states = await admin.query('select label, state from sessions order by label');
  expect(states.rows).toEqual([
    { label: '0-001', state: 'handedIn' },
    { label: '0-002', state: 'open' },
    { label: '0-003', state: 'open' },
  ]);
  const unapplied = await admin.query(`select id from changes where verdict <> 'applied'`);
  expect(unapplied.rows).toEqual([]);
}, 60_000);

it('leaves somebody’s own shop alone and says nothing', async () => {
  await admin.query(`update people set mail = 'someone@else.example' where mail = 'imre@brackwater.example'`);
  expect((await demo()).stdout.trim()).toBe('');
}, 60_000);
