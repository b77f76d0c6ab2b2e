CREATE TABLE "allocation" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "allocation_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"unit_id" integer NOT NULL,
	"during" "tstzrange" NOT NULL,
	"live" boolean NOT NULL,
	"booking_id" integer,
	"outage_id" integer,
	"other_work_id" integer,
	"created_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "allocation_during" CHECK (not isempty("allocation"."during") and lower_inc("allocation"."during") and not upper_inc("allocation"."during") and not lower_inf("allocation"."during") and not upper_inf("allocation"."during")),
	CONSTRAINT "allocation_has_one_reason" CHECK (num_nonnulls("allocation"."booking_id", "allocation"."outage_id", "allocation"."other_work_id") = 1)
);
--> statement-breakpoint
CREATE TABLE "audit_event" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "audit_event_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"at" timestamp (3) with time zone NOT NULL,
	"actor_id" integer,
	"site_id" integer,
	"action" text NOT NULL,
	"subject_kind" text NOT NULL,
	"subject_id" integer,
	"before" jsonb,
	"after" jsonb,
	"request_id" text,
	"seal_no" bigint,
	"prev_hash" text,
	"hash" text,
	CONSTRAINT "audit_event_seal_no" UNIQUE("seal_no"),
	CONSTRAINT "audit_event_sealed_whole" CHECK (num_nonnulls("audit_event"."seal_no", "audit_event"."prev_hash", "audit_event"."hash") in (0, 3))
);
--> statement-breakpoint
CREATE TABLE "booking_cell" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "booking_cell_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"booking_id" integer NOT NULL,
	"cell_id" integer NOT NULL,
	"source_unit_id" integer NOT NULL,
	"meter_unit_id" integer NOT NULL,
	"position_unit_id" integer NOT NULL,
	"meter_range_id" integer NOT NULL,
	"panel_id" integer NOT NULL,
	CONSTRAINT "booking_cell_once" UNIQUE("booking_id","cell_id"),
	CONSTRAINT "booking_cell_source" UNIQUE("booking_id","source_unit_id"),
	CONSTRAINT "booking_cell_meter" UNIQUE("booking_id","meter_unit_id"),
	CONSTRAINT "booking_cell_position" UNIQUE("booking_id","position_unit_id")
);
--> statement-breakpoint
CREATE TABLE "booking" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "booking_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"request_id" integer NOT NULL,
	"lot_id" integer NOT NULL,
	"load_id" integer NOT NULL,
	"site_id" integer NOT NULL,
	"project_id" integer NOT NULL,
	"state" text NOT NULL,
	"at_risk" boolean DEFAULT false NOT NULL,
	"at_risk_reason" text,
	"grade" text NOT NULL,
	"during" "tstzrange" NOT NULL,
	"likely_s" integer NOT NULL,
	"safe_s" integer NOT NULL,
	"estimate_inputs" jsonb NOT NULL,
	"estimate_result" jsonb NOT NULL,
	"model_version" text NOT NULL,
	"own_phases" jsonb NOT NULL,
	"no_show_at" timestamp (3) with time zone,
	"confirmed_by_id" integer,
	"confirmed_at" timestamp (3) with time zone,
	"cancel_reason" text,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "booking_state" CHECK ("booking"."state" in ('tentative', 'confirmed', 'running', 'done', 'cancelled')),
	CONSTRAINT "booking_grade" CHECK ("booking"."grade" in ('reported', 'indicative')),
	CONSTRAINT "booking_during" CHECK (not isempty("booking"."during") and lower_inc("booking"."during") and not upper_inc("booking"."during") and not lower_inf("booking"."during") and not upper_inf("booking"."during")),
	CONSTRAINT "booking_lengths" CHECK ("booking"."likely_s" > 0 and "booking"."safe_s" >= "booking"."likely_s"),
	CONSTRAINT "booking_risk_has_reason" CHECK (not "booking"."at_risk" or "booking"."at_risk_reason" is not null),
	CONSTRAINT "booking_cancelled_has_reason" CHECK ("booking"."state" <> 'cancelled' or "booking"."cancel_reason" is not null)
);
--> statement-breakpoint
CREATE TABLE "calibration_scope" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "calibration_scope_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"calibration_id" integer NOT NULL,
	"channel_id" integer,
	"function" text NOT NULL,
	"meter_range_id" integer,
	"limitation" text,
	CONSTRAINT "calibration_scope_once" UNIQUE NULLS NOT DISTINCT("calibration_id","channel_id","function","meter_range_id"),
	CONSTRAINT "calibration_scope_function" CHECK ("calibration_scope"."function" in ('source', 'measure', 'temperature'))
);
--> statement-breakpoint
CREATE TABLE "calibration" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "calibration_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"instrument_id" integer NOT NULL,
	"state" text NOT NULL,
	"performed_on" date NOT NULL,
	"due_on" date NOT NULL,
	"in_house" boolean NOT NULL,
	"provider" text NOT NULL,
	"provider_id" integer,
	"certificate_number" text NOT NULL,
	"file_id" integer,
	"conformity_as_found" text NOT NULL,
	"conformity_as_left" text NOT NULL,
	"note" text,
	"recorded_by_id" integer NOT NULL,
	"decided_by_id" integer,
	"decided_at" timestamp (3) with time zone,
	"refusal_reason" text,
	"replaces_id" integer,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "calibration_state" CHECK ("calibration"."state" in ('draft', 'awaiting-approval', 'approved', 'refused', 'replaced')),
	CONSTRAINT "calibration_as_found" CHECK ("calibration"."conformity_as_found" in ('conforms', 'does-not-conform', 'not-stated')),
	CONSTRAINT "calibration_as_left" CHECK ("calibration"."conformity_as_left" in ('conforms', 'does-not-conform', 'not-stated')),
	CONSTRAINT "calibration_dates" CHECK ("calibration"."due_on" > "calibration"."performed_on"),
	CONSTRAINT "calibration_in_house" CHECK (not "calibration"."in_house" or "calibration"."provider_id" is null),
	CONSTRAINT "calibration_second_person" CHECK ("calibration"."decided_by_id" <> "calibration"."recorded_by_id"),
	CONSTRAINT "calibration_decided" CHECK ("calibration"."state" in ('draft', 'awaiting-approval') or ("calibration"."decided_by_id" is not null and "calibration"."decided_at" is not null)),
	CONSTRAINT "calibration_refusal_has_reason" CHECK ("calibration"."state" <> 'refused' or "calibration"."refusal_reason" is not null),
	CONSTRAINT "calibration_replaces_another" CHECK ("calibration"."replaces_id" <> "calibration"."id")
);
--> statement-breakpoint
CREATE TABLE "duty" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "duty_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"instrument_id" integer NOT NULL,
	"kind" text NOT NULL,
	"interval_months" integer NOT NULL,
	"channel_id" integer,
	"function" text,
	"meter_range_id" integer,
	"next_due_on" date,
	"custodian_id" integer,
	"ended_at" timestamp (3) with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "duty_once" UNIQUE NULLS NOT DISTINCT("instrument_id","kind","channel_id","function","meter_range_id"),
	CONSTRAINT "duty_kind" CHECK ("duty"."kind" in ('calibration', 'intermediate-check', 'maintenance', 'mapping')),
	CONSTRAINT "duty_function" CHECK ("duty"."function" in ('source', 'measure', 'temperature')),
	CONSTRAINT "duty_interval" CHECK ("duty"."interval_months" between 1 and 120)
);
--> statement-breakpoint
CREATE TABLE "provider" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "provider_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"name" text NOT NULL,
	"scope" text NOT NULL,
	"accreditation_no" text,
	"expires_on" date,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "provider_name" UNIQUE("name")
);
--> statement-breakpoint
CREATE TABLE "cell_type" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "cell_type_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"name" text NOT NULL,
	"cell_class" text NOT NULL,
	"format" text NOT NULL,
	"chemistry" text NOT NULL,
	"capacity_ah" double precision NOT NULL,
	"nominal_v" double precision NOT NULL,
	"min_v" double precision NOT NULL,
	"max_v" double precision NOT NULL,
	"min_storage_c" double precision NOT NULL,
	"max_storage_c" double precision NOT NULL,
	"min_test_c" double precision NOT NULL,
	"max_test_c" double precision NOT NULL,
	"max_hold_state_of_charge_pct" double precision NOT NULL,
	"capacitance_f_per_ah" double precision,
	"resistance_ohm" double precision,
	"thermal_time_constant_s" double precision,
	"entropic_coefficient_v_per_k" double precision,
	"mass_kg" double precision,
	"surface_m2" double precision,
	"self_discharge_a_per_ah" double precision,
	"hazard_level" integer,
	"state" text NOT NULL,
	"drafted_by_id" integer,
	"released_by_id" integer,
	"released_at" timestamp (3) with time zone,
	"note" text,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "cell_type_name" UNIQUE("name"),
	CONSTRAINT "cell_type_class" CHECK ("cell_type"."cell_class" in ('coin', 'small-pouch', 'cylindrical', 'large-cylindrical', 'prismatic', 'large-prismatic')),
	CONSTRAINT "cell_type_format" CHECK ("cell_type"."format" in ('coin', 'pouch', '18650', '21700', '4680', 'prismatic')),
	CONSTRAINT "cell_type_chemistry" CHECK ("cell_type"."chemistry" in ('nmc811', 'nmc111', 'nmc', 'nca', 'lco', 'lfp', 'lto')),
	CONSTRAINT "cell_type_state" CHECK ("cell_type"."state" in ('draft', 'released')),
	CONSTRAINT "cell_type_limits" CHECK ("cell_type"."capacity_ah" > 0 and "cell_type"."min_v" < "cell_type"."max_v" and "cell_type"."nominal_v" between "cell_type"."min_v" and "cell_type"."max_v" and "cell_type"."min_storage_c" < "cell_type"."max_storage_c" and "cell_type"."min_test_c" < "cell_type"."max_test_c" and "cell_type"."max_hold_state_of_charge_pct" > 0 and "cell_type"."max_hold_state_of_charge_pct" <= 100),
	CONSTRAINT "cell_type_figures" CHECK ("cell_type"."capacitance_f_per_ah" > 0 and "cell_type"."resistance_ohm" > 0 and "cell_type"."thermal_time_constant_s" > 0 and "cell_type"."mass_kg" > 0 and "cell_type"."surface_m2" > 0 and "cell_type"."self_discharge_a_per_ah" > 0),
	CONSTRAINT "cell_type_hazard" CHECK ("cell_type"."hazard_level" between 0 and 7),
	CONSTRAINT "cell_type_released" CHECK ("cell_type"."state" <> 'released' or ("cell_type"."hazard_level" is not null and "cell_type"."released_by_id" is not null and "cell_type"."released_at" is not null))
);
--> statement-breakpoint
CREATE TABLE "cell" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "cell_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"serial" text,
	"lot_code" text,
	"site_id" integer NOT NULL,
	"project_id" integer NOT NULL,
	"cell_type_id" integer NOT NULL,
	"status" text NOT NULL,
	"received_at" timestamp (3) with time zone,
	"condition" text,
	"condition_note" text,
	"state_of_charge_pct" double precision,
	"ocv_v" double precision,
	"last_charged_at" timestamp (3) with time zone,
	"last_charge_direction" text,
	"last_charge_temperature_c" double precision,
	"storage_temperature_c" double precision,
	"place" text,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "cell_status" CHECK ("cell"."status" in ('announced', 'received', 'in-test', 'stored', 'quarantined', 'returned', 'disposed')),
	CONSTRAINT "cell_condition" CHECK ("cell"."condition" in ('good', 'suspicious', 'damaged')),
	CONSTRAINT "cell_charge_direction" CHECK ("cell"."last_charge_direction" in ('charge', 'discharge')),
	CONSTRAINT "cell_state_of_charge" CHECK ("cell"."state_of_charge_pct" between 0 and 100),
	CONSTRAINT "cell_received" CHECK ("cell"."status" = 'announced' or ("cell"."received_at" is not null and "cell"."condition" is not null))
);
--> statement-breakpoint
CREATE TABLE "chamber_position" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "chamber_position_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"chamber_id" integer NOT NULL,
	"label" text NOT NULL,
	"formats" text[] NOT NULL,
	"max_ah" double precision NOT NULL,
	"max_hazard" integer NOT NULL,
	"holder" text,
	"holder_factor" double precision DEFAULT 1 NOT NULL,
	"size_mm" text,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "chamber_position_label" UNIQUE("label"),
	CONSTRAINT "chamber_position_of_chamber" UNIQUE("id","chamber_id"),
	CONSTRAINT "chamber_position_formats" CHECK ("chamber_position"."formats" <@ array['coin', 'pouch', '18650', '21700', '4680', 'prismatic']::text[]),
	CONSTRAINT "chamber_position_figures" CHECK ("chamber_position"."max_ah" > 0 and "chamber_position"."max_hazard" between 0 and 7 and "chamber_position"."holder_factor" >= 1)
);
--> statement-breakpoint
CREATE TABLE "chamber_spec" (
	"instrument_id" integer PRIMARY KEY NOT NULL,
	"min_set_temp_mdegc" integer NOT NULL,
	"max_set_temp_mdegc" integer NOT NULL,
	"idle_temp_mdegc" integer DEFAULT 25000 NOT NULL,
	"ramp_k_per_min" double precision NOT NULL,
	"strict" boolean DEFAULT true NOT NULL,
	"protection_level" integer NOT NULL,
	"max_energy_wh" double precision NOT NULL,
	"max_cells" integer NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "chamber_spec_door" UNIQUE("instrument_id","strict"),
	CONSTRAINT "chamber_spec_idle" CHECK ("chamber_spec"."idle_temp_mdegc" between 5000 and 40000),
	CONSTRAINT "chamber_spec_span" CHECK ("chamber_spec"."min_set_temp_mdegc" < "chamber_spec"."max_set_temp_mdegc" and "chamber_spec"."idle_temp_mdegc" between "chamber_spec"."min_set_temp_mdegc" and "chamber_spec"."max_set_temp_mdegc"),
	CONSTRAINT "chamber_spec_figures" CHECK ("chamber_spec"."ramp_k_per_min" > 0 and "chamber_spec"."protection_level" between 0 and 7 and "chamber_spec"."max_energy_wh" > 0 and "chamber_spec"."max_cells" > 0)
);
--> statement-breakpoint
CREATE TABLE "channel_pair" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "channel_pair_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"instrument_id" integer NOT NULL,
	"source_channel_id" integer NOT NULL,
	"meter_channel_id" integer NOT NULL,
	CONSTRAINT "channel_pair_source" UNIQUE("source_channel_id"),
	CONSTRAINT "channel_pair_meter" UNIQUE("meter_channel_id"),
	CONSTRAINT "channel_pair_of_two" CHECK ("channel_pair"."source_channel_id" <> "channel_pair"."meter_channel_id")
);
--> statement-breakpoint
CREATE TABLE "channel" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "channel_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"instrument_id" integer NOT NULL,
	"label" text NOT NULL,
	"function" text NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "channel_label" UNIQUE("label"),
	CONSTRAINT "channel_of_instrument" UNIQUE("id","instrument_id"),
	CONSTRAINT "channel_function" CHECK ("channel"."function" in ('source', 'measure'))
);
--> statement-breakpoint
CREATE TABLE "meter_range" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "meter_range_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"instrument_id" integer NOT NULL,
	"channel_id" integer,
	"label" text NOT NULL,
	"full_scale_a" double precision NOT NULL,
	"resolution_a" double precision NOT NULL,
	"noise_a" double precision NOT NULL,
	"accuracy_ppm_reading" double precision NOT NULL,
	"accuracy_ppm_range" double precision NOT NULL,
	"accuracy_a" double precision NOT NULL,
	"burden_ohm" double precision,
	"burden_inside_loop" boolean,
	"sample_interval_s" double precision NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "meter_range_label" UNIQUE NULLS NOT DISTINCT("instrument_id","channel_id","label"),
	CONSTRAINT "meter_range_figures" CHECK ("meter_range"."full_scale_a" > 0 and "meter_range"."resolution_a" > 0 and "meter_range"."noise_a" >= 0 and "meter_range"."accuracy_ppm_reading" >= 0 and "meter_range"."accuracy_ppm_range" >= 0 and "meter_range"."accuracy_a" >= 0 and "meter_range"."burden_ohm" >= 0 and "meter_range"."sample_interval_s" > 0)
);
--> statement-breakpoint
CREATE TABLE "source_spec" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "source_spec_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"instrument_id" integer NOT NULL,
	"channel_id" integer,
	"min_v" double precision NOT NULL,
	"max_v" double precision NOT NULL,
	"stability_v_per_h" double precision,
	"noise_v" double precision NOT NULL,
	"output_ohm" double precision NOT NULL,
	"tempco_v_per_k" double precision,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "source_spec_once" UNIQUE NULLS NOT DISTINCT("instrument_id","channel_id"),
	CONSTRAINT "source_spec_figures" CHECK ("source_spec"."min_v" < "source_spec"."max_v" and "source_spec"."stability_v_per_h" >= 0 and "source_spec"."noise_v" >= 0 and "source_spec"."output_ohm" >= 0 and "source_spec"."tempco_v_per_k" >= 0)
);
--> statement-breakpoint
CREATE TABLE "check_result" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "check_result_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"booking_id" integer NOT NULL,
	"run_at" timestamp (3) with time zone NOT NULL,
	"stage" text NOT NULL,
	"code" text NOT NULL,
	"outcome" text NOT NULL,
	"sentence" text NOT NULL,
	"evidence" jsonb NOT NULL,
	CONSTRAINT "check_result_stage" CHECK ("check_result"."stage" in ('offer', 'confirm', 'recheck')),
	CONSTRAINT "check_result_outcome" CHECK ("check_result"."outcome" in ('pass', 'caution', 'stop'))
);
--> statement-breakpoint
CREATE TABLE "deviation" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "deviation_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"request_id" integer,
	"booking_id" integer,
	"check_code" text NOT NULL,
	"state" text NOT NULL,
	"reason" text NOT NULL,
	"decision_reason" text,
	"customer_acceptance" text,
	"requested_by_id" integer NOT NULL,
	"requested_at" timestamp (3) with time zone NOT NULL,
	"decided_by_id" integer,
	"decided_at" timestamp (3) with time zone,
	"expires_at" timestamp (3) with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "deviation_of_one" CHECK (num_nonnulls("deviation"."request_id", "deviation"."booking_id") = 1),
	CONSTRAINT "deviation_by_another" CHECK ("deviation"."requested_by_id" <> "deviation"."decided_by_id"),
	CONSTRAINT "deviation_span" CHECK ("deviation"."expires_at" > "deviation"."decided_at"),
	CONSTRAINT "deviation_decided" CHECK ("deviation"."state" = 'asked' or ("deviation"."decided_by_id" is not null and "deviation"."decided_at" is not null)),
	CONSTRAINT "deviation_state" CHECK ("deviation"."state" in ('asked', 'granted', 'refused', 'expired'))
);
--> statement-breakpoint
CREATE TABLE "file_chunk" (
	"file_id" integer NOT NULL,
	"seq" integer NOT NULL,
	"bytes" "bytea" NOT NULL,
	CONSTRAINT "file_chunk_pk" PRIMARY KEY("file_id","seq"),
	CONSTRAINT "file_chunk_size" CHECK (octet_length("file_chunk"."bytes") between 1 and 1048576),
	CONSTRAINT "file_chunk_seq" CHECK ("file_chunk"."seq" >= 0)
);
--> statement-breakpoint
CREATE TABLE "file" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "file_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"site_id" integer NOT NULL,
	"project_id" integer,
	"name" text NOT NULL,
	"media_type" text NOT NULL,
	"size_bytes" integer NOT NULL,
	"sha256" text NOT NULL,
	"uploaded_by_id" integer NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "file_size" CHECK ("file"."size_bytes" > 0),
	CONSTRAINT "file_sha256" CHECK ("file"."sha256" ~ '^[0-9a-f]{64}$')
);
--> statement-breakpoint
CREATE TABLE "idempotency_key" (
	"person_id" integer NOT NULL,
	"key" uuid NOT NULL,
	"contract" text NOT NULL,
	"request_hash" text NOT NULL,
	"status" integer,
	"response" jsonb,
	"created_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "idempotency_key_pk" PRIMARY KEY("person_id","key")
);
--> statement-breakpoint
CREATE TABLE "instrument" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "instrument_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"tag" text NOT NULL,
	"kind" text NOT NULL,
	"model" text NOT NULL,
	"serial" text,
	"firmware" text,
	"site_id" integer NOT NULL,
	"room_id" integer,
	"custodian_id" integer,
	"state" text NOT NULL,
	"released_by_id" integer,
	"released_at" timestamp (3) with time zone,
	"parent_id" integer,
	"note" text,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "instrument_tag" UNIQUE("tag"),
	CONSTRAINT "instrument_kind" CHECK ("instrument"."kind" in ('source', 'meter', 'chamber', 'logger', 'probe', 'standard', 'check-standard', 'fixture', 'mainframe')),
	CONSTRAINT "instrument_state" CHECK ("instrument"."state" in ('awaiting-release', 'in-service', 'out-of-service', 'retired')),
	CONSTRAINT "instrument_tag_shape" CHECK ("instrument"."tag" ~ '^[A-Z][A-Z0-9-]*$'),
	CONSTRAINT "instrument_not_own_parent" CHECK ("instrument"."parent_id" <> "instrument"."id")
);
--> statement-breakpoint
CREATE TABLE "chamber_load" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "chamber_load_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"chamber_id" integer NOT NULL,
	"strict" boolean NOT NULL,
	"state" text NOT NULL,
	"closes_at" timestamp (3) with time zone,
	"set_temp_mdegc" integer NOT NULL,
	"live" boolean NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "chamber_load_place" UNIQUE("id","chamber_id","strict"),
	CONSTRAINT "chamber_load_state" CHECK ("chamber_load"."state" in ('open', 'closed', 'running', 'done', 'cancelled')),
	CONSTRAINT "chamber_load_cancelled_is_not_live" CHECK (not "chamber_load"."live" or "chamber_load"."state" <> 'cancelled')
);
--> statement-breakpoint
CREATE TABLE "load_phase" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "load_phase_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"load_id" integer NOT NULL,
	"chamber_id" integer NOT NULL,
	"strict" boolean NOT NULL,
	"seq" integer NOT NULL,
	"plateau" integer DEFAULT 0 NOT NULL,
	"phase" text NOT NULL,
	"set_temp_mdegc" integer NOT NULL,
	"during" "tstzrange" NOT NULL,
	"live" boolean NOT NULL,
	"still" boolean GENERATED ALWAYS AS (case when phase in ('soak', 'match', 'hold', 'measure') then true when phase in ('ramp', 'return') then false when phase in ('connect', 'unload') and strict then false end) STORED,
	CONSTRAINT "load_phase_seq" UNIQUE("load_id","seq"),
	CONSTRAINT "load_phase_phase" CHECK ("load_phase"."phase" in ('connect', 'ramp', 'soak', 'match', 'hold', 'measure', 'return', 'wait', 'unload')),
	CONSTRAINT "load_phase_during" CHECK (not isempty("load_phase"."during") and lower_inc("load_phase"."during") and not upper_inc("load_phase"."during") and not lower_inf("load_phase"."during") and not upper_inf("load_phase"."during"))
);
--> statement-breakpoint
CREATE TABLE "digest" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "digest_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"person_id" integer NOT NULL,
	"site_id" integer NOT NULL,
	"day" date NOT NULL,
	"message_id" text NOT NULL,
	"state" text NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"lease_until" timestamp (3) with time zone,
	"sent_at" timestamp (3) with time zone,
	"created_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "digest_message_id" UNIQUE("message_id"),
	CONSTRAINT "digest_day" UNIQUE("person_id","site_id","day"),
	CONSTRAINT "digest_state" CHECK ("digest"."state" in ('waiting', 'sending', 'sent', 'dropped')),
	CONSTRAINT "digest_sent" CHECK (("digest"."state" = 'sent') = ("digest"."sent_at" is not null))
);
--> statement-breakpoint
CREATE TABLE "notification" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "notification_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"duty_id" integer NOT NULL,
	"due_on" date NOT NULL,
	"reason" text NOT NULL,
	"person_id" integer NOT NULL,
	"digest_id" integer NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "notification_once" UNIQUE("duty_id","due_on","reason","person_id")
);
--> statement-breakpoint
CREATE TABLE "other_work" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "other_work_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"site_id" integer NOT NULL,
	"load_id" integer NOT NULL,
	"project_id" integer,
	"kind" text NOT NULL,
	"title" text NOT NULL,
	"cell_count" integer NOT NULL,
	"during" "tstzrange" NOT NULL,
	"planned_by_id" integer NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "other_work_kind" CHECK ("other_work"."kind" in ('cycling', 'ageing', 'other')),
	CONSTRAINT "other_work_during" CHECK (not isempty("other_work"."during") and lower_inc("other_work"."during") and not upper_inc("other_work"."during") and not lower_inf("other_work"."during") and not upper_inf("other_work"."during"))
);
--> statement-breakpoint
CREATE TABLE "outage_instrument" (
	"outage_id" integer NOT NULL,
	"instrument_id" integer NOT NULL,
	CONSTRAINT "outage_instrument_pk" PRIMARY KEY("outage_id","instrument_id")
);
--> statement-breakpoint
CREATE TABLE "outage" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "outage_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"site_id" integer NOT NULL,
	"title" text NOT NULL,
	"reason" text,
	"state" text NOT NULL,
	"during" "tstzrange" NOT NULL,
	"planned_by_id" integer NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "outage_state" CHECK ("outage"."state" in ('planned', 'done', 'cancelled')),
	CONSTRAINT "outage_during" CHECK (not isempty("outage"."during") and lower_inc("outage"."during") and not upper_inc("outage"."during") and not lower_inf("outage"."during") and not upper_inf("outage"."during"))
);
--> statement-breakpoint
CREATE TABLE "unavailability" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "unavailability_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"instrument_id" integer,
	"unit_id" integer,
	"reason" text NOT NULL,
	"note" text NOT NULL,
	"starts_at" timestamp (3) with time zone NOT NULL,
	"ends_at" timestamp (3) with time zone,
	"reported_by_id" integer NOT NULL,
	"ended_by_id" integer,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "unavailability_reason" CHECK ("unavailability"."reason" in ('breakdown', 'withdrawn', 'failed-calibration', 'other')),
	CONSTRAINT "unavailability_of_one" CHECK (num_nonnulls("unavailability"."instrument_id", "unavailability"."unit_id") = 1),
	CONSTRAINT "unavailability_span" CHECK ("unavailability"."ends_at" >= "unavailability"."starts_at")
);
--> statement-breakpoint
CREATE TABLE "outbox" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "outbox_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"topic" text NOT NULL,
	"payload" jsonb NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"relayed_at" timestamp (3) with time zone,
	"attempts" integer DEFAULT 0 NOT NULL,
	"last_error" text,
	"request_id" text
);
--> statement-breakpoint
CREATE TABLE "panel_member" (
	"panel_id" integer NOT NULL,
	"unit_id" integer NOT NULL,
	CONSTRAINT "panel_member_pk" PRIMARY KEY("panel_id","unit_id")
);
--> statement-breakpoint
CREATE TABLE "panel" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "panel_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"name" text NOT NULL,
	"chamber_id" integer NOT NULL,
	"lead_resistance_ohm" double precision,
	"guarded" boolean NOT NULL,
	"recabling_allowed" boolean NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "panel_name" UNIQUE("chamber_id","name"),
	CONSTRAINT "panel_lead_resistance" CHECK ("panel"."lead_resistance_ohm" >= 0)
);
--> statement-breakpoint
CREATE TABLE "role_grant" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "role_grant_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"person_id" integer NOT NULL,
	"role" text NOT NULL,
	"site_id" integer,
	"origin" text NOT NULL,
	"granted_by_id" integer,
	"created_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "role_grant_once" UNIQUE NULLS NOT DISTINCT("person_id","role","site_id","origin"),
	CONSTRAINT "role_grant_role" CHECK ("role_grant"."role" in ('engineer', 'scheduler', 'metrologist', 'manager', 'safety', 'auditor', 'admin')),
	CONSTRAINT "role_grant_origin" CHECK ("role_grant"."origin" in ('claim', 'local'))
);
--> statement-breakpoint
CREATE TABLE "person" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "person_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"provider_key" text NOT NULL,
	"sub" text NOT NULL,
	"name" text NOT NULL,
	"email" text,
	"last_signed_in_at" timestamp (3) with time zone,
	"barred_at" timestamp (3) with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "person_identity" UNIQUE("provider_key","sub")
);
--> statement-breakpoint
CREATE TABLE "project_member" (
	"project_id" integer NOT NULL,
	"person_id" integer NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "project_member_pk" PRIMARY KEY("project_id","person_id")
);
--> statement-breakpoint
CREATE TABLE "project" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "project_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"code" text NOT NULL,
	"name" text NOT NULL,
	"customer" text,
	"cost_centre" text,
	"closed_at" timestamp (3) with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "project_code" UNIQUE("code")
);
--> statement-breakpoint
CREATE TABLE "rate_limit" (
	"key" text PRIMARY KEY NOT NULL,
	"hits" integer NOT NULL,
	"resets_at" timestamp (3) with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "request_lot_cell" (
	"lot_id" integer NOT NULL,
	"cell_id" integer NOT NULL,
	CONSTRAINT "request_lot_cell_pk" PRIMARY KEY("lot_id","cell_id")
);
--> statement-breakpoint
CREATE TABLE "request_lot" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "request_lot_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"request_id" integer NOT NULL,
	"seq" integer NOT NULL,
	"cell_type_id" integer,
	"cell_count" integer,
	"state_of_charge_pct" double precision,
	"rested_since_at" timestamp (3) with time zone,
	"storage_temperature_c" double precision,
	"is_damaged" boolean DEFAULT false NOT NULL,
	CONSTRAINT "request_lot_seq" UNIQUE("request_id","seq"),
	CONSTRAINT "request_lot_count" CHECK ("request_lot"."cell_count" > 0),
	CONSTRAINT "request_lot_state_of_charge" CHECK ("request_lot"."state_of_charge_pct" between 0 and 100)
);
--> statement-breakpoint
CREATE TABLE "request" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "request_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"site_id" integer NOT NULL,
	"project_id" integer,
	"requester_id" integer NOT NULL,
	"state" text NOT NULL,
	"kind" text NOT NULL,
	"grade" text NOT NULL,
	"set_temp_mdegc" integer,
	"set_tolerance_mk" integer DEFAULT 0 NOT NULL,
	"tolerance_kind" text,
	"tolerance_fraction" double precision,
	"tolerance_current_a" double precision,
	"bad_to_good_ratio" double precision,
	"earliest_start_at" timestamp (3) with time zone,
	"needed_by_at" timestamp (3) with time zone,
	"may_split" boolean DEFAULT false NOT NULL,
	"note" text,
	"priority" text DEFAULT 'normal' NOT NULL,
	"submitted_at" timestamp (3) with time zone,
	"decline_reason" text,
	"proposed_offer" jsonb,
	"proposed_at" timestamp (3) with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "request_state" CHECK ("request"."state" in ('draft', 'submitted', 'partly-booked', 'booked', 'done', 'withdrawn')),
	CONSTRAINT "request_kind" CHECK ("request"."kind" in ('settled', 'screening')),
	CONSTRAINT "request_grade" CHECK ("request"."grade" in ('reported', 'indicative')),
	CONSTRAINT "request_tolerance_kind" CHECK ("request"."tolerance_kind" in ('relative', 'absolute')),
	CONSTRAINT "request_priority" CHECK ("request"."priority" in ('low', 'normal', 'high')),
	CONSTRAINT "request_set_tolerance" CHECK ("request"."set_tolerance_mk" >= 0),
	CONSTRAINT "request_tolerance" CHECK (("request"."tolerance_kind" is distinct from 'relative' or ("request"."tolerance_fraction" > 0 and "request"."tolerance_fraction" < 1)) and ("request"."tolerance_kind" is distinct from 'absolute' or "request"."tolerance_current_a" > 0) and "request"."bad_to_good_ratio" > 1),
	CONSTRAINT "request_complete" CHECK ("request"."state" in ('draft', 'withdrawn') or ("request"."project_id" is not null and "request"."set_temp_mdegc" is not null and "request"."submitted_at" is not null and ("request"."kind" <> 'settled' or "request"."tolerance_kind" is not null) and ("request"."kind" <> 'screening' or "request"."bad_to_good_ratio" is not null)))
);
--> statement-breakpoint
CREATE TABLE "run_event" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "run_event_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"run_id" integer NOT NULL,
	"at" timestamp (3) with time zone NOT NULL,
	"kind" text NOT NULL,
	"phase" text,
	"detail" jsonb NOT NULL,
	"recorded_by_id" integer NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "run_event_kind" CHECK ("run_event"."kind" in ('check-in', 'phase-started', 'reading', 'note', 'disturbance', 'ended')),
	CONSTRAINT "run_event_phase" CHECK ("run_event"."phase" in ('connect', 'ramp', 'soak', 'match', 'hold', 'measure', 'return', 'wait', 'unload'))
);
--> statement-breakpoint
CREATE TABLE "run" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "run_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"booking_id" integer NOT NULL,
	"started_at" timestamp (3) with time zone NOT NULL,
	"ended_at" timestamp (3) with time zone,
	"end_reason" text,
	"observed_settle_s" integer,
	"note" text,
	"started_by_id" integer NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "run_booking" UNIQUE("booking_id"),
	CONSTRAINT "run_end_reason" CHECK ("run"."end_reason" in ('completed', 'stopped-unsettled', 'stopped-looked-bad', 'stopped-nearly-settled', 'aborted')),
	CONSTRAINT "run_span" CHECK ("run"."ended_at" > "run"."started_at"),
	CONSTRAINT "run_end_has_reason" CHECK (("run"."ended_at" is null) = ("run"."end_reason" is null)),
	CONSTRAINT "run_settle" CHECK ("run"."observed_settle_s" >= 0)
);
--> statement-breakpoint
CREATE TABLE "session" (
	"sid" varchar PRIMARY KEY NOT NULL,
	"sess" json NOT NULL,
	"expire" timestamp (6) with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "setting" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "setting_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"site_id" integer,
	"key" text NOT NULL,
	"value" jsonb NOT NULL,
	"changed_by_id" integer,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "setting_key" UNIQUE NULLS NOT DISTINCT("site_id","key")
);
--> statement-breakpoint
CREATE TABLE "room" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "room_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"site_id" integer NOT NULL,
	"name" text NOT NULL,
	"max_energy_wh" double precision,
	"temperature_swing_k" double precision,
	"note" text,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "room_name" UNIQUE("site_id","name"),
	CONSTRAINT "room_energy" CHECK ("room"."max_energy_wh" > 0),
	CONSTRAINT "room_swing" CHECK ("room"."temperature_swing_k" >= 0)
);
--> statement-breakpoint
CREATE TABLE "site_calendar_exception" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "site_calendar_exception_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"site_id" integer NOT NULL,
	"day" date NOT NULL,
	"hours" jsonb NOT NULL,
	"reason" text NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "site_calendar_exception_day" UNIQUE("site_id","day")
);
--> statement-breakpoint
CREATE TABLE "site" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "site_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"code" text NOT NULL,
	"name" text NOT NULL,
	"zone" text NOT NULL,
	"working_hours" jsonb NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "site_code" UNIQUE("code"),
	CONSTRAINT "site_code_is_slug" CHECK ("site"."code" ~ '^[a-z][a-z0-9-]*$')
);
--> statement-breakpoint
CREATE TABLE "stability_assessment" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "stability_assessment_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"chamber_id" integer NOT NULL,
	"set_temp_mdegc" integer NOT NULL,
	"assessed_on" date NOT NULL,
	"log_from_at" timestamp (3) with time zone,
	"log_to_at" timestamp (3) with time zone,
	"hours_logged" double precision NOT NULL,
	"drift_k_per_h" double precision NOT NULL,
	"half_band_k" double precision NOT NULL,
	"period_s" double precision,
	"resolution_k" double precision NOT NULL,
	"sensor_place" text NOT NULL,
	"logger_id" integer,
	"door_tolerant" boolean NOT NULL,
	"log_file_id" integer,
	"assessed_by_id" integer NOT NULL,
	"note" text,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "stability_assessment_span" CHECK ("stability_assessment"."log_to_at" > "stability_assessment"."log_from_at"),
	CONSTRAINT "stability_assessment_figures" CHECK ("stability_assessment"."hours_logged" > 0 and "stability_assessment"."drift_k_per_h" >= 0 and "stability_assessment"."half_band_k" >= 0 and "stability_assessment"."period_s" > 0 and "stability_assessment"."resolution_k" > 0)
);
--> statement-breakpoint
CREATE TABLE "limitation" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "limitation_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"unit_id" integer NOT NULL,
	"note" text NOT NULL,
	"max_current_a" double precision,
	"starts_at" timestamp (3) with time zone NOT NULL,
	"ends_at" timestamp (3) with time zone,
	"recorded_by_id" integer NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "limitation_span" CHECK ("limitation"."ends_at" > "limitation"."starts_at"),
	CONSTRAINT "limitation_current" CHECK ("limitation"."max_current_a" > 0)
);
--> statement-breakpoint
CREATE TABLE "unattended_permission" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "unattended_permission_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"chamber_id" integer NOT NULL,
	"cell_type_id" integer,
	"max_hazard" integer NOT NULL,
	"max_temperature_c" double precision NOT NULL,
	"max_state_of_charge_pct" double precision NOT NULL,
	"contact" text NOT NULL,
	"starts_at" timestamp (3) with time zone NOT NULL,
	"ends_at" timestamp (3) with time zone,
	"note" text NOT NULL,
	"granted_by_id" integer NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone NOT NULL,
	"updated_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "unattended_permission_span" CHECK ("unattended_permission"."ends_at" > "unattended_permission"."starts_at"),
	CONSTRAINT "unattended_permission_figures" CHECK ("unattended_permission"."max_hazard" between 0 and 7 and "unattended_permission"."max_state_of_charge_pct" > 0 and "unattended_permission"."max_state_of_charge_pct" <= 100)
);
--> statement-breakpoint
CREATE TABLE "unit" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "unit_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"kind" text NOT NULL,
	"instrument_id" integer NOT NULL,
	"channel_id" integer,
	"position_id" integer,
	CONSTRAINT "unit_channel" UNIQUE("channel_id"),
	CONSTRAINT "unit_position" UNIQUE("position_id"),
	CONSTRAINT "unit_kind" CHECK ("unit"."kind" in ('source-channel', 'meter-channel', 'chamber-position')),
	CONSTRAINT "unit_is_one_thing" CHECK (("unit"."kind" = 'chamber-position') = ("unit"."position_id" is not null) and ("unit"."kind" = 'chamber-position') = ("unit"."channel_id" is null))
);
--> statement-breakpoint
ALTER TABLE "allocation" ADD CONSTRAINT "allocation_unit_id_unit_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."unit"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "allocation" ADD CONSTRAINT "allocation_booking_id_booking_id_fk" FOREIGN KEY ("booking_id") REFERENCES "public"."booking"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "allocation" ADD CONSTRAINT "allocation_outage_id_outage_id_fk" FOREIGN KEY ("outage_id") REFERENCES "public"."outage"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "allocation" ADD CONSTRAINT "allocation_other_work_id_other_work_id_fk" FOREIGN KEY ("other_work_id") REFERENCES "public"."other_work"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_event" ADD CONSTRAINT "audit_event_actor_id_person_id_fk" FOREIGN KEY ("actor_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_event" ADD CONSTRAINT "audit_event_site_id_site_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."site"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "booking_cell" ADD CONSTRAINT "booking_cell_booking_id_booking_id_fk" FOREIGN KEY ("booking_id") REFERENCES "public"."booking"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "booking_cell" ADD CONSTRAINT "booking_cell_cell_id_cell_id_fk" FOREIGN KEY ("cell_id") REFERENCES "public"."cell"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "booking_cell" ADD CONSTRAINT "booking_cell_source_unit_id_unit_id_fk" FOREIGN KEY ("source_unit_id") REFERENCES "public"."unit"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "booking_cell" ADD CONSTRAINT "booking_cell_meter_unit_id_unit_id_fk" FOREIGN KEY ("meter_unit_id") REFERENCES "public"."unit"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "booking_cell" ADD CONSTRAINT "booking_cell_position_unit_id_unit_id_fk" FOREIGN KEY ("position_unit_id") REFERENCES "public"."unit"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "booking_cell" ADD CONSTRAINT "booking_cell_meter_range_id_meter_range_id_fk" FOREIGN KEY ("meter_range_id") REFERENCES "public"."meter_range"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "booking_cell" ADD CONSTRAINT "booking_cell_panel_id_panel_id_fk" FOREIGN KEY ("panel_id") REFERENCES "public"."panel"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "booking" ADD CONSTRAINT "booking_request_id_request_id_fk" FOREIGN KEY ("request_id") REFERENCES "public"."request"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "booking" ADD CONSTRAINT "booking_lot_id_request_lot_id_fk" FOREIGN KEY ("lot_id") REFERENCES "public"."request_lot"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "booking" ADD CONSTRAINT "booking_load_id_chamber_load_id_fk" FOREIGN KEY ("load_id") REFERENCES "public"."chamber_load"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "booking" ADD CONSTRAINT "booking_site_id_site_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."site"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "booking" ADD CONSTRAINT "booking_project_id_project_id_fk" FOREIGN KEY ("project_id") REFERENCES "public"."project"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "booking" ADD CONSTRAINT "booking_confirmed_by_id_person_id_fk" FOREIGN KEY ("confirmed_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibration_scope" ADD CONSTRAINT "calibration_scope_calibration_id_calibration_id_fk" FOREIGN KEY ("calibration_id") REFERENCES "public"."calibration"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibration_scope" ADD CONSTRAINT "calibration_scope_channel_id_channel_id_fk" FOREIGN KEY ("channel_id") REFERENCES "public"."channel"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibration_scope" ADD CONSTRAINT "calibration_scope_meter_range_id_meter_range_id_fk" FOREIGN KEY ("meter_range_id") REFERENCES "public"."meter_range"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibration" ADD CONSTRAINT "calibration_instrument_id_instrument_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instrument"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibration" ADD CONSTRAINT "calibration_provider_id_provider_id_fk" FOREIGN KEY ("provider_id") REFERENCES "public"."provider"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibration" ADD CONSTRAINT "calibration_file_id_file_id_fk" FOREIGN KEY ("file_id") REFERENCES "public"."file"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibration" ADD CONSTRAINT "calibration_recorded_by_id_person_id_fk" FOREIGN KEY ("recorded_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibration" ADD CONSTRAINT "calibration_decided_by_id_person_id_fk" FOREIGN KEY ("decided_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibration" ADD CONSTRAINT "calibration_replaces_id_calibration_id_fk" FOREIGN KEY ("replaces_id") REFERENCES "public"."calibration"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "duty" ADD CONSTRAINT "duty_instrument_id_instrument_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instrument"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "duty" ADD CONSTRAINT "duty_meter_range_id_meter_range_id_fk" FOREIGN KEY ("meter_range_id") REFERENCES "public"."meter_range"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "duty" ADD CONSTRAINT "duty_custodian_id_person_id_fk" FOREIGN KEY ("custodian_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "duty" ADD CONSTRAINT "duty_channel_of_instrument" FOREIGN KEY ("channel_id","instrument_id") REFERENCES "public"."channel"("id","instrument_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cell_type" ADD CONSTRAINT "cell_type_drafted_by_id_person_id_fk" FOREIGN KEY ("drafted_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cell_type" ADD CONSTRAINT "cell_type_released_by_id_person_id_fk" FOREIGN KEY ("released_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cell" ADD CONSTRAINT "cell_site_id_site_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."site"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cell" ADD CONSTRAINT "cell_project_id_project_id_fk" FOREIGN KEY ("project_id") REFERENCES "public"."project"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cell" ADD CONSTRAINT "cell_cell_type_id_cell_type_id_fk" FOREIGN KEY ("cell_type_id") REFERENCES "public"."cell_type"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "chamber_position" ADD CONSTRAINT "chamber_position_chamber_id_chamber_spec_instrument_id_fk" FOREIGN KEY ("chamber_id") REFERENCES "public"."chamber_spec"("instrument_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "chamber_spec" ADD CONSTRAINT "chamber_spec_instrument_id_instrument_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instrument"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "channel_pair" ADD CONSTRAINT "channel_pair_source_of_instrument" FOREIGN KEY ("source_channel_id","instrument_id") REFERENCES "public"."channel"("id","instrument_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "channel_pair" ADD CONSTRAINT "channel_pair_meter_of_instrument" FOREIGN KEY ("meter_channel_id","instrument_id") REFERENCES "public"."channel"("id","instrument_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "channel" ADD CONSTRAINT "channel_instrument_id_instrument_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instrument"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "meter_range" ADD CONSTRAINT "meter_range_instrument_id_instrument_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instrument"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "meter_range" ADD CONSTRAINT "meter_range_channel_of_instrument" FOREIGN KEY ("channel_id","instrument_id") REFERENCES "public"."channel"("id","instrument_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "source_spec" ADD CONSTRAINT "source_spec_instrument_id_instrument_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instrument"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "source_spec" ADD CONSTRAINT "source_spec_channel_of_instrument" FOREIGN KEY ("channel_id","instrument_id") REFERENCES "public"."channel"("id","instrument_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "check_result" ADD CONSTRAINT "check_result_booking_id_booking_id_fk" FOREIGN KEY ("booking_id") REFERENCES "public"."booking"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "deviation" ADD CONSTRAINT "deviation_request_id_request_id_fk" FOREIGN KEY ("request_id") REFERENCES "public"."request"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "deviation" ADD CONSTRAINT "deviation_booking_id_booking_id_fk" FOREIGN KEY ("booking_id") REFERENCES "public"."booking"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "deviation" ADD CONSTRAINT "deviation_requested_by_id_person_id_fk" FOREIGN KEY ("requested_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "deviation" ADD CONSTRAINT "deviation_decided_by_id_person_id_fk" FOREIGN KEY ("decided_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "file_chunk" ADD CONSTRAINT "file_chunk_file_id_file_id_fk" FOREIGN KEY ("file_id") REFERENCES "public"."file"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "file" ADD CONSTRAINT "file_site_id_site_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."site"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "file" ADD CONSTRAINT "file_project_id_project_id_fk" FOREIGN KEY ("project_id") REFERENCES "public"."project"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "file" ADD CONSTRAINT "file_uploaded_by_id_person_id_fk" FOREIGN KEY ("uploaded_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "idempotency_key" ADD CONSTRAINT "idempotency_key_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "instrument" ADD CONSTRAINT "instrument_site_id_site_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."site"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "instrument" ADD CONSTRAINT "instrument_room_id_room_id_fk" FOREIGN KEY ("room_id") REFERENCES "public"."room"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "instrument" ADD CONSTRAINT "instrument_custodian_id_person_id_fk" FOREIGN KEY ("custodian_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "instrument" ADD CONSTRAINT "instrument_released_by_id_person_id_fk" FOREIGN KEY ("released_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "instrument" ADD CONSTRAINT "instrument_parent_id_instrument_id_fk" FOREIGN KEY ("parent_id") REFERENCES "public"."instrument"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "chamber_load" ADD CONSTRAINT "chamber_load_chamber" FOREIGN KEY ("chamber_id","strict") REFERENCES "public"."chamber_spec"("instrument_id","strict") ON DELETE no action ON UPDATE cascade;--> statement-breakpoint
ALTER TABLE "load_phase" ADD CONSTRAINT "load_phase_load" FOREIGN KEY ("load_id","chamber_id","strict") REFERENCES "public"."chamber_load"("id","chamber_id","strict") ON DELETE no action ON UPDATE cascade;--> statement-breakpoint
ALTER TABLE "digest" ADD CONSTRAINT "digest_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "digest" ADD CONSTRAINT "digest_site_id_site_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."site"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "notification" ADD CONSTRAINT "notification_duty_id_duty_id_fk" FOREIGN KEY ("duty_id") REFERENCES "public"."duty"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "notification" ADD CONSTRAINT "notification_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "notification" ADD CONSTRAINT "notification_digest_id_digest_id_fk" FOREIGN KEY ("digest_id") REFERENCES "public"."digest"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "other_work" ADD CONSTRAINT "other_work_site_id_site_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."site"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "other_work" ADD CONSTRAINT "other_work_load_id_chamber_load_id_fk" FOREIGN KEY ("load_id") REFERENCES "public"."chamber_load"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "other_work" ADD CONSTRAINT "other_work_project_id_project_id_fk" FOREIGN KEY ("project_id") REFERENCES "public"."project"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "other_work" ADD CONSTRAINT "other_work_planned_by_id_person_id_fk" FOREIGN KEY ("planned_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outage_instrument" ADD CONSTRAINT "outage_instrument_outage_id_outage_id_fk" FOREIGN KEY ("outage_id") REFERENCES "public"."outage"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outage_instrument" ADD CONSTRAINT "outage_instrument_instrument_id_instrument_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instrument"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outage" ADD CONSTRAINT "outage_site_id_site_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."site"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outage" ADD CONSTRAINT "outage_planned_by_id_person_id_fk" FOREIGN KEY ("planned_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unavailability" ADD CONSTRAINT "unavailability_instrument_id_instrument_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instrument"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unavailability" ADD CONSTRAINT "unavailability_unit_id_unit_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."unit"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unavailability" ADD CONSTRAINT "unavailability_reported_by_id_person_id_fk" FOREIGN KEY ("reported_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unavailability" ADD CONSTRAINT "unavailability_ended_by_id_person_id_fk" FOREIGN KEY ("ended_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "panel_member" ADD CONSTRAINT "panel_member_panel_id_panel_id_fk" FOREIGN KEY ("panel_id") REFERENCES "public"."panel"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "panel_member" ADD CONSTRAINT "panel_member_unit_id_unit_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."unit"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "panel" ADD CONSTRAINT "panel_chamber_id_chamber_spec_instrument_id_fk" FOREIGN KEY ("chamber_id") REFERENCES "public"."chamber_spec"("instrument_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "role_grant" ADD CONSTRAINT "role_grant_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "role_grant" ADD CONSTRAINT "role_grant_site_id_site_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."site"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "role_grant" ADD CONSTRAINT "role_grant_granted_by_id_person_id_fk" FOREIGN KEY ("granted_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "project_member" ADD CONSTRAINT "project_member_project_id_project_id_fk" FOREIGN KEY ("project_id") REFERENCES "public"."project"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "project_member" ADD CONSTRAINT "project_member_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "request_lot_cell" ADD CONSTRAINT "request_lot_cell_lot_id_request_lot_id_fk" FOREIGN KEY ("lot_id") REFERENCES "public"."request_lot"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "request_lot_cell" ADD CONSTRAINT "request_lot_cell_cell_id_cell_id_fk" FOREIGN KEY ("cell_id") REFERENCES "public"."cell"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "request_lot" ADD CONSTRAINT "request_lot_request_id_request_id_fk" FOREIGN KEY ("request_id") REFERENCES "public"."request"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "request_lot" ADD CONSTRAINT "request_lot_cell_type_id_cell_type_id_fk" FOREIGN KEY ("cell_type_id") REFERENCES "public"."cell_type"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "request" ADD CONSTRAINT "request_site_id_site_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."site"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "request" ADD CONSTRAINT "request_project_id_project_id_fk" FOREIGN KEY ("project_id") REFERENCES "public"."project"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "request" ADD CONSTRAINT "request_requester_id_person_id_fk" FOREIGN KEY ("requester_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_event" ADD CONSTRAINT "run_event_run_id_run_id_fk" FOREIGN KEY ("run_id") REFERENCES "public"."run"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_event" ADD CONSTRAINT "run_event_recorded_by_id_person_id_fk" FOREIGN KEY ("recorded_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run" ADD CONSTRAINT "run_booking_id_booking_id_fk" FOREIGN KEY ("booking_id") REFERENCES "public"."booking"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run" ADD CONSTRAINT "run_started_by_id_person_id_fk" FOREIGN KEY ("started_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "setting" ADD CONSTRAINT "setting_site_id_site_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."site"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "setting" ADD CONSTRAINT "setting_changed_by_id_person_id_fk" FOREIGN KEY ("changed_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "room" ADD CONSTRAINT "room_site_id_site_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."site"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "site_calendar_exception" ADD CONSTRAINT "site_calendar_exception_site_id_site_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."site"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stability_assessment" ADD CONSTRAINT "stability_assessment_chamber_id_chamber_spec_instrument_id_fk" FOREIGN KEY ("chamber_id") REFERENCES "public"."chamber_spec"("instrument_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stability_assessment" ADD CONSTRAINT "stability_assessment_logger_id_instrument_id_fk" FOREIGN KEY ("logger_id") REFERENCES "public"."instrument"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stability_assessment" ADD CONSTRAINT "stability_assessment_log_file_id_file_id_fk" FOREIGN KEY ("log_file_id") REFERENCES "public"."file"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stability_assessment" ADD CONSTRAINT "stability_assessment_assessed_by_id_person_id_fk" FOREIGN KEY ("assessed_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "limitation" ADD CONSTRAINT "limitation_unit_id_unit_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."unit"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "limitation" ADD CONSTRAINT "limitation_recorded_by_id_person_id_fk" FOREIGN KEY ("recorded_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unattended_permission" ADD CONSTRAINT "unattended_permission_chamber_id_chamber_spec_instrument_id_fk" FOREIGN KEY ("chamber_id") REFERENCES "public"."chamber_spec"("instrument_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unattended_permission" ADD CONSTRAINT "unattended_permission_cell_type_id_cell_type_id_fk" FOREIGN KEY ("cell_type_id") REFERENCES "public"."cell_type"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unattended_permission" ADD CONSTRAINT "unattended_permission_granted_by_id_person_id_fk" FOREIGN KEY ("granted_by_id") REFERENCES "public"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unit" ADD CONSTRAINT "unit_instrument_id_instrument_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instrument"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unit" ADD CONSTRAINT "unit_channel_of_instrument" FOREIGN KEY ("channel_id","instrument_id") REFERENCES "public"."channel"("id","instrument_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unit" ADD CONSTRAINT "unit_position_of_chamber" FOREIGN KEY ("position_id","instrument_id") REFERENCES "public"."chamber_position"("id","chamber_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "allocation_window" ON "allocation" USING gist ("during");--> statement-breakpoint
CREATE INDEX "allocation_booking" ON "allocation" USING btree ("booking_id");--> statement-breakpoint
CREATE INDEX "allocation_outage" ON "allocation" USING btree ("outage_id");--> statement-breakpoint
CREATE INDEX "allocation_other_work" ON "allocation" USING btree ("other_work_id");--> statement-breakpoint
CREATE INDEX "audit_event_subject" ON "audit_event" USING btree ("subject_kind","subject_id","id");--> statement-breakpoint
CREATE INDEX "audit_event_site" ON "audit_event" USING btree ("site_id","id");--> statement-breakpoint
CREATE INDEX "audit_event_actor" ON "audit_event" USING btree ("actor_id","id");--> statement-breakpoint
CREATE INDEX "audit_event_unsealed" ON "audit_event" USING btree ("id") WHERE "audit_event"."seal_no" is null;--> statement-breakpoint
CREATE INDEX "booking_cell_cell" ON "booking_cell" USING btree ("cell_id");--> statement-breakpoint
CREATE INDEX "booking_cell_source_unit" ON "booking_cell" USING btree ("source_unit_id");--> statement-breakpoint
CREATE INDEX "booking_cell_meter_unit" ON "booking_cell" USING btree ("meter_unit_id");--> statement-breakpoint
CREATE INDEX "booking_cell_position_unit" ON "booking_cell" USING btree ("position_unit_id");--> statement-breakpoint
CREATE INDEX "booking_window" ON "booking" USING gist ("site_id","during");--> statement-breakpoint
CREATE INDEX "booking_site_state" ON "booking" USING btree ("site_id","state","id");--> statement-breakpoint
CREATE INDEX "booking_request" ON "booking" USING btree ("request_id");--> statement-breakpoint
CREATE INDEX "booking_lot" ON "booking" USING btree ("lot_id");--> statement-breakpoint
CREATE INDEX "booking_load" ON "booking" USING btree ("load_id");--> statement-breakpoint
CREATE INDEX "booking_project" ON "booking" USING btree ("project_id");--> statement-breakpoint
CREATE INDEX "calibration_scope_channel" ON "calibration_scope" USING btree ("channel_id");--> statement-breakpoint
CREATE INDEX "calibration_scope_meter_range" ON "calibration_scope" USING btree ("meter_range_id");--> statement-breakpoint
CREATE INDEX "calibration_instrument" ON "calibration" USING btree ("instrument_id","state","performed_on");--> statement-breakpoint
CREATE INDEX "calibration_state_id" ON "calibration" USING btree ("state","id");--> statement-breakpoint
CREATE INDEX "calibration_provider" ON "calibration" USING btree ("provider_id");--> statement-breakpoint
CREATE INDEX "calibration_replaces" ON "calibration" USING btree ("replaces_id");--> statement-breakpoint
CREATE INDEX "calibration_file" ON "calibration" USING btree ("file_id");--> statement-breakpoint
CREATE INDEX "duty_due" ON "duty" USING btree ("next_due_on");--> statement-breakpoint
CREATE INDEX "duty_custodian" ON "duty" USING btree ("custodian_id");--> statement-breakpoint
CREATE UNIQUE INDEX "cell_serial" ON "cell" USING btree ("cell_type_id","serial") WHERE "cell"."serial" is not null;--> statement-breakpoint
CREATE INDEX "cell_site" ON "cell" USING btree ("site_id","status");--> statement-breakpoint
CREATE INDEX "cell_project" ON "cell" USING btree ("project_id");--> statement-breakpoint
CREATE INDEX "chamber_position_chamber" ON "chamber_position" USING btree ("chamber_id");--> statement-breakpoint
CREATE INDEX "channel_instrument" ON "channel" USING btree ("instrument_id");--> statement-breakpoint
CREATE INDEX "check_result_booking" ON "check_result" USING btree ("booking_id","run_at");--> statement-breakpoint
CREATE INDEX "deviation_request" ON "deviation" USING btree ("request_id");--> statement-breakpoint
CREATE INDEX "deviation_booking" ON "deviation" USING btree ("booking_id");--> statement-breakpoint
CREATE INDEX "file_sha256_index" ON "file" USING btree ("sha256");--> statement-breakpoint
CREATE INDEX "file_site" ON "file" USING btree ("site_id");--> statement-breakpoint
CREATE INDEX "idempotency_key_created" ON "idempotency_key" USING btree ("created_at");--> statement-breakpoint
CREATE INDEX "instrument_site" ON "instrument" USING btree ("site_id","kind","tag");--> statement-breakpoint
CREATE INDEX "instrument_room" ON "instrument" USING btree ("room_id");--> statement-breakpoint
CREATE INDEX "instrument_parent" ON "instrument" USING btree ("parent_id");--> statement-breakpoint
CREATE INDEX "instrument_custodian" ON "instrument" USING btree ("custodian_id");--> statement-breakpoint
CREATE INDEX "chamber_load_chamber_state" ON "chamber_load" USING btree ("chamber_id","state");--> statement-breakpoint
CREATE INDEX "load_phase_window" ON "load_phase" USING gist ("chamber_id","during");--> statement-breakpoint
CREATE INDEX "digest_unsent" ON "digest" USING btree ("id") WHERE "digest"."state" in ('waiting', 'sending');--> statement-breakpoint
CREATE INDEX "notification_digest" ON "notification" USING btree ("digest_id");--> statement-breakpoint
CREATE INDEX "notification_person" ON "notification" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "other_work_load" ON "other_work" USING btree ("load_id");--> statement-breakpoint
CREATE INDEX "other_work_window" ON "other_work" USING gist ("site_id","during");--> statement-breakpoint
CREATE INDEX "outage_instrument_instrument" ON "outage_instrument" USING btree ("instrument_id");--> statement-breakpoint
CREATE INDEX "outage_window" ON "outage" USING gist ("site_id","during");--> statement-breakpoint
CREATE INDEX "unavailability_instrument" ON "unavailability" USING btree ("instrument_id","starts_at");--> statement-breakpoint
CREATE INDEX "unavailability_unit" ON "unavailability" USING btree ("unit_id","starts_at");--> statement-breakpoint
CREATE INDEX "outbox_waiting" ON "outbox" USING btree ("id") WHERE "outbox"."relayed_at" is null;--> statement-breakpoint
CREATE INDEX "panel_member_unit" ON "panel_member" USING btree ("unit_id");--> statement-breakpoint
CREATE INDEX "role_grant_site" ON "role_grant" USING btree ("site_id");--> statement-breakpoint
CREATE INDEX "person_name" ON "person" USING btree ("name");--> statement-breakpoint
CREATE INDEX "project_member_person" ON "project_member" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "rate_limit_resets" ON "rate_limit" USING btree ("resets_at");--> statement-breakpoint
CREATE INDEX "request_lot_cell_cell" ON "request_lot_cell" USING btree ("cell_id");--> statement-breakpoint
CREATE INDEX "request_lot_cell_type" ON "request_lot" USING btree ("cell_type_id");--> statement-breakpoint
CREATE INDEX "request_site" ON "request" USING btree ("site_id","state","id");--> statement-breakpoint
CREATE INDEX "request_project" ON "request" USING btree ("project_id");--> statement-breakpoint
CREATE INDEX "request_requester" ON "request" USING btree ("requester_id");--> statement-breakpoint
CREATE INDEX "run_event_run" ON "run_event" USING btree ("run_id","at");--> statement-breakpoint
CREATE INDEX "session_expire" ON "session" USING btree ("expire");--> statement-breakpoint
CREATE INDEX "stability_assessment_chamber" ON "stability_assessment" USING btree ("chamber_id","set_temp_mdegc","assessed_on");--> statement-breakpoint
CREATE INDEX "stability_assessment_logger" ON "stability_assessment" USING btree ("logger_id");--> statement-breakpoint
CREATE INDEX "limitation_unit" ON "limitation" USING btree ("unit_id");--> statement-breakpoint
CREATE INDEX "unattended_permission_chamber" ON "unattended_permission" USING btree ("chamber_id");--> statement-breakpoint
CREATE INDEX "unattended_permission_cell_type" ON "unattended_permission" USING btree ("cell_type_id");--> statement-breakpoint
CREATE INDEX "unit_instrument" ON "unit" USING btree ("instrument_id");