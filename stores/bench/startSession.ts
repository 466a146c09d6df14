import { and, desc, eq } from 'drizzle-orm';
import { v7 } from 'uuid';
import { AppError } from '@/shared/errors';
import type { LengthUnit, PlannedLift, PressureUnit } from '@/shared/schema/primitives';
import {
  Calibration,
  type Customer,
  type Head,
  type PortDimension,
  type PortName,
  type Session,
  type Stage,
} from '@/shared/schema/records';
import { noDimensions } from '@/shared/session/noDimensions';
import { sessionSettings } from '@/shared/session/startSession';
import type { DeviceTx } from '@/db/device/deviceDb';
import { getFact, setFact } from '@/db/device/meta';
import { record, type Draft } from '@/db/device/recordChange';
import { benches, calibrations, stages } from '@/db/device/schema/working';
import { commitAs } from './benchDevice';

export type NewHead = {
  name: string;
  casting: string;
  cylinderCount: number;
  ports: PortName[];
  intakeValveCount: number;
  exhaustValveCount: number;
  bore?: { text: string; unit: LengthUnit };
};

/** Dimensions of the ports of one side (or of one port) as far as they are known. */
export type NewDimensions = Pick<PortDimension, 'side'> & Partial<Omit<PortDimension, 'stageId' | 'side'>>;

/** A record that is there already, by id, or what makes a new one. */
export type StartSessionInput = {
  customer: string | { name: string };
  head: string | NewHead;
  stage: string | { name: string; workDone?: string };
  dimensions?: NewDimensions[];
  benchId: string;
  /** the shop's own when left out */
  standardPressure?: { text: string; unit: PressureUnit };
  liftPlan: PlannedLift[];
  note?: string;
};

/** Starts a session, with whatever of customer, head and stage is new, in one transaction.
 * @returns id of the session
 */
export function startSession(input: StartSessionInput): Promise<string> {
  return commitAs(async (tx, author) => {
    const drafts: Draft[] = [];
    const customerId =
      typeof input.customer === 'string' ? input.customer : addCustomer(drafts, input.customer.name);
    const headId = typeof input.head === 'string' ? input.head : addHead(drafts, customerId, input.head);
    const stageId =
      typeof input.stage === 'string' ? input.stage : await addStage(tx, drafts, headId, input.stage);
    for (const known of input.dimensions ?? [])
      drafts.push({
        kind: 'create',
        table: 'portDimensions',
        rid: v7(),
        set: { ...noDimensions, ...known, stageId } satisfies PortDimension,
      });

    const device = await getFact(tx, 'device');
    const shop = await getFact(tx, 'shop');
    const [bench] = await tx.select({ id: benches.id }).from(benches).where(eq(benches.id, input.benchId));
    if (!device || !shop || !bench) throw new AppError('no_such_record');
    const standard = input.standardPressure ?? {
      text: shop.settings.standardPressureText,
      unit: shop.settings.standardPressureUnit,
    };
    const sessionCount = ((await getFact(tx, 'sessionCount')) ?? 0) + 1;
    await setFact(tx, 'sessionCount', sessionCount);
    const session: Session = {
      stageId,
      benchId: input.benchId,
      label: `${device.deviceOrdinal}-${String(sessionCount).padStart(3, '0')}`,
      state: 'open',
      settings: sessionSettings(
        shop.settings,
        standard,
        await calibrationsOf(tx, input.benchId),
        input.benchId,
        author.atIso,
      ),
      liftPlan: input.liftPlan,
      plannedBy: author.personId,
      note: input.note ?? '',
    };
    const sessionId = v7();
    drafts.push({ kind: 'create', table: 'sessions', rid: sessionId, set: session });
    await record(tx, drafts, author);
    return sessionId;
  });
}

function addCustomer(drafts: Draft[], name: string): string {
  const rid = v7();
  const customer: Customer = { name, mail: null, phone: null, note: '' };
  drafts.push({ kind: 'create', table: 'customers', rid, set: customer });
  return rid;
}

function addHead(drafts: Draft[], customerId: string, { bore, ...known }: NewHead): string {
  const rid = v7();
  const head: Head = { ...known, customerId, boreText: bore?.text ?? null, boreUnit: bore?.unit ?? null };
  drafts.push({ kind: 'create', table: 'heads', rid, set: head });
  return rid;
}

async function addStage(
  tx: DeviceTx,
  drafts: Draft[],
  headId: string,
  known: { name: string; workDone?: string },
): Promise<string> {
  const [last] = await tx
    .select({ stageOrdinal: stages.stageOrdinal })
    .from(stages)
    .where(eq(stages.headId, headId))
    .orderBy(desc(stages.stageOrdinal))
    .limit(1);
  const rid = v7();
  const stage: Stage = {
    headId,
    stageOrdinal: (last?.stageOrdinal ?? 0) + 1,
    name: known.name,
    workDone: known.workDone ?? '',
  };
  drafts.push({ kind: 'create', table: 'stages', rid, set: stage });
  return rid;
}

async function calibrationsOf(tx: DeviceTx, benchId: string): Promise<(Calibration & { id: string })[]> {
  const rows = await tx
    .select()
    .from(calibrations)
    .where(and(eq(calibrations.benchId, benchId), eq(calibrations.deleted, false)));
  return rows.map(({ id, version: _version, deleted: _deleted, mark: _mark, ...fields }) => ({
    id,
    ...Calibration.parse(fields),
  }));
}
