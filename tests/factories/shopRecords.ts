import { v7 } from 'uuid';
import type { Bench, Customer, Head, PortDimension, Run, Rung, Stage } from '@/shared/schema/records';
import { noDimensions } from '@/shared/session/noDimensions';
import { newRun } from '@/shared/session/startSession';
import type { DeskChange } from '@/shared/schema/api';
import { readingFields, sessionFields } from './records';
import type { TestDevice } from './shopWorld';

export const customerFields = (word: string): Customer => ({
  name: `${word} customer`,
  mail: null,
  phone: null,
  note: '',
});

export const headFields = (word: string, customerId: string): Head => ({
  customerId,
  name: `${word} head`,
  casting: `${word} casting`,
  cylinderCount: 4,
  boreText: '86',
  boreUnit: 'mm',
  intakeValveCount: 1,
  exhaustValveCount: 1,
  ports: [{ side: 'intake', port: '1' }],
});

export const stageFields = (word: string, headId: string): Stage => ({
  headId,
  stageOrdinal: 1,
  name: `${word} as received`,
  workDone: '',
});

export const portDimensionFields = (stageId: string): PortDimension => ({
  stageId,
  side: 'intake',
  ...noDimensions,
  valveText: '40',
  valveUnit: 'mm',
});

export const benchFields = (word: string): Bench => ({
  name: `${word} bench`,
  element: 'vane',
  elementPlace: 'afterPort',
  settingKind: 'area',
  settingText: '12.5',
  settingUnit: 'in2',
  settingStepText: '0.1',
  settingStepUnit: 'in2',
  flowResolutionText: '1',
  flowResolutionUnit: 'cfm',
  pressureResolutionText: '0.1',
  pressureResolutionUnit: 'inH2O',
  pressureLowText: null,
  pressureLowUnit: null,
  pressureHighText: null,
  pressureHighUnit: null,
  ranges: [],
  leakExponentText: '0.5',
  status: 'inUse',
  statusWhy: '',
});

export const runFields = (sessionId: string): Run =>
  newRun({ sessionId, runOrdinal: 1, side: 'intake', port: '1', valvesOpenCount: 1 });

export const rungFields = (runId: string): Rung => ({
  runId,
  rungOrdinal: 1,
  liftText: '0.300',
  liftUnit: 'in',
  isSkipped: false,
});

/** A change for the desk. */
export const deskChange = (
  over: Pick<DeskChange, 'kind' | 'table' | 'rid'> & Partial<DeskChange>,
): DeskChange => ({
  id: v7(),
  base: {},
  set: {},
  ...over,
});

/** Ids of one whole session, from the customer down to a reading. */
export type Chain = Record<
  'customer' | 'head' | 'stage' | 'bench' | 'session' | 'run' | 'rung' | 'reading',
  string
>;

export const newChain = (benchId: string): Chain => ({
  customer: v7(),
  head: v7(),
  stage: v7(),
  bench: benchId,
  session: v7(),
  run: v7(),
  rung: v7(),
  reading: v7(),
});

/** The changes by which a device makes a whole session, in their order. */
export function chainChanges(device: TestDevice, word: string, ids: Chain) {
  const create = (table: string, rid: string, set: object) =>
    device.change({ kind: 'create', table, rid, set: set as Record<string, never> });
  return [
    create('customers', ids.customer, customerFields(word)),
    create('heads', ids.head, headFields(word, ids.customer)),
    create('stages', ids.stage, stageFields(word, ids.head)),
    create('portDimensions', v7(), portDimensionFields(ids.stage)),
    create(
      'sessions',
      ids.session,
      sessionFields({ stageId: ids.stage, benchId: ids.bench, label: '1-001', plannedBy: device.by }),
    ),
    create('runs', ids.run, runFields(ids.session)),
    create('rungs', ids.rung, rungFields(ids.run)),
    create('readings', ids.reading, reading(device, ids)),
  ];
}

export const reading = (device: TestDevice, ids: Chain, over: Parameters<typeof readingFields>[0] = {}) =>
  readingFields({ runId: ids.run, rungId: ids.rung, byPersonId: device.by, deviceId: device.id, ...over });
