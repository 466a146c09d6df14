import {
  boolean,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  uuid,
} from 'drizzle-orm/pg-core';
import type { z } from 'zod';
import type {
  BenchRange,
  Calibration,
  CalibrationFit,
  Chip,
  PortName,
  SessionSettings,
  SetUp,
} from '@/shared/schema/records';
import type { PlannedLift } from '@/shared/schema/primitives';
import type { SyncTable } from '@/shared/sync/syncTables';
import { shops } from './shops';
import { syncedColumns } from './syncedColumns';

/* The synced records in PostgreSQL. Keys are (shop_id, id): an id of another shop is simply a fresh one here.
 * Records with a parent belong to a shop through it; a second key to the shop would cost every row a look-up.
 * Times that a person or a device states stay text, to the letter; the columns of zod's records have the same names. */

export const customers = pgTable(
  'customers',
  {
    ...syncedColumns(),
    name: text('name').notNull(),
    mail: text('mail'),
    phone: text('phone'),
    note: text('note').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    foreignKey({ columns: [t.shopId], foreignColumns: [shops.id] }),
    index().on(t.shopId, t.seq),
  ],
);

export const heads = pgTable(
  'heads',
  {
    ...syncedColumns(),
    customerId: uuid('customer_id').notNull(),
    name: text('name').notNull(),
    casting: text('casting').notNull(),
    cylinderCount: integer('cylinder_count').notNull(),
    boreText: text('bore_text'),
    boreUnit: text('bore_unit'),
    intakeValveCount: integer('intake_valve_count').notNull(),
    exhaustValveCount: integer('exhaust_valve_count').notNull(),
    ports: jsonb('ports').$type<PortName[]>().notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    index().on(t.shopId, t.seq),
    foreignKey({ columns: [t.shopId, t.customerId], foreignColumns: [customers.shopId, customers.id] }),
    index().on(t.shopId, t.customerId),
  ],
);

export const stages = pgTable(
  'stages',
  {
    ...syncedColumns(),
    headId: uuid('head_id').notNull(),
    stageOrdinal: integer('stage_ordinal').notNull(),
    name: text('name').notNull(),
    workDone: text('work_done').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    index().on(t.shopId, t.seq),
    foreignKey({ columns: [t.shopId, t.headId], foreignColumns: [heads.shopId, heads.id] }),
    index().on(t.shopId, t.headId),
  ],
);

export const portDimensions = pgTable(
  'port_dimensions',
  {
    ...syncedColumns(),
    stageId: uuid('stage_id').notNull(),
    side: text('side').notNull(),
    port: text('port'),
    valveText: text('valve_text'),
    valveUnit: text('valve_unit'),
    seatInnerText: text('seat_inner_text'),
    seatInnerUnit: text('seat_inner_unit'),
    stemText: text('stem_text'),
    stemUnit: text('stem_unit'),
    throatText: text('throat_text'),
    throatUnit: text('throat_unit'),
    seatAngleText: text('seat_angle_text'),
    seatAngleUnit: text('seat_angle_unit'),
    smallestSectionText: text('smallest_section_text'),
    smallestSectionUnit: text('smallest_section_unit'),
    portVolumeText: text('port_volume_text'),
    portVolumeUnit: text('port_volume_unit'),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    index().on(t.shopId, t.seq),
    foreignKey({ columns: [t.shopId, t.stageId], foreignColumns: [stages.shopId, stages.id] }),
    index().on(t.shopId, t.stageId),
  ],
);

export const benches = pgTable(
  'benches',
  {
    ...syncedColumns(),
    name: text('name').notNull(),
    element: text('element').notNull(),
    elementPlace: text('element_place').notNull(),
    settingKind: text('setting_kind').notNull(),
    settingText: text('setting_text'),
    settingUnit: text('setting_unit'),
    settingStepText: text('setting_step_text'),
    settingStepUnit: text('setting_step_unit'),
    flowResolutionText: text('flow_resolution_text').notNull(),
    flowResolutionUnit: text('flow_resolution_unit').notNull(),
    pressureResolutionText: text('pressure_resolution_text').notNull(),
    pressureResolutionUnit: text('pressure_resolution_unit').notNull(),
    pressureLowText: text('pressure_low_text'),
    pressureLowUnit: text('pressure_low_unit'),
    pressureHighText: text('pressure_high_text'),
    pressureHighUnit: text('pressure_high_unit'),
    ranges: jsonb('ranges').$type<z.infer<typeof BenchRange>[]>().notNull(),
    leakExponentText: text('leak_exponent_text').notNull(),
    status: text('status').notNull(),
    statusWhy: text('status_why').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    foreignKey({ columns: [t.shopId], foreignColumns: [shops.id] }),
    index().on(t.shopId, t.seq),
  ],
);

export const calibrations = pgTable(
  'calibrations',
  {
    ...syncedColumns(),
    benchId: uuid('bench_id').notNull(),
    direction: text('direction').notNull(),
    grade: text('grade').notNull(),
    fit: jsonb('fit').$type<CalibrationFit>().notNull(),
    stepsOn: jsonb('steps_on').$type<Calibration['stepsOn']>().notNull(),
    asFoundText: text('as_found_text'),
    asFoundUnit: text('as_found_unit'),
    asLeftText: text('as_left_text'),
    asLeftUnit: text('as_left_unit'),
    adoptedBy: uuid('adopted_by').notNull(),
    fromAt: text('from_at').notNull(),
    untilAt: text('until_at'),
    withdrawnAt: text('withdrawn_at'),
    note: text('note').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    index().on(t.shopId, t.seq),
    foreignKey({ columns: [t.shopId, t.benchId], foreignColumns: [benches.shopId, benches.id] }),
    index().on(t.shopId, t.benchId),
  ],
);

export const sessions = pgTable(
  'sessions',
  {
    ...syncedColumns(),
    stageId: uuid('stage_id').notNull(),
    benchId: uuid('bench_id').notNull(),
    label: text('label').notNull(),
    state: text('state').notNull(),
    settings: jsonb('settings').$type<SessionSettings>().notNull(),
    liftPlan: jsonb('lift_plan').$type<PlannedLift[]>().notNull(),
    plannedBy: uuid('planned_by').notNull(),
    note: text('note').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    index().on(t.shopId, t.seq),
    foreignKey({ columns: [t.shopId, t.stageId], foreignColumns: [stages.shopId, stages.id] }),
    index().on(t.shopId, t.stageId),
    foreignKey({ columns: [t.shopId, t.benchId], foreignColumns: [benches.shopId, benches.id] }),
    index().on(t.shopId, t.benchId),
  ],
);

export const runs = pgTable(
  'runs',
  {
    ...syncedColumns(),
    sessionId: uuid('session_id').notNull(),
    runOrdinal: integer('run_ordinal').notNull(),
    side: text('side').notNull(),
    port: text('port').notNull(),
    direction: text('direction').notNull(),
    pass: text('pass').notNull(),
    setUp: jsonb('set_up').$type<SetUp>().notNull(),
    valvesOpenCount: integer('valves_open_count').notNull(),
    liftZeroBeforeText: text('lift_zero_before_text'),
    liftZeroBeforeUnit: text('lift_zero_before_unit'),
    liftZeroAfterText: text('lift_zero_after_text'),
    liftZeroAfterUnit: text('lift_zero_after_unit'),
    airId: uuid('air_id'),
    plenumTemperatureText: text('plenum_temperature_text'),
    plenumTemperatureUnit: text('plenum_temperature_unit'),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    index().on(t.shopId, t.seq),
    foreignKey({ columns: [t.shopId, t.sessionId], foreignColumns: [sessions.shopId, sessions.id] }),
    index().on(t.shopId, t.sessionId),
  ],
);

export const rungs = pgTable(
  'rungs',
  {
    ...syncedColumns(),
    runId: uuid('run_id').notNull(),
    rungOrdinal: integer('rung_ordinal').notNull(),
    liftText: text('lift_text').notNull(),
    liftUnit: text('lift_unit').notNull(),
    isSkipped: boolean('is_skipped').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    index().on(t.shopId, t.seq),
    foreignKey({ columns: [t.shopId, t.runId], foreignColumns: [runs.shopId, runs.id] }),
    index().on(t.shopId, t.runId),
  ],
);

export const readings = pgTable(
  'readings',
  {
    ...syncedColumns(),
    runId: uuid('run_id').notNull(),
    rungId: uuid('rung_id'),
    readingOrdinal: integer('reading_ordinal').notNull(),
    liftText: text('lift_text').notNull(),
    liftUnit: text('lift_unit').notNull(),
    flowText: text('flow_text').notNull(),
    flowUnit: text('flow_unit').notNull(),
    pressureText: text('pressure_text').notNull(),
    pressureUnit: text('pressure_unit').notNull(),
    range: text('range'),
    leakId: uuid('leak_id'),
    zeroId: uuid('zero_id'),
    isPressureRepeated: boolean('is_pressure_repeated').notNull(),
    needleSwingText: text('needle_swing_text'),
    needleSwingUnit: text('needle_swing_unit'),
    fan: text('fan').notNull(),
    chips: jsonb('chips').$type<Chip[]>().notNull(),
    isUsed: boolean('is_used').notNull(),
    notUsedWhy: text('not_used_why').notNull(),
    secondLook: text('second_look').notNull(),
    byPersonId: uuid('by_person_id').notNull(),
    deviceId: uuid('device_id'),
    at: text('at').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    index().on(t.shopId, t.seq),
    foreignKey({ columns: [t.shopId, t.runId], foreignColumns: [runs.shopId, runs.id] }),
    index().on(t.shopId, t.runId),
  ],
);

/** Every synced table by its name in the protocol. */
export const syncedPgTables = {
  customers,
  heads,
  stages,
  portDimensions,
  benches,
  calibrations,
  sessions,
  runs,
  rungs,
  readings,
} as const satisfies Record<SyncTable, unknown>;
