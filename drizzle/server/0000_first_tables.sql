CREATE TABLE "audit" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"by_person_id" uuid,
	"act" text NOT NULL,
	"about" text NOT NULL,
	"body" jsonb NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "audit_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "changes" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"device_id" uuid,
	"n" integer,
	"by_person_id" uuid,
	"kind" text NOT NULL,
	"table_name" text NOT NULL,
	"record_id" uuid,
	"schema_version" integer NOT NULL,
	"body" jsonb NOT NULL,
	"verdict" text NOT NULL,
	"why" text,
	"detail" text,
	"version" integer,
	"seq" bigint,
	"old" jsonb,
	"is_combined" boolean DEFAULT false NOT NULL,
	"recorded_at" text NOT NULL,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "changes_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "disputes" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"change_id" uuid NOT NULL,
	"table_name" text NOT NULL,
	"record_id" uuid NOT NULL,
	"field_group" text NOT NULL,
	"base" jsonb NOT NULL,
	"theirs" jsonb NOT NULL,
	"mine" jsonb NOT NULL,
	"opened_at" timestamp with time zone DEFAULT now() NOT NULL,
	"settled_at" timestamp with time zone,
	CONSTRAINT "disputes_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "devices" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"device_ordinal" integer NOT NULL,
	"name" text NOT NULL,
	"token_hash" text NOT NULL,
	"last_n" integer DEFAULT 0 NOT NULL,
	"pending_count" integer DEFAULT 0 NOT NULL,
	"enrolled_by" uuid NOT NULL,
	"enrolled_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_seen_at" timestamp with time zone,
	"revoked_at" timestamp with time zone,
	CONSTRAINT "devices_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "devices_token_hash_unique" UNIQUE("token_hash"),
	CONSTRAINT "devices_shop_id_device_ordinal_unique" UNIQUE("shop_id","device_ordinal")
);
--> statement-breakpoint
CREATE TABLE "enrolment_codes" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"code_hash" text NOT NULL,
	"made_by" uuid NOT NULL,
	"made_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone,
	CONSTRAINT "enrolment_codes_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "enrolment_codes_code_hash_unique" UNIQUE("code_hash")
);
--> statement-breakpoint
CREATE TABLE "memberships" (
	"shop_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"roles" jsonb NOT NULL,
	CONSTRAINT "memberships_shop_id_person_id_pk" PRIMARY KEY("shop_id","person_id")
);
--> statement-breakpoint
CREATE TABLE "people" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"mail" text,
	"password_hash" text,
	"closed_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "people_shop_id_id_pk" PRIMARY KEY("shop_id","id"),
	CONSTRAINT "people_shop_id_mail_unique" UNIQUE("shop_id","mail")
);
--> statement-breakpoint
CREATE TABLE "pins" (
	"shop_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"pin_hash" text NOT NULL,
	"set_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "pins_shop_id_person_id_pk" PRIMARY KEY("shop_id","person_id")
);
--> statement-breakpoint
CREATE TABLE "sign_ins" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"current_token_id" uuid NOT NULL,
	"previous_token_id" uuid,
	"rotated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"started_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_used_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"ended_at" timestamp with time zone,
	"ended_why" text,
	CONSTRAINT "sign_ins_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "epochs" (
	"bump" bigint PRIMARY KEY NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "feeds" (
	"shop_id" uuid PRIMARY KEY NOT NULL,
	"seq" bigint DEFAULT 0 NOT NULL
);
--> statement-breakpoint
CREATE TABLE "shops" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"settings" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "benches" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"version" integer NOT NULL,
	"deleted" boolean DEFAULT false NOT NULL,
	"seq" bigint NOT NULL,
	"name" text NOT NULL,
	"element" text NOT NULL,
	"element_place" text NOT NULL,
	"setting_kind" text NOT NULL,
	"setting_text" text,
	"setting_unit" text,
	"setting_step_text" text,
	"setting_step_unit" text,
	"flow_resolution_text" text NOT NULL,
	"flow_resolution_unit" text NOT NULL,
	"pressure_resolution_text" text NOT NULL,
	"pressure_resolution_unit" text NOT NULL,
	"pressure_low_text" text,
	"pressure_low_unit" text,
	"pressure_high_text" text,
	"pressure_high_unit" text,
	"ranges" jsonb NOT NULL,
	"leak_exponent_text" text NOT NULL,
	"status" text NOT NULL,
	"status_why" text NOT NULL,
	CONSTRAINT "benches_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "calibrations" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"version" integer NOT NULL,
	"deleted" boolean DEFAULT false NOT NULL,
	"seq" bigint NOT NULL,
	"bench_id" uuid NOT NULL,
	"direction" text NOT NULL,
	"grade" text NOT NULL,
	"fit" jsonb NOT NULL,
	"steps_on" jsonb NOT NULL,
	"as_found_text" text,
	"as_found_unit" text,
	"as_left_text" text,
	"as_left_unit" text,
	"adopted_by" uuid NOT NULL,
	"from_at" text NOT NULL,
	"until_at" text,
	"withdrawn_at" text,
	"note" text NOT NULL,
	CONSTRAINT "calibrations_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "customers" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"version" integer NOT NULL,
	"deleted" boolean DEFAULT false NOT NULL,
	"seq" bigint NOT NULL,
	"name" text NOT NULL,
	"mail" text,
	"phone" text,
	"note" text NOT NULL,
	CONSTRAINT "customers_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "heads" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"version" integer NOT NULL,
	"deleted" boolean DEFAULT false NOT NULL,
	"seq" bigint NOT NULL,
	"customer_id" uuid NOT NULL,
	"name" text NOT NULL,
	"casting" text NOT NULL,
	"cylinder_count" integer NOT NULL,
	"bore_text" text,
	"bore_unit" text,
	"intake_valve_count" integer NOT NULL,
	"exhaust_valve_count" integer NOT NULL,
	"ports" jsonb NOT NULL,
	CONSTRAINT "heads_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "port_dimensions" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"version" integer NOT NULL,
	"deleted" boolean DEFAULT false NOT NULL,
	"seq" bigint NOT NULL,
	"stage_id" uuid NOT NULL,
	"side" text NOT NULL,
	"port" text,
	"valve_text" text,
	"valve_unit" text,
	"seat_inner_text" text,
	"seat_inner_unit" text,
	"stem_text" text,
	"stem_unit" text,
	"throat_text" text,
	"throat_unit" text,
	"seat_angle_text" text,
	"seat_angle_unit" text,
	"smallest_section_text" text,
	"smallest_section_unit" text,
	"port_volume_text" text,
	"port_volume_unit" text,
	CONSTRAINT "port_dimensions_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "readings" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"version" integer NOT NULL,
	"deleted" boolean DEFAULT false NOT NULL,
	"seq" bigint NOT NULL,
	"run_id" uuid NOT NULL,
	"rung_id" uuid,
	"reading_ordinal" integer NOT NULL,
	"lift_text" text NOT NULL,
	"lift_unit" text NOT NULL,
	"flow_text" text NOT NULL,
	"flow_unit" text NOT NULL,
	"pressure_text" text NOT NULL,
	"pressure_unit" text NOT NULL,
	"range" text,
	"leak_id" uuid,
	"zero_id" uuid,
	"is_pressure_repeated" boolean NOT NULL,
	"needle_swing_text" text,
	"needle_swing_unit" text,
	"fan" text NOT NULL,
	"chips" jsonb NOT NULL,
	"is_used" boolean NOT NULL,
	"not_used_why" text NOT NULL,
	"second_look" text NOT NULL,
	"by_person_id" uuid NOT NULL,
	"device_id" uuid,
	"at" text NOT NULL,
	CONSTRAINT "readings_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "rungs" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"version" integer NOT NULL,
	"deleted" boolean DEFAULT false NOT NULL,
	"seq" bigint NOT NULL,
	"run_id" uuid NOT NULL,
	"rung_ordinal" integer NOT NULL,
	"lift_text" text NOT NULL,
	"lift_unit" text NOT NULL,
	"is_skipped" boolean NOT NULL,
	CONSTRAINT "rungs_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "runs" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"version" integer NOT NULL,
	"deleted" boolean DEFAULT false NOT NULL,
	"seq" bigint NOT NULL,
	"session_id" uuid NOT NULL,
	"run_ordinal" integer NOT NULL,
	"side" text NOT NULL,
	"port" text NOT NULL,
	"direction" text NOT NULL,
	"pass" text NOT NULL,
	"set_up" jsonb NOT NULL,
	"valves_open_count" integer NOT NULL,
	"lift_zero_before_text" text,
	"lift_zero_before_unit" text,
	"lift_zero_after_text" text,
	"lift_zero_after_unit" text,
	"air_id" uuid,
	"plenum_temperature_text" text,
	"plenum_temperature_unit" text,
	CONSTRAINT "runs_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"version" integer NOT NULL,
	"deleted" boolean DEFAULT false NOT NULL,
	"seq" bigint NOT NULL,
	"stage_id" uuid NOT NULL,
	"bench_id" uuid NOT NULL,
	"label" text NOT NULL,
	"state" text NOT NULL,
	"settings" jsonb NOT NULL,
	"lift_plan" jsonb NOT NULL,
	"planned_by" uuid NOT NULL,
	"note" text NOT NULL,
	CONSTRAINT "sessions_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
CREATE TABLE "stages" (
	"shop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"version" integer NOT NULL,
	"deleted" boolean DEFAULT false NOT NULL,
	"seq" bigint NOT NULL,
	"head_id" uuid NOT NULL,
	"stage_ordinal" integer NOT NULL,
	"name" text NOT NULL,
	"work_done" text NOT NULL,
	CONSTRAINT "stages_shop_id_id_pk" PRIMARY KEY("shop_id","id")
);
--> statement-breakpoint
ALTER TABLE "audit" ADD CONSTRAINT "audit_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "disputes" ADD CONSTRAINT "disputes_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "devices" ADD CONSTRAINT "devices_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "enrolment_codes" ADD CONSTRAINT "enrolment_codes_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_shop_id_person_id_people_shop_id_id_fk" FOREIGN KEY ("shop_id","person_id") REFERENCES "public"."people"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "people" ADD CONSTRAINT "people_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "pins" ADD CONSTRAINT "pins_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "pins" ADD CONSTRAINT "pins_shop_id_person_id_people_shop_id_id_fk" FOREIGN KEY ("shop_id","person_id") REFERENCES "public"."people"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sign_ins" ADD CONSTRAINT "sign_ins_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sign_ins" ADD CONSTRAINT "sign_ins_shop_id_person_id_people_shop_id_id_fk" FOREIGN KEY ("shop_id","person_id") REFERENCES "public"."people"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "feeds" ADD CONSTRAINT "feeds_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "benches" ADD CONSTRAINT "benches_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibrations" ADD CONSTRAINT "calibrations_shop_id_bench_id_benches_shop_id_id_fk" FOREIGN KEY ("shop_id","bench_id") REFERENCES "public"."benches"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "customers" ADD CONSTRAINT "customers_shop_id_shops_id_fk" FOREIGN KEY ("shop_id") REFERENCES "public"."shops"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "heads" ADD CONSTRAINT "heads_shop_id_customer_id_customers_shop_id_id_fk" FOREIGN KEY ("shop_id","customer_id") REFERENCES "public"."customers"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "port_dimensions" ADD CONSTRAINT "port_dimensions_shop_id_stage_id_stages_shop_id_id_fk" FOREIGN KEY ("shop_id","stage_id") REFERENCES "public"."stages"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "readings" ADD CONSTRAINT "readings_shop_id_run_id_runs_shop_id_id_fk" FOREIGN KEY ("shop_id","run_id") REFERENCES "public"."runs"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rungs" ADD CONSTRAINT "rungs_shop_id_run_id_runs_shop_id_id_fk" FOREIGN KEY ("shop_id","run_id") REFERENCES "public"."runs"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "runs" ADD CONSTRAINT "runs_shop_id_session_id_sessions_shop_id_id_fk" FOREIGN KEY ("shop_id","session_id") REFERENCES "public"."sessions"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_shop_id_stage_id_stages_shop_id_id_fk" FOREIGN KEY ("shop_id","stage_id") REFERENCES "public"."stages"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_shop_id_bench_id_benches_shop_id_id_fk" FOREIGN KEY ("shop_id","bench_id") REFERENCES "public"."benches"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stages" ADD CONSTRAINT "stages_shop_id_head_id_heads_shop_id_id_fk" FOREIGN KEY ("shop_id","head_id") REFERENCES "public"."heads"("shop_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "changes_shop_seq" ON "changes" USING btree ("shop_id","seq") WHERE "changes"."seq" is not null;--> statement-breakpoint
CREATE INDEX "changes_record" ON "changes" USING btree ("shop_id","record_id");--> statement-breakpoint
CREATE INDEX "disputes_record" ON "disputes" USING btree ("shop_id","record_id");--> statement-breakpoint
CREATE INDEX "benches_shop_id_seq_index" ON "benches" USING btree ("shop_id","seq");--> statement-breakpoint
CREATE INDEX "calibrations_shop_id_seq_index" ON "calibrations" USING btree ("shop_id","seq");--> statement-breakpoint
CREATE INDEX "calibrations_shop_id_bench_id_index" ON "calibrations" USING btree ("shop_id","bench_id");--> statement-breakpoint
CREATE INDEX "customers_shop_id_seq_index" ON "customers" USING btree ("shop_id","seq");--> statement-breakpoint
CREATE INDEX "heads_shop_id_seq_index" ON "heads" USING btree ("shop_id","seq");--> statement-breakpoint
CREATE INDEX "heads_shop_id_customer_id_index" ON "heads" USING btree ("shop_id","customer_id");--> statement-breakpoint
CREATE INDEX "port_dimensions_shop_id_seq_index" ON "port_dimensions" USING btree ("shop_id","seq");--> statement-breakpoint
CREATE INDEX "port_dimensions_shop_id_stage_id_index" ON "port_dimensions" USING btree ("shop_id","stage_id");--> statement-breakpoint
CREATE INDEX "readings_shop_id_seq_index" ON "readings" USING btree ("shop_id","seq");--> statement-breakpoint
CREATE INDEX "readings_shop_id_run_id_index" ON "readings" USING btree ("shop_id","run_id");--> statement-breakpoint
CREATE INDEX "rungs_shop_id_seq_index" ON "rungs" USING btree ("shop_id","seq");--> statement-breakpoint
CREATE INDEX "rungs_shop_id_run_id_index" ON "rungs" USING btree ("shop_id","run_id");--> statement-breakpoint
CREATE INDEX "runs_shop_id_seq_index" ON "runs" USING btree ("shop_id","seq");--> statement-breakpoint
CREATE INDEX "runs_shop_id_session_id_index" ON "runs" USING btree ("shop_id","session_id");--> statement-breakpoint
CREATE INDEX "sessions_shop_id_seq_index" ON "sessions" USING btree ("shop_id","seq");--> statement-breakpoint
CREATE INDEX "sessions_shop_id_stage_id_index" ON "sessions" USING btree ("shop_id","stage_id");--> statement-breakpoint
CREATE INDEX "sessions_shop_id_bench_id_index" ON "sessions" USING btree ("shop_id","bench_id");--> statement-breakpoint
CREATE INDEX "stages_shop_id_seq_index" ON "stages" USING btree ("shop_id","seq");--> statement-breakpoint
CREATE INDEX "stages_shop_id_head_id_index" ON "stages" USING btree ("shop_id","head_id");