import pino from 'pino';
import { v7 } from 'uuid';
import { connectServerDb, type ServerDb } from '@/db/server/connect';
import { changeAtDesk } from '@/server/changes/changeAtDesk';
import type { Ctx, PersonCtx } from '@/server/ctx';
import { makeEnrolmentCode } from '@/server/devices/makeEnrolmentCode';
import { addPerson } from '@/server/people/addPerson';
import { createShop } from '@/server/shops/createShop';
import type { Fields } from '@/shared/sync/protocol';
import type { Role } from '@/shared/schema/primitives';
import type { ShopSettings } from '@/shared/schema/records';
import type { SyncTable } from '@/shared/sync/syncTables';
import {
  benchFields,
  customerFields,
  headFields,
  portDimensionFields,
  stageFields,
} from '@/tests/factories/shopRecords';
import { shopSettings } from '@/tests/factories/shopWorld';
import { testDb, type TestDb } from '@/tests/factories/testDb';
import { freePort, RealServer } from './realServer';

/** One shop behind a real server process and a real PostgreSQL, with what a session needs. */
export type World = {
  db: TestDb;
  server: RealServer;
  supervisor: { mail: string; password: string };
  operator: { name: string; pin: string };
  shop: { id: string };
  stageId: string;
  benchId: string;
  /** an enrolment code as the desk would show it */
  enrolmentCode: () => Promise<string>;
  /** acts as the supervisor through a verb */
  asSupervisor: PersonCtx;
  close: () => Promise<void>;
};

const password = 'long enough for a test';

/** Makes a shop with a supervisor, an operator, a customer's head, and a bench that reads true. */
export async function makeWorld(settings: Partial<ShopSettings> = {}): Promise<World> {
  const db = await testDb();
  const verbs: ServerDb = connectServerDb(db.appUrl, () => undefined);
  const ctx: Ctx = { db: verbs, log: pino({ level: 'silent' }), clock: () => new Date(), newId: () => v7() };
  const person = (name: string, roles: Role[], pin: string | null) => ({
    name,
    mail: `${name.toLowerCase().replace(' ', '.')}@alder.example`,
    password,
    roles,
    pin,
  });
  const owner = await createShop(ctx, {
    name: 'Alder Flow Shop',
    settings: { ...shopSettings, ...settings },
    owner: person('Olga Alder', ['owner'], null),
  });
  const join = async (name: string, roles: Role[], pin: string | null): Promise<PersonCtx> => {
    const { id } = await addPerson(owner, person(name, roles, pin));
    return { ...ctx, actor: { shopId: owner.actor.shopId, id, name, roles, signInId: null } };
  };
  const supervisor = await join('Sam Rowan', ['supervisor', 'operator', 'technician'], '135791');
  await join('Petra Holm', ['operator'], '864209');

  const make = async (table: SyncTable, set: Fields): Promise<string> => {
    const rid = v7();
    const { verdicts } = await changeAtDesk(supervisor, {
      changes: [{ id: v7(), kind: 'create', table, rid, base: {}, set }],
    });
    if (verdicts[0]?.verdict !== 'applied')
      throw new Error(`${table}: ${verdicts[0]?.why} ${verdicts[0]?.detail}`);
    return rid;
  };
  const benchId = await make('benches', benchFields('Alder'));
  const headId = await make('heads', headFields('Alder', await make('customers', customerFields('Alder'))));
  const stageId = await make('stages', stageFields('Alder', headId));
  await make('portDimensions', portDimensionFields(stageId));

  const server = new RealServer(db.appUrl, await freePort());
  return {
    db,
    server,
    supervisor: { mail: 'sam.rowan@alder.example', password },
    operator: { name: 'Petra Holm', pin: '864209' },
    shop: { id: owner.actor.shopId },
    stageId,
    benchId,
    enrolmentCode: async () => (await makeEnrolmentCode(supervisor)).code,
    asSupervisor: supervisor,
    close: async () => {
      await server.dispose();
      await verbs.pool.end();
      await db.close();
    },
  };
}
