import { newRun, rungsOfPlan } from '@/shared/session/startSession';
import type { PlannedLift, Side } from '@/shared/schema/primitives';
import type { Reading, SessionSettings } from '@/shared/schema/records';
import type { Change, Fields, SeenReading } from '@/shared/sync/protocol';
import { schemaVersion, type SyncTable } from '@/shared/sync/syncTables';
import type { Ctx, PersonCtx } from '../ctx';
import { makeEnrolmentCode } from '../devices/makeEnrolmentCode';
import { enrol } from '../sync/enrol';
import { push } from '../sync/push';

type KeyedRow = readonly [lift: string, flow: string, pressure: string];

/** A bench tablet of the demonstration: it queues changes and pushes them through the real verb, as a device does. */
export class DemoTablet {
  private queue: Change[] = [];
  private lastN = 0;

  private constructor(
    private readonly ctx: Ctx & { moveOn: (seconds: number) => void },
    private readonly shopId: string,
    readonly id: string,
    private readonly personId: string,
  ) {}

  /** Enrols a tablet by a code of somebody who may make one. */
  static async enrol(
    ctx: PersonCtx & { moveOn: (seconds: number) => void },
    deviceName: string,
    personId: string,
  ): Promise<DemoTablet> {
    const { code } = await makeEnrolmentCode(ctx);
    const { deviceId } = await enrol(ctx, { code, deviceName });
    return new DemoTablet(ctx, ctx.actor.shopId, deviceId, personId);
  }

  /** Queues a new record. @returns its id */
  create(table: SyncTable, set: Fields): string {
    const rid = this.ctx.newId();
    this.add({ kind: 'create', table, rid, set });
    return rid;
  }

  /** Queues a run: its rungs from the plan and a reading on each lift that was keyed. @returns the readings as seen */
  run(
    sessionId: string,
    runOrdinal: number,
    port: { side: Side; port: string; valvesOpenCount: number },
    plan: readonly PlannedLift[],
    rows: readonly KeyedRow[],
    settings: SessionSettings,
  ): SeenReading[] {
    const runId = this.create('runs', newRun({ sessionId, runOrdinal, ...port }));
    const rungIds = rungsOfPlan(runId, plan).map((rung) => this.create('rungs', rung));
    return rows.map(([liftText, flowText, pressureText], index) => {
      this.ctx.moveOn(24);
      const reading: Reading = {
        runId,
        rungId: rungIds[index] ?? null,
        readingOrdinal: index + 1,
        liftText,
        liftUnit: plan[index]?.unit ?? settings.liftUnit,
        flowText,
        flowUnit: settings.flowUnit,
        pressureText,
        pressureUnit: settings.pressureUnit,
        range: null,
        leakId: null,
        zeroId: null,
        isPressureRepeated: false,
        needleSwingText: null,
        needleSwingUnit: null,
        fan: 'notNoted',
        chips: [],
        isUsed: true,
        notUsedWhy: '',
        secondLook: 'none',
        byPersonId: this.personId,
        deviceId: this.id,
        at: this.ctx.clock().toISOString(),
      };
      return { readingId: this.create('readings', reading), liftText, flowText, pressureText };
    });
  }

  /** Queues handing a session in, pinned to the readings as seen. */
  handIn(sessionId: string, expect: SeenReading[]): void {
    this.add({ kind: 'handIn', table: 'sessions', rid: sessionId, set: {}, expect });
  }

  /** Pushes what waits. @throws Error when a change is not simply applied: the demonstration has none to dispute */
  async send(): Promise<void> {
    const changes = this.queue.splice(0);
    const { verdicts } = await push(
      { ...this.ctx, device: { shopId: this.shopId, id: this.id } },
      {
        device: this.id,
        sv: schemaVersion,
        now: this.ctx.clock().toISOString(),
        pendingCount: changes.length,
        changes,
      },
    );
    const other = verdicts.find((verdict) => verdict.verdict !== 'applied');
    if (other)
      throw new Error(`the demonstration's change was ${other.verdict}: ${other.why} ${other.detail ?? ''}`);
  }

  private add(change: Pick<Change, 'kind' | 'table' | 'rid' | 'set' | 'expect'>): void {
    this.lastN += 1;
    this.queue.push({
      id: this.ctx.newId(),
      n: this.lastN,
      sv: schemaVersion,
      by: this.personId,
      at: this.ctx.clock().toISOString(),
      base: {},
      ...change,
    });
  }
}
