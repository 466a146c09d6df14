import pino from 'pino';
import { v7 } from 'uuid';
import { connectServerDb } from '@/db/server/connect';
import { lookUp, withShop } from '@/db/server/transaction';
import { readPerson } from '../auth/findActor';
import {
  demoOperator,
  demoOwner,
  demoPassword,
  demoShopName,
  demoSupervisor,
  demoTechnician,
} from '../demo/demoPeople';
import { makeDemoShop } from '../demo/makeDemoShop';
import { makeEnrolmentCode } from '../devices/makeEnrolmentCode';
import type { Ctx } from '../ctx';

/* Makes the demonstration shop when there is no shop at all, and says how to get in. Run by `npm start`. */

const url = process.env.APP_DATABASE_URL;
if (!url) throw new Error('APP_DATABASE_URL is missing: this is run by npm start');
const log = pino({ level: 'warn' }, pino.destination(2));
const db = connectServerDb(url, (error) => log.warn({ err: error }, 'lost a connection'));

async function welcome(): Promise<string[]> {
  const ctx: Ctx = { db, log, clock: () => new Date(), newId: () => v7() };
  const [shops] = await lookUp<{ made: boolean }>(db, 'select has_any_shop() as made', []);
  if (!shops?.made) await makeDemoShop(ctx, Date.now());
  const [found] = await lookUp<{ shop_id: string; person_id: string }>(
    db,
    'select shop_id, person_id from find_people_by_mail($1)',
    [demoSupervisor.mail],
  );
  const supervisor = found && (await withShop(db, found.shop_id, (tx) => readPerson(tx, found.person_id)));
  // somebody's own shop needs no introduction
  if (!supervisor) return [];
  const { code } = await makeEnrolmentCode({ ...ctx, actor: supervisor });
  const signIn = (person: { name: string; mail: string }, what: string) =>
    `    ${what.padEnd(11)} ${person.mail.padEnd(26)} ${person.name}`;
  return [
    '',
    `  Demonstration shop: ${demoShopName}. People and figures are invented.`,
    `  Desk (/desk), password ${demoPassword}`,
    signIn(demoOwner, 'owner'),
    signIn(demoSupervisor, 'supervisor'),
    signIn(demoTechnician, 'technician'),
    `  Bench (/bench), enrolment code ${code.slice(0, 4)}-${code.slice(4)} (one device, 15 minutes; later ones at the desk, under Devices)`,
    ...[demoOperator, demoSupervisor, demoTechnician].map(
      (person) => `    ${person.name.padEnd(11)} PIN ${person.pin}`,
    ),
    '',
  ];
}

welcome()
  .then((lines) => console.log(lines.join('\n')))
  .catch((error: unknown) => {
    console.error(error);
    process.exitCode = 1;
  })
  .finally(() => db.pool.end());
