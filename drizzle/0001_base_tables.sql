CREATE TABLE "check_runs" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"job_id" uuid NOT NULL,
	"state" text DEFAULT 'queued' NOT NULL,
	"verdict" text,
	"report_id" uuid,
	"error" text,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"finished_at" timestamp (3) with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "check_runs_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "check_runs_one" UNIQUE("workspace_id","revision_id")
);
--> statement-breakpoint
ALTER TABLE "check_runs" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "derivatives" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"mesh_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"store_key" text NOT NULL,
	"bytes" bigint NOT NULL,
	"sha256" text NOT NULL,
	"meta" jsonb NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "derivatives_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "derivatives_kind" UNIQUE("workspace_id","mesh_id","kind")
);
--> statement-breakpoint
ALTER TABLE "derivatives" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "findings" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"ordinal" integer NOT NULL,
	"check_id" text NOT NULL,
	"status" text NOT NULL,
	"measured" double precision,
	"limit_value" double precision,
	"unit" text NOT NULL,
	"message" text NOT NULL,
	"remedy" text NOT NULL,
	"basis" jsonb NOT NULL,
	"places" jsonb NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "findings_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "findings_check" UNIQUE("workspace_id","revision_id","check_id","ordinal")
);
--> statement-breakpoint
ALTER TABLE "findings" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "jobs" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"subject_id" uuid NOT NULL,
	"input_digest" text NOT NULL,
	"state" text DEFAULT 'queued' NOT NULL,
	"attempt" integer DEFAULT 0 NOT NULL,
	"handed_back" integer DEFAULT 0 NOT NULL,
	"lease_until" timestamp (3) with time zone,
	"worker" text,
	"stage" text,
	"progress" double precision DEFAULT 0 NOT NULL,
	"error" text,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"started_at" timestamp (3) with time zone,
	"finished_at" timestamp (3) with time zone,
	CONSTRAINT "jobs_workspace_id_id_pk" PRIMARY KEY("workspace_id","id")
);
--> statement-breakpoint
ALTER TABLE "jobs" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "reports" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"mesh_sha256" text NOT NULL,
	"recipe_digest" text NOT NULL,
	"engine_version" text NOT NULL,
	"body" jsonb NOT NULL,
	"sha256" text NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "reports_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "reports_input" UNIQUE("workspace_id","mesh_sha256","recipe_digest","engine_version")
);
--> statement-breakpoint
ALTER TABLE "reports" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "waivers" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"finding_id" uuid NOT NULL,
	"reason" text NOT NULL,
	"waived_by" uuid NOT NULL,
	"waived_by_name" text NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "waivers_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "waivers_one" UNIQUE("workspace_id","finding_id")
);
--> statement-breakpoint
ALTER TABLE "waivers" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "notes" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"thread_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"body" jsonb NOT NULL,
	"text" text NOT NULL,
	"mentions" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"author_id" uuid NOT NULL,
	"author_name" text NOT NULL,
	"client_key" uuid NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "notes_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "notes_client_key" UNIQUE("workspace_id","author_id","client_key")
);
--> statement-breakpoint
ALTER TABLE "notes" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "placements" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"thread_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"pin" jsonb,
	"standing" text NOT NULL,
	"distance_mm" double precision,
	"carried_from" uuid,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "placements_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "placements_one" UNIQUE("workspace_id","thread_id","revision_id")
);
--> statement-breakpoint
ALTER TABLE "placements" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "threads" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"template_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"finding_id" uuid,
	"continues" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"must_settle" boolean DEFAULT false NOT NULL,
	"after_approval" boolean DEFAULT false NOT NULL,
	"state" text DEFAULT 'open' NOT NULL,
	"settled_by" uuid,
	"settled_by_name" text,
	"settled_at" timestamp (3) with time zone,
	"opened_by" uuid NOT NULL,
	"opened_by_name" text NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "threads_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "threads_finding" UNIQUE("workspace_id","finding_id")
);
--> statement-breakpoint
ALTER TABLE "threads" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "gates" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"ordinal" integer NOT NULL,
	"rule" jsonb NOT NULL,
	"state" text DEFAULT 'waiting' NOT NULL,
	"opened_at" timestamp (3) with time zone,
	"passed_at" timestamp (3) with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "gates_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "gates_order" UNIQUE("workspace_id","revision_id","ordinal")
);
--> statement-breakpoint
ALTER TABLE "gates" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "locks" (
	"workspace_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"content_digest" text NOT NULL,
	"content" jsonb NOT NULL,
	"docket" jsonb NOT NULL,
	"locked_at" timestamp (3) with time zone NOT NULL,
	CONSTRAINT "locks_workspace_id_revision_id_pk" PRIMARY KEY("workspace_id","revision_id")
);
--> statement-breakpoint
ALTER TABLE "locks" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "packs" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"release_id" uuid NOT NULL,
	"file_name" text NOT NULL,
	"store_key" text NOT NULL,
	"bytes" integer NOT NULL,
	"sha256" text NOT NULL,
	"files" jsonb NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "packs_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "packs_one" UNIQUE("workspace_id","release_id")
);
--> statement-breakpoint
ALTER TABLE "packs" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "releases" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"released_by" uuid NOT NULL,
	"released_by_name" text NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"job_id" uuid NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "releases_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "releases_one" UNIQUE("workspace_id","revision_id")
);
--> statement-breakpoint
ALTER TABLE "releases" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "signatures" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"gate_id" uuid NOT NULL,
	"decision" text NOT NULL,
	"signer_id" uuid NOT NULL,
	"printed_name" text NOT NULL,
	"role" text NOT NULL,
	"meaning" text NOT NULL,
	"reason" text,
	"content_digest" text NOT NULL,
	"method" text NOT NULL,
	"signed_at" timestamp (3) with time zone NOT NULL,
	"time_zone" text NOT NULL,
	CONSTRAINT "signatures_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "signatures_once" UNIQUE("workspace_id","gate_id","signer_id")
);
--> statement-breakpoint
ALTER TABLE "signatures" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "accounts" (
	"id" uuid PRIMARY KEY NOT NULL,
	"account_id" text NOT NULL,
	"provider_id" text NOT NULL,
	"user_id" uuid NOT NULL,
	"access_token" text,
	"refresh_token" text,
	"id_token" text,
	"access_token_expires_at" timestamp (3) with time zone,
	"refresh_token_expires_at" timestamp (3) with time zone,
	"scope" text,
	"password" text,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"updated_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "accounts" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "rate_limits" (
	"id" uuid PRIMARY KEY NOT NULL,
	"key" text NOT NULL,
	"count" integer NOT NULL,
	"last_request" bigint NOT NULL,
	CONSTRAINT "rate_limits_key_unique" UNIQUE("key")
);
--> statement-breakpoint
ALTER TABLE "rate_limits" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" uuid PRIMARY KEY NOT NULL,
	"user_id" uuid NOT NULL,
	"token" text NOT NULL,
	"expires_at" timestamp (3) with time zone NOT NULL,
	"ip_address" text,
	"user_agent" text,
	"active_organization_id" uuid,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"updated_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "sessions_token_unique" UNIQUE("token")
);
--> statement-breakpoint
ALTER TABLE "sessions" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "users" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"email" text NOT NULL,
	"email_verified" boolean DEFAULT false NOT NULL,
	"image" text,
	"units" text DEFAULT 'mm' NOT NULL,
	"time_zone" text DEFAULT 'Europe/Lisbon' NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"updated_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "users" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "verifications" (
	"id" uuid PRIMARY KEY NOT NULL,
	"identifier" text NOT NULL,
	"value" text NOT NULL,
	"expires_at" timestamp (3) with time zone NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"updated_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "verifications" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "filaments" (
	"id" uuid NOT NULL,
	"studio_id" uuid NOT NULL,
	"name" text NOT NULL,
	"material" text NOT NULL,
	"shell_mm" double precision NOT NULL,
	"top_mm" double precision NOT NULL,
	"infill_percent" integer NOT NULL,
	"is_default" boolean DEFAULT false NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "filaments_pk" UNIQUE("studio_id","id"),
	CONSTRAINT "filaments_name" UNIQUE("studio_id","name")
);
--> statement-breakpoint
ALTER TABLE "filaments" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "machines" (
	"id" uuid NOT NULL,
	"studio_id" uuid NOT NULL,
	"name" text NOT NULL,
	"forming_x_mm" double precision NOT NULL,
	"forming_y_mm" double precision NOT NULL,
	"max_height_mm" double precision NOT NULL,
	"frame_margin_mm" double precision NOT NULL,
	"pressure_bar" double precision NOT NULL,
	"is_default" boolean DEFAULT false NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "machines_pk" UNIQUE("studio_id","id"),
	CONSTRAINT "machines_name" UNIQUE("studio_id","name")
);
--> statement-breakpoint
ALTER TABLE "machines" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "printers" (
	"id" uuid NOT NULL,
	"studio_id" uuid NOT NULL,
	"name" text NOT NULL,
	"build_x_mm" double precision NOT NULL,
	"build_y_mm" double precision NOT NULL,
	"build_z_mm" double precision NOT NULL,
	"nozzle_mm" double precision NOT NULL,
	"layer_mm" double precision NOT NULL,
	"is_default" boolean DEFAULT false NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "printers_pk" UNIQUE("studio_id","id"),
	CONSTRAINT "printers_name" UNIQUE("studio_id","name")
);
--> statement-breakpoint
ALTER TABLE "printers" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "sheets" (
	"id" uuid NOT NULL,
	"studio_id" uuid NOT NULL,
	"name" text NOT NULL,
	"material" text NOT NULL,
	"gauge_mm" double precision NOT NULL,
	"min_formed_mm" double precision NOT NULL,
	"is_default" boolean DEFAULT false NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "sheets_pk" UNIQUE("studio_id","id"),
	CONSTRAINT "sheets_name" UNIQUE("studio_id","name")
);
--> statement-breakpoint
ALTER TABLE "sheets" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "studio_limits" (
	"id" uuid NOT NULL,
	"studio_id" uuid NOT NULL,
	"limits" jsonb NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "studio_limits_pk" UNIQUE("studio_id","id"),
	CONSTRAINT "studio_limits_one" UNIQUE("studio_id")
);
--> statement-breakpoint
ALTER TABLE "studio_limits" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "drafts" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"template_id" uuid NOT NULL,
	"upload_id" uuid,
	"recipe" jsonb NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"author_id" uuid NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"changed_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "drafts_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "drafts_one" UNIQUE("workspace_id","template_id")
);
--> statement-breakpoint
ALTER TABLE "drafts" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "meshes" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"template_id" uuid NOT NULL,
	"file_name" text NOT NULL,
	"bytes" bigint NOT NULL,
	"sha256" text NOT NULL,
	"format" text NOT NULL,
	"unit" text NOT NULL,
	"triangles" integer NOT NULL,
	"bounds_mm" jsonb NOT NULL,
	"store_key" text NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "meshes_workspace_id_id_pk" PRIMARY KEY("workspace_id","id")
);
--> statement-breakpoint
ALTER TABLE "meshes" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "recipes" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"body" jsonb NOT NULL,
	"digest" text NOT NULL,
	"sheet_material" text NOT NULL,
	"gauge_mm" text NOT NULL,
	"print_material" text NOT NULL,
	"nozzle_mm" text NOT NULL,
	"layer_mm" text NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "recipes_workspace_id_id_pk" PRIMARY KEY("workspace_id","id")
);
--> statement-breakpoint
ALTER TABLE "recipes" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "revisions" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"template_id" uuid NOT NULL,
	"ordinal" integer NOT NULL,
	"letter" text NOT NULL,
	"mesh_id" uuid NOT NULL,
	"recipe_id" uuid NOT NULL,
	"gate_plan_id" uuid NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"author_id" uuid NOT NULL,
	"author_name" text NOT NULL,
	"state" text DEFAULT 'in_review' NOT NULL,
	"state_reason" text,
	"state_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"posted_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "revisions_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "revisions_ordinal" UNIQUE("workspace_id","template_id","ordinal"),
	CONSTRAINT "revisions_letter" UNIQUE("workspace_id","template_id","letter")
);
--> statement-breakpoint
ALTER TABLE "revisions" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "templates" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"serial" integer NOT NULL,
	"number" text NOT NULL,
	"title" text NOT NULL,
	"due_on" date,
	"standing" text DEFAULT 'draft' NOT NULL,
	"latest_revision_id" uuid,
	"latest_letter" text,
	"created_by" uuid NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"changed_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "templates_workspace_id_id_pk" PRIMARY KEY("workspace_id","id"),
	CONSTRAINT "templates_number" UNIQUE("workspace_id","number"),
	CONSTRAINT "templates_serial" UNIQUE("workspace_id","serial")
);
--> statement-breakpoint
ALTER TABLE "templates" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "uploads" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"template_id" uuid NOT NULL,
	"file_name" text NOT NULL,
	"bytes" bigint NOT NULL,
	"last_modified" bigint,
	"unit" text DEFAULT 'mm' NOT NULL,
	"store_key" text NOT NULL,
	"multipart_id" text NOT NULL,
	"part_bytes" integer NOT NULL,
	"parts" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"state" text DEFAULT 'sending' NOT NULL,
	"refusal" jsonb,
	"mesh_id" uuid,
	"created_by" uuid NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "uploads_workspace_id_id_pk" PRIMARY KEY("workspace_id","id")
);
--> statement-breakpoint
ALTER TABLE "uploads" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "audit_entries" (
	"workspace_id" uuid NOT NULL,
	"seq" integer NOT NULL,
	"at" timestamp (3) with time zone NOT NULL,
	"actor_id" uuid,
	"actor_name" text NOT NULL,
	"action" text NOT NULL,
	"subject_kind" text NOT NULL,
	"subject_id" uuid NOT NULL,
	"detail" jsonb NOT NULL,
	"previous" text NOT NULL,
	"hash" text NOT NULL,
	CONSTRAINT "audit_entries_workspace_id_seq_pk" PRIMARY KEY("workspace_id","seq")
);
--> statement-breakpoint
ALTER TABLE "audit_entries" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "audit_heads" (
	"workspace_id" uuid PRIMARY KEY NOT NULL,
	"seq" integer DEFAULT 0 NOT NULL,
	"hash" text NOT NULL
);
--> statement-breakpoint
ALTER TABLE "audit_heads" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "idempotency_keys" (
	"workspace_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"route" text NOT NULL,
	"key" text NOT NULL,
	"request_hash" text NOT NULL,
	"status" integer DEFAULT 0 NOT NULL,
	"response" jsonb,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "idempotency_keys_workspace_id_user_id_route_key_pk" PRIMARY KEY("workspace_id","user_id","route","key")
);
--> statement-breakpoint
ALTER TABLE "idempotency_keys" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "outbox" (
	"id" uuid PRIMARY KEY NOT NULL,
	"workspace_id" uuid,
	"studio_id" uuid,
	"kind" text NOT NULL,
	"payload" jsonb NOT NULL,
	"dedupe_key" text NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"due_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"sent_at" timestamp (3) with time zone,
	"failure" text,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "outbox" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "studio_entries" (
	"id" uuid NOT NULL,
	"studio_id" uuid NOT NULL,
	"actor_id" uuid,
	"actor_name" text NOT NULL,
	"action" text NOT NULL,
	"detail" jsonb NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "studio_entries_pk" UNIQUE("studio_id","id")
);
--> statement-breakpoint
ALTER TABLE "studio_entries" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "gate_plans" (
	"id" uuid NOT NULL,
	"workspace_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"gates" jsonb NOT NULL,
	"created_by" uuid,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "gate_plans_pk" UNIQUE("workspace_id","id"),
	CONSTRAINT "gate_plans_number" UNIQUE("workspace_id","number")
);
--> statement-breakpoint
ALTER TABLE "gate_plans" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "invitations" (
	"id" uuid PRIMARY KEY NOT NULL,
	"workspace_id" uuid NOT NULL,
	"email" text NOT NULL,
	"role" text NOT NULL,
	"status" text DEFAULT 'pending' NOT NULL,
	"token_hash" text NOT NULL,
	"expires_at" timestamp (3) with time zone NOT NULL,
	"inviter_id" uuid NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "invitations" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "members" (
	"id" uuid PRIMARY KEY NOT NULL,
	"workspace_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"role" text NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "members_one" UNIQUE("workspace_id","user_id")
);
--> statement-breakpoint
ALTER TABLE "members" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "studio_invitations" (
	"id" uuid PRIMARY KEY NOT NULL,
	"studio_id" uuid NOT NULL,
	"email" text NOT NULL,
	"role" text NOT NULL,
	"status" text DEFAULT 'pending' NOT NULL,
	"token_hash" text NOT NULL,
	"expires_at" timestamp (3) with time zone NOT NULL,
	"inviter_id" uuid NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "studio_invitations" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "studio_members" (
	"id" uuid PRIMARY KEY NOT NULL,
	"studio_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"role" text NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "studio_members_one" UNIQUE("studio_id","user_id")
);
--> statement-breakpoint
ALTER TABLE "studio_members" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "studios" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"slug" text NOT NULL,
	"time_zone" text DEFAULT 'Europe/Lisbon' NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "studios_slug_unique" UNIQUE("slug")
);
--> statement-breakpoint
ALTER TABLE "studios" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "workspaces" (
	"id" uuid PRIMARY KEY NOT NULL,
	"studio_id" uuid NOT NULL,
	"name" text NOT NULL,
	"slug" text NOT NULL,
	"code" text NOT NULL,
	"logo" text,
	"metadata" text,
	"time_zone" text DEFAULT 'Europe/Lisbon' NOT NULL,
	"template_count" integer DEFAULT 0 NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT clock_timestamp() NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	CONSTRAINT "workspaces_slug_unique" UNIQUE("slug"),
	CONSTRAINT "workspaces_code" UNIQUE("studio_id","code")
);
--> statement-breakpoint
ALTER TABLE "workspaces" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE "check_runs" ADD CONSTRAINT "check_runs_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "check_runs" ADD CONSTRAINT "check_runs_workspace_id_job_id_jobs_workspace_id_id_fk" FOREIGN KEY ("workspace_id","job_id") REFERENCES "public"."jobs"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "check_runs" ADD CONSTRAINT "check_runs_workspace_id_report_id_reports_workspace_id_id_fk" FOREIGN KEY ("workspace_id","report_id") REFERENCES "public"."reports"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "derivatives" ADD CONSTRAINT "derivatives_workspace_id_mesh_id_meshes_workspace_id_id_fk" FOREIGN KEY ("workspace_id","mesh_id") REFERENCES "public"."meshes"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "findings" ADD CONSTRAINT "findings_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "waivers" ADD CONSTRAINT "waivers_waived_by_users_id_fk" FOREIGN KEY ("waived_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "waivers" ADD CONSTRAINT "waivers_workspace_id_finding_id_findings_workspace_id_id_fk" FOREIGN KEY ("workspace_id","finding_id") REFERENCES "public"."findings"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "waivers" ADD CONSTRAINT "waivers_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "notes" ADD CONSTRAINT "notes_author_id_users_id_fk" FOREIGN KEY ("author_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "notes" ADD CONSTRAINT "notes_workspace_id_thread_id_threads_workspace_id_id_fk" FOREIGN KEY ("workspace_id","thread_id") REFERENCES "public"."threads"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "notes" ADD CONSTRAINT "notes_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "placements" ADD CONSTRAINT "placements_workspace_id_thread_id_threads_workspace_id_id_fk" FOREIGN KEY ("workspace_id","thread_id") REFERENCES "public"."threads"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "placements" ADD CONSTRAINT "placements_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "threads" ADD CONSTRAINT "threads_settled_by_users_id_fk" FOREIGN KEY ("settled_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "threads" ADD CONSTRAINT "threads_opened_by_users_id_fk" FOREIGN KEY ("opened_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "threads" ADD CONSTRAINT "threads_workspace_id_template_id_templates_workspace_id_id_fk" FOREIGN KEY ("workspace_id","template_id") REFERENCES "public"."templates"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "threads" ADD CONSTRAINT "threads_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "threads" ADD CONSTRAINT "threads_workspace_id_finding_id_findings_workspace_id_id_fk" FOREIGN KEY ("workspace_id","finding_id") REFERENCES "public"."findings"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "gates" ADD CONSTRAINT "gates_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "locks" ADD CONSTRAINT "locks_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "packs" ADD CONSTRAINT "packs_workspace_id_release_id_releases_workspace_id_id_fk" FOREIGN KEY ("workspace_id","release_id") REFERENCES "public"."releases"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "releases" ADD CONSTRAINT "releases_released_by_users_id_fk" FOREIGN KEY ("released_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "releases" ADD CONSTRAINT "releases_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "signatures" ADD CONSTRAINT "signatures_signer_id_users_id_fk" FOREIGN KEY ("signer_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "signatures" ADD CONSTRAINT "signatures_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "signatures" ADD CONSTRAINT "signatures_workspace_id_gate_id_gates_workspace_id_id_fk" FOREIGN KEY ("workspace_id","gate_id") REFERENCES "public"."gates"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "accounts" ADD CONSTRAINT "accounts_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "filaments" ADD CONSTRAINT "filaments_studio_id_studios_id_fk" FOREIGN KEY ("studio_id") REFERENCES "public"."studios"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "machines" ADD CONSTRAINT "machines_studio_id_studios_id_fk" FOREIGN KEY ("studio_id") REFERENCES "public"."studios"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "printers" ADD CONSTRAINT "printers_studio_id_studios_id_fk" FOREIGN KEY ("studio_id") REFERENCES "public"."studios"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sheets" ADD CONSTRAINT "sheets_studio_id_studios_id_fk" FOREIGN KEY ("studio_id") REFERENCES "public"."studios"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "studio_limits" ADD CONSTRAINT "studio_limits_studio_id_studios_id_fk" FOREIGN KEY ("studio_id") REFERENCES "public"."studios"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "drafts" ADD CONSTRAINT "drafts_author_id_users_id_fk" FOREIGN KEY ("author_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "drafts" ADD CONSTRAINT "drafts_workspace_id_template_id_templates_workspace_id_id_fk" FOREIGN KEY ("workspace_id","template_id") REFERENCES "public"."templates"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "drafts" ADD CONSTRAINT "drafts_workspace_id_upload_id_uploads_workspace_id_id_fk" FOREIGN KEY ("workspace_id","upload_id") REFERENCES "public"."uploads"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "meshes" ADD CONSTRAINT "meshes_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "meshes" ADD CONSTRAINT "meshes_workspace_id_template_id_templates_workspace_id_id_fk" FOREIGN KEY ("workspace_id","template_id") REFERENCES "public"."templates"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "revisions" ADD CONSTRAINT "revisions_author_id_users_id_fk" FOREIGN KEY ("author_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "revisions" ADD CONSTRAINT "revisions_workspace_id_template_id_templates_workspace_id_id_fk" FOREIGN KEY ("workspace_id","template_id") REFERENCES "public"."templates"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "revisions" ADD CONSTRAINT "revisions_workspace_id_mesh_id_meshes_workspace_id_id_fk" FOREIGN KEY ("workspace_id","mesh_id") REFERENCES "public"."meshes"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "revisions" ADD CONSTRAINT "revisions_workspace_id_recipe_id_recipes_workspace_id_id_fk" FOREIGN KEY ("workspace_id","recipe_id") REFERENCES "public"."recipes"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "revisions" ADD CONSTRAINT "revisions_workspace_id_gate_plan_id_gate_plans_workspace_id_id_fk" FOREIGN KEY ("workspace_id","gate_plan_id") REFERENCES "public"."gate_plans"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "templates" ADD CONSTRAINT "templates_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "templates" ADD CONSTRAINT "templates_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "uploads" ADD CONSTRAINT "uploads_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "uploads" ADD CONSTRAINT "uploads_workspace_id_template_id_templates_workspace_id_id_fk" FOREIGN KEY ("workspace_id","template_id") REFERENCES "public"."templates"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_heads" ADD CONSTRAINT "audit_heads_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "idempotency_keys" ADD CONSTRAINT "idempotency_keys_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "idempotency_keys" ADD CONSTRAINT "idempotency_keys_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbox" ADD CONSTRAINT "outbox_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbox" ADD CONSTRAINT "outbox_studio_id_studios_id_fk" FOREIGN KEY ("studio_id") REFERENCES "public"."studios"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "studio_entries" ADD CONSTRAINT "studio_entries_studio_id_studios_id_fk" FOREIGN KEY ("studio_id") REFERENCES "public"."studios"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "gate_plans" ADD CONSTRAINT "gate_plans_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "gate_plans" ADD CONSTRAINT "gate_plans_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_inviter_id_users_id_fk" FOREIGN KEY ("inviter_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "members" ADD CONSTRAINT "members_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "members" ADD CONSTRAINT "members_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "studio_invitations" ADD CONSTRAINT "studio_invitations_studio_id_studios_id_fk" FOREIGN KEY ("studio_id") REFERENCES "public"."studios"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "studio_invitations" ADD CONSTRAINT "studio_invitations_inviter_id_users_id_fk" FOREIGN KEY ("inviter_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "studio_members" ADD CONSTRAINT "studio_members_studio_id_studios_id_fk" FOREIGN KEY ("studio_id") REFERENCES "public"."studios"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "studio_members" ADD CONSTRAINT "studio_members_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "workspaces" ADD CONSTRAINT "workspaces_studio_id_studios_id_fk" FOREIGN KEY ("studio_id") REFERENCES "public"."studios"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "jobs_due" ON "jobs" USING btree ("state","lease_until");--> statement-breakpoint
CREATE INDEX "jobs_subject" ON "jobs" USING btree ("workspace_id","subject_id");--> statement-breakpoint
CREATE INDEX "notes_thread" ON "notes" USING btree ("workspace_id","thread_id","created_at");--> statement-breakpoint
CREATE INDEX "placements_revision" ON "placements" USING btree ("workspace_id","revision_id");--> statement-breakpoint
CREATE INDEX "threads_template" ON "threads" USING btree ("workspace_id","template_id");--> statement-breakpoint
CREATE INDEX "signatures_revision" ON "signatures" USING btree ("workspace_id","revision_id");--> statement-breakpoint
CREATE UNIQUE INDEX "users_email_key" ON "users" USING btree (lower("email"));--> statement-breakpoint
CREATE INDEX "templates_changed" ON "templates" USING btree ("workspace_id","changed_at" DESC NULLS LAST,"id");--> statement-breakpoint
CREATE INDEX "templates_due" ON "templates" USING btree ("workspace_id","due_on","id");--> statement-breakpoint
CREATE INDEX "uploads_template" ON "uploads" USING btree ("workspace_id","template_id");--> statement-breakpoint
CREATE INDEX "outbox_due" ON "outbox" USING btree ("due_at") WHERE sent_at is null and failure is null;--> statement-breakpoint
CREATE UNIQUE INDEX "outbox_occasion" ON "outbox" USING btree ("dedupe_key");--> statement-breakpoint
CREATE UNIQUE INDEX "invitations_one_pending" ON "invitations" USING btree ("workspace_id",lower("email")) WHERE status = 'pending';--> statement-breakpoint
CREATE INDEX "members_user" ON "members" USING btree ("user_id");--> statement-breakpoint
CREATE UNIQUE INDEX "studio_invitations_one_pending" ON "studio_invitations" USING btree ("studio_id",lower("email")) WHERE status = 'pending';--> statement-breakpoint
CREATE INDEX "studio_members_user" ON "studio_members" USING btree ("user_id");--> statement-breakpoint
CREATE POLICY "check_runs_tenant" ON "check_runs" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "derivatives_tenant" ON "derivatives" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "findings_tenant" ON "findings" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "jobs_tenant" ON "jobs" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "jobs_relay" ON "jobs" AS PERMISSIVE FOR ALL TO "firstpull_relay" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "reports_tenant" ON "reports" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "waivers_tenant" ON "waivers" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "notes_tenant" ON "notes" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "placements_tenant" ON "placements" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "threads_tenant" ON "threads" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "gates_tenant" ON "gates" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "locks_tenant" ON "locks" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "packs_tenant" ON "packs" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "releases_tenant" ON "releases" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "signatures_tenant" ON "signatures" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "accounts_auth" ON "accounts" AS PERMISSIVE FOR ALL TO "firstpull_auth" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "rate_limits_auth" ON "rate_limits" AS PERMISSIVE FOR ALL TO "firstpull_auth" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "sessions_auth" ON "sessions" AS PERMISSIVE FOR ALL TO "firstpull_auth" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "users_auth" ON "users" AS PERMISSIVE FOR ALL TO "firstpull_auth" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "users_tenant" ON "users" AS PERMISSIVE FOR SELECT TO "firstpull_app" USING (id = any((select app_people())::uuid[]));--> statement-breakpoint
CREATE POLICY "verifications_auth" ON "verifications" AS PERMISSIVE FOR ALL TO "firstpull_auth" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "filaments_tenant" ON "filaments" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("studio_id" = any((select app_studios())::uuid[])) WITH CHECK ("studio_id" = any((select app_studios())::uuid[]));--> statement-breakpoint
CREATE POLICY "machines_tenant" ON "machines" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("studio_id" = any((select app_studios())::uuid[])) WITH CHECK ("studio_id" = any((select app_studios())::uuid[]));--> statement-breakpoint
CREATE POLICY "printers_tenant" ON "printers" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("studio_id" = any((select app_studios())::uuid[])) WITH CHECK ("studio_id" = any((select app_studios())::uuid[]));--> statement-breakpoint
CREATE POLICY "sheets_tenant" ON "sheets" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("studio_id" = any((select app_studios())::uuid[])) WITH CHECK ("studio_id" = any((select app_studios())::uuid[]));--> statement-breakpoint
CREATE POLICY "studio_limits_tenant" ON "studio_limits" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("studio_id" = any((select app_studios())::uuid[])) WITH CHECK ("studio_id" = any((select app_studios())::uuid[]));--> statement-breakpoint
CREATE POLICY "drafts_tenant" ON "drafts" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "meshes_tenant" ON "meshes" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "recipes_tenant" ON "recipes" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "revisions_tenant" ON "revisions" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "templates_tenant" ON "templates" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "uploads_tenant" ON "uploads" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "audit_entries_tenant" ON "audit_entries" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "audit_heads_tenant" ON "audit_heads" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "idempotency_keys_tenant" ON "idempotency_keys" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "outbox_relay" ON "outbox" AS PERMISSIVE FOR ALL TO "firstpull_relay" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "outbox_tenant" ON "outbox" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "outbox_studio_tenant" ON "outbox" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("studio_id" = any((select app_studios())::uuid[])) WITH CHECK ("studio_id" = any((select app_studios())::uuid[]));--> statement-breakpoint
CREATE POLICY "outbox_identity" ON "outbox" AS PERMISSIVE FOR INSERT TO "firstpull_auth" WITH CHECK (workspace_id is null and studio_id is null and kind = 'mail');--> statement-breakpoint
CREATE POLICY "studio_entries_tenant" ON "studio_entries" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("studio_id" = any((select app_studios())::uuid[])) WITH CHECK ("studio_id" = any((select app_studios())::uuid[]));--> statement-breakpoint
CREATE POLICY "gate_plans_tenant" ON "gate_plans" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "invitations_auth" ON "invitations" AS PERMISSIVE FOR ALL TO "firstpull_auth" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "invitations_tenant" ON "invitations" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "members_auth" ON "members" AS PERMISSIVE FOR ALL TO "firstpull_auth" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "members_tenant" ON "members" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("workspace_id" = any((select app_workspaces())::uuid[])) WITH CHECK ("workspace_id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "studio_invitations_auth" ON "studio_invitations" AS PERMISSIVE FOR ALL TO "firstpull_auth" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "studio_invitations_tenant" ON "studio_invitations" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("studio_id" = any((select app_studios())::uuid[])) WITH CHECK ("studio_id" = any((select app_studios())::uuid[]));--> statement-breakpoint
CREATE POLICY "studio_members_auth" ON "studio_members" AS PERMISSIVE FOR ALL TO "firstpull_auth" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "studio_members_tenant" ON "studio_members" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("studio_id" = any((select app_studios())::uuid[])) WITH CHECK ("studio_id" = any((select app_studios())::uuid[]));--> statement-breakpoint
CREATE POLICY "studio_members_first_lead" ON "studio_members" AS PERMISSIVE FOR INSERT TO "firstpull_app" WITH CHECK (user_id = app_person() and role = 'lead' and studio_is_empty(studio_id));--> statement-breakpoint
CREATE POLICY "studios_auth" ON "studios" AS PERMISSIVE FOR ALL TO "firstpull_auth" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "studios_tenant" ON "studios" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("id" = any((select app_studios())::uuid[])) WITH CHECK ("id" = any((select app_studios())::uuid[]));--> statement-breakpoint
CREATE POLICY "studios_of_visible_workspaces" ON "studios" AS PERMISSIVE FOR SELECT TO "firstpull_app" USING (id in (select w.studio_id from workspaces w));--> statement-breakpoint
CREATE POLICY "studios_open" ON "studios" AS PERMISSIVE FOR INSERT TO "firstpull_app" WITH CHECK (app_person() is not null);--> statement-breakpoint
CREATE POLICY "workspaces_auth" ON "workspaces" AS PERMISSIVE FOR ALL TO "firstpull_auth" USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY "workspaces_tenant" ON "workspaces" AS PERMISSIVE FOR ALL TO "firstpull_app" USING ("id" = any((select app_workspaces())::uuid[])) WITH CHECK ("id" = any((select app_workspaces())::uuid[]));--> statement-breakpoint
CREATE POLICY "workspaces_open" ON "workspaces" AS PERMISSIVE FOR INSERT TO "firstpull_app" WITH CHECK (studio_id = any((select app_studios())::uuid[]));