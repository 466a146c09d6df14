import pg from 'pg';
import request from 'supertest';
import { v7 } from 'uuid';
import { schemaVersion } from '@/shared/sync/syncTables';
import { calibrationFields, fullShop, type FullShop } from '@/tests/factories/deskShop';
import {
  benchFields,
  customerFields,
  deskChange,
  headFields,
  portDimensionFields,
  reading,
  runFields,
  rungFields,
  stageFields,
} from '@/tests/factories/shopRecords';
import { sessionFields } from '@/tests/factories/records';
import { asPerson, signIn, testServer, type TestServer } from '@/tests/factories/shopWorld';
import { walkRoutes } from '@/tests/factories/walkRoutes';

/* Two shops filled by the same factory. Every route that Express knows is asked by one of them with the ids of the other
 * and with ids that never were: the two answers must be equal to the byte, and hold nothing of the other shop. A route
 * that has no probe here fails, so a new one cannot be forgotten.
 */

const anyId = /[0-9a-f]{8}-[0-9a-f]{4}-7[0-9a-f]{3}-[0-9a-f]{4}-[0-9a-f]{12}/g;

/** Ids to ask with: those of the other shop, or made up ones in the same places. */
type Target = Record<
  | 'session'
  | 'stage'
  | 'head'
  | 'customer'
  | 'bench'
  | 'calibration'
  | 'run'
  | 'rung'
  | 'reading'
  | 'device'
  | 'person'
  | 'change',
  string
> & { mail: string; code: string };

type Call = (target: Target) => PromiseLike<request.Response>;
/** Calls to compare; a stream is looked at in events.test.ts, which hears nothing of the other shop. */
type Probe = Call[] | 'stream';

let server: TestServer;
let ours: FullShop;
let theirs: FullShop;
let admin: pg.Client;
let usedCode: string;

beforeAll(async () => {
  server = await testServer();
  ours = await fullShop(server, 'nutmeg');
  theirs = await fullShop(server, 'oakum');
  admin = new pg.Client({ connectionString: server.db.adminUrl });
  await admin.connect();
  // whoever asks may do everything in their own shop: no answer is hidden behind a missing role
  const all = JSON.stringify(['operator', 'technician', 'supervisor', 'owner']);
  await admin.query('update memberships set roles = $1 where person_id = $2', [all, ours.people.owner.id]);
  const made = await asPerson(server, theirs.people.supervisor)
    .post('/api/devices/enrolment-codes')
    .expect(200);
  usedCode = made.body.code;
  await request(server.app)
    .post('/api/sync/enrol')
    .send({ code: usedCode, deviceName: 'oakum second' })
    .expect(200);
});
afterAll(async () => {
  await admin.end();
  await server.close();
});

const us = () => asPerson(server, ours.people.owner);
const device = () => ({
  get: (path: string) => request(server.app).get(path).set('Authorization', `Bearer ${ours.device.token}`),
  post: (path: string) => request(server.app).post(path).set('Authorization', `Bearer ${ours.device.token}`),
});

/** Changes that name the target in every place where an id can stand. */
function changesOf(target: Target, by: string) {
  const at = { run: target.run, rung: target.rung };
  const draft = (
    kind: 'create' | 'patch' | 'delete',
    table: string,
    rid: string,
    set: object = {},
    base: object = {},
  ) =>
    deskChange({ kind, table, rid, set: set as Record<string, never>, base: base as Record<string, never> });
  const readingOf = (over: object) => ({
    ...reading(ours.device, { ...ours.ids, ...over }),
    byPersonId: by,
    deviceId: null,
  });
  return {
    keyed: [
      draft('patch', 'customers', target.customer, { name: 'x' }, { name: 'oakum customer' }),
      draft('patch', 'heads', target.head, { name: 'x' }, { name: 'oakum head' }),
      draft(
        'patch',
        'heads',
        ours.ids.head,
        { customerId: target.customer },
        { customerId: ours.ids.customer },
      ),
      draft('patch', 'stages', target.stage, { name: 'x' }, { name: 'y' }),
      draft('patch', 'sessions', target.session, { note: 'x' }, { note: '' }),
      draft('patch', 'sessions', ours.ids.session, { benchId: target.bench }, { benchId: ours.ids.bench }),
      draft('patch', 'sessions', ours.ids.session, { stageId: target.stage }, { stageId: ours.ids.stage }),
      draft('patch', 'readings', target.reading, { flowText: '1' }, { flowText: '166' }),
      draft('delete', 'readings', target.reading, {}, { flowText: '166' }),
      draft('delete', 'runs', target.run),
      draft('create', 'heads', v7(), headFields('x', target.customer)),
      draft('create', 'stages', v7(), stageFields('x', target.head)),
      draft('create', 'portDimensions', v7(), portDimensionFields(target.stage)),
      draft('create', 'runs', v7(), runFields(target.session)),
      draft('create', 'rungs', v7(), rungFields(target.run)),
      draft('create', 'readings', v7(), readingOf(at)),
    ],
    atDesk: [
      draft('patch', 'benches', target.bench, { name: 'x' }, { name: 'oakum bench' }),
      draft('patch', 'calibrations', target.calibration, { note: 'x' }, { note: '' }),
      draft('create', 'calibrations', v7(), calibrationFields(target.bench, target.person)),
    ],
  };
}

const push = (drafts: ReturnType<typeof deskChange>[], deviceId = ours.device.id) => {
  const changes = drafts.map((draft) => ours.device.change({ ...draft, by: ours.people.operator.id }));
  if (deviceId !== ours.device.id) ours.device.n -= changes.length;
  return device().post('/api/sync/push').send({
    device: deviceId,
    sv: schemaVersion,
    now: '2026-12-01T10:00:00.000Z',
    pendingCount: changes.length,
    changes,
  });
};

const plan = (over: object) =>
  us()
    .post('/api/sessions')
    .send({
      id: v7(),
      stageId: ours.ids.stage,
      benchId: ours.ids.bench,
      standardPressureText: '28',
      standardPressureUnit: 'inH2O',
      liftPlan: [{ text: '0.1', unit: 'in' }],
      note: '',
      ...over,
    });

const probes: Record<string, Probe> = {
  'GET /api/health': [() => request(server.app).get('/api/health')],
  'POST /api/auth/sign-in': [
    ({ mail }) => request(server.app).post('/api/auth/sign-in').send({ mail, password: 'not the password' }),
    ({ mail }) =>
      request(server.app).post('/api/auth/sign-in').send({ mail, password: ours.people.owner.password }),
  ],
  'POST /api/auth/refresh': [() => request(server.app).post('/api/auth/refresh').send({})],
  'POST /api/auth/sign-out': [() => request(server.app).post('/api/auth/sign-out').send({})],
  'POST /api/auth/sign-out-everywhere': [
    async () => {
      const { mail, password } = ours.people.technician;
      const person = await signIn(server, mail, password);
      return asPerson(server, person).post('/api/auth/sign-out-everywhere').send({});
    },
  ],
  'GET /api/me': [() => us().get('/api/me')],
  'GET /api/events': 'stream',
  'GET /api/sync/events': 'stream',
  'POST /api/sync/enrol': [
    ({ code }) => request(server.app).post('/api/sync/enrol').send({ code, deviceName: 'x' }),
  ],
  'GET /api/sync/roster': [() => device().get('/api/sync/roster')],
  'POST /api/sync/push': [
    (target) =>
      push(changesOf(target, ours.people.operator.id).keyed.map((one) => ({ ...one, set: byOf(one.set) }))),
    (target) =>
      push([
        deskChange({
          kind: 'create',
          table: 'sessions',
          rid: v7(),
          set: sessionFields({ stageId: ours.ids.stage, benchId: target.bench }),
        }),
      ]),
    (target) => push([deskChange({ kind: 'create', table: 'customers', rid: v7() })], target.device),
    (target) => {
      const [change] = [
        ours.device.change({ kind: 'create', table: 'customers', rid: v7(), set: customerFields('x') }),
      ];
      return device()
        .post('/api/sync/push')
        .send({
          device: ours.device.id,
          sv: schemaVersion,
          now: '2026-12-01T10:00:00.000Z',
          pendingCount: 1,
          changes: [{ ...change, by: target.person }],
        });
    },
  ],
  'GET /api/sync/pull': [
    ({ change }) =>
      device().get('/api/sync/pull').query({ after: 3, epoch: '', seen: change, sv: schemaVersion }),
    () =>
      device().get('/api/sync/pull').query({ after: 0, epoch: '', seen: '', sv: schemaVersion, limit: 2 }),
  ],
  'GET /api/sessions': [() => us().get('/api/sessions')],
  'POST /api/sessions': [({ stage }) => plan({ stageId: stage }), ({ bench }) => plan({ benchId: bench })],
  'GET /api/sessions/:id': [({ session }) => us().get(`/api/sessions/${session}`)],
  'GET /api/catalogue': [() => us().get('/api/catalogue')],
  'POST /api/changes': [
    (target) => {
      const { keyed, atDesk } = changesOf(target, ours.people.owner.id);
      return us()
        .post('/api/changes')
        .send({ changes: [...atDesk, ...keyed].map((one) => ({ ...one, id: v7() })) });
    },
  ],
  'GET /api/devices': [() => us().get('/api/devices')],
  'POST /api/devices/enrolment-codes': [() => us().post('/api/devices/enrolment-codes')],
  'POST /api/devices/:id/revoke': [(target) => us().post(`/api/devices/${target.device}/revoke`)],
  'GET /api/people': [() => us().get('/api/people')],
  'PUT /api/people/:id/pin': [({ person }) => us().put(`/api/people/${person}/pin`).send({ pin: '112233' })],
};

/** Readings that come from a device carry its operator. */
const byOf = (set: Record<string, unknown>) =>
  ('byPersonId' in set ? { ...set, deviceId: ours.device.id } : set) as Record<string, never>;

async function idsOfTheirs(): Promise<Target> {
  const { rows } = await admin.query<{ id: string }>(
    'select id from changes where shop_id = $1 and seq = 3',
    [theirs.id],
  );
  return {
    ...theirs.ids,
    calibration: theirs.calibrationId,
    device: theirs.device.id,
    person: theirs.people.operator.id,
    change: rows[0]?.id ?? '',
    mail: theirs.people.owner.mail,
    code: usedCode,
  };
}

const madeUp = (): Target => ({
  session: v7(),
  stage: v7(),
  head: v7(),
  customer: v7(),
  bench: v7(),
  calibration: v7(),
  run: v7(),
  rung: v7(),
  reading: v7(),
  device: v7(),
  person: v7(),
  change: v7(),
  mail: 'nobody@nowhere.example',
  code: 'ZZZZ9999',
});

/** What two answers to the same question may differ in: the request's id, the clock, secrets and counts of our own. */
function comparable(answer: request.Response): string {
  const own =
    /"(requestId|now|expiresAt|accessToken|code|lastSeenAt|label|last|pendingCount|uptimeS)":("[^"]*"|\d+)/g;
  const codeOfProblem = `${answer.body?.code ?? ''}`;
  const text = answer.text.replace(own, '"$1":…').replace(anyId, 'id');
  return `${answer.status} ${answer.type} ${answer.status >= 400 ? codeOfProblem : ''} ${text}`;
}

/** Every id and every word of the other shop, from every column of every table. */
async function marksOfTheirs(): Promise<{ ids: Set<string>; rows: string }> {
  const { rows: tables } = await admin.query<{ name: string }>(
    `select c.relname as name from pg_class c join pg_attribute a on a.attrelid = c.oid and a.attname = 'shop_id'
     where c.relnamespace = 'public'::regnamespace and c.relkind = 'r' order by 1`,
  );
  let text = '';
  for (const { name } of tables) {
    const { rows } = await admin.query(
      `select to_jsonb(t)::text as row from ${name} t where shop_id = $1 order by 1`,
      [theirs.id],
    );
    text += rows.map(({ row }) => `${name} ${row}\n`).join('');
  }
  return { ids: new Set(text.match(anyId)), rows: text };
}

test('every route has a probe, and every probe a route', () => {
  expect(walkRoutes(server.app).sort()).toEqual(Object.keys(probes).sort());
});

test('the probes would see a difference: asked with ids of our own, the answers are other ones', async () => {
  const own = { ...madeUp(), ...ours.ids, device: ours.device.id, person: ours.people.technician.id };
  for (const route of ['GET /api/sessions/:id', 'PUT /api/people/:id/pin']) {
    const [call] = probes[route] as Call[];
    expect(comparable(await call!(own))).not.toBe(comparable(await call!(madeUp())));
  }
});

/** Asks a route with the ids of the other shop and with made up ones, and compares. */
async function compare(where: string, call: Call, target: Target, theirIds: Set<string>): Promise<void> {
  const absent = await call(madeUp());
  const answer = await call(target);
  expect(`${where} ${comparable(answer)}`).toBe(`${where} ${comparable(absent)}`);
  expect(answer.status).toBeLessThan(500);
  const sent = new Set(Object.values(target));
  const told = (answer.text.match(anyId) ?? []).filter((id) => theirIds.has(id) && !sent.has(id));
  expect({ where, told, hasWord: /oakum/i.test(answer.text) }).toEqual({ where, told: [], hasWord: false });
}

test('asked with ids of another shop, every route answers as if they had never been, and tells nothing of it', async () => {
  const target = await idsOfTheirs();
  const before = await marksOfTheirs();
  expect(before.ids.size).toBeGreaterThan(30);
  for (const [route, probe] of Object.entries(probes)) {
    if (probe === 'stream') continue;
    for (const [index, call] of probe.entries())
      await compare(`${route} (${index})`, call, target, before.ids);
  }
  // and nothing of theirs was touched
  expect((await marksOfTheirs()).rows).toBe(before.rows);
}, 60_000);

test('a token of one shop opens nothing of the other, whatever it is asked', async () => {
  const { people } = theirs;
  for (const token of [ours.device.token, ours.people.owner.token]) {
    const answer = await asPerson(server, { token }).get(`/api/sessions/${theirs.ids.session}`);
    expect([401, 404]).toContain(answer.status);
  }
  await asPerson(server, people.operator).get(`/api/sessions/${theirs.ids.session}`).expect(200);
});

/** Records of our own under ids that are taken in the other shop: there they are as free as any. */
const takings: Record<string, Call> = {
  'a session that is planned': ({ session }) => plan({ id: session }),
  'a bench made at the desk': ({ bench }) =>
    us()
      .post('/api/changes')
      .send({
        changes: [deskChange({ kind: 'create', table: 'benches', rid: bench, set: benchFields('x') })],
      }),
  'a customer made on a device': ({ customer }) =>
    push([deskChange({ kind: 'create', table: 'customers', rid: customer, set: customerFields('x') })]),
  'a change': ({ change }) =>
    push([
      {
        ...deskChange({ kind: 'create', table: 'customers', rid: v7(), set: customerFields('x') }),
        id: change,
      },
    ]),
};

test.each(Object.entries(takings))(
  '%s may have an id that is taken in the other shop',
  async (where, call) => {
    const before = await marksOfTheirs();
    await compare(where, call, await idsOfTheirs(), before.ids);
    expect((await marksOfTheirs()).rows).toBe(before.rows);
  },
);
