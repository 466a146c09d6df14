import pino from 'pino';
import { v7 } from 'uuid';
import { connectServerDb } from '@/db/server/connect';
import { lookUp, withShop } from '@/db/server/transaction';
import { readPerson } from '@/server/auth/findActor';
import type { Ctx } from '@/server/ctx';
import { demoOperator, demoPassword, demoSupervisor } from '@/server/demo/demoPeople';
import { makeDemoShop } from '@/server/demo/makeDemoShop';
import { makeEnrolmentCode } from '@/server/devices/makeEnrolmentCode';
import { testDb } from '@/tests/factories/testDb';
import { freePort, RealServer } from './realServer';

/** The demonstration shop behind a real server process: what a newcomer sees after `npm start`. */
export async function demoWorld() {
  const db = await testDb();
  const verbs = connectServerDb(db.appUrl, () => undefined);
  const ctx: Ctx = { db: verbs, log: pino({ level: 'silent' }), clock: () => new Date(), newId: () => v7() };
  await makeDemoShop(ctx, Date.now());
  const [found] = await lookUp<{ shop_id: string; person_id: string }>(
    verbs,
    'select shop_id, person_id from find_people_by_mail($1)',
    [demoSupervisor.mail],
  );
  const supervisor = found && (await withShop(verbs, found.shop_id, (tx) => readPerson(tx, found.person_id)));
  if (!supervisor) throw new Error('the demonstration shop has no supervisor');
  const server = new RealServer(db.appUrl, await freePort());
  return {
    server,
    operator: { name: demoOperator.name, pin: demoOperator.pin },
    supervisor: { mail: demoSupervisor.mail, password: demoPassword },
    enrolmentCode: async () => (await makeEnrolmentCode({ ...ctx, actor: supervisor })).code,
    close: async () => {
      await server.dispose();
      await verbs.pool.end();
      await db.close();
    },
  };
}
export type DemoWorld = Awaited<ReturnType<typeof demoWorld>>;
