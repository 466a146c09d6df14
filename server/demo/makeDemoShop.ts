import { v7 } from 'uuid';
import type { Fields } from '@/shared/sync/protocol';
import type { SyncTable } from '@/shared/sync/syncTables';
import { changeAtDesk } from '../changes/changeAtDesk';
import type { Actor, Ctx } from '../ctx';
import { addPerson } from '../people/addPerson';
import { planSession } from '../sessions/planSession';
import { getSession } from '../sessions/getSession';
import { createShop } from '../shops/createShop';
import { fourValveIntake, twoValveExhaust, twoValveIntake } from './benchDays';
import { demoOperator, demoOwner, demoShopName, demoSupervisor, demoTechnician } from './demoPeople';
import {
  demoBench,
  demoCalibration,
  demoCustomer,
  demoDimension,
  demoFourValveHead,
  demoSettings,
  demoStage,
  demoTwoValveHead,
} from './demoRecords';
import { DemoTablet } from './demoTablet';

/** A clock that stands until it is moved, and ids that follow from the seed and the clock. */
function seeded(ctx: Ctx, startMs: number, seed: number) {
  let nowMs = startMs;
  let state = seed;
  const rng = () =>
    Uint8Array.from({ length: 16 }, () => {
      // a linear congruential step is plenty: the ids have to be different, not secret
      state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
      return state >>> 24;
    });
  let count = 0;
  return {
    ...ctx,
    clock: () => new Date(nowMs),
    newId: () => v7({ msecs: nowMs, seq: (count += 1), rng }),
    moveOn: (seconds: number) => {
      nowMs += seconds * 1000;
    },
  };
}

const lift = (unit: 'in' | 'mm') => (row: readonly [string, string, string]) => ({ text: row[0], unit });

/** Makes the demonstration shop through the verbs that people and devices use: two heads, a session that was handed in,
 * a planned one, and one that stopped half-way. @param endMs the instant by which all of it has happened */
export async function makeDemoShop(given: Ctx, endMs: number): Promise<void> {
  const ctx = seeded(given, endMs - 26 * 60 * 60 * 1000, 28);
  const owner = await createShop(ctx, { name: demoShopName, settings: demoSettings, owner: demoOwner });
  const { shopId } = owner.actor;
  const join = async (
    person: typeof demoSupervisor | typeof demoTechnician | typeof demoOperator,
  ): Promise<Actor> => {
    const { id } = await addPerson(owner, person);
    return { shopId, id, name: person.name, roles: [...person.roles], signInId: null };
  };
  const supervisor = { ...ctx, actor: await join(demoSupervisor) };
  const technician = { ...ctx, actor: await join(demoTechnician) };
  const operator = await join(demoOperator);

  const make = async (table: SyncTable, set: Fields): Promise<string> => {
    const rid = ctx.newId();
    const change = { id: ctx.newId(), kind: 'create', table, rid, base: {}, set };
    const { verdicts } = await changeAtDesk(technician, { changes: [change] });
    if (verdicts[0]?.verdict !== 'applied')
      throw new Error(`the demonstration's ${table} was ${verdicts[0]?.why}`);
    return rid;
  };

  const benchId = await make('benches', demoBench);
  for (const direction of ['drawing', 'blowing'] as const)
    await make(
      'calibrations',
      demoCalibration(benchId, direction, technician.actor.id, ctx.clock().toISOString()),
    );

  const saloonHead = await make(
    'heads',
    demoTwoValveHead(await make('customers', demoCustomer('Harrow & Finch'))),
  );
  const received = await make('stages', demoStage(saloonHead, 1, 'As received', ''));
  await make(
    'portDimensions',
    demoDimension(received, 'intake', { unit: 'in', valve: '1.960', stem: '0.342', throat: '1.720' }),
  );
  await make(
    'portDimensions',
    demoDimension(received, 'exhaust', { unit: 'in', valve: '1.560', stem: '0.342', throat: '1.365' }),
  );
  const climbHead = await make(
    'heads',
    demoFourValveHead(await make('customers', demoCustomer('Sedge Moor Climbers'))),
  );
  const finished = await make(
    'stages',
    demoStage(climbHead, 1, 'Finished', 'Ports matched, guides shortened.'),
  );
  await make(
    'portDimensions',
    demoDimension(finished, 'intake', { unit: 'mm', valve: '34.5', stem: '5.5', throat: '30.0' }),
  );

  const plan = async (
    stageId: string,
    unit: 'in' | 'mm',
    rows: readonly (readonly [string, string, string])[],
    note: string,
  ) => {
    const { id } = await planSession(supervisor, {
      id: ctx.newId(),
      stageId,
      benchId,
      standardPressureText: '28',
      standardPressureUnit: 'inH2O',
      liftPlan: rows.map(lift(unit)),
      note,
    });
    return (await getSession(supervisor, id)).session;
  };

  const tablet = await DemoTablet.enrol(supervisor, 'Shed tablet', operator.id);
  const first = await plan(received, 'in', twoValveIntake, '');
  ctx.moveOn(1800);
  const seen = [
    ...tablet.run(
      first.id,
      1,
      { side: 'intake', port: '1', valvesOpenCount: 1 },
      first.liftPlan,
      twoValveIntake,
      first.settings,
    ),
    ...tablet.run(
      first.id,
      2,
      { side: 'exhaust', port: '1', valvesOpenCount: 1 },
      first.liftPlan,
      twoValveExhaust,
      first.settings,
    ),
  ];
  tablet.handIn(first.id, seen);
  await tablet.send();

  ctx.moveOn(20 * 3600);
  const halfWay = await plan(finished, 'mm', fourValveIntake, '');
  ctx.moveOn(1200);
  tablet.run(
    halfWay.id,
    1,
    { side: 'intake', port: '1', valvesOpenCount: 2 },
    halfWay.liftPlan,
    fourValveIntake.slice(0, 6),
    halfWay.settings,
  );
  await tablet.send();

  const bowls = await make(
    'stages',
    demoStage(saloonHead, 2, 'Bowls opened', 'Throats blended, short side left alone.'),
  );
  await plan(bowls, 'in', twoValveIntake, 'Intake 1 and exhaust 1, to compare with as received.');
}
