CREATE TABLE "drafts" (
	"user_id" text NOT NULL,
	"form" text NOT NULL,
	"content" jsonb NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "drafts_pkey" PRIMARY KEY("user_id","form")
);
--> statement-breakpoint
CREATE TABLE "idempotency_keys" (
	"user_id" text NOT NULL,
	"key" text NOT NULL,
	"request_hash" text NOT NULL,
	"status" integer,
	"response" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "idempotency_keys_pkey" PRIMARY KEY("user_id","key")
);
--> statement-breakpoint
CREATE TABLE "one_time_codes" (
	"code_hash" text PRIMARY KEY NOT NULL,
	"purpose" text NOT NULL,
	"user_id" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone,
	CONSTRAINT "one_time_codes_purpose_check" CHECK ("one_time_codes"."purpose" in ('set-up', 'invitation', 'reset'))
);
--> statement-breakpoint
CREATE TABLE "preferences" (
	"user_id" text NOT NULL,
	"key" text NOT NULL,
	"content" jsonb NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "preferences_pkey" PRIMARY KEY("user_id","key")
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id_hash" text PRIMARY KEY NOT NULL,
	"user_id" text NOT NULL,
	"epoch" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"signed_in_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_seen_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone,
	"ip_prefix" text DEFAULT '' NOT NULL,
	"user_agent" text DEFAULT '' NOT NULL
);
--> statement-breakpoint
CREATE TABLE "tokens" (
	"id" text PRIMARY KEY NOT NULL,
	"user_id" text NOT NULL,
	"name" text NOT NULL,
	"secret_hash" text NOT NULL,
	"scopes" text[] NOT NULL,
	"campaign_id" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_used_at" timestamp with time zone,
	"expires_at" timestamp with time zone,
	"revoked_at" timestamp with time zone,
	CONSTRAINT "tokens_secret_hash_unique" UNIQUE("secret_hash")
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" text PRIMARY KEY NOT NULL,
	"email" text NOT NULL,
	"display_name" text NOT NULL,
	"role" text NOT NULL,
	"password_hash" text NOT NULL,
	"password_scheme" text NOT NULL,
	"session_epoch" integer DEFAULT 1 NOT NULL,
	"failed_sign_ins" integer DEFAULT 0 NOT NULL,
	"last_failed_at" timestamp with time zone,
	"disabled_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "users_role_check" CHECK ("users"."role" in ('technician', 'researcher', 'lead', 'guest', 'admin'))
);
--> statement-breakpoint
CREATE TABLE "reactions" (
	"id" text PRIMARY KEY NOT NULL,
	"code" text NOT NULL,
	"name" text NOT NULL,
	"key_reactant" text NOT NULL,
	"steps" jsonb NOT NULL,
	"thermochemistry" jsonb,
	"notes" text DEFAULT '' NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "reactions_code_unique" UNIQUE("code")
);
--> statement-breakpoint
CREATE TABLE "calibrations" (
	"id" text PRIMARY KEY NOT NULL,
	"kind" text NOT NULL,
	"name" text NOT NULL,
	"instrument" text DEFAULT '' NOT NULL,
	"rig_id" text,
	"convention" text,
	"entries" jsonb NOT NULL,
	"standard_used" text DEFAULT '' NOT NULL,
	"file_sha256" text,
	"valid_from" timestamp with time zone NOT NULL,
	"valid_to" timestamp with time zone,
	"supersedes_id" text,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "calibrations_kind_check" CHECK ("calibrations"."kind" in ('response-factors', 'flow-controller', 'cylinder', 'balance', 'thermocouple', 'pressure-gauge')),
	CONSTRAINT "calibrations_validity_check" CHECK ("calibrations"."valid_to" is null or "calibrations"."valid_to" > "calibrations"."valid_from")
);
--> statement-breakpoint
CREATE TABLE "column_maps" (
	"id" text PRIMARY KEY NOT NULL,
	"rig_id" text NOT NULL,
	"instrument" text NOT NULL,
	"number" integer NOT NULL,
	"fingerprint" text NOT NULL,
	"specification" jsonb NOT NULL,
	"sample_file_sha256" text,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "column_maps_rig_id_instrument_number_unique" UNIQUE("rig_id","instrument","number")
);
--> statement-breakpoint
CREATE TABLE "rigs" (
	"id" text PRIMARY KEY NOT NULL,
	"code" text NOT NULL,
	"name" text NOT NULL,
	"reactor_kind" text NOT NULL,
	"time_zone" text NOT NULL,
	"channels" jsonb NOT NULL,
	"barometer_pa" double precision DEFAULT 101325 NOT NULL,
	"maximum_pressure_pa" double precision,
	"maximum_temperature_k" double precision,
	"line_lag_s" double precision DEFAULT 0 NOT NULL,
	"flow_reference_temperature_k" double precision,
	"flow_reference_pressure_pa" double precision,
	"notes" text DEFAULT '' NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "rigs_code_unique" UNIQUE("code"),
	CONSTRAINT "rigs_reactor_kind_check" CHECK ("rigs"."reactor_kind" in ('plug-flow', 'stirred-tank', 'batch'))
);
--> statement-breakpoint
CREATE TABLE "loadings" (
	"id" text PRIMARY KEY NOT NULL,
	"code" text NOT NULL,
	"sample_id" text NOT NULL,
	"lot_id" text,
	"rig_id" text NOT NULL,
	"channel" text NOT NULL,
	"catalyst_mass_kg" double precision NOT NULL,
	"mass_relative_standard_uncertainty" double precision NOT NULL,
	"diluent_mass_kg" double precision DEFAULT 0 NOT NULL,
	"diluent_material" text DEFAULT '' NOT NULL,
	"particle_minimum_m" double precision,
	"particle_maximum_m" double precision,
	"tube_inner_diameter_m" double precision,
	"bed_length_m" double precision,
	"packed_at" timestamp with time zone,
	"notes" text DEFAULT '' NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "loadings_code_unique" UNIQUE("code"),
	CONSTRAINT "loadings_mass_check" CHECK ("loadings"."catalyst_mass_kg" >= 0 and "loadings"."diluent_mass_kg" >= 0)
);
--> statement-breakpoint
CREATE TABLE "lots" (
	"id" text PRIMARY KEY NOT NULL,
	"sample_id" text NOT NULL,
	"code" text NOT NULL,
	"made_at" timestamp with time zone,
	"notes" text DEFAULT '' NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "lots_sample_id_code_unique" UNIQUE("sample_id","code")
);
--> statement-breakpoint
CREATE TABLE "samples" (
	"id" text PRIMARY KEY NOT NULL,
	"code" text NOT NULL,
	"name" text NOT NULL,
	"composition" text DEFAULT '' NOT NULL,
	"active_metal" text,
	"metal_mass_fraction" double precision,
	"particle_density_kg_per_m3" double precision,
	"pore_fraction" double precision,
	"tortuosity" double precision,
	"mean_pore_radius_m" double precision,
	"bed_void_fraction" double precision,
	"notes" text DEFAULT '' NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "samples_code_unique" UNIQUE("code")
);
--> statement-breakpoint
CREATE TABLE "site_counts" (
	"id" text PRIMARY KEY NOT NULL,
	"sample_id" text NOT NULL,
	"lot_id" text,
	"method" text NOT NULL,
	"mol_per_kg" double precision NOT NULL,
	"relative_standard_uncertainty" double precision NOT NULL,
	"state" text DEFAULT 'fresh' NOT NULL,
	"counted_at" timestamp with time zone,
	"notes" text DEFAULT '' NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "site_counts_mol_per_kg_check" CHECK ("site_counts"."mol_per_kg" > 0),
	CONSTRAINT "site_counts_state_check" CHECK ("site_counts"."state" in ('fresh', 'spent'))
);
--> statement-breakpoint
CREATE TABLE "campaign_samples" (
	"campaign_id" text NOT NULL,
	"sample_id" text NOT NULL,
	"is_shortlisted" integer DEFAULT 0 NOT NULL,
	"priority" integer,
	"remark" text DEFAULT '' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "campaign_samples_pkey" PRIMARY KEY("campaign_id","sample_id"),
	CONSTRAINT "campaign_samples_priority_check" CHECK ("campaign_samples"."priority" is null or "campaign_samples"."priority" between 1 and 9)
);
--> statement-breakpoint
CREATE TABLE "campaigns" (
	"id" text PRIMARY KEY NOT NULL,
	"code" text NOT NULL,
	"name" text NOT NULL,
	"laboratory" text DEFAULT '' NOT NULL,
	"description" text DEFAULT '' NOT NULL,
	"reaction_id" text NOT NULL,
	"reference_sample_id" text,
	"closed_at" timestamp with time zone,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "campaigns_code_unique" UNIQUE("code")
);
--> statement-breakpoint
CREATE TABLE "members" (
	"campaign_id" text NOT NULL,
	"user_id" text NOT NULL,
	"role" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "members_pkey" PRIMARY KEY("campaign_id","user_id"),
	CONSTRAINT "members_role_check" CHECK ("members"."role" in ('technician', 'researcher', 'lead', 'guest'))
);
--> statement-breakpoint
CREATE TABLE "methods" (
	"id" text PRIMARY KEY NOT NULL,
	"campaign_id" text NOT NULL,
	"number" integer NOT NULL,
	"settings" jsonb NOT NULL,
	"reason" text NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "methods_campaign_id_number_unique" UNIQUE("campaign_id","number")
);
--> statement-breakpoint
CREATE TABLE "decisions" (
	"id" text PRIMARY KEY NOT NULL,
	"run_id" text NOT NULL,
	"decision" text NOT NULL,
	"reason" text NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "decisions_decision_check" CHECK ("decisions"."decision" in ('counts', 'set-aside', 'repeat'))
);
--> statement-breakpoint
CREATE TABLE "exclusions" (
	"id" text PRIMARY KEY NOT NULL,
	"run_id" text NOT NULL,
	"kind" text NOT NULL,
	"at_s" double precision NOT NULL,
	"reason" text NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"withdrawn_by" text,
	"withdrawn_at" timestamp with time zone,
	CONSTRAINT "exclusions_kind_check" CHECK ("exclusions"."kind" in ('hold', 'injection'))
);
--> statement-breakpoint
CREATE TABLE "feeds" (
	"run_id" text NOT NULL,
	"species" text NOT NULL,
	"position" integer NOT NULL,
	"flow_text" text NOT NULL,
	"flow_mol_per_s" double precision NOT NULL,
	"reference_temperature_k" double precision NOT NULL,
	"reference_pressure_pa" double precision NOT NULL,
	"is_internal_standard" integer DEFAULT 0 NOT NULL,
	CONSTRAINT "feeds_pkey" PRIMARY KEY("run_id","species"),
	CONSTRAINT "feeds_flow_check" CHECK ("feeds"."flow_mol_per_s" >= 0)
);
--> statement-breakpoint
CREATE TABLE "hold_edits" (
	"id" text PRIMARY KEY NOT NULL,
	"run_id" text NOT NULL,
	"found_start_s" double precision NOT NULL,
	"start_s" double precision,
	"end_s" double precision,
	"reason" text NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"withdrawn_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "remarks" (
	"id" text PRIMARY KEY NOT NULL,
	"run_id" text NOT NULL,
	"body" text NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "runs" (
	"id" text PRIMARY KEY NOT NULL,
	"code" text NOT NULL,
	"campaign_id" text NOT NULL,
	"loading_id" text NOT NULL,
	"rig_id" text NOT NULL,
	"kind" text NOT NULL,
	"state" text DEFAULT 'open' NOT NULL,
	"decision" text,
	"started_at" timestamp with time zone NOT NULL,
	"pressure_pa" double precision,
	"pressure_kind" text DEFAULT 'absolute' NOT NULL,
	"barometer_pa" double precision,
	"pressure_text" text DEFAULT '' NOT NULL,
	"pretreatment" text DEFAULT '' NOT NULL,
	"notes" text DEFAULT '' NOT NULL,
	"clock_offset_s" double precision DEFAULT 0 NOT NULL,
	"handed_in_at" timestamp with time zone,
	"handed_in_by" text,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "runs_campaign_id_code_unique" UNIQUE("campaign_id","code"),
	CONSTRAINT "runs_kind_check" CHECK ("runs"."kind" in ('catalyst', 'blank', 'diluent')),
	CONSTRAINT "runs_state_check" CHECK ("runs"."state" in ('open', 'handed-in', 'decided')),
	CONSTRAINT "runs_decision_check" CHECK (("runs"."decision" is null) = ("runs"."state" <> 'decided') and ("runs"."decision" is null or "runs"."decision" in ('counts', 'set-aside', 'repeat'))),
	CONSTRAINT "runs_pressure_kind_check" CHECK ("runs"."pressure_kind" in ('absolute', 'gauge'))
);
--> statement-breakpoint
CREATE TABLE "reading_sets" (
	"id" text PRIMARY KEY NOT NULL,
	"upload_id" text NOT NULL,
	"run_id" text NOT NULL,
	"kind" text NOT NULL,
	"column_map_id" text,
	"content_sha256" text NOT NULL,
	"row_count" integer NOT NULL,
	"first_at" timestamp with time zone,
	"last_at" timestamp with time zone,
	"channels" jsonb NOT NULL,
	"parser_version" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"superseded_at" timestamp with time zone,
	CONSTRAINT "reading_sets_kind_check" CHECK ("reading_sets"."kind" in ('rig-log', 'injections'))
);
--> statement-breakpoint
CREATE TABLE "readings" (
	"reading_set_id" text NOT NULL,
	"channel" text NOT NULL,
	"chunk" integer NOT NULL,
	"value_count" integer NOT NULL,
	"minimum" double precision,
	"maximum" double precision,
	"content" "bytea" NOT NULL,
	CONSTRAINT "readings_pkey" PRIMARY KEY("reading_set_id","channel","chunk")
);
--> statement-breakpoint
CREATE TABLE "uploads" (
	"id" text PRIMARY KEY NOT NULL,
	"campaign_id" text NOT NULL,
	"run_id" text NOT NULL,
	"sha256" text NOT NULL,
	"byte_count" bigint NOT NULL,
	"file_name" text NOT NULL,
	"state" text DEFAULT 'received' NOT NULL,
	"kind" text,
	"format" text,
	"detection" jsonb,
	"problems" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"answers" jsonb,
	"failure" text,
	"column_map_id" text,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"confirmed_by" text,
	"confirmed_at" timestamp with time zone,
	"erased_at" timestamp with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "uploads_state_check" CHECK ("uploads"."state" in ('received', 'reading', 'needs-answers', 'ready', 'confirmed', 'failed', 'set-aside')),
	CONSTRAINT "uploads_kind_check" CHECK ("uploads"."kind" is null or "uploads"."kind" in ('rig-log', 'analyser', 'attachment'))
);
--> statement-breakpoint
CREATE TABLE "audit_entries" (
	"seq" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "audit_entries_seq_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"actor_id" text NOT NULL,
	"session_ref" text DEFAULT '' NOT NULL,
	"action" text NOT NULL,
	"entity" text NOT NULL,
	"entity_id" text NOT NULL,
	"campaign_id" text,
	"before" jsonb,
	"after" jsonb,
	"reason" text DEFAULT '' NOT NULL,
	"previous_hash" text DEFAULT '' NOT NULL,
	"hash" text DEFAULT '' NOT NULL
);
--> statement-breakpoint
CREATE TABLE "editions" (
	"id" text PRIMARY KEY NOT NULL,
	"campaign_id" text NOT NULL,
	"number" integer NOT NULL,
	"method_id" text NOT NULL,
	"engine_id" text NOT NULL,
	"content" jsonb NOT NULL,
	"content_sha256" text NOT NULL,
	"statement" text NOT NULL,
	"published_by" text NOT NULL,
	"published_at" timestamp with time zone NOT NULL,
	"withdrawn_at" timestamp with time zone,
	"withdrawn_reason" text,
	CONSTRAINT "editions_campaign_id_number_unique" UNIQUE("campaign_id","number")
);
--> statement-breakpoint
CREATE TABLE "fits" (
	"key" text PRIMARY KEY NOT NULL,
	"campaign_id" text NOT NULL,
	"sample_id" text NOT NULL,
	"run_id" text,
	"method_id" text NOT NULL,
	"engine_id" text NOT NULL,
	"activation_energy_j_per_mol" double precision,
	"ln_pre_exponential" double precision,
	"content" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "holds" (
	"reduction_key" text NOT NULL,
	"position" integer NOT NULL,
	"kind" text NOT NULL,
	"number" integer NOT NULL,
	"started_at" timestamp with time zone NOT NULL,
	"ended_at" timestamp with time zone NOT NULL,
	"set_temperature_k" double precision NOT NULL,
	"content" jsonb NOT NULL,
	CONSTRAINT "holds_pkey" PRIMARY KEY("reduction_key","position")
);
--> statement-breakpoint
CREATE TABLE "points" (
	"reduction_key" text NOT NULL,
	"hold_number" integer NOT NULL,
	"temperature_k" double precision NOT NULL,
	"rate_mol_per_kg_s" double precision,
	"conversion" double precision,
	"content" jsonb NOT NULL,
	CONSTRAINT "points_pkey" PRIMARY KEY("reduction_key","hold_number")
);
--> statement-breakpoint
CREATE TABLE "reductions" (
	"key" text PRIMARY KEY NOT NULL,
	"run_id" text NOT NULL,
	"method_id" text NOT NULL,
	"engine_id" text NOT NULL,
	"summary" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "drafts" ADD CONSTRAINT "drafts_user_id_fkey" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "idempotency_keys" ADD CONSTRAINT "idempotency_keys_user_id_fkey" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "one_time_codes" ADD CONSTRAINT "one_time_codes_user_id_fkey" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "preferences" ADD CONSTRAINT "preferences_user_id_fkey" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_user_id_fkey" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "tokens" ADD CONSTRAINT "tokens_user_id_fkey" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reactions" ADD CONSTRAINT "reactions_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibrations" ADD CONSTRAINT "calibrations_rig_id_fkey" FOREIGN KEY ("rig_id") REFERENCES "public"."rigs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibrations" ADD CONSTRAINT "calibrations_supersedes_id_fkey" FOREIGN KEY ("supersedes_id") REFERENCES "public"."calibrations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibrations" ADD CONSTRAINT "calibrations_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "column_maps" ADD CONSTRAINT "column_maps_rig_id_fkey" FOREIGN KEY ("rig_id") REFERENCES "public"."rigs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "column_maps" ADD CONSTRAINT "column_maps_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rigs" ADD CONSTRAINT "rigs_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "loadings" ADD CONSTRAINT "loadings_sample_id_fkey" FOREIGN KEY ("sample_id") REFERENCES "public"."samples"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "loadings" ADD CONSTRAINT "loadings_lot_id_fkey" FOREIGN KEY ("lot_id") REFERENCES "public"."lots"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "loadings" ADD CONSTRAINT "loadings_rig_id_fkey" FOREIGN KEY ("rig_id") REFERENCES "public"."rigs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "loadings" ADD CONSTRAINT "loadings_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lots" ADD CONSTRAINT "lots_sample_id_fkey" FOREIGN KEY ("sample_id") REFERENCES "public"."samples"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lots" ADD CONSTRAINT "lots_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "samples" ADD CONSTRAINT "samples_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "site_counts" ADD CONSTRAINT "site_counts_sample_id_fkey" FOREIGN KEY ("sample_id") REFERENCES "public"."samples"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "site_counts" ADD CONSTRAINT "site_counts_lot_id_fkey" FOREIGN KEY ("lot_id") REFERENCES "public"."lots"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "site_counts" ADD CONSTRAINT "site_counts_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "campaign_samples" ADD CONSTRAINT "campaign_samples_campaign_id_fkey" FOREIGN KEY ("campaign_id") REFERENCES "public"."campaigns"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "campaign_samples" ADD CONSTRAINT "campaign_samples_sample_id_fkey" FOREIGN KEY ("sample_id") REFERENCES "public"."samples"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "campaigns" ADD CONSTRAINT "campaigns_reaction_id_fkey" FOREIGN KEY ("reaction_id") REFERENCES "public"."reactions"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "campaigns" ADD CONSTRAINT "campaigns_reference_sample_id_fkey" FOREIGN KEY ("reference_sample_id") REFERENCES "public"."samples"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "campaigns" ADD CONSTRAINT "campaigns_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "members" ADD CONSTRAINT "members_campaign_id_fkey" FOREIGN KEY ("campaign_id") REFERENCES "public"."campaigns"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "members" ADD CONSTRAINT "members_user_id_fkey" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "methods" ADD CONSTRAINT "methods_campaign_id_fkey" FOREIGN KEY ("campaign_id") REFERENCES "public"."campaigns"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "methods" ADD CONSTRAINT "methods_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "decisions" ADD CONSTRAINT "decisions_run_id_fkey" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "decisions" ADD CONSTRAINT "decisions_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exclusions" ADD CONSTRAINT "exclusions_run_id_fkey" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exclusions" ADD CONSTRAINT "exclusions_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exclusions" ADD CONSTRAINT "exclusions_withdrawn_by_fkey" FOREIGN KEY ("withdrawn_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "feeds" ADD CONSTRAINT "feeds_run_id_fkey" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "hold_edits" ADD CONSTRAINT "hold_edits_run_id_fkey" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "hold_edits" ADD CONSTRAINT "hold_edits_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "remarks" ADD CONSTRAINT "remarks_run_id_fkey" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "remarks" ADD CONSTRAINT "remarks_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "runs" ADD CONSTRAINT "runs_campaign_id_fkey" FOREIGN KEY ("campaign_id") REFERENCES "public"."campaigns"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "runs" ADD CONSTRAINT "runs_loading_id_fkey" FOREIGN KEY ("loading_id") REFERENCES "public"."loadings"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "runs" ADD CONSTRAINT "runs_rig_id_fkey" FOREIGN KEY ("rig_id") REFERENCES "public"."rigs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "runs" ADD CONSTRAINT "runs_handed_in_by_fkey" FOREIGN KEY ("handed_in_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "runs" ADD CONSTRAINT "runs_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reading_sets" ADD CONSTRAINT "reading_sets_upload_id_fkey" FOREIGN KEY ("upload_id") REFERENCES "public"."uploads"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reading_sets" ADD CONSTRAINT "reading_sets_run_id_fkey" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reading_sets" ADD CONSTRAINT "reading_sets_column_map_id_fkey" FOREIGN KEY ("column_map_id") REFERENCES "public"."column_maps"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "readings" ADD CONSTRAINT "readings_reading_set_id_fkey" FOREIGN KEY ("reading_set_id") REFERENCES "public"."reading_sets"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "uploads" ADD CONSTRAINT "uploads_campaign_id_fkey" FOREIGN KEY ("campaign_id") REFERENCES "public"."campaigns"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "uploads" ADD CONSTRAINT "uploads_run_id_fkey" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "uploads" ADD CONSTRAINT "uploads_column_map_id_fkey" FOREIGN KEY ("column_map_id") REFERENCES "public"."column_maps"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "uploads" ADD CONSTRAINT "uploads_created_by_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "uploads" ADD CONSTRAINT "uploads_confirmed_by_fkey" FOREIGN KEY ("confirmed_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "editions" ADD CONSTRAINT "editions_campaign_id_fkey" FOREIGN KEY ("campaign_id") REFERENCES "public"."campaigns"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "editions" ADD CONSTRAINT "editions_method_id_fkey" FOREIGN KEY ("method_id") REFERENCES "public"."methods"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "editions" ADD CONSTRAINT "editions_published_by_fkey" FOREIGN KEY ("published_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fits" ADD CONSTRAINT "fits_campaign_id_fkey" FOREIGN KEY ("campaign_id") REFERENCES "public"."campaigns"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fits" ADD CONSTRAINT "fits_sample_id_fkey" FOREIGN KEY ("sample_id") REFERENCES "public"."samples"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fits" ADD CONSTRAINT "fits_run_id_fkey" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fits" ADD CONSTRAINT "fits_method_id_fkey" FOREIGN KEY ("method_id") REFERENCES "public"."methods"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "holds" ADD CONSTRAINT "holds_reduction_key_fkey" FOREIGN KEY ("reduction_key") REFERENCES "public"."reductions"("key") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "points" ADD CONSTRAINT "points_reduction_key_fkey" FOREIGN KEY ("reduction_key") REFERENCES "public"."reductions"("key") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reductions" ADD CONSTRAINT "reductions_run_id_fkey" FOREIGN KEY ("run_id") REFERENCES "public"."runs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reductions" ADD CONSTRAINT "reductions_method_id_fkey" FOREIGN KEY ("method_id") REFERENCES "public"."methods"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "sessions_user_id_index" ON "sessions" USING btree ("user_id");--> statement-breakpoint
CREATE UNIQUE INDEX "users_email_unique" ON "users" USING btree (lower("email"));--> statement-breakpoint
CREATE INDEX "calibrations_kind_valid_from_index" ON "calibrations" USING btree ("kind","valid_from");--> statement-breakpoint
CREATE INDEX "column_maps_fingerprint_index" ON "column_maps" USING btree ("fingerprint");--> statement-breakpoint
CREATE INDEX "loadings_rig_id_channel_index" ON "loadings" USING btree ("rig_id","channel");--> statement-breakpoint
CREATE INDEX "site_counts_sample_id_index" ON "site_counts" USING btree ("sample_id");--> statement-breakpoint
CREATE INDEX "campaign_samples_sample_id_index" ON "campaign_samples" USING btree ("sample_id");--> statement-breakpoint
CREATE INDEX "members_user_id_index" ON "members" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "decisions_run_id_index" ON "decisions" USING btree ("run_id");--> statement-breakpoint
CREATE INDEX "exclusions_run_id_index" ON "exclusions" USING btree ("run_id");--> statement-breakpoint
CREATE INDEX "hold_edits_run_id_index" ON "hold_edits" USING btree ("run_id");--> statement-breakpoint
CREATE INDEX "remarks_run_id_index" ON "remarks" USING btree ("run_id");--> statement-breakpoint
CREATE INDEX "runs_campaign_id_index" ON "runs" USING btree ("campaign_id");--> statement-breakpoint
CREATE INDEX "runs_loading_id_index" ON "runs" USING btree ("loading_id");--> statement-breakpoint
CREATE INDEX "runs_rig_id_started_at_index" ON "runs" USING btree ("rig_id","started_at");--> statement-breakpoint
CREATE INDEX "reading_sets_run_id_index" ON "reading_sets" USING btree ("run_id");--> statement-breakpoint
CREATE INDEX "reading_sets_upload_id_index" ON "reading_sets" USING btree ("upload_id");--> statement-breakpoint
CREATE UNIQUE INDEX "uploads_run_id_sha256_unique" ON "uploads" USING btree ("run_id","sha256");--> statement-breakpoint
CREATE INDEX "uploads_campaign_id_index" ON "uploads" USING btree ("campaign_id");--> statement-breakpoint
CREATE INDEX "audit_entries_entity_entity_id_index" ON "audit_entries" USING btree ("entity","entity_id");--> statement-breakpoint
CREATE INDEX "audit_entries_campaign_id_index" ON "audit_entries" USING btree ("campaign_id");--> statement-breakpoint
CREATE INDEX "fits_campaign_id_index" ON "fits" USING btree ("campaign_id");--> statement-breakpoint
CREATE INDEX "reductions_run_id_index" ON "reductions" USING btree ("run_id");