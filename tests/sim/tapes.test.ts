import { asc, eq, gt } from 'drizzle-orm';
import fc from 'fast-check';
import { v7 } from 'uuid';
import { getFact } from '@/db/device/meta';
import { nextBatch } from '@/db/device/outbox';
import { outbox } from '@/db/device/schema/deviceTables';
import { readings } from '@/db/device/schema/working';
import { rebuildRecords, recordsInOutbox } from '@/db/device/workingRows';
import type { Change } from '@/shared/sync/protocol';
import { benchWorld, type BenchWorld, type WorldDevice } from '../factories/benchWorld';
import { deskBatchOf } from '../factories/deskBatch';
import { readingFields, sessionFields } from '../factories/records';
import { customerFields, headFields, runFields, stageFields } from '../factories/shopRecords';

/* Tapes of small integers over two devices, a desk and the server, with everything that fails in a shed: answers and
 * requests lost, browsers killed in the middle of a statement, disks and the server set back to an earlier copy. After
 * each step the queue of each device is whole; at rest, after healing:
 *
 *   nothing lost     every change a device committed is in the shop's log, once, with a verdict, unless the very disks
 *                    that held it were set back
 *   convergence      both devices show the readings that PostgreSQL holds
 *   nothing waits    every queue is empty
 */

let world: BenchWorld;
beforeAll(async () => {
  world = await benchWorld();
});
afterAll(() => world.close());

const stepKinds = [
  ...Array<'key'>(6).fill('key'),
  ...Array<'patch'>(3).fill('patch'),
  ...Array<'undo'>(2).fill('undo'),
  ...Array<'sync'>(5).fill('sync'),
  ...Array<'loseAnswer'>(3).fill('loseAnswer'),
  ...Array<'loseRequest'>(2).fill('loseRequest'),
  ...Array<'killInSync'>(4).fill('killInSync'),
  ...Array<'killInKey'>(2).fill('killInKey'),
  ...Array<'desk'>(2).fill('desk'),
  'image',
  'rollBack',
  'backup',
  'restore',
] as const;
const Step = fc.record({
  kind: fc.constantFrom(...stepKinds),
  who: fc.nat(1),
  arg: fc.nat(79),
});
type Step = { kind: (typeof stepKinds)[number]; who: number; arg: number };

class Tape {
  private constructor(
    private readonly devices: [WorldDevice, WorldDevice],
    private readonly runId: string,
  ) {}
  private readonly images: (string | null)[] = [null, null];
  private backup: Awaited<ReturnType<BenchWorld['backup']>> | null = null;
  private flow = 0;
  /** changes that somebody was told are saved, while a disk still holds them */
  private readonly committed = new Set<string>();

  static async begin(): Promise<Tape> {
    const runId = await deskSession();
    const devices: [WorldDevice, WorldDevice] = [await world.device(), await world.device()];
    for (const device of devices) await device.sync();
    return new Tape(devices, runId);
  }

  async play({ kind, who, arg }: Step): Promise<void> {
    const device = who === 0 ? this.devices[0] : this.devices[1];
    if (kind === 'key') await this.key(device);
    if (kind === 'patch') await this.patch(device, arg);
    if (kind === 'undo') await this.undo(device, arg);
    if (kind === 'sync') await device.sync();
    if (kind === 'loseAnswer' || kind === 'loseRequest') {
      let left = arg % 4;
      device.network = () => (left-- === 0 ? kind : 'ok');
      await device.sync();
      device.network = () => 'ok';
    }
    if (kind === 'killInSync') await this.killed(device, arg, () => device.sync());
    if (kind === 'killInKey') await this.killed(device, arg % 12, () => this.key(device));
    if (kind === 'desk') await this.desk(arg);
    if (kind === 'image') this.images[who] = await device.image();
    if (kind === 'rollBack') await this.rollBack(device, this.images[who] ?? null);
    if (kind === 'backup') this.backup = await world.backup();
    if (kind === 'restore') await this.restore(arg % 2 === 0 ? 'newLife' : 'sameLife');
    await this.expectWhole(device);
  }

  private async commit(device: WorldDevice, draft: Parameters<WorldDevice['record']>[0]): Promise<void> {
    for (const change of await device.record(draft)) this.committed.add(change.id);
  }

  private async key(device: WorldDevice): Promise<void> {
    this.flow += 1;
    const set = readingFields({
      runId: this.runId,
      flowText: String(this.flow),
      byPersonId: device.personId,
    });
    await this.commit(device, { kind: 'create', table: 'readings', rid: v7(), set });
  }

  /** A reading that stands on the device's screen. */
  private async seen(device: WorldDevice, arg: number) {
    const rows = await device.db.read
      .select({ id: readings.id, flowText: readings.flowText, deleted: readings.deleted })
      .from(readings)
      .where(eq(readings.runId, this.runId))
      .orderBy(asc(readings.id));
    const living = rows.filter((row) => !row.deleted);
    return living[arg % Math.max(living.length, 1)];
  }

  private async patch(device: WorldDevice, arg: number): Promise<void> {
    const reading = await this.seen(device, arg);
    if (!reading) return;
    this.flow += 1;
    const [base, set] = [{ flowText: reading.flowText }, { flowText: String(this.flow) }];
    await this.commit(device, { kind: 'patch', table: 'readings', rid: reading.id, base, set });
  }

  private async undo(device: WorldDevice, arg: number): Promise<void> {
    const reading = await this.seen(device, arg);
    if (!reading) return;
    const base = { flowText: reading.flowText };
    await this.commit(device, { kind: 'delete', table: 'readings', rid: reading.id, base });
  }

  private async killed(device: WorldDevice, step: number, work: () => Promise<unknown>): Promise<void> {
    device.driver.dieAt(step);
    await work().catch(() => undefined);
    await device.reopen();
  }

  private async desk(arg: number): Promise<void> {
    const rows = await this.inShop();
    const row = rows.filter(({ deleted }) => !deleted)[arg % Math.max(rows.length, 1)];
    if (!row) return;
    this.flow += 1;
    await deskBatchOf(world.server, world.shop, [
      {
        kind: 'patch',
        table: 'readings',
        rid: row.id,
        base: { flowText: row.flow },
        set: { flowText: String(this.flow) },
      },
    ]);
  }

  private async rollBack(device: WorldDevice, image: string | null): Promise<void> {
    if (image === null) return;
    const before = await this.queued(device);
    await device.rollBackTo(image);
    await this.forgetUnless([...(await this.logged()), ...(await this.queuedAnywhere())], before);
  }

  private async restore(how: 'newLife' | 'sameLife'): Promise<void> {
    if (!this.backup) return;
    const before = await this.logged();
    await world.restore(this.backup, how);
    await this.forgetUnless([...(await this.logged()), ...(await this.queuedAnywhere())], before);
  }

  /** What no disk holds any more cannot come back. */
  private async forgetUnless(held: string[], candidates: string[]): Promise<void> {
    const kept = new Set(held);
    for (const id of candidates) if (!kept.has(id)) this.committed.delete(id);
  }

  private async queued(device: WorldDevice): Promise<string[]> {
    return (await device.db.read.select({ id: outbox.id }).from(outbox)).map(({ id }) => id);
  }

  private async queuedAnywhere(): Promise<string[]> {
    return [...(await this.queued(this.devices[0])), ...(await this.queued(this.devices[1]))];
  }

  private async logged(): Promise<string[]> {
    const { rows } = await world.admin.query<{ id: string }>('select id from changes');
    return rows.map(({ id }) => id);
  }

  private async inShop(): Promise<{ id: string; flow: string; deleted: boolean }[]> {
    const { rows } = await world.admin.query<{ id: string; flow: string; deleted: boolean }>(
      'select id, flow_text as flow, deleted from readings where run_id = $1 order by id',
      [this.runId],
    );
    return rows;
  }

  private async expectWhole(device: WorldDevice): Promise<void> {
    const places = (await nextBatch(device.db.read, 500)).map(({ n }) => n);
    const next = (await getFact(device.db.read, 'nextN')) ?? 1;
    expect(places).toEqual(places.map((_, index) => next - places.length + index));
  }

  async heal(): Promise<void> {
    for (let round = 0; round < 5; round += 1)
      for (const device of this.devices) {
        const report = await device.sync();
        if (report?.state === 'enrolAgain') await device.enrol(await world.newCode());
      }
    for (const device of this.devices) expect(await device.sync()).toEqual({ state: 'idle' });
  }

  async expectAtRest(): Promise<void> {
    const logged = new Set(await this.logged());
    expect([...this.committed].filter((id) => !logged.has(id))).toEqual([]);
    const shop = await this.inShop();
    for (const device of this.devices) {
      expect(await nextBatch(device.db.read, 500)).toEqual([]);
      const here = await device.db.read
        .select({
          id: readings.id,
          flow: readings.flowText,
          deleted: readings.deleted,
          version: readings.version,
        })
        .from(readings)
        .where(gt(readings.version, 0))
        .orderBy(asc(readings.id));
      const ofRun = new Set(shop.map(({ id }) => id));
      expect(here.filter(({ id }) => ofRun.has(id)).map(({ version: _version, ...row }) => row)).toEqual(
        shop,
      );
      await this.expectRowsAreOverlay(device);
    }
    const { rows } = await world.admin.query<{ why: string }>(
      `select distinct why from changes where why is not null and device_id = any($1::uuid[])`,
      [[await this.devices[0].id(), await this.devices[1].id()]],
    );
    const wrong = ['invalid', 'not_by_device', 'newer_version', 'unknown_table'];
    expect(rows.filter(({ why }) => wrong.includes(why))).toEqual([]);
  }

  /** The working rows are what they would be if they were all drawn anew. */
  private async expectRowsAreOverlay(device: WorldDevice): Promise<void> {
    const all = () => device.db.read.select().from(readings).orderBy(asc(readings.id));
    const before = await all();
    await device.db.tx(async (tx) =>
      rebuildRecords(tx, [
        ...before.map(({ id }) => ({ tableName: 'readings', id })),
        ...(await recordsInOutbox(tx)),
      ]),
    );
    expect(await all()).toEqual(before);
  }
}

/** A session with a run, planned at the desk. @returns id of the run */
async function deskSession(): Promise<string> {
  const [customer, head, stage, session, run] = [v7(), v7(), v7(), v7(), v7()];
  const create = (table: string, rid: string, set: object) =>
    ({ kind: 'create', table, rid, set: set as Change['set'] }) as const;
  await deskBatchOf(world.server, world.shop, [
    create('customers', customer, customerFields('fell')),
    create('heads', head, headFields('fell', customer)),
    create('stages', stage, stageFields('fell', head)),
    create(
      'sessions',
      session,
      sessionFields({ stageId: stage, benchId: world.benchId, plannedBy: world.shop.owner.actor.id }),
    ),
    create('runs', run, runFields(session)),
  ]);
  return run;
}

it('loses, doubles and diverges on no tape', async () => {
  await fc.assert(
    fc.asyncProperty(fc.array(Step, { minLength: 4, maxLength: 24 }), async (steps) => {
      const tape = await Tape.begin();
      for (const step of steps) await tape.play(step);
      await tape.heal();
      await tape.expectAtRest();
    }),
    { numRuns: Number(process.env.TAPE_COUNT ?? 12), endOnFailure: false },
  );
}, 600_000);
