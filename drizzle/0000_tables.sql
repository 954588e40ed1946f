CREATE TABLE "access_tokens" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"account_id" uuid NOT NULL,
	"name" text NOT NULL,
	"hash" text NOT NULL,
	"scopes" text[] NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone,
	"last_used_at" timestamp with time zone,
	"revoked_at" timestamp with time zone,
	CONSTRAINT "access_tokens_hash_unique" UNIQUE("hash"),
	CONSTRAINT "access_tokens_hash" CHECK (hash ~ '^[0-9a-f]{64}$')
);
--> statement-breakpoint
CREATE TABLE "account_invitations" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"hash" text NOT NULL,
	"email" text NOT NULL,
	"role" text NOT NULL,
	"invited_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_by" uuid,
	"used_at" timestamp with time zone,
	CONSTRAINT "account_invitations_role" CHECK (role in ('theorist', 'reviewer', 'admin')),
	CONSTRAINT "account_invitations_hash_form" CHECK (hash ~ '^[0-9a-f]{64}$')
);
--> statement-breakpoint
CREATE TABLE "accounts" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"provider_id" text NOT NULL,
	"login" text NOT NULL,
	"name" text NOT NULL,
	"email" text,
	"role" text DEFAULT 'theorist' NOT NULL,
	"state" text DEFAULT 'waiting' NOT NULL,
	"time_zone" text DEFAULT 'UTC' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"admitted_at" timestamp with time zone,
	CONSTRAINT "accounts_providerId_unique" UNIQUE("provider_id"),
	CONSTRAINT "accounts_role" CHECK (role in ('theorist', 'reviewer', 'admin')),
	CONSTRAINT "accounts_state" CHECK (state in ('waiting', 'active', 'deactivated'))
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"sid" varchar PRIMARY KEY NOT NULL,
	"sess" json NOT NULL,
	"expire" timestamp (6) NOT NULL
);
--> statement-breakpoint
CREATE TABLE "audit_entries" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "audit_entries_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"actor_id" uuid,
	"action" text NOT NULL,
	"subject" text NOT NULL,
	"subject_id" text NOT NULL,
	"before" jsonb,
	"after" jsonb,
	"request_id" text
);
--> statement-breakpoint
CREATE TABLE "idempotency_keys" (
	"account_id" uuid NOT NULL,
	"key" text NOT NULL,
	"request_hash" text NOT NULL,
	"response" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "idempotency_keys_account_id_key_pk" PRIMARY KEY("account_id","key"),
	CONSTRAINT "idempotency_keys_hash" CHECK (request_hash ~ '^[0-9a-f]{64}$')
);
--> statement-breakpoint
CREATE TABLE "execution_events" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "execution_events_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"execution_id" uuid NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"text" text NOT NULL
);
--> statement-breakpoint
CREATE TABLE "executions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"job_hash" text NOT NULL,
	"submission_id" uuid NOT NULL,
	"point" integer NOT NULL,
	"reason" text NOT NULL,
	"asked_by" uuid NOT NULL,
	"state" text DEFAULT 'running' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"started_at" timestamp with time zone,
	"finished_at" timestamp with time zone,
	"cpu_us" bigint DEFAULT 0 NOT NULL,
	"workers" text[] DEFAULT '{}' NOT NULL,
	"result_digest" text,
	"failure_code" text,
	"failure_text" text,
	CONSTRAINT "executions_state" CHECK (state in ('running', 'finished', 'failed', 'cancelled', 'broken-off')),
	CONSTRAINT "executions_reason" CHECK (reason in ('first', 're-run', 'audit', 'restore')),
	CONSTRAINT "executions_result" CHECK ((state = 'finished') = (result_digest is not null)),
	CONSTRAINT "executions_end" CHECK ((state = 'running') = (finished_at is null)),
	CONSTRAINT "executions_failure" CHECK ((state in ('failed', 'broken-off')) = (failure_code is not null))
);
--> statement-breakpoint
CREATE TABLE "jobs" (
	"hash" text PRIMARY KEY NOT NULL,
	"canonical_text" text NOT NULL,
	"specification" jsonb GENERATED ALWAYS AS (canonical_text::jsonb) STORED NOT NULL,
	"model" text NOT NULL,
	"kernel_digest" text NOT NULL,
	"question_digest" text,
	"table_digests" text[] DEFAULT '{}' NOT NULL,
	"unlisted" boolean DEFAULT false NOT NULL,
	"estimated_ms" double precision NOT NULL,
	"slices" integer NOT NULL,
	"result_bytes" bigint NOT NULL,
	"memory_bytes" bigint NOT NULL,
	"state" text DEFAULT 'waiting' NOT NULL,
	"result_digest" text,
	"cpu_ms" double precision,
	"failure_code" text,
	"failure_text" text,
	"first_submitted_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"finished_at" timestamp with time zone,
	CONSTRAINT "jobs_hash" CHECK (hash = encode(sha256(convert_to(canonical_text, 'UTF8')), 'hex')),
	CONSTRAINT "jobs_state" CHECK (state in ('waiting', 'running', 'finished', 'disputed', 'failed')),
	CONSTRAINT "jobs_slices" CHECK (slices > 0 and estimated_ms >= 0 and result_bytes >= 0 and memory_bytes >= 0),
	CONSTRAINT "jobs_result_when_finished" CHECK ((state in ('finished', 'disputed')) = (result_digest is not null)),
	CONSTRAINT "jobs_failure_when_failed" CHECK ((state = 'failed') = (failure_code is not null))
);
--> statement-breakpoint
CREATE TABLE "kernels" (
	"digest" text PRIMARY KEY NOT NULL,
	"version" text NOT NULL,
	"bytes" "bytea" NOT NULL,
	"manifest" jsonb NOT NULL,
	"state" text DEFAULT 'released' NOT NULL,
	"released_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "kernels_state" CHECK (state in ('current', 'released', 'retired')),
	CONSTRAINT "kernels_digest" CHECK (digest = encode(sha256(bytes), 'hex'))
);
--> statement-breakpoint
CREATE TABLE "chunks" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"submission_id" uuid NOT NULL,
	"account_id" uuid NOT NULL,
	"parts" "int4multirange" NOT NULL,
	"estimated_ms" double precision NOT NULL,
	"attempt" integer DEFAULT 0 NOT NULL,
	"state" text DEFAULT 'open' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"closed_at" timestamp with time zone,
	"used_us" bigint DEFAULT 0 NOT NULL,
	CONSTRAINT "chunks_state" CHECK (state in ('open', 'done', 'cancelled', 'dead'))
);
--> statement-breakpoint
CREATE TABLE "leases" (
	"chunk_id" uuid PRIMARY KEY NOT NULL,
	"attempt" integer NOT NULL,
	"submission_id" uuid NOT NULL,
	"account_id" uuid NOT NULL,
	"worker" text NOT NULL,
	"started_at" timestamp with time zone DEFAULT now() NOT NULL,
	"beat_at" timestamp with time zone DEFAULT now() NOT NULL,
	"cpu_us" bigint DEFAULT 0 NOT NULL,
	"fraction" real DEFAULT 0 NOT NULL
);
--> statement-breakpoint
CREATE TABLE "parked_points" (
	"submission_id" uuid NOT NULL,
	"point" integer NOT NULL,
	"job_hash" text NOT NULL,
	"parts" "int4multirange" NOT NULL,
	CONSTRAINT "parked_points_submission_id_point_pk" PRIMARY KEY("submission_id","point")
);
--> statement-breakpoint
CREATE TABLE "part_rows" (
	"submission_id" uuid NOT NULL,
	"index" integer NOT NULL,
	"slice" integer NOT NULL,
	"number" integer NOT NULL,
	"data" "bytea" NOT NULL,
	CONSTRAINT "part_rows_submission_id_index_slice_number_pk" PRIMARY KEY("submission_id","index","slice","number"),
	CONSTRAINT "part_rows_size" CHECK (octet_length(data) <= 4194304)
);
--> statement-breakpoint
CREATE TABLE "parts" (
	"submission_id" uuid NOT NULL,
	"index" integer NOT NULL,
	"execution_id" uuid NOT NULL,
	"outcome" text NOT NULL,
	"attempt" integer NOT NULL,
	"worker" text NOT NULL,
	"cpu_us" bigint NOT NULL,
	"speed_factor" double precision NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "parts_submission_id_index_pk" PRIMARY KEY("submission_id","index"),
	CONSTRAINT "parts_outcome" CHECK (outcome in ('payloads', 'result', 'failure')),
	CONSTRAINT "parts_cpu" CHECK (cpu_us >= 0 and speed_factor > 0)
);
--> statement-breakpoint
CREATE TABLE "submission_points" (
	"submission_id" uuid NOT NULL,
	"point" integer NOT NULL,
	"job_hash" text NOT NULL,
	"place" integer NOT NULL,
	"swept_values" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"outcome" text,
	CONSTRAINT "submission_points_submission_id_point_pk" PRIMARY KEY("submission_id","point"),
	CONSTRAINT "submission_points_outcome" CHECK (outcome in ('finished', 'failed', 'reused', 'broken-off', 'left-out', 'cancelled'))
);
--> statement-breakpoint
CREATE TABLE "submissions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"kind" text NOT NULL,
	"account_id" uuid NOT NULL,
	"balance_id" uuid NOT NULL,
	"title" text NOT NULL,
	"model" text NOT NULL,
	"state" text DEFAULT 'active' NOT NULL,
	"tonight" boolean NOT NULL,
	"priority" smallint DEFAULT 0 NOT NULL,
	"points" integer NOT NULL,
	"parts_per_job" integer NOT NULL,
	"todo" "int4multirange" NOT NULL,
	"held" "int4multirange" DEFAULT '{}' NOT NULL,
	"open_chunks" integer DEFAULT 0 NOT NULL,
	"parked_points" integer DEFAULT 0 NOT NULL,
	"done_points" integer DEFAULT 0 NOT NULL,
	"failed_points" integer DEFAULT 0 NOT NULL,
	"total_slices" bigint NOT NULL,
	"done_slices" bigint DEFAULT 0 NOT NULL,
	"estimated_ms" double precision NOT NULL,
	"part_ms" double precision NOT NULL,
	"memory_bytes" bigint NOT NULL,
	"reserved_at_start_ms" bigint NOT NULL,
	"reserved_ms" bigint NOT NULL,
	"used_us" bigint DEFAULT 0 NOT NULL,
	"lost_us" bigint DEFAULT 0 NOT NULL,
	"virtual_time" double precision DEFAULT 0 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"started_at" timestamp with time zone,
	"finished_at" timestamp with time zone,
	CONSTRAINT "submissions_kind" CHECK (kind in ('sweep', 'job', 're-run')),
	CONSTRAINT "submissions_state" CHECK (state in ('active', 'paused', 'done', 'cancelled')),
	CONSTRAINT "submissions_numbering" CHECK (points > 0 and parts_per_job > 0),
	CONSTRAINT "submissions_counts" CHECK (open_chunks >= 0 and parked_points >= 0 and done_points <= points and failed_points <= points),
	CONSTRAINT "submissions_reserved" CHECK (reserved_ms >= 0 and reserved_ms <= reserved_at_start_ms and used_us >= 0),
	CONSTRAINT "submissions_done_is_empty" CHECK (state <> 'done' or (isempty(todo) and isempty(held) and open_chunks = 0 and parked_points = 0)),
	CONSTRAINT "submissions_end_releases" CHECK (finished_at is null or reserved_ms = 0)
);
--> statement-breakpoint
CREATE TABLE "turn_clock" (
	"one" boolean PRIMARY KEY DEFAULT true NOT NULL,
	"virtual_time" double precision DEFAULT 0 NOT NULL,
	CONSTRAINT "turn_clock_one" CHECK (one)
);
--> statement-breakpoint
CREATE TABLE "turns" (
	"account_id" uuid PRIMARY KEY NOT NULL,
	"weight" double precision DEFAULT 1 NOT NULL,
	"max_slots" integer,
	"weekly_grant_ms" bigint,
	"running" integer DEFAULT 0 NOT NULL,
	"virtual_time" double precision DEFAULT 0 NOT NULL,
	"clock" double precision DEFAULT 0 NOT NULL,
	CONSTRAINT "turns_limits" CHECK (weight > 0 and running >= 0 and (max_slots is null or max_slots >= 0))
);
--> statement-breakpoint
CREATE TABLE "quota_balances" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"account_id" uuid NOT NULL,
	"week_start" timestamp with time zone NOT NULL,
	"week_end" timestamp with time zone NOT NULL,
	"granted_ms" bigint DEFAULT 0 NOT NULL,
	"reserved_ms" bigint DEFAULT 0 NOT NULL,
	"used_ms" bigint DEFAULT 0 NOT NULL,
	CONSTRAINT "quota_balances_week" UNIQUE("account_id","week_start"),
	CONSTRAINT "quota_balances_not_negative" CHECK (granted_ms >= 0 and reserved_ms >= 0 and used_ms >= 0)
);
--> statement-breakpoint
CREATE TABLE "quota_entries" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "quota_entries_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"balance_id" uuid NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"kind" text NOT NULL,
	"granted_ms" bigint DEFAULT 0 NOT NULL,
	"reserved_ms" bigint DEFAULT 0 NOT NULL,
	"used_ms" bigint DEFAULT 0 NOT NULL,
	"reason" text NOT NULL,
	"submission_id" uuid,
	"chunk_id" uuid,
	CONSTRAINT "quota_entries_kind" CHECK (kind in ('grant', 'reserve', 'settle', 'release', 'adjust')),
	CONSTRAINT "quota_entries_sides" CHECK (case kind
    when 'grant' then granted_ms >= 0 and reserved_ms = 0 and used_ms = 0
    when 'reserve' then granted_ms = 0 and reserved_ms > 0 and used_ms = 0
    when 'settle' then granted_ms = 0 and reserved_ms <= 0 and used_ms >= 0
    when 'release' then granted_ms = 0 and reserved_ms < 0 and used_ms = 0
    else reserved_ms = 0 end),
	CONSTRAINT "quota_entries_submission" CHECK (kind in ('grant', 'adjust') or submission_id is not null)
);
--> statement-breakpoint
CREATE TABLE "result_array_rows" (
	"sha256" text NOT NULL,
	"number" integer NOT NULL,
	"data" "bytea" NOT NULL,
	CONSTRAINT "result_array_rows_sha256_number_pk" PRIMARY KEY("sha256","number"),
	CONSTRAINT "result_array_rows_size" CHECK (octet_length(data) <= 4194304)
);
--> statement-breakpoint
CREATE TABLE "result_arrays" (
	"sha256" text PRIMARY KEY NOT NULL,
	"bytes" bigint NOT NULL,
	CONSTRAINT "result_arrays_sha256" CHECK (sha256 ~ '^[0-9a-f]{64}$'),
	CONSTRAINT "result_arrays_bytes" CHECK (bytes >= 0)
);
--> statement-breakpoint
CREATE TABLE "results" (
	"digest" text PRIMARY KEY NOT NULL,
	"arrays" jsonb NOT NULL,
	"certificate" jsonb NOT NULL,
	"bytes" bigint NOT NULL,
	"check_failed" boolean GENERATED ALWAYS AS (jsonb_path_exists(certificate, '$.checks[*] ? (@.holds == false)')) STORED NOT NULL,
	"state" text DEFAULT 'kept' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "results_digest" CHECK (digest ~ '^[0-9a-f]{64}$'),
	CONSTRAINT "results_state" CHECK (state in ('kept', 'evicted'))
);
--> statement-breakpoint
CREATE TABLE "settings" (
	"version" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "settings_version_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"group_name" text NOT NULL,
	"time_zone" text DEFAULT 'UTC' NOT NULL,
	"night_from" time DEFAULT '20:00' NOT NULL,
	"night_to" time DEFAULT '07:00' NOT NULL,
	"weekly_grant_ms" bigint DEFAULT 360000000 NOT NULL,
	"max_slots" integer DEFAULT 8 NOT NULL,
	"chunk_ms" integer DEFAULT 2000 NOT NULL,
	"chunk_budget_ms" integer DEFAULT 4000 NOT NULL,
	"changed_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "settings_limits" CHECK (weekly_grant_ms >= 0 and max_slots > 0 and chunk_ms > 0 and chunk_budget_ms >= chunk_ms)
);
--> statement-breakpoint
CREATE TABLE "sweep_drafts" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"owner_id" uuid NOT NULL,
	"title" text NOT NULL,
	"model" text NOT NULL,
	"body" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "sweeps" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"submission_id" uuid NOT NULL,
	"owner_id" uuid NOT NULL,
	"title" text NOT NULL,
	"model" text NOT NULL,
	"definition" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "sweeps_submissionId_unique" UNIQUE("submission_id")
);
--> statement-breakpoint
CREATE TABLE "table_holdings" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "table_holdings_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"table_digest" text NOT NULL,
	"account_id" uuid NOT NULL,
	"name" text NOT NULL,
	"file_digest" text,
	"origin" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "tables" (
	"digest" text PRIMARY KEY NOT NULL,
	"columns" jsonb NOT NULL,
	"bytes" "bytea" NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "tables_digest" CHECK (digest ~ '^[0-9a-f]{64}$')
);
--> statement-breakpoint
CREATE TABLE "workers" (
	"id" text PRIMARY KEY NOT NULL,
	"host" text NOT NULL,
	"pid" integer NOT NULL,
	"slots" integer NOT NULL,
	"memory_bytes" bigint NOT NULL,
	"speed_factor" double precision DEFAULT 1 NOT NULL,
	"kernel_digests" text[] DEFAULT '{}' NOT NULL,
	"works_from" time,
	"works_to" time,
	"state" text DEFAULT 'active' NOT NULL,
	"started_at" timestamp with time zone DEFAULT now() NOT NULL,
	"heartbeat_at" timestamp with time zone DEFAULT now() NOT NULL,
	"stopped_at" timestamp with time zone,
	CONSTRAINT "workers_state" CHECK (state in ('active', 'winding-down', 'silent', 'stopped')),
	CONSTRAINT "workers_size" CHECK (slots > 0 and memory_bytes > 0 and speed_factor > 0),
	CONSTRAINT "workers_hours" CHECK ((works_from is null) = (works_to is null))
);
--> statement-breakpoint
ALTER TABLE "access_tokens" ADD CONSTRAINT "access_tokens_account_id_accounts_id_fk" FOREIGN KEY ("account_id") REFERENCES "public"."accounts"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "account_invitations" ADD CONSTRAINT "account_invitations_invited_by_accounts_id_fk" FOREIGN KEY ("invited_by") REFERENCES "public"."accounts"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "account_invitations" ADD CONSTRAINT "account_invitations_used_by_accounts_id_fk" FOREIGN KEY ("used_by") REFERENCES "public"."accounts"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "idempotency_keys" ADD CONSTRAINT "idempotency_keys_account_id_accounts_id_fk" FOREIGN KEY ("account_id") REFERENCES "public"."accounts"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "execution_events" ADD CONSTRAINT "execution_events_execution_id_executions_id_fk" FOREIGN KEY ("execution_id") REFERENCES "public"."executions"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "executions" ADD CONSTRAINT "executions_job_hash_jobs_hash_fk" FOREIGN KEY ("job_hash") REFERENCES "public"."jobs"("hash") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "executions" ADD CONSTRAINT "executions_submission_id_submissions_id_fk" FOREIGN KEY ("submission_id") REFERENCES "public"."submissions"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "executions" ADD CONSTRAINT "executions_asked_by_accounts_id_fk" FOREIGN KEY ("asked_by") REFERENCES "public"."accounts"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "executions" ADD CONSTRAINT "executions_result_digest_results_digest_fk" FOREIGN KEY ("result_digest") REFERENCES "public"."results"("digest") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "jobs" ADD CONSTRAINT "jobs_kernel_digest_kernels_digest_fk" FOREIGN KEY ("kernel_digest") REFERENCES "public"."kernels"("digest") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "jobs" ADD CONSTRAINT "jobs_result_digest_results_digest_fk" FOREIGN KEY ("result_digest") REFERENCES "public"."results"("digest") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "jobs" ADD CONSTRAINT "jobs_first_submitted_by_accounts_id_fk" FOREIGN KEY ("first_submitted_by") REFERENCES "public"."accounts"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "chunks" ADD CONSTRAINT "chunks_submission_id_submissions_id_fk" FOREIGN KEY ("submission_id") REFERENCES "public"."submissions"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "leases" ADD CONSTRAINT "leases_chunk_id_chunks_id_fk" FOREIGN KEY ("chunk_id") REFERENCES "public"."chunks"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "parked_points" ADD CONSTRAINT "parked_points_submission_id_submissions_id_fk" FOREIGN KEY ("submission_id") REFERENCES "public"."submissions"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_rows" ADD CONSTRAINT "part_rows_submission_id_submissions_id_fk" FOREIGN KEY ("submission_id") REFERENCES "public"."submissions"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "parts" ADD CONSTRAINT "parts_submission_id_submissions_id_fk" FOREIGN KEY ("submission_id") REFERENCES "public"."submissions"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "submission_points" ADD CONSTRAINT "submission_points_submission_id_submissions_id_fk" FOREIGN KEY ("submission_id") REFERENCES "public"."submissions"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "submission_points" ADD CONSTRAINT "submission_points_job_hash_jobs_hash_fk" FOREIGN KEY ("job_hash") REFERENCES "public"."jobs"("hash") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "submissions" ADD CONSTRAINT "submissions_account_id_accounts_id_fk" FOREIGN KEY ("account_id") REFERENCES "public"."accounts"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "submissions" ADD CONSTRAINT "submissions_balance_id_quota_balances_id_fk" FOREIGN KEY ("balance_id") REFERENCES "public"."quota_balances"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "turns" ADD CONSTRAINT "turns_account_id_accounts_id_fk" FOREIGN KEY ("account_id") REFERENCES "public"."accounts"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quota_balances" ADD CONSTRAINT "quota_balances_account_id_accounts_id_fk" FOREIGN KEY ("account_id") REFERENCES "public"."accounts"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quota_entries" ADD CONSTRAINT "quota_entries_balance_id_quota_balances_id_fk" FOREIGN KEY ("balance_id") REFERENCES "public"."quota_balances"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "result_array_rows" ADD CONSTRAINT "result_array_rows_sha256_result_arrays_sha256_fk" FOREIGN KEY ("sha256") REFERENCES "public"."result_arrays"("sha256") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settings" ADD CONSTRAINT "settings_changed_by_accounts_id_fk" FOREIGN KEY ("changed_by") REFERENCES "public"."accounts"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sweep_drafts" ADD CONSTRAINT "sweep_drafts_owner_id_accounts_id_fk" FOREIGN KEY ("owner_id") REFERENCES "public"."accounts"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sweeps" ADD CONSTRAINT "sweeps_submission_id_submissions_id_fk" FOREIGN KEY ("submission_id") REFERENCES "public"."submissions"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sweeps" ADD CONSTRAINT "sweeps_owner_id_accounts_id_fk" FOREIGN KEY ("owner_id") REFERENCES "public"."accounts"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "table_holdings" ADD CONSTRAINT "table_holdings_table_digest_tables_digest_fk" FOREIGN KEY ("table_digest") REFERENCES "public"."tables"("digest") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "table_holdings" ADD CONSTRAINT "table_holdings_account_id_accounts_id_fk" FOREIGN KEY ("account_id") REFERENCES "public"."accounts"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "access_tokens_account" ON "access_tokens" USING btree ("account_id");--> statement-breakpoint
CREATE UNIQUE INDEX "account_invitations_hash" ON "account_invitations" USING btree ("hash");--> statement-breakpoint
CREATE INDEX "sessions_expire" ON "sessions" USING btree ("expire");--> statement-breakpoint
CREATE INDEX "audit_entries_subject" ON "audit_entries" USING btree ("subject","subject_id");--> statement-breakpoint
CREATE INDEX "audit_entries_at" ON "audit_entries" USING btree ("at");--> statement-breakpoint
CREATE INDEX "idempotency_keys_created" ON "idempotency_keys" USING btree ("created_at");--> statement-breakpoint
CREATE INDEX "execution_events_execution" ON "execution_events" USING btree ("execution_id","id");--> statement-breakpoint
CREATE INDEX "executions_job" ON "executions" USING btree ("job_hash");--> statement-breakpoint
CREATE INDEX "executions_submission" ON "executions" USING btree ("submission_id","point");--> statement-breakpoint
CREATE UNIQUE INDEX "executions_one_running" ON "executions" USING btree ("submission_id","point") WHERE state = 'running';--> statement-breakpoint
CREATE INDEX "jobs_created" ON "jobs" USING btree ("created_at","hash");--> statement-breakpoint
CREATE INDEX "jobs_finished" ON "jobs" USING btree ("finished_at");--> statement-breakpoint
CREATE INDEX "jobs_result" ON "jobs" USING btree ("result_digest");--> statement-breakpoint
CREATE INDEX "jobs_question" ON "jobs" USING btree ("question_digest");--> statement-breakpoint
CREATE UNIQUE INDEX "kernels_one_current" ON "kernels" USING btree ("state") WHERE state = 'current';--> statement-breakpoint
CREATE INDEX "chunks_open" ON "chunks" USING btree ("submission_id") WHERE state = 'open';--> statement-breakpoint
CREATE INDEX "chunks_closed" ON "chunks" USING btree ("closed_at");--> statement-breakpoint
CREATE INDEX "parked_points_job" ON "parked_points" USING btree ("job_hash");--> statement-breakpoint
CREATE INDEX "parts_execution" ON "parts" USING btree ("execution_id");--> statement-breakpoint
CREATE INDEX "submission_points_job" ON "submission_points" USING btree ("job_hash");--> statement-breakpoint
CREATE INDEX "submissions_backlog" ON "submissions" USING btree ("account_id") WHERE state = 'active' and not isempty(todo);--> statement-breakpoint
CREATE INDEX "submissions_account" ON "submissions" USING btree ("account_id","created_at");--> statement-breakpoint
CREATE INDEX "submissions_open" ON "submissions" USING btree ("state") WHERE state in ('active', 'paused');--> statement-breakpoint
CREATE INDEX "quota_entries_balance" ON "quota_entries" USING btree ("balance_id","id");--> statement-breakpoint
CREATE INDEX "sweep_drafts_owner" ON "sweep_drafts" USING btree ("owner_id","updated_at");--> statement-breakpoint
CREATE INDEX "sweeps_owner" ON "sweeps" USING btree ("owner_id","created_at","id");--> statement-breakpoint
CREATE INDEX "table_holdings_table" ON "table_holdings" USING btree ("table_digest");--> statement-breakpoint
CREATE INDEX "table_holdings_account" ON "table_holdings" USING btree ("account_id");--> statement-breakpoint
CREATE INDEX "workers_state" ON "workers" USING btree ("state");