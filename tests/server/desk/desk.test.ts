import pg from 'pg';
import request from 'supertest';
import { v7 } from 'uuid';
import { Catalogue, SessionView } from '@/shared/schema/views';
import { DeviceList, PeopleList, RosterResponse, SessionList } from '@/shared/schema/api';
import { isRightSecret } from '@/server/auth/passwords';
import { fullShop, type FullShop } from '@/tests/factories/deskShop';
import { customerFields, deskChange, reading } from '@/tests/factories/shopRecords';
import { asPerson, testDevice, testServer, type TestServer } from '@/tests/factories/shopWorld';
import { readingFields } from '@/tests/factories/records';

let server: TestServer;
let shop: FullShop;
let admin: pg.Client;

beforeAll(async () => {
  server = await testServer();
  shop = await fullShop(server, 'fir');
  admin = new pg.Client({ connectionString: server.db.adminUrl });
  await admin.connect();
});
afterAll(async () => {
  await admin.end();
  await server.close();
});

const problem = (answer: request.Response) => [answer.status, answer.body.code];
const operator = () => asPerson(server, shop.people.operator);
const technician = () => asPerson(server, shop.people.technician);
const supervisor = () => asPerson(server, shop.people.supervisor);
const auditOf = async (act: string, about: string) =>
  (await admin.query('select by_person_id as by from audit where act = $1 and about = $2', [act, about]))
    .rows;
const flowPatch = (from: string, to: string) =>
  deskChange({
    kind: 'patch',
    table: 'readings',
    rid: shop.ids.reading,
    base: { flowText: from },
    set: { flowText: to },
  });

describe('sessions', () => {
  test('the list says whose they are, what is in them and who keyed', async () => {
    const { sessions } = SessionList.parse((await operator().get('/api/sessions').expect(200)).body);
    expect(sessions).toContainEqual({
      id: shop.ids.session,
      label: '1-001',
      state: 'open',
      customerName: 'fir customer',
      headName: 'fir head',
      stageName: 'fir as received',
      benchName: 'fir bench',
      runCount: 1,
      rungCount: 1,
      readingCount: 1,
      notSentCount: 0,
      keyedBy: ['fir operator'],
      lastReadingAt: '2026-12-01T10:00:00.000Z',
    });
  });

  test('one session has everything a screen shows, with the texts as keyed', async () => {
    const view = SessionView.parse(
      (await operator().get(`/api/sessions/${shop.ids.session}`).expect(200)).body,
    );
    expect(view.bench.name).toBe('fir bench');
    expect(view.portDimensions).toHaveLength(1);
    expect(view.runs[0]?.readings[0]).toEqual({
      id: shop.ids.reading,
      version: 1,
      mark: 'sent',
      ...reading(shop.device, shop.ids),
    });
    expect(view.people.map((person) => person.name)).toContain('fir operator');
    expect(JSON.stringify(view)).not.toContain(shop.people.operator.mail);
  });

  test('an unknown one is 404', async () => {
    expect(problem(await operator().get(`/api/sessions/${v7()}`))).toEqual([404, 'no_such_record']);
  });

  test('a reading in dispute or with a held change is marked so, in the session and in the count', async () => {
    const other = await testDevice(server, shop, 'second');
    const change = (rid: string, flowText: string) =>
      other.change({ kind: 'patch', table: 'readings', rid, base: { flowText: '1' }, set: { flowText } });
    await other.push(change(shop.ids.reading, '2'));
    const markOf = async () => {
      const { body } = await operator().get(`/api/sessions/${shop.ids.session}`);
      return SessionView.parse(body).runs[0]?.readings[0]?.mark;
    };
    expect(await markOf()).toBe('dispute');
    const { body } = await operator().get('/api/sessions');
    expect(SessionList.parse(body).sessions.find((one) => one.id === shop.ids.session)?.notSentCount).toBe(1);
    await admin.query('update disputes set settled_at = now() where record_id = $1', [shop.ids.reading]);
    expect(await markOf()).toBe('sent');
  });
});

test('the catalogue has what a session is started from', async () => {
  const catalogue = Catalogue.parse((await operator().get('/api/catalogue').expect(200)).body);
  expect(catalogue.customers.map((one) => one.name)).toEqual(['fir customer']);
  expect(catalogue.heads[0]).toMatchObject({ customerId: shop.ids.customer, mark: 'sent', version: 1 });
  expect(catalogue.stages[0]).toMatchObject({ headId: shop.ids.head });
  expect(catalogue.benches[0]).toMatchObject({ id: shop.ids.bench, status: 'inUse' });
});

describe('planning', () => {
  const plan = () => ({
    id: v7(),
    stageId: shop.ids.stage,
    benchId: shop.ids.bench,
    standardPressureText: '28',
    standardPressureUnit: 'inH2O',
    liftPlan: [{ text: '0.100', unit: 'in' }],
    note: '',
  });

  test('copies in settings and the calibration in force, counts the number, and stands in the feed', async () => {
    const asked = plan();
    const { body } = await supervisor().post('/api/sessions').send(asked).expect(200);
    expect(body).toEqual({ id: asked.id, label: expect.stringMatching(/^0-\d{3}$/) });
    const item = (await shop.device.pullAll()).items.find((one) => one.id === asked.id);
    expect(item?.fields).toMatchObject({
      state: 'open',
      plannedBy: shop.people.supervisor.id,
      settings: {
        flowUnit: 'cfm',
        drawing: { calibrationId: shop.calibrationId, grade: 'comparative', fit: { factorText: '1.02' } },
        blowing: null,
      },
    });
  });

  test('asked twice it is planned once, and ten at the same moment get ten numbers', async () => {
    const asked = plan();
    const first = await operator().post('/api/sessions').send(asked).expect(200);
    const again = await operator().post('/api/sessions').send(asked).expect(200);
    expect(again.body).toEqual(first.body);
    const many = await Promise.all(
      Array.from({ length: 10 }, () => operator().post('/api/sessions').send(plan()).expect(200)),
    );
    expect(new Set(many.map((answer) => answer.body.label)).size).toBe(10);
  });

  test('needs a stage and a bench of the shop, a plan, a pressure', async () => {
    for (const over of [{ stageId: v7() }, { benchId: v7() }])
      expect(
        problem(
          await operator()
            .post('/api/sessions')
            .send({ ...plan(), ...over }),
        ),
      ).toEqual([404, 'no_such_record']);
    for (const over of [
      { liftPlan: [] },
      { standardPressureText: '2.8.0' },
      { note: 'a\u0000' },
      { more: 1 },
    ])
      expect(
        problem(
          await operator()
            .post('/api/sessions')
            .send({ ...plan(), ...over }),
        ),
      ).toEqual([422, 'invalid']);
  });
});

describe('changes at the desk', () => {
  const send = (who: ReturnType<typeof operator>, ...changes: unknown[]) =>
    who.post('/api/changes').send({ changes });

  test('are merged, logged without a device under the person, and answered the same when asked twice', async () => {
    const change = flowPatch('166', '165');
    const first = await send(technician(), change).expect(200);
    expect(first.body.verdicts).toEqual([{ id: change.id, verdict: 'applied', version: 2 }]);
    expect((await send(technician(), change)).body).toEqual(first.body);
    const { rows } = await admin.query(
      'select device_id, n, by_person_id as by, old, seq is not null as moved from changes where id = $1',
      [change.id],
    );
    expect(rows).toEqual([
      { device_id: null, n: null, by: shop.people.technician.id, old: { flowText: '166' }, moved: true },
    ]);
    const stale = await send(technician(), flowPatch('166', '160')).expect(200);
    expect(stale.body.verdicts).toMatchObject([{ verdict: 'dispute', why: 'differs' }]);
    await send(technician(), flowPatch('165', '166')).expect(200);
  });

  test('a handed in session is closed to the operator, open to the technician for its readings, and not for more', async () => {
    await shop.device.push({
      ...shop.device.change({ kind: 'handIn', table: 'sessions', rid: shop.ids.session }),
      expect: [{ readingId: shop.ids.reading, liftText: '0.300', flowText: '166', pressureText: '27.0' }],
    });
    expect(problem(await send(operator(), flowPatch('166', '1')))).toEqual([409, 'state_forbids']);
    await send(technician(), flowPatch('166', '164')).expect(200);
    await send(technician(), flowPatch('164', '166')).expect(200);
    const late = shop.device.change({
      kind: 'patch',
      table: 'readings',
      rid: shop.ids.reading,
      base: { flowText: '166' },
      set: { flowText: '1' },
    });
    expect((await shop.device.push(late)).verdicts).toMatchObject([
      { verdict: 'held', why: 'session_closed' },
    ]);
    await admin.query('update disputes set settled_at = now() where record_id = $1', [shop.ids.reading]);
    const { body } = await operator().get(`/api/sessions/${shop.ids.session}`);
    expect(SessionView.parse(body).runs[0]?.readings[0]?.mark).toBe('held');
    const run = deskChange({
      kind: 'patch',
      table: 'runs',
      rid: shop.ids.run,
      base: { pass: 'up' },
      set: { pass: 'down' },
    });
    expect(problem(await send(operator(), run))).toEqual([409, 'state_forbids']);
    expect(problem(await send(technician(), run))).toEqual([403, 'not_allowed']);
  });

  test('one that may not be done stops all of the request', async () => {
    const customer = deskChange({
      kind: 'create',
      table: 'customers',
      rid: v7(),
      set: customerFields('fir'),
    });
    const bench = deskChange({
      kind: 'patch',
      table: 'benches',
      rid: shop.ids.bench,
      base: { name: 'fir bench' },
      set: { name: 'x' },
    });
    expect(problem(await send(operator(), customer, bench))).toEqual([403, 'not_allowed']);
    const { rows } = await admin.query('select from customers where id = $1', [customer.rid]);
    expect(rows).toHaveLength(0);
  });

  test('sessions are planned, not created; customers are not deleted; nobody keys under another name', async () => {
    const { run, session, customer } = shop.ids;
    for (const change of [
      deskChange({ kind: 'create', table: 'sessions', rid: session }),
      deskChange({ kind: 'delete', table: 'customers', rid: customer }),
      deskChange({ kind: 'create', table: 'readings', rid: v7(), set: readingFields({ runId: run }) }),
      { ...deskChange({ kind: 'patch', table: 'customers', rid: customer }), kind: 'handIn' },
    ])
      expect(problem(await send(operator(), change))).toEqual([422, 'invalid']);
  });
});

describe('devices', () => {
  test('are enrolled by a one-time code, which works once and for a quarter of an hour', async () => {
    const { body: made } = await supervisor().post('/api/devices/enrolment-codes').expect(200);
    expect(made.code).toMatch(/^[A-HJ-NP-Z2-9]{8}$/);
    const enrol = (code: string) =>
      request(server.app).post('/api/sync/enrol').send({ code, deviceName: 'shed' });
    const typed = ` ${made.code.slice(0, 4).toLowerCase()}-${made.code.slice(4)}`;
    const { body: enrolled } = await enrol(typed).expect(200);
    expect(problem(await enrol(made.code))).toEqual([422, 'wrong_code']);
    const { devices } = DeviceList.parse((await supervisor().get('/api/devices').expect(200)).body);
    expect(devices.find((device) => device.id === enrolled.deviceId)).toMatchObject({
      name: 'shed',
      revokedAt: null,
    });
    expect(new Set(devices.map((device) => device.deviceOrdinal)).size).toBe(devices.length);
    expect(await auditOf('deviceEnrolled', enrolled.deviceId)).toEqual([{ by: shop.people.supervisor.id }]);
    const { body: late } = await supervisor().post('/api/devices/enrolment-codes').expect(200);
    server.pass(15 * 60_000 + 1000);
    expect(problem(await enrol(late.code))).toEqual([422, 'wrong_code']);
    expect(JSON.stringify(devices)).not.toContain(enrolled.token);
  });

  test('a code used by two at the same moment makes one device', async () => {
    const person = await freshSupervisor();
    const { body: made } = await person.post('/api/devices/enrolment-codes').expect(200);
    const enrol = () =>
      request(server.app).post('/api/sync/enrol').send({ code: made.code, deviceName: 'twin' });
    const answers = await Promise.all([enrol(), enrol(), enrol()]);
    expect(answers.map((answer) => answer.status).sort()).toEqual([200, 422, 422]);
  });

  test.each([
    [{ code: 'ABCDEFG1', deviceName: 'x' }],
    [{ code: 'ABCD', deviceName: 'x' }],
    [{ code: 'ABCDEFGH', deviceName: '' }],
    [{ code: 'ABCDEFGH' }],
    [{ code: 12345678, deviceName: 'x' }],
  ])('enrolling with %j is 422', async (body) => {
    const answer = await request(server.app).post('/api/sync/enrol').send(body);
    expect(problem(answer)).toEqual([422, 'invalid']);
  });

  test('shutting out twice is done and written down once; an unknown device is 404', async () => {
    const device = await testDevice(server, await freshShop(), 'lost');
    const person = await freshSupervisor();
    for (let times = 0; times < 2; times += 1)
      await person.post(`/api/devices/${device.id}/revoke`).expect(204);
    expect(await auditOf('deviceRevoked', device.id)).toHaveLength(1);
    expect(problem(await person.post(`/api/devices/${v7()}/revoke`))).toEqual([404, 'no_such_record']);
  });

  test('the desk sees how much waits on a device and when it was last heard', async () => {
    const change = shop.device.change({
      kind: 'create',
      table: 'customers',
      rid: v7(),
      set: customerFields('fir'),
    });
    await shop.device.send([change], { pendingCount: 31 }).expect(200);
    const { body } = await (await freshSupervisor()).get('/api/devices');
    const device = DeviceList.parse(body).devices.find((one) => one.id === shop.device.id);
    expect(device).toMatchObject({ pendingCount: 30, lastSeenAt: expect.any(String) });
  });
});

/** Sign-ins of the beginning are over once a test has moved the clock. */
async function freshShop(): Promise<FullShop> {
  const { mail, password } = shop.people.supervisor;
  const answer = await request(server.app).post('/api/auth/sign-in').send({ mail, password }).expect(200);
  return {
    ...shop,
    people: { ...shop.people, supervisor: { ...shop.people.supervisor, token: answer.body.accessToken } },
  };
}
const freshSupervisor = async () => asPerson(server, (await freshShop()).people.supervisor);
const freshOwner = async () => {
  const { mail, password } = shop.people.owner;
  const answer = await request(server.app).post('/api/auth/sign-in').send({ mail, password }).expect(200);
  return asPerson(server, { token: answer.body.accessToken });
};

describe('people', () => {
  test('the list has names, roles and whether there is a PIN, and no secret', async () => {
    const { body } = await (await freshOwner()).get('/api/people').expect(200);
    const { people } = PeopleList.parse(body);
    expect(people).toHaveLength(4);
    expect(people[0]).toMatchObject({ name: 'fir operator', roles: ['operator'], hasPin: true });
    expect(JSON.stringify(body)).not.toMatch(/\$2[aby]\$/);
  });

  test('a PIN set at the desk reaches devices as a verifier, and is written down without it', async () => {
    const { operator: person } = shop.people;
    await (await freshOwner()).put(`/api/people/${person.id}/pin`).send({ pin: '135790' }).expect(204);
    const roster = async () =>
      RosterResponse.parse(
        (
          await request(server.app)
            .get('/api/sync/roster')
            .set('Authorization', `Bearer ${shop.device.token}`)
        ).body,
      );
    const known = (await roster()).people.find((one) => one.id === person.id);
    expect(await isRightSecret('135790', known?.pinHash ?? null)).toBe(true);
    expect(await isRightSecret('246810', known?.pinHash ?? null)).toBe(false);
    expect(await auditOf('pinSet', person.id)).toEqual([{ by: shop.people.owner.id }]);
    const { rows } = await admin.query(`select body::text from audit where act = 'pinSet'`);
    expect(JSON.stringify(rows)).not.toContain('135790');
    await admin.query('update people set closed_at = now() where id = $1', [person.id]);
    expect((await roster()).people.map((one) => one.id)).not.toContain(person.id);
    await admin.query('update people set closed_at = null where id = $1', [person.id]);
  });

  test.each(['12345', '1234567', 'abcdef', '١٢٣٤٥٦', ' 123456', ''])('a PIN of %j is 422', async (pin) => {
    const answer = await (await freshOwner()).put(`/api/people/${shop.people.operator.id}/pin`).send({ pin });
    expect(problem(answer)).toEqual([422, 'invalid']);
  });

  test('a PIN for somebody who is not there is 404', async () => {
    const answer = await (await freshOwner()).put(`/api/people/${v7()}/pin`).send({ pin: '135790' });
    expect(problem(answer)).toEqual([404, 'no_such_record']);
  });
});
