CREATE TABLE `copies` (
	`table_name` text NOT NULL,
	`id` text NOT NULL,
	`version` integer NOT NULL,
	`deleted` integer NOT NULL,
	`seq` integer NOT NULL,
	`fields` text NOT NULL,
	PRIMARY KEY(`table_name`, `id`)
);
--> statement-breakpoint
CREATE TABLE `drafts` (
	`run_id` text PRIMARY KEY NOT NULL,
	`draft` text NOT NULL,
	`saved_at` text NOT NULL
);
--> statement-breakpoint
CREATE TABLE `meta` (
	`key` text PRIMARY KEY NOT NULL,
	`value` text NOT NULL
);
--> statement-breakpoint
CREATE TABLE `outbox` (
	`id` text PRIMARY KEY NOT NULL,
	`n` integer NOT NULL,
	`table_name` text NOT NULL,
	`record_id` text NOT NULL,
	`change` text NOT NULL,
	`recorded_at` text NOT NULL,
	`verdict` text,
	`why` text,
	`detail` text,
	`applied_version` integer,
	`answered_at` text,
	`try_count` integer DEFAULT 0 NOT NULL,
	`last_try_at` text,
	`last_answer` text
);
--> statement-breakpoint
CREATE UNIQUE INDEX `outbox_n_unique` ON `outbox` (`n`);--> statement-breakpoint
CREATE INDEX `outbox_record` ON `outbox` (`table_name`,`record_id`);--> statement-breakpoint
CREATE INDEX `outbox_verdict` ON `outbox` (`verdict`,`n`);--> statement-breakpoint
CREATE TABLE `roster` (
	`person_id` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`roles` text NOT NULL,
	`pin_hash` text,
	`wrong_try_count` integer DEFAULT 0 NOT NULL,
	`wait_until_at` text,
	`is_removed` integer DEFAULT false NOT NULL
);
--> statement-breakpoint
CREATE TABLE `benches` (
	`id` text PRIMARY KEY NOT NULL,
	`version` integer NOT NULL,
	`deleted` integer NOT NULL,
	`mark` text NOT NULL,
	`name` text NOT NULL,
	`element` text NOT NULL,
	`element_place` text NOT NULL,
	`setting_kind` text NOT NULL,
	`setting_text` text,
	`setting_unit` text,
	`setting_step_text` text,
	`setting_step_unit` text,
	`flow_resolution_text` text NOT NULL,
	`flow_resolution_unit` text NOT NULL,
	`pressure_resolution_text` text NOT NULL,
	`pressure_resolution_unit` text NOT NULL,
	`pressure_low_text` text,
	`pressure_low_unit` text,
	`pressure_high_text` text,
	`pressure_high_unit` text,
	`ranges` text NOT NULL,
	`leak_exponent_text` text NOT NULL,
	`status` text NOT NULL,
	`status_why` text NOT NULL
);
--> statement-breakpoint
CREATE TABLE `calibrations` (
	`id` text PRIMARY KEY NOT NULL,
	`version` integer NOT NULL,
	`deleted` integer NOT NULL,
	`mark` text NOT NULL,
	`bench_id` text NOT NULL,
	`direction` text NOT NULL,
	`grade` text NOT NULL,
	`fit` text NOT NULL,
	`steps_on` text NOT NULL,
	`as_found_text` text,
	`as_found_unit` text,
	`as_left_text` text,
	`as_left_unit` text,
	`adopted_by` text NOT NULL,
	`from_at` text NOT NULL,
	`until_at` text,
	`withdrawn_at` text,
	`note` text NOT NULL
);
--> statement-breakpoint
CREATE INDEX `calibrations_bench_id` ON `calibrations` (`bench_id`);--> statement-breakpoint
CREATE TABLE `customers` (
	`id` text PRIMARY KEY NOT NULL,
	`version` integer NOT NULL,
	`deleted` integer NOT NULL,
	`mark` text NOT NULL,
	`name` text NOT NULL,
	`mail` text,
	`phone` text,
	`note` text NOT NULL
);
--> statement-breakpoint
CREATE TABLE `heads` (
	`id` text PRIMARY KEY NOT NULL,
	`version` integer NOT NULL,
	`deleted` integer NOT NULL,
	`mark` text NOT NULL,
	`customer_id` text NOT NULL,
	`name` text NOT NULL,
	`casting` text NOT NULL,
	`cylinder_count` integer NOT NULL,
	`bore_text` text,
	`bore_unit` text,
	`intake_valve_count` integer NOT NULL,
	`exhaust_valve_count` integer NOT NULL,
	`ports` text NOT NULL
);
--> statement-breakpoint
CREATE INDEX `heads_customer_id` ON `heads` (`customer_id`);--> statement-breakpoint
CREATE TABLE `port_dimensions` (
	`id` text PRIMARY KEY NOT NULL,
	`version` integer NOT NULL,
	`deleted` integer NOT NULL,
	`mark` text NOT NULL,
	`stage_id` text NOT NULL,
	`side` text NOT NULL,
	`port` text,
	`valve_text` text,
	`valve_unit` text,
	`seat_inner_text` text,
	`seat_inner_unit` text,
	`stem_text` text,
	`stem_unit` text,
	`throat_text` text,
	`throat_unit` text,
	`seat_angle_text` text,
	`seat_angle_unit` text,
	`smallest_section_text` text,
	`smallest_section_unit` text,
	`port_volume_text` text,
	`port_volume_unit` text
);
--> statement-breakpoint
CREATE INDEX `port_dimensions_stage_id` ON `port_dimensions` (`stage_id`);--> statement-breakpoint
CREATE TABLE `readings` (
	`id` text PRIMARY KEY NOT NULL,
	`version` integer NOT NULL,
	`deleted` integer NOT NULL,
	`mark` text NOT NULL,
	`run_id` text NOT NULL,
	`rung_id` text,
	`reading_ordinal` integer NOT NULL,
	`lift_text` text NOT NULL,
	`lift_unit` text NOT NULL,
	`flow_text` text NOT NULL,
	`flow_unit` text NOT NULL,
	`pressure_text` text NOT NULL,
	`pressure_unit` text NOT NULL,
	`range` text,
	`leak_id` text,
	`zero_id` text,
	`is_pressure_repeated` integer NOT NULL,
	`needle_swing_text` text,
	`needle_swing_unit` text,
	`fan` text NOT NULL,
	`chips` text NOT NULL,
	`is_used` integer NOT NULL,
	`not_used_why` text NOT NULL,
	`second_look` text NOT NULL,
	`by_person_id` text NOT NULL,
	`device_id` text,
	`at` text NOT NULL
);
--> statement-breakpoint
CREATE INDEX `readings_run_id` ON `readings` (`run_id`);--> statement-breakpoint
CREATE TABLE `rungs` (
	`id` text PRIMARY KEY NOT NULL,
	`version` integer NOT NULL,
	`deleted` integer NOT NULL,
	`mark` text NOT NULL,
	`run_id` text NOT NULL,
	`rung_ordinal` integer NOT NULL,
	`lift_text` text NOT NULL,
	`lift_unit` text NOT NULL,
	`is_skipped` integer NOT NULL
);
--> statement-breakpoint
CREATE INDEX `rungs_run_id` ON `rungs` (`run_id`);--> statement-breakpoint
CREATE TABLE `runs` (
	`id` text PRIMARY KEY NOT NULL,
	`version` integer NOT NULL,
	`deleted` integer NOT NULL,
	`mark` text NOT NULL,
	`session_id` text NOT NULL,
	`run_ordinal` integer NOT NULL,
	`side` text NOT NULL,
	`port` text NOT NULL,
	`direction` text NOT NULL,
	`pass` text NOT NULL,
	`set_up` text NOT NULL,
	`valves_open_count` integer NOT NULL,
	`lift_zero_before_text` text,
	`lift_zero_before_unit` text,
	`lift_zero_after_text` text,
	`lift_zero_after_unit` text,
	`air_id` text,
	`plenum_temperature_text` text,
	`plenum_temperature_unit` text
);
--> statement-breakpoint
CREATE INDEX `runs_session_id` ON `runs` (`session_id`);--> statement-breakpoint
CREATE TABLE `sessions` (
	`id` text PRIMARY KEY NOT NULL,
	`version` integer NOT NULL,
	`deleted` integer NOT NULL,
	`mark` text NOT NULL,
	`stage_id` text NOT NULL,
	`bench_id` text NOT NULL,
	`label` text NOT NULL,
	`state` text NOT NULL,
	`settings` text NOT NULL,
	`lift_plan` text NOT NULL,
	`planned_by` text NOT NULL,
	`note` text NOT NULL
);
--> statement-breakpoint
CREATE INDEX `sessions_stage_id` ON `sessions` (`stage_id`);--> statement-breakpoint
CREATE INDEX `sessions_bench_id` ON `sessions` (`bench_id`);--> statement-breakpoint
CREATE TABLE `stages` (
	`id` text PRIMARY KEY NOT NULL,
	`version` integer NOT NULL,
	`deleted` integer NOT NULL,
	`mark` text NOT NULL,
	`head_id` text NOT NULL,
	`stage_ordinal` integer NOT NULL,
	`name` text NOT NULL,
	`work_done` text NOT NULL
);
--> statement-breakpoint
CREATE INDEX `stages_head_id` ON `stages` (`head_id`);