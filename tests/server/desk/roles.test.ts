import { v7 } from 'uuid';
import type { Role } from '@/shared/schema/primitives';
import { calibrationFields, fullShop, type FullShop } from '@/tests/factories/deskShop';
import {
  benchFields,
  customerFields,
  deskChange,
  headFields,
  portDimensionFields,
  runFields,
  rungFields,
  stageFields,
} from '@/tests/factories/shopRecords';
import { readingFields } from '@/tests/factories/records';
import { asPerson, testServer, type TestServer } from '@/tests/factories/shopWorld';

/* Every act of the desk against every role, over the real API. */

const roles: Role[] = ['operator', 'technician', 'supervisor', 'owner'];
let server: TestServer;
let shop: FullShop;

beforeAll(async () => {
  server = await testServer();
  shop = await fullShop(server, 'hazel');
});
afterAll(() => server.close());

type Ask = (role: Role) => Promise<{ status: number; body: { code?: string } }>;
const as = (role: Role) => asPerson(server, shop.people[role]);
const change = (make: (by: string) => ReturnType<typeof deskChange>): Ask => {
  return async (role) =>
    as(role)
      .post('/api/changes')
      .send({ changes: [make(shop.people[role].id)] });
};
const create = (table: string, fields: (by: string) => object): Ask =>
  change((by) => deskChange({ kind: 'create', table, rid: v7(), set: fields(by) as Record<string, never> }));

const asks: [string, readonly Role[], Ask][] = [
  ['read sessions', roles, async (role) => as(role).get('/api/sessions')],
  ['read one session', roles, async (role) => as(role).get(`/api/sessions/${shop.ids.session}`)],
  ['read the catalogue', roles, async (role) => as(role).get('/api/catalogue')],
  ['read devices', roles, async (role) => as(role).get('/api/devices')],
  ['read people', roles, async (role) => as(role).get('/api/people')],
  ['read who one is', roles, async (role) => as(role).get('/api/me')],
  [
    'plan a session',
    ['operator', 'supervisor'],
    async (role) =>
      as(role)
        .post('/api/sessions')
        .send({
          id: v7(),
          stageId: shop.ids.stage,
          benchId: shop.ids.bench,
          standardPressureText: '28',
          standardPressureUnit: 'inH2O',
          liftPlan: [{ text: '0.1', unit: 'in' }],
          note: '',
        }),
  ],
  ['make a customer', ['operator'], create('customers', () => customerFields('hazel'))],
  ['make a head', ['operator'], create('heads', () => headFields('hazel', shop.ids.customer))],
  ['make a stage', ['operator'], create('stages', () => stageFields('hazel', shop.ids.head))],
  ['note port dimensions', ['operator'], create('portDimensions', () => portDimensionFields(shop.ids.stage))],
  ['make a run', ['operator'], create('runs', () => runFields(shop.ids.session))],
  ['make a rung', ['operator'], create('rungs', () => rungFields(shop.ids.run))],
  [
    'key a reading',
    ['operator'],
    create('readings', (byPersonId) => readingFields({ runId: shop.ids.run, byPersonId })),
  ],
  [
    'correct a reading',
    ['operator', 'technician'],
    change(() =>
      deskChange({
        kind: 'patch',
        table: 'readings',
        rid: shop.ids.reading,
        base: { isUsed: true },
        set: { isUsed: true },
      }),
    ),
  ],
  [
    'change a session',
    ['operator'],
    change(() =>
      deskChange({
        kind: 'patch',
        table: 'sessions',
        rid: shop.ids.session,
        base: { note: '' },
        set: { note: '' },
      }),
    ),
  ],
  ['make a bench', ['technician'], create('benches', () => benchFields('hazel'))],
  [
    'adopt a calibration',
    ['technician'],
    create('calibrations', (by) => calibrationFields(shop.ids.bench, by)),
  ],
  [
    'make an enrolment code',
    ['supervisor', 'owner'],
    async (role) => as(role).post('/api/devices/enrolment-codes'),
  ],
  [
    'shut a device out',
    ['supervisor'],
    async (role) => as(role).post(`/api/devices/${shop.device.id}/revoke`),
  ],
  [
    "set a colleague's PIN",
    ['owner'],
    async (role) => {
      const colleague = shop.people[role === 'operator' ? 'technician' : 'operator'];
      return as(role).put(`/api/people/${colleague.id}/pin`).send({ pin: '112233' });
    },
  ],
  [
    "set one's own PIN",
    roles,
    async (role) => as(role).put(`/api/people/${shop.people[role].id}/pin`).send({ pin: '112233' }),
  ],
];

describe.each(asks)('to %s', (_, allowed, ask) => {
  test.each(roles)('as %s', async (role) => {
    const answer = await ask(role);
    if (allowed.includes(role)) expect([200, 204]).toContain(answer.status);
    else expect([answer.status, answer.body.code]).toEqual([403, 'not_allowed']);
  });
});
