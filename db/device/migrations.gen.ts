// Generated from drizzle/device by `npm run db:generate`.
/** A step of the device database, oldest first. */
export type DeviceMigration = { idx: number; tag: string; sql: string[] };

export const deviceMigrations: DeviceMigration[] = [
  {
    "idx": 0,
    "tag": "0000_first_tables",
    "sql": [
      "CREATE TABLE `copies` (\n\t`table_name` text NOT NULL,\n\t`id` text NOT NULL,\n\t`version` integer NOT NULL,\n\t`deleted` integer NOT NULL,\n\t`seq` integer NOT NULL,\n\t`fields` text NOT NULL,\n\tPRIMARY KEY(`table_name`, `id`)\n);",
      "CREATE TABLE `drafts` (\n\t`run_id` text PRIMARY KEY NOT NULL,\n\t`draft` text NOT NULL,\n\t`saved_at` text NOT NULL\n);",
      "CREATE TABLE `meta` (\n\t`key` text PRIMARY KEY NOT NULL,\n\t`value` text NOT NULL\n);",
      "CREATE TABLE `outbox` (\n\t`id` text PRIMARY KEY NOT NULL,\n\t`n` integer NOT NULL,\n\t`table_name` text NOT NULL,\n\t`record_id` text NOT NULL,\n\t`change` text NOT NULL,\n\t`recorded_at` text NOT NULL,\n\t`verdict` text,\n\t`why` text,\n\t`detail` text,\n\t`applied_version` integer,\n\t`answered_at` text,\n\t`try_count` integer DEFAULT 0 NOT NULL,\n\t`last_try_at` text,\n\t`last_answer` text\n);",
      "CREATE UNIQUE INDEX `outbox_n_unique` ON `outbox` (`n`);",
      "CREATE INDEX `outbox_record` ON `outbox` (`table_name`,`record_id`);",
      "CREATE INDEX `outbox_verdict` ON `outbox` (`verdict`,`n`);",
      "CREATE TABLE `roster` (\n\t`person_id` text PRIMARY KEY NOT NULL,\n\t`name` text NOT NULL,\n\t`roles` text NOT NULL,\n\t`pin_hash` text,\n\t`wrong_try_count` integer DEFAULT 0 NOT NULL,\n\t`wait_until_at` text,\n\t`is_removed` integer DEFAULT false NOT NULL\n);",
      "CREATE TABLE `benches` (\n\t`id` text PRIMARY KEY NOT NULL,\n\t`version` integer NOT NULL,\n\t`deleted` integer NOT NULL,\n\t`mark` text NOT NULL,\n\t`name` text NOT NULL,\n\t`element` text NOT NULL,\n\t`element_place` text NOT NULL,\n\t`setting_kind` text NOT NULL,\n\t`setting_text` text,\n\t`setting_unit` text,\n\t`setting_step_text` text,\n\t`setting_step_unit` text,\n\t`flow_resolution_text` text NOT NULL,\n\t`flow_resolution_unit` text NOT NULL,\n\t`pressure_resolution_text` text NOT NULL,\n\t`pressure_resolution_unit` text NOT NULL,\n\t`pressure_low_text` text,\n\t`pressure_low_unit` text,\n\t`pressure_high_text` text,\n\t`pressure_high_unit` text,\n\t`ranges` text NOT NULL,\n\t`leak_exponent_text` text NOT NULL,\n\t`status` text NOT NULL,\n\t`status_why` text NOT NULL\n);",
      "CREATE TABLE `calibrations` (\n\t`id` text PRIMARY KEY NOT NULL,\n\t`version` integer NOT NULL,\n\t`deleted` integer NOT NULL,\n\t`mark` text NOT NULL,\n\t`bench_id` text NOT NULL,\n\t`direction` text NOT NULL,\n\t`grade` text NOT NULL,\n\t`fit` text NOT NULL,\n\t`steps_on` text NOT NULL,\n\t`as_found_text` text,\n\t`as_found_unit` text,\n\t`as_left_text` text,\n\t`as_left_unit` text,\n\t`adopted_by` text NOT NULL,\n\t`from_at` text NOT NULL,\n\t`until_at` text,\n\t`withdrawn_at` text,\n\t`note` text NOT NULL\n);",
      "CREATE INDEX `calibrations_bench_id` ON `calibrations` (`bench_id`);",
      "CREATE TABLE `customers` (\n\t`id` text PRIMARY KEY NOT NULL,\n\t`version` integer NOT NULL,\n\t`deleted` integer NOT NULL,\n\t`mark` text NOT NULL,\n\t`name` text NOT NULL,\n\t`mail` text,\n\t`phone` text,\n\t`note` text NOT NULL\n);",
      "CREATE TABLE `heads` (\n\t`id` text PRIMARY KEY NOT NULL,\n\t`version` integer NOT NULL,\n\t`deleted` integer NOT NULL,\n\t`mark` text NOT NULL,\n\t`customer_id` text NOT NULL,\n\t`name` text NOT NULL,\n\t`casting` text NOT NULL,\n\t`cylinder_count` integer NOT NULL,\n\t`bore_text` text,\n\t`bore_unit` text,\n\t`intake_valve_count` integer NOT NULL,\n\t`exhaust_valve_count` integer NOT NULL,\n\t`ports` text NOT NULL\n);",
      "CREATE INDEX `heads_customer_id` ON `heads` (`customer_id`);",
      "CREATE TABLE `port_dimensions` (\n\t`id` text PRIMARY KEY NOT NULL,\n\t`version` integer NOT NULL,\n\t`deleted` integer NOT NULL,\n\t`mark` text NOT NULL,\n\t`stage_id` text NOT NULL,\n\t`side` text NOT NULL,\n\t`port` text,\n\t`valve_text` text,\n\t`valve_unit` text,\n\t`seat_inner_text` text,\n\t`seat_inner_unit` text,\n\t`stem_text` text,\n\t`stem_unit` text,\n\t`throat_text` text,\n\t`throat_unit` text,\n\t`seat_angle_text` text,\n\t`seat_angle_unit` text,\n\t`smallest_section_text` text,\n\t`smallest_section_unit` text,\n\t`port_volume_text` text,\n\t`port_volume_unit` text\n);",
      "CREATE INDEX `port_dimensions_stage_id` ON `port_dimensions` (`stage_id`);",
      "CREATE TABLE `readings` (\n\t`id` text PRIMARY KEY NOT NULL,\n\t`version` integer NOT NULL,\n\t`deleted` integer NOT NULL,\n\t`mark` text NOT NULL,\n\t`run_id` text NOT NULL,\n\t`rung_id` text,\n\t`reading_ordinal` integer NOT NULL,\n\t`lift_text` text NOT NULL,\n\t`lift_unit` text NOT NULL,\n\t`flow_text` text NOT NULL,\n\t`flow_unit` text NOT NULL,\n\t`pressure_text` text NOT NULL,\n\t`pressure_unit` text NOT NULL,\n\t`range` text,\n\t`leak_id` text,\n\t`zero_id` text,\n\t`is_pressure_repeated` integer NOT NULL,\n\t`needle_swing_text` text,\n\t`needle_swing_unit` text,\n\t`fan` text NOT NULL,\n\t`chips` text NOT NULL,\n\t`is_used` integer NOT NULL,\n\t`not_used_why` text NOT NULL,\n\t`second_look` text NOT NULL,\n\t`by_person_id` text NOT NULL,\n\t`device_id` text,\n\t`at` text NOT NULL\n);",
      "CREATE INDEX `readings_run_id` ON `readings` (`run_id`);",
      "CREATE TABLE `rungs` (\n\t`id` text PRIMARY KEY NOT NULL,\n\t`version` integer NOT NULL,\n\t`deleted` integer NOT NULL,\n\t`mark` text NOT NULL,\n\t`run_id` text NOT NULL,\n\t`rung_ordinal` integer NOT NULL,\n\t`lift_text` text NOT NULL,\n\t`lift_unit` text NOT NULL,\n\t`is_skipped` integer NOT NULL\n);",
      "CREATE INDEX `rungs_run_id` ON `rungs` (`run_id`);",
      "CREATE TABLE `runs` (\n\t`id` text PRIMARY KEY NOT NULL,\n\t`version` integer NOT NULL,\n\t`deleted` integer NOT NULL,\n\t`mark` text NOT NULL,\n\t`session_id` text NOT NULL,\n\t`run_ordinal` integer NOT NULL,\n\t`side` text NOT NULL,\n\t`port` text NOT NULL,\n\t`direction` text NOT NULL,\n\t`pass` text NOT NULL,\n\t`set_up` text NOT NULL,\n\t`valves_open_count` integer NOT NULL,\n\t`lift_zero_before_text` text,\n\t`lift_zero_before_unit` text,\n\t`lift_zero_after_text` text,\n\t`lift_zero_after_unit` text,\n\t`air_id` text,\n\t`plenum_temperature_text` text,\n\t`plenum_temperature_unit` text\n);",
      "CREATE INDEX `runs_session_id` ON `runs` (`session_id`);",
      "CREATE TABLE `sessions` (\n\t`id` text PRIMARY KEY NOT NULL,\n\t`version` integer NOT NULL,\n\t`deleted` integer NOT NULL,\n\t`mark` text NOT NULL,\n\t`stage_id` text NOT NULL,\n\t`bench_id` text NOT NULL,\n\t`label` text NOT NULL,\n\t`state` text NOT NULL,\n\t`settings` text NOT NULL,\n\t`lift_plan` text NOT NULL,\n\t`planned_by` text NOT NULL,\n\t`note` text NOT NULL\n);",
      "CREATE INDEX `sessions_stage_id` ON `sessions` (`stage_id`);",
      "CREATE INDEX `sessions_bench_id` ON `sessions` (`bench_id`);",
      "CREATE TABLE `stages` (\n\t`id` text PRIMARY KEY NOT NULL,\n\t`version` integer NOT NULL,\n\t`deleted` integer NOT NULL,\n\t`mark` text NOT NULL,\n\t`head_id` text NOT NULL,\n\t`stage_ordinal` integer NOT NULL,\n\t`name` text NOT NULL,\n\t`work_done` text NOT NULL\n);",
      "CREATE INDEX `stages_head_id` ON `stages` (`head_id`);"
    ]
  }
];
