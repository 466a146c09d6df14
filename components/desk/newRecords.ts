import { v7 } from 'uuid';
import type { DeskChange } from '@/shared/schema/api';
import type { Customer, Head, PortDimension, Stage } from '@/shared/schema/records';
import { noDimensions } from '@/shared/session/noDimensions';

function create(table: string, rid: string, set: DeskChange['set']): DeskChange {
  return { id: v7(), kind: 'create', table, rid, base: {}, set };
}

/** The birth of a customer known by name only. */
export function newCustomer(rid: string, name: string): DeskChange {
  const customer: Customer = { name, mail: null, phone: null, note: '' };
  return create('customers', rid, customer);
}

export type HeadDraft = {
  name: string;
  casting: string;
  cylinderCount: number;
  intakeValveCount: number;
  exhaustValveCount: number;
};

/** The birth of a head, with one intake and one exhaust port a cylinder, numbered from the front. */
export function newHead(rid: string, customerId: string, draft: HeadDraft): DeskChange {
  const cylinders = Array.from({ length: draft.cylinderCount }, (_, at) => String(at + 1));
  const head: Head = {
    ...draft,
    customerId,
    boreText: null,
    boreUnit: null,
    ports: [
      ...cylinders.map((port) => ({ side: 'intake' as const, port })),
      ...cylinders.map((port) => ({ side: 'exhaust' as const, port })),
    ],
  };
  return create('heads', rid, head);
}

/** The birth of a stage, the next of its head. */
export function newStage(
  rid: string,
  stage: Pick<Stage, 'headId' | 'stageOrdinal' | 'name' | 'workDone'>,
): DeskChange {
  return create('stages', rid, stage);
}

/** The valve diameter of one side at a stage, as written; the other dimensions stay inherited. */
export function newValve(rid: string, stageId: string, side: 'intake' | 'exhaust', text: string): DeskChange {
  const dimension: PortDimension = {
    stageId,
    side,
    ...noDimensions,
    valveText: text,
    valveUnit: 'mm',
  };
  return create('portDimensions', rid, dimension);
}
