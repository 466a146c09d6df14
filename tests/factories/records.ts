import { v7 } from 'uuid';
import type { Reading, Session } from '@/shared/schema/records';
import type { Change, Fields } from '@/shared/sync/protocol';
import { schemaVersion } from '@/shared/sync/syncTables';
import type { Guard, Row } from '@/shared/sync/merge';

/** A fresh record id. */
export const newId = (): string => v7();

/** A reading with every field filled, to be overridden where a test cares. */
export function readingFields(over: Partial<Reading> = {}): Reading {
  return {
    runId: newId(),
    rungId: null,
    readingOrdinal: 1,
    liftText: '0.300',
    liftUnit: 'in',
    flowText: '166',
    flowUnit: 'cfm',
    pressureText: '27.0',
    pressureUnit: 'inH2O',
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
    byPersonId: newId(),
    deviceId: null,
    at: '2026-12-01T10:00:00.000Z',
    ...over,
  };
}

/** A session with every field filled. */
export function sessionFields(over: Partial<Session> = {}): Session {
  return {
    stageId: newId(),
    benchId: newId(),
    label: '0-001',
    state: 'open',
    settings: {
      standardPressureText: '28',
      standardPressureUnit: 'inH2O',
      flowUnit: 'cfm',
      pressureUnit: 'inH2O',
      liftUnit: 'in',
      decimalMark: '.',
      referenceAir: 'dry20C',
      showPowerEstimate: false,
      drawing: null,
      blowing: null,
    },
    liftPlan: [{ text: '0.100', unit: 'in' }],
    plannedBy: newId(),
    note: '',
    ...over,
  };
}

/** A change with its envelope filled. */
export function changeOf(over: Partial<Change> & { set?: Fields; base?: Fields }): Change {
  return {
    id: newId(),
    n: 1,
    kind: 'patch',
    table: 'readings',
    rid: newId(),
    sv: schemaVersion,
    by: newId(),
    at: '2026-12-01T10:00:00.000Z',
    base: {},
    set: {},
    ...over,
  };
}

export const openGuard: Guard = {
  source: 'device',
  sessionState: 'open',
  standing: 'open',
  parent: 'present',
  isSeenCurrent: true,
};

/** A stored record. */
export const rowOf = (fields: Fields, over: Partial<Row> = {}): Row => ({
  id: newId(),
  version: 1,
  deleted: false,
  fields,
  ...over,
});
