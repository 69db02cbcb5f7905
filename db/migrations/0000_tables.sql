CREATE TABLE "audit_events" (
	"org_id" uuid NOT NULL,
	"seq" integer NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"actor_kind" text NOT NULL,
	"actor_id" uuid,
	"actor_name" text NOT NULL,
	"action" text NOT NULL,
	"subject_kind" text NOT NULL,
	"subject_id" uuid,
	"detail" jsonb NOT NULL,
	"previous_hash" text NOT NULL,
	"hash" text NOT NULL,
	CONSTRAINT "audit_events_org_id_seq_pk" PRIMARY KEY("org_id","seq")
);
--> statement-breakpoint
CREATE TABLE "counters" (
	"org_id" uuid PRIMARY KEY NOT NULL,
	"audit_seq" integer DEFAULT 0 NOT NULL,
	"audit_hash" text DEFAULT '' NOT NULL,
	"change_number" integer DEFAULT 0 NOT NULL
);
--> statement-breakpoint
CREATE TABLE "idempotency_keys" (
	"org_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"key" text NOT NULL,
	"request_digest" text NOT NULL,
	"status" integer,
	"body" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "idempotency_keys_org_id_person_id_key_pk" PRIMARY KEY("org_id","person_id","key")
);
--> statement-breakpoint
CREATE TABLE "rate_limits" (
	"key" text PRIMARY KEY NOT NULL,
	"points" integer DEFAULT 0 NOT NULL,
	"expire" bigint
);
--> statement-breakpoint
CREATE TABLE "change_events" (
	"org_id" uuid NOT NULL,
	"change_id" uuid NOT NULL,
	"seq" integer NOT NULL,
	"action" text NOT NULL,
	"by_id" uuid NOT NULL,
	"by_name" text NOT NULL,
	"by_role" text NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"meaning" text,
	"remark" text DEFAULT '' NOT NULL,
	"payload" jsonb NOT NULL,
	"content_hash" text NOT NULL,
	"previous_hash" text NOT NULL,
	"hash" text NOT NULL,
	CONSTRAINT "change_events_org_id_change_id_seq_pk" PRIMARY KEY("org_id","change_id","seq")
);
--> statement-breakpoint
CREATE TABLE "changes" (
	"org_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"number" integer NOT NULL,
	"axis_id" uuid NOT NULL,
	"from_gain_set_id" uuid,
	"to_gain_set_id" uuid NOT NULL,
	"state" text NOT NULL,
	"reason" text NOT NULL,
	"risk" text DEFAULT '' NOT NULL,
	"test" text DEFAULT '' NOT NULL,
	"way_back" text DEFAULT '' NOT NULL,
	"temporary_until" timestamp with time zone,
	"safety_function" text NOT NULL,
	"site_reference" text DEFAULT '' NOT NULL,
	"author_id" uuid NOT NULL,
	"author_name" text NOT NULL,
	"technician_id" uuid,
	"content_hash" text NOT NULL,
	"row_version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"changed_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "changes_org_id_id_pk" PRIMARY KEY("org_id","id"),
	CONSTRAINT "changes_number" UNIQUE("org_id","number")
);
--> statement-breakpoint
CREATE TABLE "field_reports" (
	"org_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"change_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"identity" jsonb,
	"as_found" jsonb,
	"as_left" jsonb,
	"saved" text,
	"remark" text DEFAULT '' NOT NULL,
	"entered_by" uuid NOT NULL,
	"entered_by_name" text NOT NULL,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "field_reports_org_id_id_pk" PRIMARY KEY("org_id","id")
);
--> statement-breakpoint
CREATE TABLE "gain_sets" (
	"org_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"axis_id" uuid NOT NULL,
	"version" integer NOT NULL,
	"load_cases" jsonb NOT NULL,
	"controller" jsonb NOT NULL,
	"convention" jsonb NOT NULL,
	"device_rows" jsonb NOT NULL,
	"rule" text,
	"settings" jsonb,
	"requirement" jsonb NOT NULL,
	"actuator" jsonb NOT NULL,
	"sample_time_s" double precision,
	"checks" jsonb NOT NULL,
	"worst_case" text NOT NULL,
	"verdict" jsonb NOT NULL,
	"engines" jsonb NOT NULL,
	"reason" text NOT NULL,
	"digest" text NOT NULL,
	"created_by" uuid NOT NULL,
	"created_by_name" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "gain_sets_org_id_id_pk" PRIMARY KEY("org_id","id"),
	CONSTRAINT "gain_sets_version" UNIQUE("org_id","axis_id","version")
);
--> statement-breakpoint
CREATE TABLE "axes" (
	"org_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"machine_id" uuid NOT NULL,
	"tag" text NOT NULL,
	"name" text NOT NULL,
	"measurement_unit" text NOT NULL,
	"output_unit" text NOT NULL,
	"actuator_low" double precision,
	"actuator_high" double precision,
	"actuator_slew" double precision,
	"sample_time_s" double precision,
	"filter" jsonb,
	"convention" jsonb NOT NULL,
	"requirement" jsonb NOT NULL,
	"device_label" text DEFAULT '' NOT NULL,
	"in_service_gain_set_id" uuid,
	"in_service_since" timestamp with time zone,
	"last_version" integer DEFAULT 0 NOT NULL,
	"row_version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "axes_org_id_id_pk" PRIMARY KEY("org_id","id"),
	CONSTRAINT "axes_tag" UNIQUE("org_id","machine_id","tag")
);
--> statement-breakpoint
CREATE TABLE "load_cases" (
	"org_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"axis_id" uuid NOT NULL,
	"name" text NOT NULL,
	"position" integer NOT NULL,
	"plant" jsonb,
	CONSTRAINT "load_cases_org_id_id_pk" PRIMARY KEY("org_id","id"),
	CONSTRAINT "load_cases_name" UNIQUE("org_id","axis_id","name")
);
--> statement-breakpoint
CREATE TABLE "machines" (
	"org_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"site" text NOT NULL,
	"name" text NOT NULL,
	"cautions" text DEFAULT '' NOT NULL,
	"row_version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "machines_org_id_id_pk" PRIMARY KEY("org_id","id"),
	CONSTRAINT "machines_name" UNIQUE("org_id","site","name")
);
--> statement-breakpoint
CREATE TABLE "inbox_messages" (
	"org_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"message_id" text NOT NULL,
	"to_email" text NOT NULL,
	"subject" text NOT NULL,
	"body" text NOT NULL,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "inbox_messages_org_id_id_pk" PRIMARY KEY("org_id","id"),
	CONSTRAINT "inbox_messages_message_id_unique" UNIQUE("message_id")
);
--> statement-breakpoint
CREATE TABLE "outbox_messages" (
	"org_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"kind" text NOT NULL,
	"to_email" text NOT NULL,
	"to_name" text NOT NULL,
	"subject" text NOT NULL,
	"body" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"next_attempt_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_error" text,
	"sent_at" timestamp with time zone,
	CONSTRAINT "outbox_messages_org_id_id_pk" PRIMARY KEY("org_id","id")
);
--> statement-breakpoint
CREATE TABLE "api_tokens" (
	"org_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"person_id" uuid NOT NULL,
	"name" text NOT NULL,
	"token_hash" text NOT NULL,
	"role" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"last_used_at" timestamp with time zone,
	CONSTRAINT "api_tokens_org_id_id_pk" PRIMARY KEY("org_id","id"),
	CONSTRAINT "api_tokens_token_hash_unique" UNIQUE("token_hash")
);
--> statement-breakpoint
CREATE TABLE "memberships" (
	"org_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"roles" text[] NOT NULL,
	CONSTRAINT "memberships_org_id_person_id_pk" PRIMARY KEY("org_id","person_id")
);
--> statement-breakpoint
CREATE TABLE "organisations" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"one_person_shop" boolean DEFAULT false NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "persons" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"deactivated_at" timestamp with time zone,
	CONSTRAINT "persons_email_unique" UNIQUE("email")
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"person_id" uuid NOT NULL,
	"org_id" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"ended_at" timestamp with time zone
);
--> statement-breakpoint
ALTER TABLE "counters" ADD CONSTRAINT "counters_org_id_organisations_id_fk" FOREIGN KEY ("org_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "change_events" ADD CONSTRAINT "change_events_org_id_change_id_changes_org_id_id_fk" FOREIGN KEY ("org_id","change_id") REFERENCES "public"."changes"("org_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "changes" ADD CONSTRAINT "changes_org_id_axis_id_axes_org_id_id_fk" FOREIGN KEY ("org_id","axis_id") REFERENCES "public"."axes"("org_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "changes" ADD CONSTRAINT "changes_org_id_to_gain_set_id_gain_sets_org_id_id_fk" FOREIGN KEY ("org_id","to_gain_set_id") REFERENCES "public"."gain_sets"("org_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "changes" ADD CONSTRAINT "changes_org_id_from_gain_set_id_gain_sets_org_id_id_fk" FOREIGN KEY ("org_id","from_gain_set_id") REFERENCES "public"."gain_sets"("org_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "field_reports" ADD CONSTRAINT "field_reports_org_id_change_id_changes_org_id_id_fk" FOREIGN KEY ("org_id","change_id") REFERENCES "public"."changes"("org_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "gain_sets" ADD CONSTRAINT "gain_sets_org_id_axis_id_axes_org_id_id_fk" FOREIGN KEY ("org_id","axis_id") REFERENCES "public"."axes"("org_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "axes" ADD CONSTRAINT "axes_org_id_machine_id_machines_org_id_id_fk" FOREIGN KEY ("org_id","machine_id") REFERENCES "public"."machines"("org_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "load_cases" ADD CONSTRAINT "load_cases_org_id_axis_id_axes_org_id_id_fk" FOREIGN KEY ("org_id","axis_id") REFERENCES "public"."axes"("org_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "machines" ADD CONSTRAINT "machines_org_id_organisations_id_fk" FOREIGN KEY ("org_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "api_tokens" ADD CONSTRAINT "api_tokens_org_id_organisations_id_fk" FOREIGN KEY ("org_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "api_tokens" ADD CONSTRAINT "api_tokens_person_id_persons_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."persons"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_org_id_organisations_id_fk" FOREIGN KEY ("org_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_person_id_persons_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."persons"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_person_id_persons_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."persons"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_org_id_organisations_id_fk" FOREIGN KEY ("org_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "audit_events_subject" ON "audit_events" USING btree ("org_id","subject_kind","subject_id");--> statement-breakpoint
CREATE INDEX "change_events_at" ON "change_events" USING btree ("org_id","at");--> statement-breakpoint
CREATE INDEX "changes_state" ON "changes" USING btree ("org_id","state");--> statement-breakpoint
CREATE INDEX "changes_axis" ON "changes" USING btree ("org_id","axis_id");--> statement-breakpoint
CREATE INDEX "field_reports_change" ON "field_reports" USING btree ("org_id","change_id");--> statement-breakpoint
CREATE INDEX "inbox_messages_received" ON "inbox_messages" USING btree ("org_id","received_at");--> statement-breakpoint
CREATE INDEX "outbox_messages_due" ON "outbox_messages" USING btree ("sent_at","next_attempt_at");--> statement-breakpoint
CREATE INDEX "memberships_person" ON "memberships" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "sessions_person" ON "sessions" USING btree ("person_id");