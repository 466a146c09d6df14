import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
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
import { workingColumns } from './workingColumns';

/* Working rows on the device: the server's copy with the device's own waiting changes merged over it, rebuilt in the
 * transaction that changes either. No foreign keys: a reading may arrive before its run does. */

export const customers = sqliteTable('customers', {
  ...workingColumns(),
  name: text('name').notNull(),
  mail: text('mail'),
  phone: text('phone'),
  note: text('note').notNull(),
});

export const heads = sqliteTable(
  'heads',
  {
    ...workingColumns(),
    customerId: text('customer_id').notNull(),
    name: text('name').notNull(),
    casting: text('casting').notNull(),
    cylinderCount: integer('cylinder_count').notNull(),
    boreText: text('bore_text'),
    boreUnit: text('bore_unit'),
    intakeValveCount: integer('intake_valve_count').notNull(),
    exhaustValveCount: integer('exhaust_valve_count').notNull(),
    ports: text('ports', { mode: 'json' }).$type<PortName[]>().notNull(),
  },
  (t) => [index('heads_customer_id').on(t.customerId)],
);

export const stages = sqliteTable(
  'stages',
  {
    ...workingColumns(),
    headId: text('head_id').notNull(),
    stageOrdinal: integer('stage_ordinal').notNull(),
    name: text('name').notNull(),
    workDone: text('work_done').notNull(),
  },
  (t) => [index('stages_head_id').on(t.headId)],
);

export const portDimensions = sqliteTable(
  'port_dimensions',
  {
    ...workingColumns(),
    stageId: text('stage_id').notNull(),
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
  (t) => [index('port_dimensions_stage_id').on(t.stageId)],
);

export const benches = sqliteTable('benches', {
  ...workingColumns(),
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
  ranges: text('ranges', { mode: 'json' }).$type<z.infer<typeof BenchRange>[]>().notNull(),
  leakExponentText: text('leak_exponent_text').notNull(),
  status: text('status').notNull(),
  statusWhy: text('status_why').notNull(),
});

export const calibrations = sqliteTable(
  'calibrations',
  {
    ...workingColumns(),
    benchId: text('bench_id').notNull(),
    direction: text('direction').notNull(),
    grade: text('grade').notNull(),
    fit: text('fit', { mode: 'json' }).$type<CalibrationFit>().notNull(),
    stepsOn: text('steps_on', { mode: 'json' }).$type<Calibration['stepsOn']>().notNull(),
    asFoundText: text('as_found_text'),
    asFoundUnit: text('as_found_unit'),
    asLeftText: text('as_left_text'),
    asLeftUnit: text('as_left_unit'),
    adoptedBy: text('adopted_by').notNull(),
    fromAt: text('from_at').notNull(),
    untilAt: text('until_at'),
    withdrawnAt: text('withdrawn_at'),
    note: text('note').notNull(),
  },
  (t) => [index('calibrations_bench_id').on(t.benchId)],
);

export const sessions = sqliteTable(
  'sessions',
  {
    ...workingColumns(),
    stageId: text('stage_id').notNull(),
    benchId: text('bench_id').notNull(),
    label: text('label').notNull(),
    state: text('state').notNull(),
    settings: text('settings', { mode: 'json' }).$type<SessionSettings>().notNull(),
    liftPlan: text('lift_plan', { mode: 'json' }).$type<PlannedLift[]>().notNull(),
    plannedBy: text('planned_by').notNull(),
    note: text('note').notNull(),
  },
  (t) => [index('sessions_stage_id').on(t.stageId), index('sessions_bench_id').on(t.benchId)],
);

export const runs = sqliteTable(
  'runs',
  {
    ...workingColumns(),
    sessionId: text('session_id').notNull(),
    runOrdinal: integer('run_ordinal').notNull(),
    side: text('side').notNull(),
    port: text('port').notNull(),
    direction: text('direction').notNull(),
    pass: text('pass').notNull(),
    setUp: text('set_up', { mode: 'json' }).$type<SetUp>().notNull(),
    valvesOpenCount: integer('valves_open_count').notNull(),
    liftZeroBeforeText: text('lift_zero_before_text'),
    liftZeroBeforeUnit: text('lift_zero_before_unit'),
    liftZeroAfterText: text('lift_zero_after_text'),
    liftZeroAfterUnit: text('lift_zero_after_unit'),
    airId: text('air_id'),
    plenumTemperatureText: text('plenum_temperature_text'),
    plenumTemperatureUnit: text('plenum_temperature_unit'),
  },
  (t) => [index('runs_session_id').on(t.sessionId)],
);

export const rungs = sqliteTable(
  'rungs',
  {
    ...workingColumns(),
    runId: text('run_id').notNull(),
    rungOrdinal: integer('rung_ordinal').notNull(),
    liftText: text('lift_text').notNull(),
    liftUnit: text('lift_unit').notNull(),
    isSkipped: integer('is_skipped', { mode: 'boolean' }).notNull(),
  },
  (t) => [index('rungs_run_id').on(t.runId)],
);

export const readings = sqliteTable(
  'readings',
  {
    ...workingColumns(),
    runId: text('run_id').notNull(),
    rungId: text('rung_id'),
    readingOrdinal: integer('reading_ordinal').notNull(),
    liftText: text('lift_text').notNull(),
    liftUnit: text('lift_unit').notNull(),
    flowText: text('flow_text').notNull(),
    flowUnit: text('flow_unit').notNull(),
    pressureText: text('pressure_text').notNull(),
    pressureUnit: text('pressure_unit').notNull(),
    range: text('range'),
    leakId: text('leak_id'),
    zeroId: text('zero_id'),
    isPressureRepeated: integer('is_pressure_repeated', { mode: 'boolean' }).notNull(),
    needleSwingText: text('needle_swing_text'),
    needleSwingUnit: text('needle_swing_unit'),
    fan: text('fan').notNull(),
    chips: text('chips', { mode: 'json' }).$type<Chip[]>().notNull(),
    isUsed: integer('is_used', { mode: 'boolean' }).notNull(),
    notUsedWhy: text('not_used_why').notNull(),
    secondLook: text('second_look').notNull(),
    byPersonId: text('by_person_id').notNull(),
    deviceId: text('device_id'),
    at: text('at').notNull(),
  },
  (t) => [index('readings_run_id').on(t.runId)],
);

/** Every working table by its name in the protocol. */
export const workingTables = {
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
