import type { z } from 'zod';
import {
  Bench,
  Calibration,
  Customer,
  Head,
  PortDimension,
  Reading,
  Run,
  Rung,
  Session,
  Stage,
} from '@/shared/schema/records';

/** The schema version that this build writes into each change. Raise it together with an upcaster. */
export const schemaVersion = 1;

type Declaration = {
  schema: z.ZodObject;
  /** field that names the parent record, and the parent's table */
  parent: { field: string; table: SyncTable } | null;
  /** other fields that must name a living record of the shop */
  references: { field: string; table: SyncTable }[];
  /** what a device may do with it; other tables reach devices by the feed only */
  deviceMay: readonly ('create' | 'patch' | 'delete' | 'handIn')[];
  /** fields that never change after the record is born */
  fixed: readonly string[];
};

export const syncTableNames = [
  'customers',
  'heads',
  'stages',
  'portDimensions',
  'benches',
  'calibrations',
  'sessions',
  'runs',
  'rungs',
  'readings',
] as const;
export type SyncTable = (typeof syncTableNames)[number];

/** Every synced record type declares itself here, parents before children; the rest of the sync code walks this table. */
export const syncTables: Record<SyncTable, Declaration> = {
  customers: { schema: Customer, parent: null, references: [], deviceMay: ['create', 'patch'], fixed: [] },
  heads: {
    schema: Head,
    parent: { field: 'customerId', table: 'customers' },
    references: [],
    deviceMay: ['create', 'patch'],
    fixed: [],
  },
  stages: {
    schema: Stage,
    parent: { field: 'headId', table: 'heads' },
    references: [],
    deviceMay: ['create', 'patch'],
    fixed: ['headId'],
  },
  portDimensions: {
    schema: PortDimension,
    parent: { field: 'stageId', table: 'stages' },
    references: [],
    deviceMay: ['create', 'patch'],
    fixed: ['stageId', 'side', 'port'],
  },
  benches: { schema: Bench, parent: null, references: [], deviceMay: [], fixed: [] },
  calibrations: {
    schema: Calibration,
    parent: { field: 'benchId', table: 'benches' },
    references: [],
    deviceMay: [],
    fixed: ['benchId', 'direction'],
  },
  sessions: {
    schema: Session,
    parent: { field: 'stageId', table: 'stages' },
    references: [{ field: 'benchId', table: 'benches' }],
    deviceMay: ['create', 'patch', 'handIn'],
    fixed: ['label', 'settings', 'plannedBy', 'state'],
  },
  runs: {
    schema: Run,
    parent: { field: 'sessionId', table: 'sessions' },
    references: [],
    deviceMay: ['create', 'patch', 'delete'],
    fixed: ['sessionId', 'runOrdinal'],
  },
  rungs: {
    schema: Rung,
    parent: { field: 'runId', table: 'runs' },
    references: [],
    deviceMay: ['create', 'patch', 'delete'],
    fixed: ['runId'],
  },
  readings: {
    schema: Reading,
    parent: { field: 'runId', table: 'runs' },
    references: [],
    deviceMay: ['create', 'patch', 'delete'],
    fixed: ['runId', 'readingOrdinal', 'byPersonId', 'deviceId', 'at'],
  },
};

/** Tables whose records belong to a session, with the way up to it. Their changes meet the session's state. */
export const sessionTables: readonly SyncTable[] = ['sessions', 'runs', 'rungs', 'readings'];

/** True when the text names a synced table. */
export function isSyncTable(name: string): name is SyncTable {
  return (syncTableNames as readonly string[]).includes(name);
}

/** The merge group a field belongs to: `flowText` and `flowUnit` mean nothing apart, so they are one. */
export function groupOf(field: string): string {
  return field.replace(/(Text|Unit)$/, '');
}
