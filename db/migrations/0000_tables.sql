CREATE TABLE "audit_entries" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"actor_id" text NOT NULL,
	"action" text NOT NULL,
	"subject_type" text NOT NULL,
	"subject_id" text NOT NULL,
	"detail" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "audit_entries_detail_small" CHECK (pg_column_size("audit_entries"."detail") < 4096)
);
--> statement-breakpoint
CREATE TABLE "captured_mail" (
	"id" text PRIMARY KEY NOT NULL,
	"to" text NOT NULL,
	"from" text NOT NULL,
	"subject" text NOT NULL,
	"text" text NOT NULL,
	"html" text NOT NULL,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "fabric_versions" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"fabric_id" text NOT NULL,
	"number" integer NOT NULL,
	"label" text DEFAULT '' NOT NULL,
	"document" jsonb NOT NULL,
	"content_hash" text NOT NULL,
	"rows" integer NOT NULL,
	"cols" integer NOT NULL,
	"topology" text NOT NULL,
	"pe_count" integer NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "fabric_versions_number_unique" UNIQUE("fabric_id","number"),
	CONSTRAINT "fabric_versions_workspace_id_unique" UNIQUE("workspace_id","id"),
	CONSTRAINT "fabric_versions_number" CHECK ("fabric_versions"."number" >= 1),
	CONSTRAINT "fabric_versions_label_length" CHECK (length("fabric_versions"."label") <= 80),
	CONSTRAINT "fabric_versions_grid" CHECK ("fabric_versions"."rows" between 1 and 64 and "fabric_versions"."cols" between 1 and 64)
);
--> statement-breakpoint
CREATE TABLE "fabrics" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"name" text NOT NULL,
	"draft" jsonb NOT NULL,
	"revision" integer DEFAULT 1 NOT NULL,
	"rows" integer NOT NULL,
	"cols" integer NOT NULL,
	"topology" text NOT NULL,
	"pe_count" integer NOT NULL,
	"error_count" integer NOT NULL,
	"created_by" text NOT NULL,
	"updated_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"archived_at" timestamp with time zone,
	CONSTRAINT "fabrics_workspace_id_unique" UNIQUE("workspace_id","id"),
	CONSTRAINT "fabrics_name_length" CHECK (length(btrim("fabrics"."name")) between 1 and 80),
	CONSTRAINT "fabrics_grid" CHECK ("fabrics"."rows" between 1 and 64 and "fabrics"."cols" between 1 and 64),
	CONSTRAINT "fabrics_counts" CHECK ("fabrics"."revision" >= 1 and "fabrics"."error_count" >= 0 and "fabrics"."pe_count" between 0 and "fabrics"."rows" * "fabrics"."cols"),
	CONSTRAINT "fabrics_topology" CHECK ("fabrics"."topology" in ('mesh', 'torus', 'diagonal')),
	CONSTRAINT "fabrics_draft_object" CHECK (jsonb_typeof("fabrics"."draft") = 'object')
);
--> statement-breakpoint
CREATE TABLE "invitations" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"email" text NOT NULL,
	"role" text NOT NULL,
	"token_hash" text NOT NULL,
	"invited_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"accepted_at" timestamp with time zone,
	"revoked_at" timestamp with time zone,
	CONSTRAINT "invitations_token_unique" UNIQUE("token_hash"),
	CONSTRAINT "invitations_email_lower" CHECK ("invitations"."email" = lower("invitations"."email") and length("invitations"."email") <= 254),
	CONSTRAINT "invitations_role" CHECK ("invitations"."role" in ('viewer', 'reviewer', 'editor', 'owner')),
	CONSTRAINT "invitations_one_end" CHECK ("invitations"."accepted_at" is null or "invitations"."revoked_at" is null)
);
--> statement-breakpoint
CREATE TABLE "kernel_versions" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"kernel_id" text NOT NULL,
	"number" integer NOT NULL,
	"label" text DEFAULT '' NOT NULL,
	"document" jsonb NOT NULL,
	"content_hash" text NOT NULL,
	"op_count" integer NOT NULL,
	"edge_count" integer NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "kernel_versions_number_unique" UNIQUE("kernel_id","number"),
	CONSTRAINT "kernel_versions_workspace_id_unique" UNIQUE("workspace_id","id"),
	CONSTRAINT "kernel_versions_number" CHECK ("kernel_versions"."number" >= 1),
	CONSTRAINT "kernel_versions_label_length" CHECK (length("kernel_versions"."label") <= 80)
);
--> statement-breakpoint
CREATE TABLE "kernels" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"name" text NOT NULL,
	"draft" jsonb NOT NULL,
	"revision" integer DEFAULT 1 NOT NULL,
	"op_count" integer NOT NULL,
	"edge_count" integer NOT NULL,
	"error_count" integer NOT NULL,
	"created_by" text NOT NULL,
	"updated_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"archived_at" timestamp with time zone,
	CONSTRAINT "kernels_workspace_id_unique" UNIQUE("workspace_id","id"),
	CONSTRAINT "kernels_name_length" CHECK (length(btrim("kernels"."name")) between 1 and 80),
	CONSTRAINT "kernels_counts" CHECK ("kernels"."revision" >= 1 and "kernels"."op_count" >= 0 and "kernels"."edge_count" >= 0 and "kernels"."error_count" >= 0),
	CONSTRAINT "kernels_draft_object" CHECK (jsonb_typeof("kernels"."draft") = 'object')
);
--> statement-breakpoint
CREATE TABLE "mapping_drafts" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"name" text NOT NULL,
	"kernel_version_id" text NOT NULL,
	"fabric_version_id" text NOT NULL,
	"document" jsonb NOT NULL,
	"provenance" jsonb NOT NULL,
	"revision" integer DEFAULT 1 NOT NULL,
	"op_count" integer NOT NULL,
	"placed_ops" integer DEFAULT 0 NOT NULL,
	"wire_hops" integer DEFAULT 0 NOT NULL,
	"path_hops" integer DEFAULT 0 NOT NULL,
	"longest_path_hops" integer DEFAULT 0 NOT NULL,
	"links_used" integer DEFAULT 0 NOT NULL,
	"fullest_link_nets" integer DEFAULT 0 NOT NULL,
	"kept_as" text,
	"created_by" text NOT NULL,
	"updated_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"archived_at" timestamp with time zone,
	CONSTRAINT "mapping_drafts_workspace_id_unique" UNIQUE("workspace_id","id"),
	CONSTRAINT "mapping_drafts_name_length" CHECK (length(btrim("mapping_drafts"."name")) between 1 and 80),
	CONSTRAINT "mapping_drafts_counts" CHECK ("mapping_drafts"."revision" >= 1 and "mapping_drafts"."op_count" >= 0 and "mapping_drafts"."placed_ops" between 0 and "mapping_drafts"."op_count"),
	CONSTRAINT "mapping_drafts_figures" CHECK (least("mapping_drafts"."wire_hops", "mapping_drafts"."path_hops", "mapping_drafts"."longest_path_hops", "mapping_drafts"."links_used", "mapping_drafts"."fullest_link_nets") >= 0)
);
--> statement-breakpoint
CREATE TABLE "mappings" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"name" text NOT NULL,
	"kernel_version_id" text NOT NULL,
	"fabric_version_id" text NOT NULL,
	"mapping_draft_id" text,
	"document" jsonb NOT NULL,
	"made_by" text NOT NULL,
	"solve_status" text NOT NULL,
	"engine" text,
	"objective" text,
	"seed" bigint,
	"time_limit_ms" integer,
	"objective_value" double precision,
	"bound" double precision,
	"changed_by_hand" boolean DEFAULT false NOT NULL,
	"op_count" integer NOT NULL,
	"wire_hops" integer NOT NULL,
	"path_hops" integer NOT NULL,
	"longest_path_hops" integer NOT NULL,
	"links_used" integer NOT NULL,
	"fullest_link_nets" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"archived_at" timestamp with time zone,
	CONSTRAINT "mappings_workspace_id_unique" UNIQUE("workspace_id","id"),
	CONSTRAINT "mappings_name_length" CHECK (length(btrim("mappings"."name")) between 1 and 80),
	CONSTRAINT "mappings_status" CHECK ("mappings"."solve_status" in ('by hand', 'optimal', 'feasible')),
	CONSTRAINT "mappings_solver_columns" CHECK (case when "mappings"."solve_status" = 'by hand'
        then num_nonnulls("mappings"."engine", "mappings"."objective", "mappings"."seed", "mappings"."time_limit_ms", "mappings"."objective_value", "mappings"."bound") = 0
        else num_nulls("mappings"."engine", "mappings"."objective", "mappings"."seed", "mappings"."time_limit_ms", "mappings"."objective_value", "mappings"."bound") = 0 end),
	CONSTRAINT "mappings_bound_below_value" CHECK ("mappings"."bound" is null or "mappings"."bound" <= "mappings"."objective_value" + 1e-6),
	CONSTRAINT "mappings_figures" CHECK (least("mappings"."op_count", "mappings"."wire_hops", "mappings"."path_hops", "mappings"."longest_path_hops", "mappings"."links_used", "mappings"."fullest_link_nets") >= 0)
);
--> statement-breakpoint
CREATE TABLE "members" (
	"workspace_id" text NOT NULL,
	"user_id" text NOT NULL,
	"role" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_opened_at" timestamp with time zone,
	CONSTRAINT "members_workspace_id_user_id_pk" PRIMARY KEY("workspace_id","user_id"),
	CONSTRAINT "members_role" CHECK ("members"."role" in ('viewer', 'reviewer', 'editor', 'owner'))
);
--> statement-breakpoint
CREATE TABLE "password_resets" (
	"id" text PRIMARY KEY NOT NULL,
	"user_id" text NOT NULL,
	"token_hash" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone,
	CONSTRAINT "password_resets_token_unique" UNIQUE("token_hash"),
	CONSTRAINT "password_resets_expiry_later" CHECK ("password_resets"."expires_at" > "password_resets"."created_at")
);
--> statement-breakpoint
CREATE TABLE "rate_limits" (
	"key" text PRIMARY KEY NOT NULL,
	"hits" integer NOT NULL,
	"resets_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" text PRIMARY KEY NOT NULL,
	"user_id" text NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_seen_at" timestamp with time zone DEFAULT now() NOT NULL,
	"user_agent" text DEFAULT '' NOT NULL,
	"address_prefix" text DEFAULT '' NOT NULL,
	CONSTRAINT "sessions_id_is_digest" CHECK ("sessions"."id" ~ '^[0-9a-f]{64}$')
);
--> statement-breakpoint
CREATE TABLE "solve_jobs" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"mapping_draft_id" text NOT NULL,
	"kernel_version_id" text NOT NULL,
	"fabric_version_id" text NOT NULL,
	"requested_by" text NOT NULL,
	"state" text DEFAULT 'queued' NOT NULL,
	"settings" jsonb NOT NULL,
	"pins" jsonb NOT NULL,
	"start_placement" jsonb,
	"cancel_requested" boolean DEFAULT false NOT NULL,
	"worker" text,
	"attempt" integer DEFAULT 0 NOT NULL,
	"lease_until" timestamp with time zone,
	"boss_job_id" text,
	"phase" text DEFAULT '' NOT NULL,
	"best_objective" double precision,
	"bound" double precision,
	"gap_ratio" double precision,
	"elapsed_ms" integer DEFAULT 0 NOT NULL,
	"best" jsonb,
	"history" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"outcome" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"started_at" timestamp with time zone,
	"finished_at" timestamp with time zone,
	CONSTRAINT "solve_jobs_workspace_id_unique" UNIQUE("workspace_id","id"),
	CONSTRAINT "solve_jobs_state" CHECK ("solve_jobs"."state" in ('queued', 'running', 'done', 'failed', 'cancelled')),
	CONSTRAINT "solve_jobs_lease" CHECK (("solve_jobs"."state" = 'running') = ("solve_jobs"."lease_until" is not null)),
	CONSTRAINT "solve_jobs_finished" CHECK (("solve_jobs"."state" in ('done', 'failed', 'cancelled')) = ("solve_jobs"."finished_at" is not null)),
	CONSTRAINT "solve_jobs_history" CHECK (jsonb_typeof("solve_jobs"."history") = 'array' and jsonb_array_length("solve_jobs"."history") <= 400)
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" text PRIMARY KEY NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "users_email_unique" UNIQUE("email"),
	CONSTRAINT "users_email_lower" CHECK ("users"."email" = lower("users"."email") and "users"."email" like '%_@_%' and length("users"."email") <= 254),
	CONSTRAINT "users_name_length" CHECK (length(btrim("users"."name")) between 1 and 80)
);
--> statement-breakpoint
CREATE TABLE "worker_heartbeats" (
	"worker" text PRIMARY KEY NOT NULL,
	"started_at" timestamp with time zone DEFAULT now() NOT NULL,
	"beat_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "workspaces" (
	"id" text PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"slug" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "workspaces_slug_unique" UNIQUE("slug"),
	CONSTRAINT "workspaces_slug_form" CHECK ("workspaces"."slug" ~ '^[a-z0-9]([a-z0-9-]{0,46}[a-z0-9])?$'),
	CONSTRAINT "workspaces_name_length" CHECK (length(btrim("workspaces"."name")) between 1 and 80)
);
--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_actor_id_users_id_fk" FOREIGN KEY ("actor_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fabric_versions" ADD CONSTRAINT "fabric_versions_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fabric_versions" ADD CONSTRAINT "fabric_versions_fabric_fk" FOREIGN KEY ("workspace_id","fabric_id") REFERENCES "public"."fabrics"("workspace_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fabrics" ADD CONSTRAINT "fabrics_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fabrics" ADD CONSTRAINT "fabrics_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fabrics" ADD CONSTRAINT "fabrics_updated_by_users_id_fk" FOREIGN KEY ("updated_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_invited_by_users_id_fk" FOREIGN KEY ("invited_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "kernel_versions" ADD CONSTRAINT "kernel_versions_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "kernel_versions" ADD CONSTRAINT "kernel_versions_kernel_fk" FOREIGN KEY ("workspace_id","kernel_id") REFERENCES "public"."kernels"("workspace_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "kernels" ADD CONSTRAINT "kernels_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "kernels" ADD CONSTRAINT "kernels_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "kernels" ADD CONSTRAINT "kernels_updated_by_users_id_fk" FOREIGN KEY ("updated_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mapping_drafts" ADD CONSTRAINT "mapping_drafts_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mapping_drafts" ADD CONSTRAINT "mapping_drafts_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mapping_drafts" ADD CONSTRAINT "mapping_drafts_updated_by_users_id_fk" FOREIGN KEY ("updated_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mapping_drafts" ADD CONSTRAINT "mapping_drafts_kernel_version_fk" FOREIGN KEY ("workspace_id","kernel_version_id") REFERENCES "public"."kernel_versions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mapping_drafts" ADD CONSTRAINT "mapping_drafts_fabric_version_fk" FOREIGN KEY ("workspace_id","fabric_version_id") REFERENCES "public"."fabric_versions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mappings" ADD CONSTRAINT "mappings_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mappings" ADD CONSTRAINT "mappings_made_by_users_id_fk" FOREIGN KEY ("made_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mappings" ADD CONSTRAINT "mappings_kernel_version_fk" FOREIGN KEY ("workspace_id","kernel_version_id") REFERENCES "public"."kernel_versions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mappings" ADD CONSTRAINT "mappings_fabric_version_fk" FOREIGN KEY ("workspace_id","fabric_version_id") REFERENCES "public"."fabric_versions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mappings" ADD CONSTRAINT "mappings_draft_fk" FOREIGN KEY ("workspace_id","mapping_draft_id") REFERENCES "public"."mapping_drafts"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "members" ADD CONSTRAINT "members_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "members" ADD CONSTRAINT "members_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "password_resets" ADD CONSTRAINT "password_resets_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "solve_jobs" ADD CONSTRAINT "solve_jobs_requested_by_users_id_fk" FOREIGN KEY ("requested_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "solve_jobs" ADD CONSTRAINT "solve_jobs_draft_fk" FOREIGN KEY ("workspace_id","mapping_draft_id") REFERENCES "public"."mapping_drafts"("workspace_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "solve_jobs" ADD CONSTRAINT "solve_jobs_kernel_version_fk" FOREIGN KEY ("workspace_id","kernel_version_id") REFERENCES "public"."kernel_versions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "solve_jobs" ADD CONSTRAINT "solve_jobs_fabric_version_fk" FOREIGN KEY ("workspace_id","fabric_version_id") REFERENCES "public"."fabric_versions"("workspace_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "audit_entries_list" ON "audit_entries" USING btree ("workspace_id","created_at");--> statement-breakpoint
CREATE INDEX "audit_entries_subject" ON "audit_entries" USING btree ("workspace_id","subject_id");--> statement-breakpoint
CREATE INDEX "captured_mail_received" ON "captured_mail" USING btree ("received_at");--> statement-breakpoint
CREATE INDEX "fabrics_list" ON "fabrics" USING btree ("workspace_id","updated_at");--> statement-breakpoint
CREATE UNIQUE INDEX "invitations_one_pending" ON "invitations" USING btree ("workspace_id","email") WHERE accepted_at is null and revoked_at is null;--> statement-breakpoint
CREATE INDEX "invitations_workspace" ON "invitations" USING btree ("workspace_id","created_at");--> statement-breakpoint
CREATE INDEX "kernels_list" ON "kernels" USING btree ("workspace_id","updated_at");--> statement-breakpoint
CREATE INDEX "mapping_drafts_list" ON "mapping_drafts" USING btree ("workspace_id","updated_at");--> statement-breakpoint
CREATE INDEX "mapping_drafts_kernel_version" ON "mapping_drafts" USING btree ("kernel_version_id");--> statement-breakpoint
CREATE INDEX "mapping_drafts_fabric_version" ON "mapping_drafts" USING btree ("fabric_version_id");--> statement-breakpoint
CREATE INDEX "mappings_list" ON "mappings" USING btree ("workspace_id","created_at");--> statement-breakpoint
CREATE INDEX "mappings_kernel_version" ON "mappings" USING btree ("kernel_version_id");--> statement-breakpoint
CREATE INDEX "mappings_fabric_version" ON "mappings" USING btree ("fabric_version_id");--> statement-breakpoint
CREATE INDEX "members_user" ON "members" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "password_resets_user" ON "password_resets" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "rate_limits_resets" ON "rate_limits" USING btree ("resets_at");--> statement-breakpoint
CREATE INDEX "sessions_user" ON "sessions" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "sessions_expiry" ON "sessions" USING btree ("expires_at");--> statement-breakpoint
CREATE UNIQUE INDEX "solve_jobs_one_live" ON "solve_jobs" USING btree ("mapping_draft_id") WHERE state in ('queued', 'running');--> statement-breakpoint
CREATE INDEX "solve_jobs_live" ON "solve_jobs" USING btree ("state","lease_until") WHERE state in ('queued', 'running');